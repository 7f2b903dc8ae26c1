import { eq, sql } from 'drizzle-orm'
import { models, units } from '../../drizzle/schema'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { factInWords } from '../../shared/domain/knowledge'
import { formatMoney } from '../../shared/domain/money'
import { may } from '../../shared/domain/roles'
import type { AskingPrice, ChangedUnit } from '../../shared/schemas/unit'
import type { Person } from '../../shared/types/person'
import type { UnitView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { forbidden, invalid, stale } from '../utils/errors'
import { refreshCoverage } from './coverage'
import { appendUnitLedger } from './ledger'
import { holdModelForField } from './models'
import { partyNamed } from './parties'
import { todayInShop } from './shop-day'
import { readAmount, shopCurrency } from './shop-money'
import type { UnitRow } from './unit-lock'
import { lockUnit } from './unit-lock'
import { getUnitView } from './unit-view'

type Change = ChangedUnit & { tag: string }
type Columns = Pick<UnitRow, 'modelId' | 'serialAnswer' | 'serial' | 'conditionNotes' | 'supplyAsSet' | 'ownership' | 'sourceKind' | 'sourcePartyId' | 'sourceNote' | 'acquiredOn' | 'costMinor' | 'costCurrency'>

/**
 * Changes a unit's record: what is not given stays as it is. Each changed field stands in the ledger, cost in an entry
 * of its own.
 *
 * 403 for a cost or a name from somebody who may not see such; 409 with the unit as it stands if somebody else changed
 * it meanwhile; 422 at the field otherwise.
 */
export async function editUnit(db: Database, actor: Person, change: Change): Promise<UnitView> {
  refuseHidden(actor, change)
  return db.transaction(async (tx) => {
    if (change.modelId !== undefined) await holdModelForField(tx, change.modelId, 'modelId')
    const unit = await lockUnit(tx, change.tag)
    if (unit.version !== change.version) throw stale('unit', await getUnitView(tx, actor, change.tag))
    const next = await columnsAfter(tx, unit, change)
    await requireSense(tx, unit, next)
    const record = await changesOfRecord(tx, unit, next)
    const cost = changesOfCost(unit, next)
    if (record.length + cost.length === 0) return getUnitView(tx, actor, change.tag)
    await tx.update(units).set({ ...next, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
    if (record.length > 0) await appendUnitLedger(tx, actor, unit.id, 'edited', { changes: record })
    if (cost.length > 0) await appendUnitLedger(tx, actor, unit.id, 'cost_changed', { changes: cost })
    if (next.modelId !== unit.modelId) await refreshCoverage(tx, actor, { unitIds: [unit.id] })
    return getUnitView(tx, actor, change.tag)
  })
}

/** Who may not see a cost or a name may not overwrite it unseen either. */
function refuseHidden(actor: Person, change: Change): void {
  if (change.cost !== undefined && !may(actor.role, 'cost.read')) throw forbidden('Your role does not enter costs. Leave the cost out.')
  if ((change.sourceName !== undefined || change.sourceNote !== undefined) && !may(actor.role, 'parties.read')) {
    throw forbidden('Your role does not see who a piece came from, so it cannot change it. Leave the name and its note out.')
  }
}

async function columnsAfter(tx: Database, unit: UnitRow, change: Change): Promise<Columns> {
  const cost = change.cost === undefined ? { minor: unit.costMinor, currency: unit.costCurrency } : await readAmount(tx, change.cost, 'cost')
  return {
    modelId: change.modelId ?? unit.modelId,
    serialAnswer: change.serialAnswer ?? unit.serialAnswer,
    serial: change.serial === undefined ? unit.serial : change.serial,
    conditionNotes: change.conditionNotes ?? unit.conditionNotes,
    supplyAsSet: change.supplyAsSet ?? unit.supplyAsSet,
    ownership: change.ownership ?? unit.ownership,
    sourceKind: change.sourceKind ?? unit.sourceKind,
    sourcePartyId: change.sourceName === undefined ? unit.sourcePartyId : await partyNamed(tx, change.sourceName),
    sourceNote: change.sourceNote ?? unit.sourceNote,
    acquiredOn: change.acquiredOn ?? unit.acquiredOn,
    costMinor: cost?.minor ?? null,
    costCurrency: cost?.currency ?? null,
  }
}

/** What must hold of the record as a whole, whichever of its fields were sent. */
async function requireSense(tx: Database, unit: UnitRow, next: Columns): Promise<void> {
  if (next.acquiredOn !== unit.acquiredOn && next.acquiredOn > await todayInShop(tx)) {
    throw invalid([{ path: 'acquiredOn', message: 'The day it came must be today or earlier' }])
  }
  if (next.ownership !== 'consigned') return
  if (next.sourcePartyId === null) throw invalid([{ path: 'sourceName', message: 'Enter the consignor’s name' }])
  if (next.costMinor !== null) throw invalid([{ path: 'cost', message: 'A consigned piece was not paid for: leave the cost empty' }])
}

async function changesOfRecord(tx: Database, unit: UnitRow, next: Columns): Promise<FieldChange[]> {
  const plain = (['conditionNotes', 'supplyAsSet', 'ownership', 'sourceKind', 'acquiredOn'] as const)
    .filter(field => unit[field] !== next[field])
    .map(field => ({ field, from: unit[field] || null, to: next[field] || null }))
  const was = factInWords(unit.serialAnswer, unit.serial)
  const now = factInWords(next.serialAnswer, next.serial)
  return [
    ...unit.modelId === next.modelId ? [] : [{ field: 'modelId', from: await modelName(tx, unit.modelId), to: await modelName(tx, next.modelId) }],
    ...was === now && unit.serialAnswer === next.serialAnswer ? [] : [{ field: 'serial', from: was, to: now }],
    ...plain,
    // Names stay out of the story, for some of its readers may not see them.
    ...unit.sourcePartyId === next.sourcePartyId ? [] : [withoutSaying('sourceName', 'a name', unit.sourcePartyId, next.sourcePartyId)],
    ...unit.sourceNote === next.sourceNote ? [] : [withoutSaying('sourceNote', 'a note', unit.sourceNote, next.sourceNote)],
  ]
}

function withoutSaying(field: string, what: string, from: string | null, to: string | null): FieldChange {
  return { field, from: from ? what : null, to: to ? from ? what.replace('a ', 'another ') : what : null }
}

function changesOfCost(unit: UnitRow, next: Columns): FieldChange[] {
  if (unit.costMinor === next.costMinor && unit.costCurrency === next.costCurrency) return []
  const words = (minor: number | null, currency: string | null) => minor === null || currency === null ? null : formatMoney({ minor, currency })
  return [{ field: 'costMinor', from: words(unit.costMinor, unit.costCurrency), to: words(next.costMinor, next.costCurrency) }]
}

async function modelName(tx: Database, id: string): Promise<string> {
  const [model] = await tx.select({ maker: models.maker, designation: models.designation }).from(models).where(eq(models.id, id))
  return model ? `${model.maker} ${model.designation}` : ''
}

/**
 * Sets what a unit is asked for, or takes its price off (an empty amount). 409 with the unit as it stands if somebody
 * else changed it meanwhile; 422 for an amount that cannot be read or is nought.
 */
export async function priceUnit(db: Database, actor: Person, { tag, asking, version }: AskingPrice & { tag: string }): Promise<UnitView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    if (unit.version !== version) throw stale('unit', await getUnitView(tx, actor, tag))
    const price = await readAmount(tx, asking, 'asking')
    if (price?.minor === 0) throw invalid([{ path: 'asking', message: 'An asking price must be above nought. Leave it empty to take the price off.' }])
    const askingMinor = price?.minor ?? null
    const askingCurrency = price?.currency ?? null
    if (askingMinor === unit.askingMinor && askingCurrency === unit.askingCurrency) return getUnitView(tx, actor, tag)
    await tx.update(units).set({ askingMinor, askingCurrency, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
    await appendUnitLedger(tx, actor, unit.id, 'priced', {
      fromMinor: unit.askingMinor, toMinor: askingMinor, currency: askingCurrency ?? unit.askingCurrency ?? await shopCurrency(tx),
    })
    return getUnitView(tx, actor, tag)
  })
}
