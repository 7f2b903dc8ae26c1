import type { DecisionRule } from '#shared/domain/decision'
import { MOST_GUARD_FACTOR } from '#shared/domain/decision'
import { parseDecimal, toNumber } from '#shared/domain/decimal'
import type { Gauge } from '#shared/domain/evaluation'
import { evaluateReading, gaugeOf } from '#shared/domain/evaluation'
import type { DraftReading, SheetDraft } from '#shared/domain/sheet-draft'
import { EMPTY_READING } from '#shared/domain/sheet-draft'
import type { InstrumentView, ReadingView, TakenView } from '#shared/types/bench'

/** A reading as it stands on the form: what is typed, what is wrong with it, and what follows from what can be read. */
export interface SheetRow {
  point: ReadingView
  draft: DraftReading
  /** The point with what was typed, judged. */
  view: ReadingView
  problems: { found: string | null, left: string | null }
  /** A reading about ten or a thousand times off: kept, and asked about. */
  questions: { found: string | null, left: string | null }
}

interface Side { taken: TakenView | null, problem: string | null, question: string | null }
const NOTHING: Side = { taken: null, problem: null, question: null }

/**
 * What follows from a draft, row by row. A row is judged again only when its own words, its checkpoint, the instruments or
 * the rule have changed, so that a keystroke costs one row however long the sheet is.
 */
export function useSheetResults(points: () => readonly ReadingView[], draft: () => SheetDraft, offered: () => readonly InstrumentView[]) {
  const picked = computed(() => draft().instrumentIds)
  const testedOn = computed(() => draft().testedOn)
  const gauges = computed(() => offered().filter(({ id }) => picked.value.includes(id)).map(instrument => gaugeOf(instrument, testedOn.value)))
  const factorTyped = computed(() => draft().guardFactor)
  const ruleName = computed(() => draft().decisionRule)
  const rule = computed((): DecisionRule => {
    const read = parseDecimal(factorTyped.value)
    const factor = read.ok ? toNumber(read.decimal) : Number.NaN
    return { rule: ruleName.value, factor: factor >= 0 && factor <= MOST_GUARD_FACTOR ? factor : 1 }
  })

  const kept = new Map<number, { row: SheetRow, gauges: readonly Gauge[], rule: DecisionRule }>()
  function rowOf(point: ReadingView): SheetRow {
    const own = draft().readings[point.position] ?? EMPTY_READING
    const last = kept.get(point.position)
    if (last && last.row.draft === own && last.row.point === point && last.gauges === gauges.value && last.rule === rule.value) return last.row
    const row = judged(point, own, gauges.value, rule.value)
    kept.set(point.position, { row, gauges: gauges.value, rule: rule.value })
    return row
  }
  return { gauges, rule, rows: computed(() => points().map(rowOf)) }
}

function judged(point: ReadingView, draft: DraftReading, gauges: readonly Gauge[], rule: DecisionRule): SheetRow {
  const side = (typed: string): Side => {
    if (typed.trim() === '') return NOTHING
    const evaluated = evaluateReading(typed, point, gauges, draft.instrumentId || null, rule)
    return evaluated.ok
      ? { taken: { text: typed, result: evaluated.result }, problem: null, question: evaluated.taken.question }
      : { taken: null, problem: evaluated.sentence, question: null }
  }
  const [found, left] = [side(draft.found), side(draft.left)]
  return {
    point,
    draft,
    view: { ...point, found: found.taken, left: left.taken, instrumentId: draft.instrumentId || null, note: draft.note },
    problems: { found: found.problem, left: left.problem },
    questions: { found: found.question, left: left.question },
  }
}
