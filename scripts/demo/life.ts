import { eq } from 'drizzle-orm'
import { models, units } from '../../drizzle/schema'
import { answerDisclosures } from '../../server/services/disclosures'
import { bookInUnit } from '../../server/services/intake'
import { changeKeptWith, listKeptWith, setPacked } from '../../server/services/kept-with'
import { correctModification, logModification, withdrawModification } from '../../server/services/modifications'
import { listKit } from '../../server/services/models'
import { discloseNotEnergised, holdUnit, moveUnit } from '../../server/services/moves'
import { addPhoto } from '../../server/services/photos'
import { placeForField } from '../../server/services/places'
import { describeForBuyer } from '../../server/services/provenance'
import { publishUnit } from '../../server/services/publications'
import { breakUnit } from '../../server/services/donors'
import { recordSafetyCheck } from '../../server/services/safety-checks'
import { sellUnit, undoSale } from '../../server/services/sales'
import { saveTestSheet, signTestSheet, startTestSheet } from '../../server/services/test-sheets'
import { recordTriage } from '../../server/services/triage'
import { getUnitRow } from '../../server/services/unit-lock'
import { priceUnit } from '../../server/services/units-edit'
import type { Database } from '../../server/utils/db'
import type { FileStore } from '../../server/utils/file-store'
import type { DisclosureKey } from '../../shared/domain/disclosures'
import type { PhotoSubject } from '../../shared/domain/photos'
import { breakUp } from '../../shared/schemas/break-up'
import { newModification } from '../../shared/schemas/modification'
import { newSafetyCheck } from '../../shared/schemas/safety-check'
import { newTestSheet, savedTestSheet } from '../../shared/schemas/test-sheet'
import { newTriage } from '../../shared/schemas/triage'
import { newUnit } from '../../shared/schemas/unit'
import type { Person } from '../../shared/types/person'
import { JOB_PARTS, PULLED } from './lots'
import type { DemoModel } from './models'
import { drawPhoto } from './pictures'
import { seeded } from './pictures/primitives'
import { demoWarmUp, instrumentsFor, readDemoSheet } from './readings'
import type { DemoUnit } from './units'
import { JOBS } from './work'

/** What every step may use. */
export interface World {
  db: Database
  store: FileStore | null
  owner: Person
  bench: Person
  floor: Person
  modelIds: ReadonlyMap<string, string>
  placeTags: ReadonlyMap<string, string>
  /** The counter and the insulation tester, by their rows' ids. */
  /** The bench's instruments: counter, multimeter, millivoltmeter, oscilloscope. */
  instrumentIds: readonly string[]
  testerId: string
  /** The tags of the lots in the drawers, by their keys; what is pulled from a donor joins them. */
  lotTags: Map<string, string>
  today: Date
}

/** One thing that happened to a piece, on a day of the story. */
export interface Step { at: Date, run: () => Promise<void> }

/** A piece's life as steps; `tag` is known once the first has run. */
export class Life {
  tag = ''
  readonly steps: Step[] = []
  private readonly random: () => number
  constructor(private readonly world: World, private readonly unit: DemoUnit, private readonly model: DemoModel, index: number) {
    this.random = seeded(`${unit.model}/${unit.serial}/${index}`)
    this.plan()
  }

  /** Files a step `daysAgo`, at a working hour; steps of one day keep their order. */
  private on(daysAgo: number, run: () => Promise<void>): void {
    const hour = 9 + Math.min(8.5, this.steps.length * 0.35)
    const at = new Date(this.world.today.getTime() - daysAgo * 86_400_000)
    at.setUTCHours(Math.floor(hour), Math.floor(this.random() * 60), 0, 0)
    const last = this.steps.at(-1)?.at
    this.steps.push({ at: last && last >= at ? new Date(last.getTime() + 60_000 * (2 + Math.floor(this.random() * 20))) : at, run })
  }

  private day(daysAgo: number): string {
    return new Date(this.world.today.getTime() - daysAgo * 86_400_000).toISOString().slice(0, 10)
  }

  private async version(): Promise<number> {
    return (await getUnitRow(this.world.db, this.tag)).version
  }

  private plan(): void {
    const { unit } = this
    this.on(unit.days, () => this.bookIn())
    if (this.world.store) this.on(unit.days, () => this.photograph(['packing', 'front', 'plate', 'rear']))
    if (unit.triage !== null) this.on(unit.days - 0.5, () => this.triage())
    if (unit.state === 'intake') return
    this.on(unit.days - 1, () => this.move('bench', this.world.bench))
    const events: [number, () => Promise<void>][] = [
      ...(unit.work ?? []).map(([job, daysAgo]): [number, () => Promise<void>] => [daysAgo, () => this.log(job, daysAgo)]),
      ...(unit.tests ?? []).map((test): [number, () => Promise<void>] => [test.daysAgo, () => this.measure(test)]),
    ]
    for (const [daysAgo, run] of events.sort(([a], [b]) => b - a)) this.on(daysAgo, run)
    if (unit.safety !== undefined) this.on(unit.safety, () => this.checkSafety())
    this.planEnd()
  }

