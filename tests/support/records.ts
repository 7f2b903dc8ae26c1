import { randomBytes } from 'node:crypto'
import { bands, locations, models, people, shop, units } from '../../drizzle/schema'
import type { Role } from '../../shared/domain/roles'
import type { Person } from '../../shared/types/person'
import { takeTag } from '../../server/services/tags'
import type { Database } from '../../server/utils/db'

/** One row of what an insert returned. */
function only<T>(rows: T[]): T {
  const [row] = rows
  if (row === undefined) throw new Error('The insert returned no row')
  return row
}

/** The shop's own row, needed wherever a day or a currency is asked for. */
export async function makeShop(db: Database): Promise<void> {
  await db.insert(shop).values({ name: 'Fenwold Instruments', timeZone: 'Europe/London', currency: 'GBP' }).onConflictDoNothing()
}

/** Somebody with a role. Their password is nobody's: tests of signing in make their own. */
export async function makePerson(db: Database, role: Role, name = `A person of the ${role}`): Promise<Person> {
  const email = `${role}-${randomBytes(4).toString('hex')}@shop.invalid`
  const row = only(await db.insert(people).values({ email, name, role, passwordHash: 'not a hash' }).returning())
  return { id: row.id, name: row.name, email: row.email, role: row.role, mustChangePassword: row.mustChangePassword }
}

const EDGES = [100_000, 320_000, 1_000_000, 3_200_000, 10_000_000, 32_000_000]
const FIVE_BANDS = EDGES.slice(0, -1).map((lowerHz, index) => ({ label: 'ABCDE'.charAt(index), lowerHz, upperHz: EDGES[index + 1] ?? lowerHz }))

/** An RF generator under a name of its own; of five bands, 100 kHz to 32 MHz, unless others are given. */
export async function makeModel(
  db: Database, values: Partial<typeof models.$inferInsert> = {}, generates: readonly { label: string, lowerHz: number, upperHz: number }[] = FIVE_BANDS,
): Promise<typeof models.$inferSelect> {
  const model = only(await db.insert(models).values({
    maker: 'Oxmarden', designation: `307-${randomBytes(3).toString('hex')}`, kind: 'rf_generator', technology: 'valve',
    yearsFrom: 1951, yearsTo: 1959, supply: '200–250 V 50 Hz', dialTolerancePercent: 2, ...values,
  }).returning())
  if (generates.length > 0) {
    await db.insert(bands).values(generates.map((band, index) => ({ ...band, modelId: model.id, position: index + 1, function: 'generates' as const })))
  }
  return model
}

/** A room with a tag. */
export async function makePlace(db: Database, name = `Room ${randomBytes(3).toString('hex')}`): Promise<typeof locations.$inferSelect> {
  return db.transaction(async tx => only(await tx.insert(locations).values({ tag: await takeTag(tx, 'L'), kind: 'room', name }).returning()))
}

/** A unit just booked in, of a model of its own unless one is named; `values` overrides any column. */
export async function makeUnit(db: Database, bookedInBy: Person, values: Partial<typeof units.$inferInsert> = {}): Promise<typeof units.$inferSelect> {
  const modelId = values.modelId ?? (await makeModel(db)).id
  return db.transaction(async tx => only(await tx.insert(units).values({
    tag: await takeTag(tx, 'U'), modelId, serialAnswer: 'known', serial: '4417', ownership: 'bought', sourceKind: 'club_sale',
    acquiredOn: '2026-03-02', bookedInBy: bookedInBy.id, ...values,
  }).returning()))
}
