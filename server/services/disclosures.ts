import { and, eq } from 'drizzle-orm'
import { people, unitDisclosures } from '../../drizzle/schema'
import type { DisclosureKey } from '../../shared/domain/disclosures'
import { DISCLOSURE_KEYS, DISCLOSURES } from '../../shared/domain/disclosures'
import type { DisclosureAnswers } from '../../shared/schemas/disclosure'
import type { DisclosureView } from '../../shared/types/disclosure'
import type { Database } from '../utils/db'
import { stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendUnitLedger } from './ledger'
import { lockUnit } from './unit-lock'

/** Every topic in the order a buyer reads them, answered or not. `fromRecord` is left empty: see `describeForBuyer`. */
export async function listDisclosures(db: Database, unitId: string): Promise<DisclosureView[]> {
  const rows = await db.select({
    key: unitDisclosures.key, answer: unitDisclosures.answer, text: unitDisclosures.text,
    answeredBy: people.name, answeredAt: unitDisclosures.updatedAt, version: unitDisclosures.version,
  }).from(unitDisclosures).innerJoin(people, eq(people.id, unitDisclosures.answeredBy)).where(eq(unitDisclosures.unitId, unitId))
  const answered = new Map(rows.map(row => [row.key, row]))
  return DISCLOSURE_KEYS.map((key) => {
    const row = answered.get(key)
    return {
      key, fromRecord: '', answer: row?.answer ?? null, text: row?.text ?? null, answeredBy: row?.answeredBy ?? null,
      answeredAt: row?.answeredAt.toISOString() ?? null, version: row?.version ?? 0,
    }
  })
}

/** Labels of the topics nobody has answered: while there is one, the unit cannot be offered. */
export async function missingDisclosures(db: Database, unitId: string): Promise<string[]> {
  const answered = await listDisclosures(db, unitId)
  return answered.filter(entry => entry.answer === null).map(entry => DISCLOSURES[entry.key].label)
}

/**
 * Saves the answers given, each against the version its form was opened on; all or none.
 * Throws 409 `stale` with every topic as it stands when somebody else answered one of them meanwhile.
 */
export async function answerDisclosures(db: Database, actor: Actor, tag: string, { answers }: DisclosureAnswers): Promise<void> {
  await db.transaction(async (tx) => {
    const unit = await lockUnit(tx, tag)
    const current = await listDisclosures(tx, unit.id)
    const standing = new Map<DisclosureKey, DisclosureView>(current.map(entry => [entry.key, entry]))
    for (const { key, answer, text: typed, version } of answers) {
      const before = standing.get(key)
      if (before?.version !== version) throw stale('disclosure', current)
      const text = answer === 'known' ? typed : null
      if (before.answer === answer && before.text === text) continue
      if (version === 0) {
        await tx.insert(unitDisclosures).values({ unitId: unit.id, key, answer, text, answeredBy: actor.id })
      } else {
        await tx.update(unitDisclosures).set({ answer, text, answeredBy: actor.id, version: version + 1 })
          .where(and(eq(unitDisclosures.unitId, unit.id), eq(unitDisclosures.key, key)))
      }
      await appendUnitLedger(tx, actor, unit.id, 'disclosed', { key, answer, text })
    }
  })
}
