import type { PartLotView } from '#shared/types/part'

/** The lot whose tag is in the page's address, and how to put a newer reading of it in its place. */
export async function useLot() {
  const address = `/api/parts/${String(useRoute().params.tag)}`
  const { data, error, refresh } = await useFetch<PartLotView>(address)
  if (error.value || !data.value) throw createError({ statusCode: error.value?.statusCode ?? 500, message: problemOf(error.value)?.detail, fatal: true })
  const lot = shallowRef<PartLotView>(data.value)
  async function reload() {
    await refresh()
    if (data.value) lot.value = data.value
  }
  return { address, lot, reload }
}
