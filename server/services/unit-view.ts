import { and, asc, eq, isNull } from 'drizzle-orm'
import { bands, models, parties, sales } from '../../drizzle/schema'
import { may } from '../../shared/domain/roles'
import type { Role } from '../../shared/domain/roles'
import { decideMove, moveDeed, possibleMoves } from '../../shared/domain/unit-states'
import type { BandView } from '../../shared/types/model'
import type { Person } from '../../shared/types/person'
import type { MoveView, UnitView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { listModelDocuments, listUnitDocuments } from './documents'
import { listFittings } from './fittings'
import { findHold, releaseLapsedHolds } from './holds'
import { listKeptWith } from './kept-with'
import { listModifications } from './modifications'
import { viewOriginality } from './originality'
import { listPhotos } from './photos'
import { findPlace } from './places'
import { getDonor } from './pulled-lots'
import { findSafetyCheck } from './safety-checks'
import { findPublication } from './publications'
import { todayInShop } from './shop-day'
import { listTestSheets } from './test-sheets'
import { findTriage } from './triage'
import { gatherUnitFacts, NOTHING_LEFT_UNSAID } from './unit-facts'
import type { UnitRow } from './unit-lock'
import { getUnitRow } from './unit-lock'
import { listOpenPartRecalls } from './unit-part-recalls'

/** Whoever reads: what they may not see leaves the server as null. */
type Reader = Pick<Person, 'role'>

/** Everything on the page of one unit, for this reader. 404 if no unit has the compact tag. */
export async function getUnitView(db: Database, reader: Reader, tag: string): Promise<UnitView> {
  const unit = await getCurrentUnit(db, tag)
  const model = await getModel(db, unit.modelId)
  const photos = await listPhotos(db, unit.id)
  return {
    tag: unit.tag,
    id: unit.id,
    model: {
      id: model.id, maker: model.maker, designation: model.designation, kind: model.kind,
      yearsFrom: model.yearsFrom, yearsTo: model.yearsTo,
    },
    technology: model.technology,
    serial: { answer: unit.serialAnswer, text: unit.serial },
    state: unit.state,
    hazardHold: unit.hazardHold,
    notEnergisedDisclosure: unit.notEnergisedDisclosure,
    place: await findPlace(db, unit.locationId),
    bands: await listBands(db, unit.modelId),
    dialTolerancePercent: model.dialTolerancePercent,
    typicalHazards: model.typicalHazards,
    supply: model.supply,
    supplyAsSet: unit.supplyAsSet,
    conditionNotes: unit.conditionNotes,
    ownership: unit.ownership,
    acquiredOn: unit.acquiredOn,
    ...await source(db, reader.role, unit),
    ...money(reader.role, unit),
    ceilingMinutes: unit.ceilingMinutes,
    thumbnailUrl: photos[0]?.thumbnailUrl ?? null,
    createdAt: unit.createdAt.toISOString(),
    keptWith: await listKeptWith(db, unit.id),
    modifications: await work(db, reader.role, unit.id),
    originality: await viewOriginality(db, unit),
    fittings: await listFittings(db, reader, unit.id),
    donor: await donorOf(db, reader, tag),
    partRecalls: await listOpenPartRecalls(db, unit.id),
    photos,
    documents: [...await listUnitDocuments(db, unit.id), ...await listModelDocuments(db, unit.modelId)],
    sheets: await listTestSheets(db, unit.id),
    triage: await findTriage(db, unit.id),
    safety: await findSafetyCheck(db, unit.id),
    moves: await listMoves(db, unit),
    hold: await hold(db, reader.role, unit),
    sale: await sale(db, reader.role, unit),
    publication: may(reader.role, 'provenance.publish') ? await publication(db, unit.id) : null,
    version: unit.version,
  }
}

/** The row as it stands now: a hold whose day is past is released before anybody reads it. */
async function getCurrentUnit(db: Database, tag: string): Promise<UnitRow> {
  const unit = await getUnitRow(db, tag)
  const standing = unit.state === 'held' ? await findHold(db, unit.id) : null
  if (!standing || standing.until >= await todayInShop(db)) return unit
  await releaseLapsedHolds(db)
  return getUnitRow(db, tag)
}

async function getModel(db: Database, id: string) {
  const [model] = await db.select().from(models).where(eq(models.id, id))
  if (!model) throw new Error(`The model ${id} of a unit is gone, which its foreign key forbids`)
  return model
}

async function listBands(db: Database, modelId: string): Promise<BandView[]> {
  return db.select({
    label: bands.label, function: bands.function, lowerHz: bands.lowerHz, upperHz: bands.upperHz, dialTolerancePercent: bands.dialTolerancePercent,
  }).from(bands).where(eq(bands.modelId, modelId)).orderBy(asc(bands.position))
}

async function source(db: Database, role: Role, unit: UnitRow): Promise<Pick<UnitView, 'sourceKind' | 'sourceName' | 'sourceNote'>> {
  if (!may(role, 'parties.read')) return { sourceKind: unit.sourceKind, sourceName: null, sourceNote: null }
  return { sourceKind: unit.sourceKind, sourceName: await findPartyName(db, unit.sourcePartyId), sourceNote: unit.sourceNote }
}

async function findPartyName(db: Database, id: string | null): Promise<string | null> {
  if (id === null) return null
  const [party] = await db.select({ name: parties.name }).from(parties).where(eq(parties.id, id))
  return party?.name ?? null
}

async function donorOf(db: Database, reader: Pick<Person, 'role'>, tag: string): Promise<UnitView['donor']> {
  const donor = await getDonor(db, reader, tag)
  return donor.pulled.length > 0 ? donor : null
}

/** The work log; how a consignor agreed names them, so only those who may see names read it. */
async function work(db: Database, role: Role, unitId: string): Promise<UnitView['modifications']> {
  const entries = await listModifications(db, unitId)
  return may(role, 'parties.read') ? entries : entries.map(entry => ({ ...entry, ownerConsent: '' }))
}

function money(role: Role, unit: UnitRow): Pick<UnitView, 'costMinor' | 'costCurrency' | 'askingMinor' | 'askingCurrency'> {
  const cost = may(role, 'cost.read')
  const price = may(role, 'price.read')
  return {
    costMinor: cost ? unit.costMinor : null,
    costCurrency: cost ? unit.costCurrency : null,
    askingMinor: price ? unit.askingMinor : null,
    askingCurrency: price ? unit.askingCurrency : null,
  }
}

async function hold(db: Database, role: Role, unit: UnitRow): Promise<UnitView['hold']> {
  const standing = await findHold(db, unit.id)
  return standing && { heldFor: may(role, 'parties.read') ? standing.heldFor : null, until: standing.until }
}

async function sale(db: Database, role: Role, unit: UnitRow): Promise<UnitView['sale']> {
  const [standing] = await db.select({
    soldOn: sales.soldOn, priceMinor: sales.priceMinor, currency: sales.currency, buyer: parties.name,
  }).from(sales).innerJoin(parties, eq(parties.id, sales.buyerId)).where(and(eq(sales.unitId, unit.id), isNull(sales.undoneAt)))
  return standing
    ? {
        soldOn: standing.soldOn,
        currency: standing.currency,
        buyer: may(role, 'parties.read') ? standing.buyer : null,
        priceMinor: may(role, 'price.read') ? standing.priceMinor : null,
      }
    : null
}

/** Each move out of the unit's state, with what refuses it now. What the move's own form asks for does not count. */
async function listMoves(db: Database, unit: UnitRow): Promise<MoveView[]> {
  const facts = await gatherUnitFacts(db, unit, NOTHING_LEFT_UNSAID)
  return possibleMoves(unit.state).map((to) => {
    const decision = decideMove(unit.state, to, facts)
    return { to, label: moveDeed(unit.state, to), refusals: decision.allowed ? [] : decision.refusals }
  })
}

/** Where the owner finds the public sheet; the link is theirs to give, so nobody else is told it. */
async function publication(db: Database, unitId: string): Promise<UnitView['publication']> {
  const standing = await findPublication(db, unitId)
  return standing && { url: `/p/${standing.token}`, publishedAt: standing.publishedAt }
}
