import type { LabelSheetView } from '#shared/types/label'

export interface LabelChoice { tags: readonly string[], sheet: string, start: number, copies: number }

/** The query of both the picture on the screen and the PDF. */
export function labelSearch({ tags, sheet, start, copies }: LabelChoice): string {
  return new URLSearchParams({ tags: tags.join(','), sheet, start: String(start), copies: String(copies) }).toString()
}

/** The first sheet of labels as it will print, asked for again a moment after the choice changes. */
export function useLabelSheet(choice: Readonly<Ref<LabelChoice>>) {
  const view = shallowRef<LabelSheetView | null>(null)
  const trouble = ref<string | null>(null)
  const pending = ref(false)
  let asked = 0

  async function ask() {
    const mine = ++asked
    trouble.value = null
    if (choice.value.tags.length === 0) {
      view.value = null
      pending.value = false
      return
    }
    pending.value = true
    try {
      const answer = await $fetch<LabelSheetView>(`/api/labels/sheet?${labelSearch(choice.value)}`)
      if (mine === asked) view.value = answer
    } catch (error) {
      if (mine !== asked) return
      view.value = null
      trouble.value = problemOf(error)?.detail ?? 'The shop’s server could not be reached. Try again.'
    } finally {
      if (mine === asked) pending.value = false
    }
  }
  watchDebounced(choice, ask, { debounce: 150, deep: true })
  onMounted(ask)
  return { view, trouble: readonly(trouble), pending: readonly(pending) }
}
