import { eq } from 'drizzle-orm'
import { photos, shop } from '../../drizzle/schema'
import { openShop } from '../../server/services/first-run'
import { addInstrument } from '../../server/services/instruments'
import { addLocation } from '../../server/services/locations'
import { changeStanding, enterLot } from '../../server/services/part-lots'
import { setMinimum } from '../../server/services/reorder'
import { addModel } from '../../server/services/models'
import { writePerson } from '../../server/services/people'
import type { Database } from '../../server/utils/db'
import type { FileStore } from '../../server/utils/file-store'
import { newModel } from '../../shared/schemas/model'
import { newPartLot } from '../../shared/schemas/part-lot'
import type { Person } from '../../shared/types/person'
import type { LoadedStep } from './backdate'
import { addProcedures } from './procedures'
import { backdate } from './backdate'
import type { Step } from './life'
import { findModelIds, Life } from './life'
import { DEMO_LOTS } from './lots'
import { DEMO_MODELS } from './models'
import { DEMO_PLACES } from './places'
import { DEMO_PEOPLE, demoInstruments, DEMO_SHOP } from './shop'
import { DEMO_UNITS } from './units'

type People = Record<'owner' | 'bench' | 'floor' | 'reader', Person>

/** Loads the whole shop; without a file store, without photos. Gives how much it loaded. */
export async function loadDemoShop(db: Database, store: FileStore | null, password: string, today = new Date()): Promise<{ unitCount: number, photoCount: number }> {
  const done: LoadedStep[] = []
  /** Runs a step and remembers the real moments it took, so that they can be moved to its day. */
  async function live<T>(at: Date, run: () => Promise<T>): Promise<T> {
    const began = new Date()
    const result = await run()
    // A hair apart, so that no two steps share an instant.
    await new Promise(resolve => setTimeout(resolve, 2))
    done.push({ began, ended: new Date(), at })
    return result
  }
  const opening = new Date(today.getTime() - 400 * 86_400_000)
  const people = await live(opening, () => openWithPeople(db, password))
  const placeTags = await live(opening, () => addPlaces(db, people.owner))
  await live(opening, () => addModels(db, people.owner))
  const instruments = await live(opening, () => addInstruments(db, people.bench, today))
  const modelIds = await findModelIds(db, DEMO_MODELS)
  await live(opening, () => addProcedures(db, people.bench, modelIds))
  const lotTags = await live(opening, () => addLots(db, people.bench, placeTags, opening))
  const world = {
    db, store, ...people, placeTags, today, modelIds,
    instrumentIds: instruments, testerId: instruments[4] ?? '', lotTags,
  }
  const catalogue = new Map(DEMO_MODELS.map(model => [model.key, model]))
  const steps: Step[] = DEMO_UNITS.flatMap((unit, index) => {
    const model = catalogue.get(unit.model)
    if (!model) throw new Error(`The demo has no model ${unit.model}`)
    return new Life(world, unit, model, index).steps
  })
  for (const { at, run } of steps.sort((a, b) => a.at.getTime() - b.at.getTime())) await live(at > today ? today : at, run)
  await backdate(db, done)
  return { unitCount: DEMO_UNITS.length, photoCount: await db.$count(photos) }
}

async function openWithPeople(db: Database, password: string): Promise<People> {
  const { address, defaultTerms, ...settings } = DEMO_SHOP
  const [first, ...others] = DEMO_PEOPLE
  if (!first) throw new Error('The demo shop has nobody in it')
  const owner = await openShop(db, { ...settings, name: first.name, email: first.email, password })
  await db.update(shop).set({ address, defaultTerms }).where(eq(shop.id, 1))
  const everyone: Person[] = [{ ...first, id: owner.id, mustChangePassword: false }]
  for (const person of others) {
    everyone.push({ ...person, id: await writePerson(db, owner, { ...person, password, mustChangePassword: false }), mustChangePassword: false })
  }
  const withRole = (role: Person['role']) => {
    const person = everyone.find(each => each.role === role)
    if (!person) throw new Error(`The demo shop has nobody with the role ${role}`)
    return person
  }
  return { owner: withRole('owner'), bench: withRole('bench'), floor: withRole('floor'), reader: withRole('reader') }
}

async function addPlaces(db: Database, owner: Person): Promise<Map<string, string>> {
  const tags = new Map<string, string>()
  for (const [path, kind] of DEMO_PLACES) {
    const names = path.split('/')
    const name = names.pop() ?? path
    const place = await addLocation(db, owner, { kind, name, parentTag: tags.get(names.join('/')) ?? null, note: '' })
    tags.set(path, place.tag)
  }
  return tags
}

async function addModels(db: Database, owner: Person): Promise<void> {
  for (const { key: _key, bands, kit, ...model } of DEMO_MODELS) {
    await addModel(db, owner, newModel.parse({
      ...model,
      dialTolerancePercent: model.dialTolerancePercent === null ? '' : String(model.dialTolerancePercent),
      bands: bands.map(({ label, function: does, lowerHz, upperHz }) => ({ label, function: does, lower: lowerHz === 0 ? 'DC' : `${lowerHz} Hz`, upper: `${upperHz} Hz`, tolerance: '' })),
      kit: kit.map(line => ({ ...line, quantity: String(line.quantity) })),
    }))
  }
}

async function addLots(db: Database, bench: Person, placeTags: ReadonlyMap<string, string>, day: Date): Promise<Map<string, string>> {
  const tags = new Map<string, string>()
  for (const { key, kind, description, value = '', tolerance = '', rating = '', package: packageOrBase = '', countedIn = 'piece', made, source, supplier = '', invoice = '', cost = '', minimum, standing, ...lot } of DEMO_LOTS) {
    const entered = await enterLot(db, bench, newPartLot.parse({
      ...lot, type: { kind, description, value, tolerance, rating, package: packageOrBase, countedIn }, madeFrom: made?.[0], madeTo: made?.[1], sourceKind: source, supplierName: supplier,
      invoiceNumber: invoice, acquiredOn: day.toISOString().slice(0, 10), cost, placeTag: placeTags.get(kind === 'capacitor' ? 'Bench room/Bench 1' : 'Bench room/Bench 2'),
    }))
    tags.set(key, entered.tag)
    if (minimum) await setMinimum(db, bench, { id: entered.type.id, minimum, version: entered.type.version })
    if (standing) await changeStanding(db, bench, { tag: entered.tag, standing: standing.to, why: standing.why, version: entered.version })
  }
  return tags
}

async function addInstruments(db: Database, bench: Person, today: Date): Promise<string[]> {
  const ids: string[] = []
  for (const instrument of demoInstruments(today)) ids.push((await addInstrument(db, bench, instrument)).id)
  return ids
}
