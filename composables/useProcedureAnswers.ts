import { typedAmount } from '#shared/domain/amount'
import type { Checkpoint, Section } from '#shared/domain/checkpoint'
import { SECTION_QUANTITIES } from '#shared/domain/checkpoint'
import type { DecisionRule, DecisionRuleName } from '#shared/domain/decision'
import type { Limit } from '#shared/domain/limits'
import type { Quantity } from '#shared/domain/reading'
import type { CheckpointAnswers } from '#shared/schemas/procedure'

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
