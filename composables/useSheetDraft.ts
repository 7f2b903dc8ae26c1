import type { DraftKey, SheetDraft } from '#shared/domain/sheet-draft'
import { changedKeys, draftOf, mergeDrafts, patchOf, readingKeyOf, withFields } from '#shared/domain/sheet-draft'
import { readTaken } from '#shared/domain/taken'
import { toFieldErrors } from '#shared/schemas/field-errors'
import { readKeptDraft } from '#shared/schemas/sheet-draft'
import { savedTestSheet } from '#shared/schemas/test-sheet'
import type { TestSheetView } from '#shared/types/bench'
import type { FieldError } from '#shared/types/problem'

/**
 * `saved`: the server has all of it. `changed`: about to be sent. `held`: something can't be read and waits to be put
 * right; all else is saved. `unreachable`: kept on this device, sent again by itself. `conflict`: somebody else wrote the
 * same field. `refused`: the server won't take it, and says why.
 */
export type SaveState = 'saved' | 'changed' | 'saving' | 'held' | 'unreachable' | 'conflict' | 'refused'

export interface DraftConflict { key: DraftKey, mine: SheetDraft, theirs: SheetDraft }

const SAVE_AFTER_MS = 1200
const RETRY_AFTER_MS = 5000

/**
 * A test sheet as it is filled in: kept on this device at every keystroke, saved by itself, one save at a time. What can't
 * be read stays in its field and holds nothing else back. What somebody else saved meanwhile is brought in. The draft is
 * never changed in place: each part keeps its identity until it is written, so that only what was written is judged anew.
 */
