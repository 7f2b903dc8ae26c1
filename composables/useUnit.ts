import type { UnitView } from '#shared/types/unit'

/** The unit of the page's address. Its own 404 or 403, in words, becomes the page. */
export async function useUnit() {
  const tag = String(useRoute().params.tag)
  const { data, error, refresh } = await useFetch<UnitView>(`/api/units/${tag}`)
  const found = data.value
  if (error.value || !found) {
    throw createError({ statusCode: error.value?.statusCode ?? 500, message: problemOf(error.value)?.detail, fatal: true })
  }
  const unit = shallowRef<UnitView>(found)
  /** Reads it again after a write. */
  async function reload() {
    await refresh()
    if (data.value) unit.value = data.value
  }
  return { tag, unit, reload }
}

/** `Oxmarden 307-G`, as a page names a unit. */
export const unitName = (unit: Pick<UnitView, 'model'>) => `${unit.model.maker} ${unit.model.designation}`
