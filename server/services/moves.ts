import { eq, sql } from 'drizzle-orm'
import { holds, units } from '../../drizzle/schema'
import { may, PERMISSIONS, ROLE_LABELS } from '../../shared/domain/roles'
import { formatTag } from '../../shared/domain/tag'
import { movePage, movePermission } from '../../shared/domain/unit-moves'
import { UNIT_STATE_LABELS } from '../../shared/domain/unit-state-names'
import type { UnitState } from '../../shared/domain/unit-state-names'
import { decideMove, moveDeed } from '../../shared/domain/unit-states'
import type { HoldRelease, NotEnergised, UnitHold, UnitMove } from '../../shared/schemas/moves'
import type { Person } from '../../shared/types/person'
import type { UnitView } from '../../shared/types/unit'
import type { Database } from '../utils/db'
import { conflict, forbidden, invalid, stale } from '../utils/errors'
import { endHold } from './holds'
import { findPlace } from './places'
import { appendUnitLedger } from './ledger'
import { todayInShop } from './shop-day'
import { gatherUnitFacts } from './unit-facts'
import type { SaidWithMove } from './unit-facts'
import { lockUnit } from './unit-lock'
import type { UnitRow } from './unit-lock'
import { writeState } from './unit-state-write'
import { getUnitView } from './unit-view'

/**
 * Moves a unit to another state. 403 without the permission for that move; 409 `move-refused` with every guard that
 * refuses, `own-form` where the move needs more than a reason, `stale` if somebody else changed the unit meanwhile.
 */
export async function moveUnit(db: Database, actor: Person, { tag, to, why, ownerConsent, version }: UnitMove & { tag: string }): Promise<UnitView> {
  return db.transaction(async (tx) => {
    const unit = await lockForMove(tx, actor, { tag, to, version })
    await requireOpenMove(tx, unit, to, { reason: why, ownerConsent: ownerConsent !== '', missingSaleDetails: [] })
    const form = movePage(tag, unit.state, to)
    if (form) throw conflict('own-form', `${moveDeed(unit.state, to)} asks for more than a reason: it is done on its own page.`)
    const said = [why, ownerConsent && `Its owner agreed: ${ownerConsent}`].filter(Boolean).join('. ') || null
    if (unit.state === 'held') await endHold(tx, actor, unit.id, said ?? moveDeed('held', to))
    await writeState(tx, actor, unit, to, said, to === 'dispatched' ? await leaveShelf(tx, actor, unit) : {})
    return getUnitView(tx, actor, tag)
  })
}

/** Puts an offered unit by for somebody until the end of a day. The same refusals as `moveUnit`; 422 for a day that is past. */
export async function holdUnit(db: Database, actor: Person, { tag, heldFor, until, note, version }: UnitHold & { tag: string }): Promise<UnitView> {
  return db.transaction(async (tx) => {
    const unit = await lockForMove(tx, actor, { tag, to: 'held', version })
    if (until < await todayInShop(tx)) throw invalid([{ path: 'until', message: 'The last day of the hold must be today or later' }])
    await requireOpenMove(tx, unit, 'held', { reason: note, ownerConsent: false, missingSaleDetails: [] })
    await tx.insert(holds).values({ unitId: unit.id, heldFor, until, note, createdBy: actor.id })
    await appendUnitLedger(tx, actor, unit.id, 'held', { heldFor, until })
    await writeState(tx, actor, unit, 'held', null)
    return getUnitView(tx, actor, tag)
  })
}

/** Ends a hold before its day: the unit is offered again. */
export async function releaseHold(db: Database, actor: Person, { tag, why, version }: HoldRelease & { tag: string }): Promise<UnitView> {
  return moveUnit(db, actor, { tag, to: 'offered', why, ownerConsent: '', version })
}

/** Says, in the words the buyer will read, that the piece is sold untested and not to be energised; an empty text takes it back. */
export async function discloseNotEnergised(db: Database, actor: Person, { tag, text, version }: NotEnergised & { tag: string }): Promise<UnitView> {
  return db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    await requireVersion(tx, actor, unit, version)
    if (unit.state === 'sold' || unit.state === 'dispatched') {
      throw conflict('record-closed', `The unit is “${UNIT_STATE_LABELS[unit.state]}”: what its buyer was told stays as it was.`)
    }
    const said = text || null
    if (said !== unit.notEnergisedDisclosure) {
      await tx.update(units).set({ notEnergisedDisclosure: said, version: sql`${units.version} + 1` }).where(eq(units.id, unit.id))
      await appendUnitLedger(tx, actor, unit.id, 'not_energised_disclosed', { text: said })
    }
    return getUnitView(tx, actor, tag)
  })
}

/** Locks the unit for a move by this person, or refuses with 403 or, when it has changed since they looked, 409. */
export async function lockForMove(tx: Database, actor: Person, { tag, to, version }: { tag: string, to: UnitState, version: number }): Promise<UnitRow> {
  const unit = await lockUnit(tx, tag)
  const permission = movePermission(unit.state, to)
  if (!may(actor.role, permission)) {
    const holders = PERMISSIONS[permission].map(role => ROLE_LABELS[role]).join(' or ')
    throw forbidden(`Your role (${ROLE_LABELS[actor.role]}) does not make this move. Ask somebody with the role ${holders}.`)
  }
  await requireVersion(tx, actor, unit, version)
  return unit
}

async function requireVersion(tx: Database, actor: Person, unit: UnitRow, version: number): Promise<void> {
  if (unit.version !== version) throw stale('unit', await getUnitView(tx, actor, unit.tag))
}

/** Asks the domain; 409 with every refusal, in words and with where to mend it. */
export async function requireOpenMove(tx: Database, unit: UnitRow, to: UnitState, said: SaidWithMove): Promise<void> {
  const decision = decideMove(unit.state, to, await gatherUnitFacts(tx, unit, said))
  if (decision.allowed) return
  const reasons = decision.refusals.map(refusal => `${refusal.sentence} ${refusal.remedy}`)
  throw conflict('move-refused', `${formatTag(unit.tag)} can’t be moved to “${UNIT_STATE_LABELS[to]}” yet. ${reasons.join(' ')}`, { refusals: decision.refusals })
}

/** What has left the shop stands on no shelf. */
async function leaveShelf(tx: Database, actor: Person, unit: UnitRow): Promise<{ locationId: null }> {
  const place = await findPlace(tx, unit.locationId)
  if (place) await appendUnitLedger(tx, actor, unit.id, 'moved', { from: place.path, to: null, why: 'Dispatched' })
  return { locationId: null }
}