  private planEnd(): void {
    const { unit, world } = this
    const { state } = unit
    if (state === 'parted') return this.on(unit.days - 20, () => this.breakUp())
    if (state === 'written_off') return this.on(unit.days - 20, () => this.move(state, world.owner, unit.why))
    if (state === 'bench') return
    const readyAt = unit.safety ?? unit.days - 30
    const { notEnergised } = unit
    if (notEnergised) this.on(readyAt, async () => void await discloseNotEnergised(world.db, world.bench, { tag: this.tag, text: notEnergised, version: await this.version() }))
    this.on(readyAt, () => this.move('ready', world.bench))
    if (unit.asking !== undefined) this.on(readyAt - 1, async () => void await priceUnit(world.db, world.owner, { tag: this.tag, asking: String(unit.asking), version: await this.version() }))
    if (state === 'ready') return
    this.on(readyAt - 1, () => this.tellBuyer())
    this.on(readyAt - 2, () => this.move('offered', world.owner))
    if (unit.published) this.on(readyAt - 2, async () => void await publishUnit(world.db, world.owner, this.tag))
    if (state === 'held') this.on(3, async () => void await holdUnit(world.db, world.owner, { tag: this.tag, heldFor: unit.buyer ?? 'Buyer 100', until: this.day(-(unit.until ?? 7)), note: 'Deposit taken', version: await this.version() }))
    if (state === 'sold' || state === 'dispatched' || state === 'returned') this.planSale(readyAt)
  }

  private planSale(readyAt: number): void {
    const { unit, world } = this
    const soldAt = unit.state === 'sold' ? 2 : Math.max(readyAt - 12, 3)
    this.on(soldAt, async () => void await sellUnit(world.db, world.owner, {
      tag: this.tag, buyerName: unit.buyer ?? 'Buyer 100', buyerContact: '', priceMinor: (unit.asking ?? 0) * 100 - 500, currency: 'GBP', soldOn: this.day(soldAt), version: await this.version(),
    }))
    if (unit.state === 'sold') return
    this.on(soldAt - 1, () => this.pack())
    this.on(soldAt - 1, () => this.move('dispatched', world.floor))
    if (unit.state === 'returned') {
      this.on(Math.max(soldAt - 9, 1), async () => void await undoSale(world.db, world.owner, { tag: this.tag, to: 'returned', why: unit.why ?? 'Came back', version: await this.version() }))
    }
  }

  private async bookIn(): Promise<void> {
    const { world, unit } = this
    const modelId = world.modelIds.get(unit.model)
    if (!modelId) throw new Error(`No model ${unit.model}`)
    const kit = await listKit(world.db, modelId)
    const view = await bookInUnit(world.db, unit.consignor ? world.owner : world.bench, newUnit.parse({
      modelId, serialAnswer: unit.serial ? 'known' : 'could_not_tell', serial: unit.serial ?? '', conditionNotes: unit.condition, supplyAsSet: unit.set ?? '',
      ownership: unit.consignor ? 'consigned' : 'bought', sourceKind: unit.consignor ? 'consignor' : unit.source, sourceName: unit.consignor ?? unit.from ?? '',
      acquiredOn: this.day(unit.days), cost: unit.cost === null ? '' : String(unit.cost), placeTag: this.placeTag('Quarantine'),
      kit: kit.map(line => ({
        kitItemId: line.id, found: unit.missing?.includes(line.description) ? 'missing' : 'here',
        originality: line.kind === 'manual' && this.random() < 0.4 ? 'copy' : this.random() < 0.85 ? 'original' : 'not_known',
      })),
    }))
    this.tag = view.tag
    // Its shelf is written as one of the booking's facts: the demo's shelves are not walked one by one.
    await world.db.update(units).set({ locationId: await this.placeId() }).where(eq(units.tag, this.tag))
  }

  private placeTag(path: string): string {
    const tag = this.world.placeTags.get(path)
    if (!tag) throw new Error(`No place ${path}`)
    return tag
  }

  private async placeId(): Promise<string> {
    return (await placeForField(this.world.db, this.placeTag(this.unit.place), 'placeTag')).id
  }

