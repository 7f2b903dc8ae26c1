import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { addCalibration, attachCertificate, getInstrumentPage, listSheetsMadeWith, readCertificate, withdrawCalibration } from '../../../../server/services/calibrations'
import { retireInstrument } from '../../../../server/services/instruments'
import type { InstrumentView } from '../../../../shared/types/bench'
import type { Person } from '../../../../shared/types/person'
import { makeInstrument } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makeMemoryFileStore } from '../../../support/memory-file-store'
import { makePdf } from '../../../support/pictures'
import { makePerson, makeShop } from '../../../support/records'

describe('calibration certificates', () => {
  const database = useTestDatabase()
  let bench: Person
  let meter: InstrumentView

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench')
  })
  beforeEach(async () => {
    meter = await makeInstrument(database.db, bench)
  })
  const certificate = (calibratedOn: string, dueOn: string | null = null) => ({ calibratedOn, dueOn, certificateNumber: calibratedOn, laboratory: '', traceableTo: '', note: '' })
  const add = (calibratedOn: string, dueOn: string | null = null) => addCalibration(database.db, bench, { tag: meter.tag, ...certificate(calibratedOn, dueOn) })

  it('follow each other: the newest on or before a day is in force', async () => {
    const page = await add('2026-06-01', '2026-09-01')
    expect(page).toMatchObject({ calibratedOn: '2026-06-01', calibration: 'overdue', certificates: [{ certificateNumber: '2026-06-01' }, { certificateNumber: '88' }] })
    // One entered late but given earlier changes nothing of today.
    expect(await add('2026-02-01', '2099-01-01')).toMatchObject({ calibratedOn: '2026-06-01', certificates: { length: 3 } })
  })
  it('can be taken back with a reason, once, and then count as never given', async () => {
    const { addedId } = await add('2026-06-01', '2026-09-01')
    const back = await withdrawCalibration(database.db, bench, { tag: meter.tag, id: addedId, why: 'Of another meter' })
    expect(back).toMatchObject({ calibratedOn: '2026-01-10', calibration: 'in_date' })
    expect(back.certificates[0]).toMatchObject({ withdrawnBecause: 'Of another meter' })
    await expect(withdrawCalibration(database.db, bench, { tag: meter.tag, id: addedId, why: 'x' })).rejects.toMatchObject({ data: { code: 'withdrawn' } })
  })
  it('keep their PDF, judged by its content, once', async () => {
    const store = makeMemoryFileStore()
    const { addedId } = await add('2026-06-01')
    const at = { tag: meter.tag, id: addedId }
    await expect(attachCertificate(database.db, store, bench, { ...at, name: 'x.pdf', bytes: Buffer.from('no pdf at all') })).rejects.toMatchObject({ statusCode: 415 })
    await expect(readCertificate(database.db, store, at)).rejects.toMatchObject({ statusCode: 404 })
    expect((await attachCertificate(database.db, store, bench, { ...at, name: 'wcl.pdf', bytes: makePdf('one') })).certificates[0]).toMatchObject({ hasFile: true })
    expect(await readCertificate(database.db, store, at)).toMatchObject({ name: 'wcl.pdf', bytes: makePdf('one') })
    await expect(attachCertificate(database.db, store, bench, { ...at, name: 'y.pdf', bytes: makePdf('two') })).rejects.toMatchObject({ data: { code: 'has-file' } })
  })
  it('can’t be of a day to come, or of an instrument retired', async () => {
    await expect(add('2099-01-01')).rejects.toMatchObject({ data: { errors: [{ path: 'calibratedOn' }] } })
    await retireInstrument(database.db, bench, { tag: meter.tag, version: meter.version, why: 'Dropped' })
    await expect(add('2026-06-01')).rejects.toMatchObject({ data: { code: 'retired' } })
  })
  it('stand beside an empty list of sheets until it is used', async () => {
    expect(await listSheetsMadeWith(database.db, meter.tag, { limit: 10 })).toEqual({ items: [], nextCursor: null })
    await expect(getInstrumentPage(database.db, 'B0000996')).rejects.toMatchObject({ statusCode: 404 })
  })
})
