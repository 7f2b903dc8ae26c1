import { setTimeout as sleep } from 'node:timers/promises'
import { beforeAll, describe, expect, it } from 'vitest'
import { getBenchQueue } from '../../../../server/services/bench-queue'
import { addCalibration } from '../../../../server/services/calibrations'
import { addInstrument, changeInstrument, getInstrument, listInstruments, retireInstrument } from '../../../../server/services/instruments'
import { saveTestSheet, signTestSheet, startTestSheet } from '../../../../server/services/test-sheets'
import type { NewInstrument } from '../../../../shared/schemas/instrument'
import type { Person } from '../../../../shared/types/person'
import { makeTriage, makeWork } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

const meter: NewInstrument = { name: 'Insulation tester', serial: '', accuracy: '±3 % of reading', capabilities: [], calibration: { calibratedOn: '2020-01-10', dueOn: '2021-01-10', certificateNumber: '88', laboratory: '', traceableTo: '', note: '' } }
const { calibration: _calibration, ...described } = meter

describe('the bench’s queue', () => {
  const database = useTestDatabase()
  let bench: Person

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench')
  })

  it('is empty in an empty shop', async () => {
    const queue = await getBenchQueue(database.db)
    expect(Object.values(queue).map(list => list.total)).toEqual([0, 0, 0, 0, 0, 0])
  })

  it('puts each thing in the parts where something is to be done about it', async () => {
    const { db } = database
    const waiting = await makeUnit(db, bench)
    const held = await makeUnit(db, bench, { hazardHold: 'Selenium smell', state: 'bench' })
    await makeTriage(db, bench, held.id, 'hazard_hold')
    const open = await makeUnit(db, bench, { state: 'bench' })
    await makeTriage(db, bench, open.id)
    await startTestSheet(db, bench, { tag: open.tag, energised: true })
    const stale = await makeUnit(db, bench, { state: 'ready' })
    const { version } = await startTestSheet(db, bench, { tag: stale.tag, energised: false })
    const checked = await saveTestSheet(db, bench, { tag: stale.tag, number: 1, version, checks: [{ name: 'Looked', result: 'pass', note: '' }] })
    await signTestSheet(db, bench, { tag: stale.tag, number: 1, version: checked.version })
    await sleep(5)
    await makeWork(db, bench, stale.id)
    await makeUnit(db, bench, { state: 'sold' })
    const overdue = await addInstrument(db, bench, meter)

    const queue = await getBenchQueue(db)
    expect(queue.awaitingTriage.items.map(unit => unit.tag)).toEqual([waiting.tag, stale.tag])
    expect(queue.hazardHolds.items).toMatchObject([{ tag: held.tag, hazardHold: 'Selenium smell' }])
    expect(queue.onBench.items).toMatchObject([{ tag: held.tag, openSheets: [] }, { tag: open.tag, openSheets: [1] }])
    expect(queue.unsigned).toMatchObject({ total: 1, items: [{ unitTag: open.tag, number: 1 }] })
    expect(queue.stale).toMatchObject({ total: 1, items: [{ unitTag: stale.tag, staleBecause: expect.stringContaining('C14') }] })
    expect(queue.overdue).toMatchObject({ total: 1, items: [{ tag: overdue.tag, calibration: 'overdue' }] })
  })

  it('leaves an instrument out once it is calibrated again or retired', async () => {
    const { db } = database
    const [overdue] = (await getBenchQueue(db)).overdue.items
    const certificate = { calibratedOn: '2026-01-10', dueOn: '2099-01-10', certificateNumber: '91', laboratory: '', traceableTo: '', note: '' }
    expect(await addCalibration(db, bench, { tag: overdue?.tag ?? '', ...certificate })).toMatchObject({ calibration: 'in_date', certificates: [{ certificateNumber: '91' }, { certificateNumber: '88' }] })
    const again = await changeInstrument(db, bench, { ...described, tag: overdue?.tag ?? '', version: 1, serial: '119' })
    expect(again).toMatchObject({ calibration: 'in_date', serial: '119', version: 2 })
    await expect(changeInstrument(db, bench, { ...described, tag: again.tag, version: 1 })).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale' } })
    expect((await getBenchQueue(db)).overdue.total).toBe(0)
    await retireInstrument(db, bench, { tag: again.tag, version: 2, why: 'Sold on' })
    expect((await listInstruments(db, { limit: 50, retired: 'no' })).items).toEqual([])
    expect((await listInstruments(db, { limit: 50, retired: 'yes' })).items).toMatchObject([{ tag: again.tag, retired: true }])
    await expect(changeInstrument(db, bench, { ...described, tag: again.tag, version: 3 })).rejects.toMatchObject({ data: { code: 'retired' } })
  })

  it('lists instruments page by page and refuses a cursor that is not one of ours', async () => {
    const { db } = database
    for (const name of ['Lamp limiter', 'Counter', 'Bridge']) await addInstrument(db, bench, { ...meter, name })
    const first = await listInstruments(db, { limit: 2, retired: 'no' })
    expect(first).toMatchObject({ total: 3, items: [{ name: 'Lamp limiter' }, { name: 'Counter' }] })
    expect(await listInstruments(db, { limit: 2, retired: 'no', cursor: first.nextCursor ?? '' })).toMatchObject({ nextCursor: null, items: [{ name: 'Bridge' }] })
    await expect(listInstruments(db, { limit: 2, retired: 'no', cursor: 'banana' })).rejects.toMatchObject({ statusCode: 400 })
  })

  it('refuses a calibration in the future and a tag that no instrument has', async () => {
    await expect(addInstrument(database.db, bench, { ...meter, calibration: { calibratedOn: '2098-01-01', dueOn: null, certificateNumber: '', laboratory: '', traceableTo: '', note: '' } })).rejects.toMatchObject({ data: { errors: [{ path: 'calibratedOn' }] } })
    await expect(getInstrument(database.db, 'B0000996')).rejects.toMatchObject({ statusCode: 404 })
  })
})