  private async photograph(subjects: readonly PhotoSubject[], modificationId?: string): Promise<void> {
    const { db, store, floor } = this.world
    if (!store) return
    const { kind, maker, designation, supply } = this.model
    await Promise.all(subjects.map(async subject => addPhoto(db, store, floor, {
      tag: this.tag, name: `${subject}.jpg`, subject, caption: '', modificationId,
      bytes: await drawPhoto({ kind, maker, designation, serial: this.unit.serial ?? '—', supply, seed: `${this.tag}${modificationId ?? ''}` }, subject),
    })))
  }

  private async triage(): Promise<void> {
    const said = this.unit.triage ?? {}
    const battery = /battery|cells|DC$/i.test(this.model.supply)
    const hazards = said.hazards ?? this.model.typicalHazards
    const old = this.model.yearsFrom < 1962 && this.random() < 0.6
    await recordTriage(this.world.db, this.world.bench, {
      tag: this.tag, ...newTriage.parse({
        safetyClass: said.class ?? (battery ? 'low_voltage' : 'earthed'), lead: battery ? 'not_applicable' : old ? 'perished' : 'sound', plug: battery ? 'not_applicable' : old ? 'wrong' : 'sound',
        fuse: battery ? 'not_applicable' : 'sound', fuseRating: battery ? '' : 'T 1 A', voltageSetting: battery ? '' : this.unit.set ?? '240 V', hazards, verdict: said.verdict ?? 'may_be_powered', holdBecause: said.because ?? '',
      }),
    })
  }

  private async move(to: 'bench' | 'ready' | 'offered' | 'dispatched' | 'parted' | 'written_off', actor: Person, why = ''): Promise<void> {
    await moveUnit(this.world.db, actor, { tag: this.tag, to, why, ownerConsent: '', version: await this.version() })
  }

  private async breakUp(): Promise<void> {
    const { world, unit } = this
    const pulled = PULLED[unit.model] ?? []
    if (pulled.length === 0) return this.move('parted', world.owner, unit.why)
    const donor = await breakUnit(world.db, world.owner, {
      tag: this.tag, ...breakUp.parse({
        parts: pulled.map(({ kind, description, value = '', quantity, worth, tested = '' }) => ({ type: { kind, description, value }, quantity, worth, tested, placeTag: this.placeTag('Long store/L9/A') })),
        carcassWorth: '2', why: unit.why, version: await this.version(),
      }),
    })
    for (const { lot } of donor.pulled) world.lotTags.set(lot.title, lot.tag)
  }

  /** The parts that a job takes out of the drawers, as the log's form sends them. */
  private partsOf(job: keyof typeof JOBS): Record<string, string>[] {
    const parts = job === 'tube' ? [{ lot: 'EHT multiplier, 1370/P · 3 kV', at: 'EHT', replaced: 'Failed multiplier' }] : JOB_PARTS[job] ?? []
    return parts.flatMap(({ lot, at, replaced, ...rest }) => {
      const lotTag = this.world.lotTags.get(lot)
      return lotTag === undefined ? [] : [{ lotTag, circuitReference: at, replaced, quantity: 'quantity' in rest ? String(rest.quantity) : '1', disposition: replaced === '' ? 'nothing_removed' : JOBS[job](0).disposition }]
    })
  }

  private async log(job: keyof typeof JOBS, daysAgo: number): Promise<void> {
    const { photos, bag, daysAgo: _day, ...entry } = JOBS[job](daysAgo)
    const ours = entry.hand === 'done_by_us'
    const logged = await logModification(this.world.db, this.world.bench, {
      tag: this.tag, ...newModification.parse({
        ...entry, fittings: ours ? this.partsOf(job) : [], removedPartsBag: bag ?? '', doneOn: ours ? this.day(daysAgo) : null,
        ownerConsent: ours && this.unit.consignor ? `${this.unit.consignor} agreed by letter, ${this.day(daysAgo + 6)}` : '',
      }),
    })
    if (photos) await this.photograph(['before', 'after'], logged.id)
    if (this.unit.serial === '4417' && job === 'lead') {
      const { removedPartsBag: _bag, fittings: _fittings, ...asLogged } = newModification.parse({ ...entry, doneOn: this.day(daysAgo) })
      await correctModification(this.world.db, this.world.bench, { tag: this.tag, id: logged.id, ...asLogged, testedAfter: 'Earth bond 0.05 Ω', why: 'Read again after the earth tag was tightened', version: logged.version })
    }
    if (this.unit.model === 'UB-1') {
      const wrong = await logModification(this.world.db, this.world.bench, { tag: this.tag, ...newModification.parse({ ...JOBS.lamps(daysAgo), doneOn: this.day(daysAgo), removedPartsBag: '' }) })
      await withdrawModification(this.world.db, this.world.bench, { tag: this.tag, id: wrong.id, why: 'Logged on the wrong piece', version: wrong.version })
    }
  }

