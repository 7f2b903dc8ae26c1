/** Where the batch is kept in the tab, so that a reload does not lose it. */
const KEY = 'knurl.label-batch'

function stored(): string[] {
  try {
    const kept: unknown = JSON.parse(sessionStorage.getItem(KEY) ?? '[]')
    return Array.isArray(kept) ? kept.filter(tag => typeof tag === 'string') : []
  } catch {
    // Storage is closed to us or holds something else: the batch begins empty.
    return []
  }
}

function store(tags: readonly string[]): void {
  try {
    sessionStorage.setItem(KEY, JSON.stringify(tags))
  } catch {
    // Full, or closed to us: the batch still lives as long as the page.
  }
}

/** The tags picked for the next sheet of labels, in the order picked: units, places, kept-with items alike. */
export const useLabelBatchStore = defineStore('label-batch', () => {
  const picked = ref<string[]>([])
  const tags = computed<readonly string[]>(() => picked.value)
  const count = computed(() => picked.value.length)
  const has = (tag: string) => picked.value.includes(tag)

  function addMany(more: readonly string[]) {
    picked.value = [...new Set([...picked.value, ...more])]
  }
  const add = (tag: string) => addMany([tag])
  function remove(tag: string) {
    picked.value = picked.value.filter(each => each !== tag)
  }
  function clear() {
    picked.value = []
  }

  if (import.meta.client) {
    // After hydration, because the server knows nothing of this tab.
    onNuxtReady(() => {
      addMany(stored())
      watch(picked, store)
    })
  }
  return { picked, tags, count, has, add, addMany, remove, clear }
})
