import { eq } from 'drizzle-orm'
import { units } from '../../drizzle/schema'
import { factInWords } from '../../shared/domain/knowledge'
import { may } from '../../shared/domain/roles'
import type { NewUnit } from '../../shared/schemas/unit'
import type { KitItemView } from '../../shared/types/model'
import type { Person } from '../../shared/types/person'
import type { UnitView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { forbidden, invalid } from '../utils/errors'
import { refreshCoverage } from './coverage'
import { insertKeptWith } from './kept-with'
import { appendUnitLedger } from './ledger'
import { findOrAddModel, holdModelForField, listKit } from './models'
import { partyNamed } from './parties'
import { placeForField } from './places'
import { todayInShop } from './shop-day'
import { readAmount } from './shop-money'
import { takeTag } from './tags'
import { getUnitView } from './unit-view'

/**
 * Books a piece in at the doorway: its tag, its model (made if it is new), its kit counted against the model's list,
 * what it covers, and the first entry of its story, all or nothing.
 *
 * 403 for a cost from somebody who may not see costs; 422 at the field for an unknown model, place or line of the kit,
 * a day to come, or an amount that cannot be read.
 */
export async function bookInUnit(db: Database, actor: Person, input: NewUnit): Promise<UnitView> {
  if (input.cost !== '' && !may(actor.role, 'cost.read')) throw forbidden('Your role does not enter costs. Leave the cost empty.')
  return db.transaction(async (tx) => {
    if (input.acquiredOn > await todayInShop(tx)) throw invalid([{ path: 'acquiredOn', message: 'The day it came must be today or earlier' }])
    const cost = await readAmount(tx, input.cost, 'cost')
    const place = input.placeTag === null ? null : await placeForField(tx, input.placeTag, 'placeTag')
    const model = input.newModel ? await findOrAddModel(tx, actor, input.newModel) : await holdModelForField(tx, input.modelId ?? '', 'model')
    const kit = matchKit(input.kit, await listKit(tx, model.id))
    const tag = await takeTag(tx, 'U')
    const unit = await insertUnit(tx, {
      tag,
      modelId: model.id,
      serialAnswer: input.serialAnswer,
      serial: input.serial,
      locationId: place?.id ?? null,
      conditionNotes: input.conditionNotes,
      supplyAsSet: input.supplyAsSet,
      ownership: input.ownership,
      sourceKind: input.sourceKind,
      sourcePartyId: await partyNamed(tx, input.sourceName),
      sourceNote: input.sourceNote,
      acquiredOn: input.acquiredOn,
      costMinor: cost?.minor ?? null,
      costCurrency: cost?.currency ?? null,
      bookedInBy: actor.id,
    })
    const notLooked = kit.filter(({ found }) => found === 'not_looked').map(({ line }) => line.description)
    await appendUnitLedger(tx, actor, unit.id, 'booked_in', {
      model: `${model.maker} ${model.designation}`, serial: factInWords(input.serialAnswer, input.serial), ownership: input.ownership, source: input.sourceKind,
      ...notLooked.length > 0 ? { notLooked } : {},
    })
    if (place) await appendUnitLedger(tx, actor, unit.id, 'moved', { from: null, to: place.path })
    await refreshCoverage(tx, actor, { unitIds: [unit.id] }, { quietly: true })
    await writeKit(tx, actor, unit.id, kit, input.extras)
    return getUnitView(tx, actor, tag)
  })
}

async function insertUnit(tx: Database, values: typeof units.$inferInsert): Promise<{ id: string }> {
  const [row] = await tx.insert(units).values(values).returning({ id: units.id })
  if (!row) throw new Error('A unit was not written')
  return row
}

type Counted = NewUnit['kit'][number] & { line: KitItemView, here: number }

/** Each counted line with the model's; 422 for one that is not of this model, is counted twice, or more are here than belong. */
function matchKit(counted: NewUnit['kit'], lines: KitItemView[]): Counted[] {
  return counted.map((count, index) => {
    const line = lines.find(each => each.id === count.kitItemId)
    const refuse = (field: string, message: string) => invalid([{ path: `kit.${index}.${field}`, message }])
    if (!line) throw refuse('found', 'The model’s kit was changed meanwhile: choose the model again and count once more')
    if (counted.findIndex(each => each.kitItemId === count.kitItemId) !== index) throw refuse('found', `${line.description} is counted twice`)
    const here = count.found === 'here' ? count.count ?? line.quantity : 0
    if (here > line.quantity) throw refuse('count', `Only ${line.quantity} of ${line.description} belong to it: note the others beneath`)
    return { ...count, line, here }
  })
}

/** One item with a tag of its own for each thing; what is missing is an item too, so that its absence shows. */
async function writeKit(tx: Database, actor: Person, unitId: string, kit: Counted[], extras: NewUnit['extras']): Promise<void> {
  for (const { line, found, here, originality, condition } of kit) {
    if (found === 'not_looked') continue
    for (let number = 1; number <= line.quantity; number++) {
      const isHere = number <= here
      await insertKeptWith(tx, actor, unitId, {
        kitItemId: line.id,
        kind: line.kind,
        description: line.quantity > 1 ? `${line.description} (${number} of ${line.quantity})` : line.description,
        originality: isHere ? originality : 'not_known',
        condition: isHere ? condition : '',
        whereabouts: isHere ? 'with_unit' : 'missing',
        placeTag: null,
        absenceDisclosed: '',
      })
    }
  }
  for (const item of extras) {
    await insertKeptWith(tx, actor, unitId, { ...item, whereabouts: 'with_unit', placeTag: null, absenceDisclosed: '' })
  }
}

/** What of the model's kit nobody looked for when a unit (by its row's id) came: lines that no item of it answers. */
export async function listNotLooked(db: Database, unitId: string, answered: ReadonlySet<string>): Promise<string[]> {
  const [unit] = await db.select({ modelId: units.modelId }).from(units).where(eq(units.id, unitId))
  if (!unit) return []
  return (await listKit(db, unit.modelId)).filter(line => !answered.has(line.id)).map(line => line.description)
}
