import type { Page } from '#shared/types/page'

interface Place { tag: string, path: string, retiredAt: string | null }

/** Every place in use, from the room inwards, as a list to choose from by its tag. */
export async function usePlaces() {
  const { data } = await useFetch<Page<Place>>('/api/locations')
  return computed(() => (data.value?.items ?? []).filter(place => place.retiredAt === null).map(place => ({ value: place.tag, label: place.path })))
}