export function useSheetDraft(opened: TestSheetView) {
  const address = `/api/units/${opened.unitTag}/test-sheets/${opened.number}`
  const storageKey = `knurl:test-sheet:${opened.unitTag}:${opened.number}`
  const sheet = shallowRef(opened)
  const draft = shallowRef<SheetDraft>(draftOf(opened))
  const base = shallowRef<SheetDraft>(draftOf(opened))
  const state = ref<SaveState>('saved')
  const refusal = ref('')
  const notice = ref('')
  const conflicts = shallowRef<DraftConflict[]>([])
  let running: Promise<void> | null = null
  let retry: ReturnType<typeof setTimeout> | undefined

  const dirty = () => changedKeys(base.value, draft.value)

  /** What is wrong with one field, at its path on the form. */
  function problemsOf(key: DraftKey): FieldError[] {
    const of = readingKeyOf(key)
    if (of && (of.part === 'found' || of.part === 'left')) {
      const point = sheet.value.readings.find(each => each.position === of.position)
      const typed = draft.value.readings[of.position]?.[of.part] ?? ''
      if (!point || typed.trim() === '') return []
      const taken = readTaken(typed, point)
      return taken.ok ? [] : [{ path: key, message: taken.sentence }]
    }
    const parsed = savedTestSheet.safeParse({ version: sheet.value.version, ...patchOf(draft.value, [key]) })
    if (!parsed.success) return toFieldErrors(parsed.error)
    return key === 'drift' ? driftProblems() : []
  }
  /** The warm-up is one field: a row of it that can't be read holds the whole back. */
  function driftProblems(): FieldError[] {
    const { quantity, readings } = draft.value.drift
    return readings.flatMap(({ minutes, text }, index) => {
      if (minutes.trim() === '' && text.trim() === '') return []
      const taken = readTaken(text, { section: 'other', quantity, nominal: null, atHz: null })
      return taken.ok ? [] : [{ path: `drift.readings.${index}.text`, message: taken.sentence }]
    })
  }
  const problems = computed(() => dirty().flatMap(problemsOf))

  function keep() {
    if (dirty().length > 0) localStorage.setItem(storageKey, JSON.stringify({ base: base.value, draft: draft.value }))
    else localStorage.removeItem(storageKey)
  }

  /** Brings in the sheet as it stands on the server; mine stays where I wrote, and a field that both wrote is asked about. */
  function join(from: SheetDraft, mine: SheetDraft, fresh: TestSheetView) {
    const theirs = draftOf(fresh)
    const joined = mergeDrafts(from, mine, theirs)
    sheet.value = fresh
    base.value = theirs
    draft.value = joined.merged
    conflicts.value = joined.conflicts.map(key => ({ key, mine: joined.merged, theirs }))
    if (conflicts.value.length > 0) state.value = 'conflict'
  }

  function choose(conflict: DraftConflict, whose: 'mine' | 'theirs') {
    if (whose === 'theirs') draft.value = withFields(draft.value, conflict.theirs, [conflict.key])
    conflicts.value = conflicts.value.filter(each => each !== conflict)
    if (conflicts.value.length === 0) void save()
  }

  async function send(keys: DraftKey[]) {
    const sent = withFields(base.value, draft.value, keys)
    state.value = 'saving'
    try {
      sheet.value = await $fetch<TestSheetView>(address, { method: 'PATCH', body: { version: sheet.value.version, ...patchOf(sent, keys) } })
      base.value = sent
      refusal.value = ''
    } catch (error) {
      await failed(problemOf(error))
    }
  }

  async function failed(problem: ReturnType<typeof problemOf>) {
    if (problem?.code === 'stale') {
      const fresh = await $fetch<TestSheetView>(address).catch(() => null)
      if (fresh && fresh.signedAt === null) {
        join(base.value, draft.value, fresh)
        notice.value = 'Somebody else saved this sheet too. What they wrote has been brought in.'
        return
      }
    }
    if (problem) {
      state.value = 'refused'
      refusal.value = problem.detail
      return
    }
    state.value = 'unreachable'
    retry = setTimeout(() => void save(), RETRY_AFTER_MS)
  }

  /** Brings in photographs added since, and nothing else: what is typed here stays as it is. */
  async function refreshPhotos() {
    const fresh = await $fetch<TestSheetView>(address).catch(() => null)
    if (!fresh) return
    const taken = new Map(fresh.readings.map(({ position, photoIds }) => [position, photoIds]))
    sheet.value = { ...sheet.value, readings: sheet.value.readings.map(reading => ({ ...reading, photoIds: taken.get(reading.position) ?? reading.photoIds })) }
  }

  async function saveAll() {
    for (let round = 0; round < 5 && conflicts.value.length === 0; round += 1) {
      const keys = dirty()
      const sendable = keys.filter(key => problemsOf(key).length === 0)
      if (sendable.length === 0) {
        state.value = keys.length > 0 ? 'held' : 'saved'
        break
      }
      await send(sendable)
      if (state.value === 'unreachable' || state.value === 'refused') break
    }
    keep()
  }

  /** Sends what has changed; a call while one is under way waits for it and then sends the rest. */
  async function save(): Promise<void> {
    clearTimeout(retry)
    if (running) await running
    running ??= saveAll().finally(() => running = null)
    await running
  }

  watch(draft, () => {
    if (!import.meta.client) return
    if (dirty().length > 0 && ['saved', 'held', 'refused'].includes(state.value)) state.value = 'changed'
    keep()
  })
  watchDebounced(draft, () => state.value !== 'conflict' && void save(), { debounce: SAVE_AFTER_MS })
  useEventListener('online', () => void save())

  onMounted(() => {
    const kept = readKept(storageKey)
    const mine = kept && readKeptDraft(kept.draft, base.value)
    const from = kept && readKeptDraft(kept.base, base.value)
    if (!mine || !from) return
    join(from, mine, sheet.value)
    if (dirty().length > 0) notice.value = 'What you had typed on this device, and was not saved yet, is back.'
  })
  onBeforeRouteLeave(() => save())
  onScopeDispose(() => clearTimeout(retry))

  return { sheet, draft, base, state: readonly(state), refusal: readonly(refusal), notice: readonly(notice), conflicts, problems, save, choose, refreshPhotos }
}

function readKept(storageKey: string): { base: unknown, draft: unknown } | null {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(storageKey) ?? 'null')
    return typeof kept === 'object' && kept !== null && 'base' in kept && 'draft' in kept ? { base: kept.base, draft: kept.draft } : null
  } catch {
    // What is not JSON is no draft of ours.
    return null
  }
}
