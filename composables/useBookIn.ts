import type { Ownership, SourceKind } from '#shared/domain/acquisition'
import type { EquipmentKind } from '#shared/domain/equipment-kinds'
import type { KeptWithKind, Originality } from '#shared/domain/kept-with'
import type { Knowledge } from '#shared/domain/knowledge'
import type { KitFinding } from '#shared/schemas/unit'
import type { ModelView } from '#shared/types/model'

export interface BookInAnswers {
  modelId: string | null
  /** Asked instead of choosing one when the shop does not know the model. */
  newModel: { maker: string, designation: string, kind: EquipmentKind | '' } | null
  serialAnswer: Knowledge | ''
  serial: string
  conditionNotes: string
  supplyAsSet: string
  ownership: Ownership | ''
  sourceKind: SourceKind | ''
  sourceName: string
  sourceNote: string
  acquiredOn: string
  cost: string
  placeTag: string
  /** By the line of the model's kit; a line without an answer was not looked for. */
  kit: Record<string, { found: KitFinding | '', count: string }>
  extras: { kind: KeptWithKind, description: string, originality: Originality, condition: string }[]
}

/** What stays from one piece of a run to the next: they came together and go to the same place. */
const STAYING = ['ownership', 'sourceKind', 'sourceName', 'sourceNote', 'acquiredOn', 'placeTag'] as const

function emptyAnswers(today: string): BookInAnswers {
  return {
    modelId: null, newModel: null, serialAnswer: '', serial: '', conditionNotes: '', supplyAsSet: '', ownership: '', sourceKind: '',
    sourceName: '', sourceNote: '', acquiredOn: today, cost: '', placeTag: '', kit: {}, extras: [],
  }
}

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null

/** A draft as this browser kept it; null for none, or for one of an older shape. */
function readDraft(text: string | null, shape: BookInAnswers): BookInAnswers | null {
  if (!text) return null
  try {
    const kept: unknown = JSON.parse(text)
    return isDraft(kept, shape) ? kept : null
  } catch {
    return null
  }
}
function isDraft(kept: unknown, shape: BookInAnswers): kept is BookInAnswers {
  return isRecord(kept) && Object.entries(shape).every(([key, value]) =>
    key in kept && (value === null || (typeof kept[key] === typeof value && Array.isArray(kept[key]) === Array.isArray(value))))
}

/**
 * The answers of a booking-in. What is typed is kept in this browser until the piece is booked in, so that a call, a
 * flat battery or a wrong tap loses nothing; photos can't be kept so.
 */
export function useBookIn() {
  const session = useSessionStore()
  const today = useState('book-in-today', () => new Intl.DateTimeFormat('en-CA', { timeZone: session.shop?.timeZone ?? 'UTC' }).format(new Date()))
  const answers = ref(emptyAnswers(today.value))
  const model = shallowRef<ModelView | null>(null)
  const isRestored = ref(false)
  const key = `knurl-book-in-${session.person?.id ?? ''}`

  /** Takes a model by its id, with its kit to be counted. */
  async function takeModel(id: string | null) {
    answers.value.modelId = id
    model.value = id === null ? null : await $fetch<ModelView>(`/api/models/${id}`).catch(() => null)
    if (model.value === null) {
      answers.value.modelId = null
      answers.value.kit = {}
      return
    }
    const before = answers.value.kit
    answers.value.kit = Object.fromEntries(model.value.kit.map(line => [line.id, before[line.id] ?? { found: '', count: String(line.quantity) }]))
  }

  onMounted(async () => {
    const kept = readDraft(localStorage.getItem(key), emptyAnswers(today.value))
    if (kept) {
      answers.value = kept
      isRestored.value = kept.modelId !== null || kept.newModel !== null || kept.serial !== '' || kept.conditionNotes !== ''
      await takeModel(kept.modelId)
    }
    watch(answers, now => localStorage.setItem(key, JSON.stringify(now)), { deep: true })
  })

  /** Empties the form for the next piece; with `staying` what a run has in common stays. */
  function startAfresh(staying: boolean) {
    const before = answers.value
    const next = emptyAnswers(today.value)
    answers.value = staying ? { ...next, ...Object.fromEntries(STAYING.map(field => [field, before[field]])) } : next
    model.value = null
    isRestored.value = false
  }

  /** As the server takes it. */
  function toSend() {
    const { kit, ...rest } = answers.value
    const consigned = rest.ownership === 'consigned'
    return {
      ...rest,
      cost: consigned || !session.can('cost.read') ? '' : rest.cost,
      kit: (model.value?.kit ?? []).map((line) => {
        const { found, count } = kit[line.id] ?? { found: '', count: '' }
        return { kitItemId: line.id, found: found || 'not_looked', count: found === 'here' ? count : null }
      }),
    }
  }

  return { answers, model, isRestored, takeModel, startAfresh, toSend }
}
