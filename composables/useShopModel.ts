import type { ModelView } from '#shared/types/model'

/** The model of the page's address. Its own 404 or 403, in words, becomes the page. */
export async function useShopModel() {
  const id = String(useRoute().params.id)
  const { data, error } = await useFetch<ModelView>(`/api/models/${id}`)
  const found = data.value
  if (error.value || !found) {
    throw createError({ statusCode: error.value?.statusCode ?? 500, message: problemOf(error.value)?.detail, fatal: true })
  }
  return { id, model: shallowRef<ModelView>(found) }
}

/** "1951–1959", "from 1951", "until 1959", or nothing. */
export function yearsInWords({ yearsFrom, yearsTo }: Pick<ModelView, 'yearsFrom' | 'yearsTo'>): string {
  if (yearsFrom !== null && yearsTo !== null) return yearsFrom === yearsTo ? String(yearsFrom) : `${yearsFrom}–${yearsTo}`
  if (yearsFrom !== null) return `from ${yearsFrom}`
  return yearsTo === null ? '' : `until ${yearsTo}`
}
