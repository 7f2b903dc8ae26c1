import { typedAmount } from '#shared/domain/amount'
import type { Checkpoint, Section } from '#shared/domain/checkpoint'
import { SECTION_LABELS, SECTION_QUANTITIES } from '#shared/domain/checkpoint'
import type { DecisionRule, DecisionRuleName } from '#shared/domain/decision'
import { DECISION_RULE_LABELS } from '#shared/domain/decision'
import type { Limit } from '#shared/domain/limits'
import { LIMIT_KIND_LABELS } from '#shared/domain/limits'
import type { Quantity } from '#shared/domain/reading'
import { settingKey } from '#shared/domain/procedure-suggestions'
import type { CheckpointAnswers } from '#shared/schemas/procedure'
import { checkpointRow } from '#shared/schemas/procedure'

/** A procedure as its form holds it: text, even where an amount is meant. */
export interface ProcedureAnswers {
  origin: string
  why: string
  warmUpMinutes: string
  supply: string
  decisionRule: DecisionRuleName
  guardFactor: string
  checkpoints: CheckpointAnswers[]
}

const NO_LIMIT: CheckpointAnswers['limit'] = { kind: 'none', amount: '', second: '', secondKind: 'absolute' }

function limitAnswers(limit: Limit | null, quantity: Quantity): CheckpointAnswers['limit'] {
  if (limit === null) return { ...NO_LIMIT }
  const typed = (kind: string, amount: number) => kind === 'absolute' || kind === 'between' || kind === 'at_least' || kind === 'at_most' ? typedAmount(amount, quantity) : String(amount)
  switch (limit.kind) {
    case 'between': return { ...NO_LIMIT, kind: limit.kind, amount: typed('between', limit.lower), second: typed('between', limit.upper) }
    case 'at_least':
    case 'at_most': return { ...NO_LIMIT, kind: limit.kind, amount: typed(limit.kind, limit.value) }
    case 'larger_of': return { kind: limit.kind, amount: String(limit.of[0].amount), second: typed(limit.of[1].kind, limit.of[1].amount), secondKind: limit.of[1].kind }
    default: return { ...NO_LIMIT, kind: limit.kind, amount: typed(limit.kind, limit.amount) }
  }
}

/** A checkpoint as its row of the form shows it. */
export function checkpointAnswers(point: Checkpoint): CheckpointAnswers {
  const { section, bandLabel, label, quantity, atHz, nominal, span, limit } = point
  return {
    section, bandLabel, label, quantity,
    at: atHz === null || section === 'dial' ? '' : typedAgain(atHz),
    nominal: nominal === null ? '' : quantity === 'frequency' && Number.isInteger(nominal) ? typedAgain(nominal) : typedAmount(nominal, quantity),
    span: span === null ? '' : typedAmount(span, quantity),
    limit: limitAnswers(limit, quantity),
  }
}

/** An empty row of a section. */
export function emptyCheckpoint(section: Section, like?: CheckpointAnswers): CheckpointAnswers {
  return {
    section, bandLabel: like?.bandLabel ?? '', label: section === 'dial' ? '' : like?.label ?? '', quantity: like?.quantity ?? SECTION_QUANTITIES[section],
    at: '', nominal: '', span: like?.span ?? '', limit: like ? { ...like.limit } : { ...NO_LIMIT },
  }
}

interface Written { origin: string, warmUpMinutes: number | null, supply: string, decisionRule: DecisionRule, checkpoints: readonly Checkpoint[] }

/** A version as its form opens it, ready for the next. */
export function procedureAnswers({ origin, warmUpMinutes, supply, decisionRule, checkpoints }: Written): ProcedureAnswers {
  return {
    origin, why: '', warmUpMinutes: String(warmUpMinutes ?? ''), supply, decisionRule: decisionRule.rule, guardFactor: String(decisionRule.factor),
    checkpoints: checkpoints.map(checkpointAnswers),
  }
}

/** A row's checkpoint; null while something in it can't be read. */
function pointOf(row: CheckpointAnswers): Checkpoint | null {
  const read = checkpointRow.safeParse(row)
  return read.success ? read.data : null
}

/** Where a dial point belongs among the rows: after the settings below it in its band, else before the band's first, else last. */
function placeOf(rows: readonly CheckpointAnswers[], { bandLabel, nominal }: Checkpoint): number {
  const points = rows.map(pointOf)
  const isOfBand = (point: Checkpoint | null) => point?.section === 'dial' && point.bandLabel === bandLabel
  const below = points.findLastIndex(point => isOfBand(point) && (point?.nominal ?? 0) <= (nominal ?? 0))
  if (below >= 0) return below + 1
  const first = points.findIndex(isOfBand)
  return first >= 0 ? first : rows.length
}

/** Rows with more checkpoints: dial points in their place, others at the end, and nothing twice. */
export function withCheckpoints(rows: readonly CheckpointAnswers[], made: readonly Checkpoint[]): CheckpointAnswers[] {
  const keys = new Set(rows.flatMap(row => pointOf(row) ?? []).map(settingKey))
  const together = [...rows]
  for (const point of made.filter(each => !keys.has(settingKey(each)))) {
    together.splice(point.section === 'dial' ? placeOf(together, point) : together.length, 0, checkpointAnswers(point))
  }
  return together
}

/** A row as one line, however its amounts were typed: "Dial: A, 320 kHz, ± per cent of setting 2". */
function rowInWords(typed: CheckpointAnswers): string {
  const point = pointOf(typed)
  const { section, bandLabel, label, at, nominal, span, limit } = point ? checkpointAnswers(point) : typed
  const kind = limit.kind === 'none' ? 'no limit' : LIMIT_KIND_LABELS[limit.kind]
  return `${SECTION_LABELS[section]}: ${[bandLabel, label, at, nominal, span && `full scale ${span}`, [kind, limit.amount, limit.second].filter(Boolean).join(' ')].filter(Boolean).join(', ')}`
}

/** The lines of one that the other has not; all of them where only the order differs. */
function linesBeyond(rows: readonly CheckpointAnswers[], others: readonly CheckpointAnswers[]): string {
  const [own, theirs] = [rows.map(rowInWords), others.map(rowInWords)]
  const isSame = own.length === theirs.length && own.every(line => theirs.includes(line)) && theirs.every(line => own.includes(line))
  return (isSame ? own : own.filter(line => !theirs.includes(line))).join('\n')
}

/** Two procedures side by side, field by field, for a person to choose between. */
export function bothProcedures(theirs: ProcedureAnswers, yours: ProcedureAnswers): { label: string, theirs: string, yours: string }[] {
  const row = (label: string, words: (of: ProcedureAnswers) => string) => ({ label, theirs: words(theirs), yours: words(yours) })
  return [
    row('Limits from', of => of.origin),
    row('Warm-up', of => of.warmUpMinutes),
    row('Supply', of => of.supply),
    row('How a reading is judged', of => of.decisionRule === 'simple' ? DECISION_RULE_LABELS.simple : `${DECISION_RULE_LABELS.guard_band}, ${of.guardFactor} × U`),
    { label: 'Checkpoints', theirs: linesBeyond(theirs.checkpoints, yours.checkpoints), yours: linesBeyond(yours.checkpoints, theirs.checkpoints) },
  ]
}
