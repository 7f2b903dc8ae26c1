import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { eq } from 'drizzle-orm'
import { bands, ledger, testSheets, units } from '../../../../drizzle/schema'
import { addInstrument, changeInstrument, retireInstrument } from '../../../../server/services/instruments'
import { getTestSheet, listTestSheets, reopenTestSheet, saveTestSheet, signTestSheet, startTestSheet } from '../../../../server/services/test-sheets'
import type { InstrumentView } from '../../../../shared/types/bench'
import type { Person } from '../../../../shared/types/person'
import { makeCapability, makeInstrument, makeTriage, makeWork } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makeModel, makePerson, makeShop, makeUnit } from '../../../support/records'

describe('test sheets', () => {
  const database = useTestDatabase()
  let bench: Person
  let meter: InstrumentView
  let unit: typeof units.$inferSelect

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench', 'Edith Marsh')
    meter = await makeInstrument(database.db, bench)
  })
  beforeEach(async () => {
    unit = await makeUnit(database.db, bench)
  })

  const start = (energised = true) => startTestSheet(database.db, bench, { tag: unit.tag, energised })
  async function startTriaged() {
    await makeTriage(database.db, bench, unit.id)
    return start()
  }
  const at = (number = 1) => ({ tag: unit.tag, number })
  const events = async () => (await database.db.select({ event: ledger.event }).from(ledger).where(eq(ledger.unitId, unit.id)).orderBy(ledger.id)).map(({ event }) => event)

  it('starts with the dial at low, middle and high of every band, and the checks of its kind', async () => {
    const sheet = await startTriaged()
    expect(sheet).toMatchObject({ number: 1, testedBy: 'Edith Marsh', signedAt: null, tally: { points: 15, read: 0 }, unitTag: unit.tag, powerRefusal: null })
    expect(sheet.readings.map(point => point.nominal)).toEqual([
      100_000, 180_000, 320_000, 320_000, 570_000, 1_000_000, 1_000_000, 1_800_000, 3_200_000, 3_200_000, 5_700_000, 10_000_000, 10_000_000, 18_000_000, 32_000_000,
    ])
    expect(new Set(sheet.readings.map(({ limit }) => JSON.stringify(limit)))).toEqual(new Set([JSON.stringify({ kind: 'percent_of_setting', amount: 2 })]))
    expect(sheet).toMatchObject({ procedure: null, decisionRule: { rule: 'guard_band', factor: 1 } })
    expect(sheet.checks[0]).toEqual({ name: 'Internal modulation present', result: 'not_done', note: '' })
    expect(await events()).toEqual(['sheet_started'])
  })

  it('has no dial points for a model without a tolerance', async () => {
    const model = await makeModel(database.db, { dialTolerancePercent: null })
    unit = await makeUnit(database.db, bench, { modelId: model.id })
    expect((await startTriaged()).readings).toEqual([])
  })

  it.each([
    ['without a triage', null, {}, 'triage-needed'],
    ['under “do not power”', 'do_not_power', {}, 'do-not-power'],
    ['under a hazard hold', 'may_be_powered', { hazardHold: 'Asbestos suspected' }, 'hazard-hold'],
    ['after a triage that put it on hold', 'hazard_hold', {}, 'hazard-hold'],
  ] as const)('refuses to start under power %s, and writes nothing', async (_name, verdict, values, code) => {
    unit = await makeUnit(database.db, bench, values)
    if (verdict) await makeTriage(database.db, bench, unit.id, verdict)
    await expect(start()).rejects.toMatchObject({ statusCode: 409, data: { code } })
    expect(await database.db.$count(testSheets, eq(testSheets.unitId, unit.id))).toBe(0)
  })

  it('lets a cold sitting start without a triage, without anything that needs power', async () => {
    const sheet = await start(false)
    expect(sheet.readings).toEqual([])
    expect(sheet.checks.map(check => check.name)).toContain('Controls and switches turn freely')
    expect(sheet.powerRefusal).toContain('triage')
  })

  it('refuses a second open sheet and a sold unit', async () => {
    await startTriaged()
    await expect(start()).rejects.toMatchObject({ data: { code: 'sheet-open' } })
    unit = await makeUnit(database.db, bench, { state: 'sold' })
    await expect(startTriaged()).rejects.toMatchObject({ data: { code: 'record-closed' } })
  })

  // Common practice, no source: the usual tolerance of a service-grade dial is 2 % of the setting.
  it('reads readings as they are typed and judges them', async () => {
    const { version } = await startTriaged()
    const sheet = await saveTestSheet(database.db, bench, {
      ...at(), version, supply: '240 V 50 Hz', warmUpMinutes: 30, ambientCelsius: 19.5, instrumentIds: [meter.id],
      readings: [{ position: 1, found: '98.2 kc' }, { position: 3, found: '313.0' }, { position: 12, found: '10.0 Mc', note: 'zero beat' }],
    })
    expect(sheet.readings[0]).toMatchObject({ found: { text: '98.2 kc', result: { value: 98_200, judgement: { verdict: 'pass' } } }, left: null })
    expect(sheet.readings[0]?.found?.result.errorPercent).toBeCloseTo(-1.8, 10)
    expect(sheet.readings[2]?.found).toMatchObject({ text: '313.0', result: { value: 313_000, judgement: { verdict: 'fail' } } })
    expect(sheet).toMatchObject({ tally: { read: 3, pass: 2, fail: 1 }, supply: '240 V 50 Hz', warmUpMinutes: 30, ambientCelsius: 19.5, version: version + 1 })
    expect(sheet.instruments[0]).toMatch(/^B \d{6} \w Frequency meter$/)
  })

  it('leaves alone what a save does not name, and takes a reading back when it is emptied', async () => {
    const { version } = await startTriaged()
    const first = await saveTestSheet(database.db, bench, { ...at(), version, supply: '240 V', readings: [{ position: 1, found: '98.2 kc' }, { position: 2, found: '180 kc' }] })
    const second = await saveTestSheet(database.db, bench, { ...at(), version: first.version, readings: [{ position: 2, found: '' }], warmUpMinutes: null })
    expect(second.supply).toBe('240 V')
    expect(second.readings.slice(0, 2).map(point => point.found?.text)).toEqual(['98.2 kc', undefined])
  })

  it('refuses nonsense at its own field and writes none of that save', async () => {
    const { version } = await startTriaged()
    const readings = [{ position: 1, found: '98.2 kc' }, { position: 2, found: 'banana' }, { position: 3, found: '1' }, { position: 99, found: '1 kc' }]
    await expect(saveTestSheet(database.db, bench, { ...at(), version, readings })).rejects.toMatchObject({
      statusCode: 422,
      data: { errors: [{ path: 'readings.1.found' }, { path: 'readings.2.found' }, { path: 'readings.3.position' }] },
    })
    expect(await getTestSheet(database.db, at())).toMatchObject({ version, tally: { read: 0 } })
  })

  it('refuses a new reading once a hazard hold stands, but takes a note', async () => {
    const { version } = await startTriaged()
    await database.db.update(units).set({ hazardHold: 'Mains lead perished' }).where(eq(units.id, unit.id))
    await expect(saveTestSheet(database.db, bench, { ...at(), version, readings: [{ position: 1, found: '98.2 kc' }] }))
      .rejects.toMatchObject({ data: { code: 'hazard-hold' } })
    expect(await saveTestSheet(database.db, bench, { ...at(), version, note: 'Stopped' })).toMatchObject({ note: 'Stopped' })
  })

  it('refuses a save from an older version and hands back the sheet as it stands', async () => {
    const { version } = await startTriaged()
    await saveTestSheet(database.db, bench, { ...at(), version, note: 'The first hand' })
    await expect(saveTestSheet(database.db, bench, { ...at(), version, note: 'The second hand' }))
      .rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { note: 'The first hand', version: version + 1 } } })
  })

  it('lets one of two simultaneous saves through', async () => {
    const { version } = await startTriaged()
    const tries = await Promise.allSettled(['one', 'two'].map(note => saveTestSheet(database.db, bench, { ...at(), version, note })))
    expect(tries.map(each => each.status).sort()).toEqual(['fulfilled', 'rejected'])
  })

  it('refuses to sign an empty sheet, or readings that no instrument took', async () => {
    const { version } = await startTriaged()
    await expect(signTestSheet(database.db, bench, { ...at(), version })).rejects.toMatchObject({ data: { errors: [{ path: 'readings' }] } })
    const read = await saveTestSheet(database.db, bench, { ...at(), version, readings: [{ position: 1, found: '98.2 kc' }] })
    await expect(signTestSheet(database.db, bench, { ...at(), version: read.version })).rejects.toMatchObject({ data: { errors: [{ path: 'instrumentIds' }] } })
  })

  async function signed() {
    const { version } = await startTriaged()
    const read = await saveTestSheet(database.db, bench, { ...at(), version, instrumentIds: [meter.id], readings: [{ position: 1, found: '98.2 kc' }] })
    return signTestSheet(database.db, bench, { ...at(), version: read.version })
  }

  it('lets a signed sheet stand until it is opened again with a reason, and tells the story', async () => {
    const { version, signedAt } = await signed()
    expect(signedAt).not.toBeNull()
    await expect(saveTestSheet(database.db, bench, { ...at(), version, note: 'x' })).rejects.toMatchObject({ data: { code: 'sheet-signed' } })
    const open = await reopenTestSheet(database.db, bench, { ...at(), version, why: 'Read the wrong band' })
    expect(open.signedAt).toBeNull()
    expect(await events()).toEqual(['sheet_started', 'sheet_signed', 'sheet_reopened'])
    const [entry] = await database.db.select({ details: ledger.details }).from(ledger).where(eq(ledger.event, 'sheet_reopened')).orderBy(ledger.id)
    expect(entry?.details).toMatchObject({ why: 'Read the wrong band', said: [expect.stringContaining('98.2 kc')] })
  })

  it('goes stale by later work of ours, not by what was found, and says so', async () => {
    await signed()
    await makeWork(database.db, bench, unit.id, 'found_like_this')
    expect(await listTestSheets(database.db, unit.id)).toMatchObject([{ number: 1, staleBecause: null }])
    await makeWork(database.db, bench, unit.id)
    expect(await listTestSheets(database.db, unit.id)).toMatchObject([{ number: 1, staleBecause: expect.stringContaining('C14') }])
  })

  it('stands beside the signed sheet before it, and judges by the limits of its own day', async () => {
    await signed()
    await database.db.update(bands).set({ dialTolerancePercent: 1 }).where(eq(bands.modelId, unit.modelId))
    const second = await start()
    expect(second).toMatchObject({ number: 2, earlier: [{ number: 1, readings: [{ section: 'dial', value: 98_200, within: true }] }] })
    expect(second.readings[0]).toMatchObject({ limit: { kind: 'percent_of_setting', amount: 1 } })
  })

  it('keeps an instrument retired since on its sheet, and offers it to no new one', async () => {
    const { version } = await startTriaged()
    const other = await makeInstrument(database.db, bench)
    const named = await saveTestSheet(database.db, bench, { ...at(), version, instrumentIds: [other.id] })
    await retireInstrument(database.db, bench, { tag: other.tag, version: other.version, why: 'Dropped' })
    const again = await saveTestSheet(database.db, bench, { ...at(), version: named.version, instrumentIds: [other.id, meter.id] })
    expect(again.instrumentList).toHaveLength(2)
    const bare = await saveTestSheet(database.db, bench, { ...at(), version: again.version, instrumentIds: [] })
    await expect(saveTestSheet(database.db, bench, { ...at(), version: bare.version, instrumentIds: [other.id] })).rejects.toMatchObject({ data: { errors: [{ path: 'instrumentIds' }] } })
  })

  it('keeps as found beside as left, and lets what is left stand', async () => {
    const { version } = await startTriaged()
    const sheet = await saveTestSheet(database.db, bench, { ...at(), version, instrumentIds: [meter.id], readings: [{ position: 1, found: '97.1 kc', left: '99.9 kc; 100.0; 100.1 kc' }] })
    expect(sheet.readings[0]).toMatchObject({ found: { result: { judgement: { verdict: 'fail' } } }, left: { result: { count: 3, judgement: { verdict: 'pass' } } } })
    expect(sheet.tally).toMatchObject({ read: 1, pass: 1, fail: 0 })
  })

  it('says more than “conditional” only when the instrument says how well it measures', async () => {
    const { version } = await startTriaged()
    const bare = await addInstrument(database.db, bench, { name: 'Absorption wavemeter', serial: '', accuracy: '', capabilities: [], calibration: null })
    const sheet = await saveTestSheet(database.db, bench, { ...at(), version, instrumentIds: [bare.id], readings: [{ position: 1, found: '100.0 kc', instrumentId: bare.id }] })
    expect(sheet.readings[0]?.found?.result).toMatchObject({ uncertainty: null, judgement: { verdict: 'conditional_pass' }, fitness: 'not_known' })
  })

  it('freezes what was computed at the signature, whatever is said of the instrument later', async () => {
    const own = await makeInstrument(database.db, bench)
    const { version } = await startTriaged()
    const read = await saveTestSheet(database.db, bench, { ...at(), version, instrumentIds: [own.id], readings: [{ position: 1, found: '98.2 kc' }] })
    const before = await signTestSheet(database.db, bench, { ...at(), version: read.version })
    expect(before).toMatchObject({ signedBy: 'Edith Marsh', readings: [{ instrumentId: own.id }, ...Array<object>(14).fill({})] })
    await changeInstrument(database.db, bench, { tag: own.tag, version: own.version, name: own.name, serial: '', accuracy: '', capabilities: [makeCapability({ quantity: 'frequency', lower: 10, upper: 100e6, percentOfReading: 5 })] })
    const after = await getTestSheet(database.db, at())
    expect(after.readings[0]?.found?.result.uncertainty).toEqual(before.readings[0]?.found?.result.uncertainty)
    const open = await reopenTestSheet(database.db, bench, { ...at(), version: after.version, why: 'To judge it anew' })
    expect(open.readings[0]?.found?.result.uncertainty?.expanded).toBeGreaterThan(1000)
  })

  it('keeps a warm-up in order, and refuses a reading of it that is none', async () => {
    const { version } = await startTriaged()
    const drift = { label: '320 kc', quantity: 'frequency' as const, readings: [{ minutes: 5, text: '321.2 kc' }, { minutes: 20, text: '320.3 kc' }] }
    const sheet = await saveTestSheet(database.db, bench, { ...at(), version, drift })
    expect(sheet.drift).toEqual({ label: '320 kc', quantity: 'frequency', readings: [{ minutes: 5, text: '321.2 kc', value: 321_200 }, { minutes: 20, text: '320.3 kc', value: 320_300 }] })
    await expect(saveTestSheet(database.db, bench, { ...at(), version: sheet.version, drift: { ...drift, readings: [{ minutes: 5, text: 'warm' }] } }))
      .rejects.toMatchObject({ data: { errors: [{ path: 'drift.readings.0.text' }] } })
  })

  it('says of a sheet that its instrument was overdue on the day, or has fallen due since', async () => {
    const calibration = { calibratedOn: '2020-01-10', dueOn: '2021-01-10', certificateNumber: '', laboratory: '', traceableTo: '', note: '' }
    const old = await addInstrument(database.db, bench, { name: 'Old meter', serial: '', accuracy: '', capabilities: [], calibration })
    await makeTriage(database.db, bench, unit.id)
    const sheet = await startTestSheet(database.db, bench, { tag: unit.tag, energised: true, testedOn: '2020-06-01' })
    const since = await saveTestSheet(database.db, bench, { ...at(), version: sheet.version, instrumentIds: [old.id] })
    expect(since.instrumentWarnings).toEqual([expect.stringContaining('fallen due for calibration since')])
    const then = await saveTestSheet(database.db, bench, { ...at(), version: since.version, testedOn: '2021-06-01' })
    expect(then.instrumentWarnings).toEqual([expect.stringContaining('overdue for calibration on the day')])
    expect(then.instruments).toEqual([expect.stringContaining('calibration overdue')])
  })

  it('says which sheet there is not', async () => {
    await expect(getTestSheet(database.db, at(7))).rejects.toMatchObject({ statusCode: 404, message: expect.stringContaining('no test sheet 7') })
  })
})