  private async measure(test: NonNullable<DemoUnit['tests']>[number]): Promise<void> {
    const { db, bench, instrumentIds } = this.world
    const powered = this.unit.triage?.verdict === undefined || this.unit.triage.verdict === 'may_be_powered'
    const sheet = await startTestSheet(db, bench, { tag: this.tag, ...newTestSheet.parse({ energised: powered, testedOn: this.day(test.daysAgo) }) })
    const open = test.open ?? false
    const readings = readDemoSheet(`${this.tag}/${test.daysAgo}`, sheet.readings.slice(0, open ? 4 : undefined), test)
    const checks = sheet.checks.map(({ name }) => ({ name, result: open ? 'not_done' as const : this.random() < 0.94 ? 'pass' as const : 'fail' as const, note: '' }))
    const saved = await saveTestSheet(db, bench, {
      tag: this.tag, number: sheet.number, ...savedTestSheet.parse({
        version: sheet.version, warmUpMinutes: 30, supply: this.unit.set ? `${this.unit.set}, through an isolating transformer` : '', ambientCelsius: 18 + Math.round(this.random() * 5),
        instrumentIds: instrumentsFor(sheet.readings, instrumentIds), readings, checks, ...test.drift ? { drift: demoWarmUp(sheet.readings) } : {},
      }),
    })
    if (!open) await signTestSheet(db, bench, { tag: this.tag, number: saved.number, version: saved.version })
  }

  private async checkSafety(): Promise<void> {
    const triage = this.unit.triage ?? {}
    const battery = /battery|cells|DC$/i.test(this.model.supply)
    const safetyClass = triage.class ?? (battery ? 'low_voltage' : 'earthed')
    const ok = battery ? 'not_applicable' as const : 'pass' as const
    await recordSafetyCheck(this.world.db, this.world.bench, {
      tag: this.tag, ...newSafetyCheck.parse({
        safetyClass, earthBond: safetyClass === 'earthed' ? `0.0${4 + Math.floor(this.random() * 5)} ohm` : '', insulation: battery ? '' : `${20 + Math.floor(this.random() * 80)} M`, insulationTestVolts: battery ? '' : '500',
        leakage: battery ? '' : `0.${1 + Math.floor(this.random() * 5)} mA`, leadAndPlug: ok, fuse: ok, polarity: ok, visual: 'pass', instrumentId: battery ? '' : this.world.testerId,
      }),
    })
  }

  /** Answers everything a buyer must be told: from the record where it speaks, else by eye, else "not known". */
  private async tellBuyer(): Promise<void> {
    const { db, owner } = this.world
    const unit = await getUnitRow(db, this.tag)
    const faces = { cosmetic_front: this.unit.condition, cosmetic_rear: 'Sockets clean, no holes beyond those in the work log', cosmetic_top: 'Light scratches', cosmetic_left: 'Light scratches', cosmetic_right: 'Light scratches' }
    const words: Partial<Record<DisclosureKey, string>> = { ...faces, working_state: 'Working to the limits shown on its test sheet', behaviour: this.model.technology === 'transistor' ? '' : 'Settles after about half an hour; a faint hum is normal for the type' }
    const topics = await describeForBuyer(db, unit.id)
    await answerDisclosures(db, owner, this.tag, {
      answers: topics.map(({ key, fromRecord, version }) => {
        const text = words[key] || fromRecord
        return { key, version, text, answer: text ? 'known' as const : key === 'missing' ? 'not_applicable' as const : key === 'cosmetic_underneath' ? 'not_looked' as const : 'not_known' as const }
      }),
    })
    for (const item of await listKeptWith(db, unit.id)) {
      if (item.whereabouts !== 'missing') continue
      await changeKeptWith(db, this.world.floor, { tag: item.tag, kind: item.kind, description: item.description, originality: item.originality, condition: item.condition, whereabouts: 'missing', placeTag: null, absenceDisclosed: 'Not with it when it came to us', version: item.version })
    }
  }

  private async pack(): Promise<void> {
    const { db, floor } = this.world
    const { id } = await getUnitRow(db, this.tag)
    for (const item of await listKeptWith(db, id)) {
      if (item.whereabouts !== 'missing') await setPacked(db, floor, { tag: item.tag, packed: true })
    }
  }
}

/** The ids of the demo's models by the key its units name them by. */
export async function findModelIds(db: Database, catalogue: readonly DemoModel[]): Promise<Map<string, string>> {
  const rows = await db.select({ id: models.id, maker: models.maker, designation: models.designation }).from(models)
  return new Map(catalogue.flatMap(({ key, maker, designation }) => {
    const row = rows.find(each => each.maker === maker && each.designation === designation)
    return row ? [[key, row.id] as const] : []
  }))
}
