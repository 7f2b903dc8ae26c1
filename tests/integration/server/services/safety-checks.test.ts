import { setTimeout as sleep } from 'node:timers/promises'
import { eq } from 'drizzle-orm'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { safetyChecks, shop, triages, units } from '../../../../drizzle/schema'
import { findSafetyCheck, getSafetyForm, recordSafetyCheck } from '../../../../server/services/safety-checks'
import { getTestSheet, startTestSheet } from '../../../../server/services/test-sheets'
import { newSafetyCheck } from '../../../../shared/schemas/safety-check'
import type { Person } from '../../../../shared/types/person'
import { makeInstrument, makeTriage, makeWork } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

describe('safety checks', () => {
  const database = useTestDatabase()
  let bench: Person
  let instrumentId = ''
  let unit: typeof units.$inferSelect

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench')
    instrumentId = (await makeInstrument(database.db, bench)).id
  })
  beforeEach(async () => {
    unit = await makeUnit(database.db, bench)
  })

  const record = (values: object = {}) => recordSafetyCheck(database.db, bench, {
    tag: unit.tag,
    ...newSafetyCheck.parse({
      safetyClass: 'earthed', earthBond: '0.06', insulation: '20', insulationTestVolts: '500',
      leadAndPlug: 'pass', fuse: 'pass', polarity: 'pass', visual: 'pass', instrumentId, ...values,
    }),
  })

  it('passes within the shop’s limits, and keeps them with their origin', async () => {
    const check = await record()
    expect(check).toMatchObject({
      passed: true, current: true, earthBondMilliohm: 60, earthBondLimitMilliohm: 100, insulationLimitKilohm: 1000, limitsOrigin: expect.stringContaining('Class I'),
    })
    expect(check.reasons.map(reason => reason.sentence).join(' ')).toContain('against a limit of')
  })

  it('judges by the limits of the day, whatever the shop sets later', async () => {
    await record()
    await database.db.update(shop).set({ earthBondLimitMilliohm: 50 })
    expect(await findSafetyCheck(database.db, unit.id)).toMatchObject({ passed: true, earthBondLimitMilliohm: 100 })
    expect(await record()).toMatchObject({ passed: false, earthBondLimitMilliohm: 50 })
    await database.db.update(shop).set({ earthBondLimitMilliohm: 100 })
  })

  it('takes other limits with where they come from', async () => {
    expect(await record({ earthBond: '0.2', earthBondLimit: '0.3', limitsOrigin: 'Long cord, our own code' }))
      .toMatchObject({ passed: true, earthBondLimitMilliohm: 300, limitsOrigin: 'Long cord, our own code' })
  })

  it('keeps the fuse and the stored charge as they were entered, and judges nothing by them', async () => {
    expect(await record({ fuseRating: 'T 500 mA', reservoirMicrofarad: '32.5', bleederKilohm: '470', reservoirVolts: '350' }))
      .toMatchObject({ passed: true, fuseRating: 'T 500 mA', reservoirMicrofarad: 32.5, bleederKilohm: 470, reservoirVolts: 350 })
    expect(await record()).toMatchObject({ passed: true, fuseRating: '', reservoirMicrofarad: null, bleederKilohm: null, reservoirVolts: null })
  })

  it('is overtaken by later work, and by a later check', async () => {
    await record()
    await sleep(5)
    await makeWork(database.db, bench, unit.id)
    expect(await findSafetyCheck(database.db, unit.id)).toMatchObject({ passed: true, current: false })
    await sleep(5)
    expect(await record({ visual: 'fail' })).toMatchObject({ passed: false, current: true })
  })

  it('measures leakage only after a triage that allows power', async () => {
    await expect(record({ leakage: '0.4' })).rejects.toMatchObject({ data: { code: 'triage-needed' } })
    expect(await database.db.$count(safetyChecks, eq(safetyChecks.unitId, unit.id))).toBe(0)
    await makeTriage(database.db, bench, unit.id)
    expect(await record({ leakage: '0.4' })).toMatchObject({ leakageMicroamp: 400, passed: true })
  })

  it('stands on the sheet of whose sitting it is a part', async () => {
    await startTestSheet(database.db, bench, { tag: unit.tag, energised: false, checkpoints: 'bands' })
    await record({ sheetNumber: 1 })
    expect((await getTestSheet(database.db, { tag: unit.tag, number: 1 })).safety).toMatchObject({ sheetNumber: 1, current: true })
    await expect(record({ sheetNumber: 2 })).rejects.toMatchObject({ data: { errors: [{ path: 'sheetNumber' }] } })
  })

  it('refuses a sold unit', async () => {
    await database.db.update(units).set({ state: 'sold' }).where(eq(units.id, unit.id))
    await expect(record()).rejects.toMatchObject({ statusCode: 409, data: { code: 'record-closed' } })
  })

  it('starts its form from the class and the fuse of the last triage', async () => {
    expect(await getSafetyForm(database.db, unit.tag)).toMatchObject({ safetyClass: null, fuseRating: '' })
    await database.db.insert(triages).values({ unitId: unit.id, safetyClass: 'earthed', lead: 'sound', plug: 'sound', fuse: 'sound', fuseRating: 'T 500 mA', verdict: 'may_be_powered', doneBy: bench.id })
    expect(await getSafetyForm(database.db, unit.tag)).toMatchObject({ safetyClass: 'earthed', fuseRating: 'T 500 mA', powerRefusal: null, latest: null, limits: { earthBondMilliohm: 100 } })
  })
})
