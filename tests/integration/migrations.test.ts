import { readdir, readFile } from 'node:fs/promises'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { getInstrument } from '../../server/services/instruments'
import { getTestSheet } from '../../server/services/test-sheets'
import type { TestDatabase } from '../support/database'
import { makeTestDatabase } from '../support/database'

const FOLDER = new URL('../../drizzle/migrations/', import.meta.url)

/** Runs the migrations whose number lies in a range, as they stand. */
async function migrate({ pool }: TestDatabase, from: number, to: number): Promise<void> {
  const files = (await readdir(FOLDER)).filter(name => name.endsWith('.sql')).sort()
  for (const name of files.filter(each => Number(each.slice(0, 4)) >= from && Number(each.slice(0, 4)) <= to)) {
    for (const statement of (await readFile(new URL(name, FOLDER), 'utf8')).split('--> statement-breakpoint')) await pool.query(statement)
  }
}

describe('a shop that was opened before readings had limits of every kind', () => {
  let database: TestDatabase

  beforeAll(async () => {
    database = await makeTestDatabase()
    await database.pool.query('drop schema public cascade; create schema public')
    await migrate(database, 0, 2)
    await database.pool.query(`
      insert into shop (name) values ('An older shop');
      insert into people (id, email, name, role, password_hash) values ('00000000-0000-4000-8000-000000000001', 'bench@demo.invalid', 'Edith Marsh', 'bench', 'x');
      insert into models (id, maker, designation, kind, dial_tolerance_percent) values ('00000000-0000-4000-8000-000000000002', 'Oxmarden', '307-G', 'rf_generator', 2);
      insert into instruments (id, tag, name, accuracy, calibrated_on, calibration_due, calibration_note) values
        ('00000000-0000-4000-8000-000000000003', 'B000001X', 'Counter', '±0.1 ppm', '2026-01-10', '2026-06-10', 'Certificate 88'),
        ('00000000-0000-4000-8000-000000000004', 'B000002V', 'Meter', '±3 %', null, null, 'Compared with the other');
    `)
    await database.pool.query(`
      insert into units (id, tag, model_id, state, ownership, serial_answer, serial, source_kind, acquired_on, booked_in_by) values
        ('00000000-0000-4000-8000-000000000005', 'U0000016', '00000000-0000-4000-8000-000000000002', 'bench', 'bought', 'known', '4417', 'auction', '2026-01-02', '00000000-0000-4000-8000-000000000001');
      insert into test_sheets (id, unit_id, number, tested_on, tested_by, signed_at) values
        ('00000000-0000-4000-8000-000000000006', '00000000-0000-4000-8000-000000000005', 1, '2026-03-01', '00000000-0000-4000-8000-000000000001', '2026-03-01T12:00:00Z');
      insert into test_sheet_instruments (sheet_id, instrument_id) values ('00000000-0000-4000-8000-000000000006', '00000000-0000-4000-8000-000000000003');
      insert into readings (sheet_id, position, band_label, setting_hz, tolerance_percent, reading_text, reading_hz) values
        ('00000000-0000-4000-8000-000000000006', 1, 'A', 100000, 2, '98.2 kc', 98200),
        ('00000000-0000-4000-8000-000000000006', 2, 'A', 300000, 2, '293.6 kc', 293600),
        ('00000000-0000-4000-8000-000000000006', 3, 'A', 320000, 2, null, null);
    `)
    await migrate(database, 3, 9999)
  })
  afterAll(() => database.drop())

  it('keeps every reading, its limit and its verdict', async () => {
    const sheet = await getTestSheet(database.db, { tag: 'U0000016', number: 1 })
    expect(sheet).toMatchObject({ decisionRule: { rule: 'simple' }, signedBy: 'Edith Marsh', procedure: null, tally: { points: 3, read: 2, pass: 1, fail: 1 } })
    expect(sheet.readings.map(({ section, nominal, atHz, limit, found }) => [section, nominal, atHz, limit, found?.text])).toEqual([
      ['dial', 100_000, 100_000, { kind: 'percent_of_setting', amount: 2 }, '98.2 kc'], ['dial', 300_000, 300_000, { kind: 'percent_of_setting', amount: 2 }, '293.6 kc'], ['dial', 320_000, 320_000, { kind: 'percent_of_setting', amount: 2 }, undefined],
    ])
  })
  it('keeps what was known of each instrument’s calibration', async () => {
    expect(await getInstrument(database.db, 'B000001X')).toMatchObject({ calibratedOn: '2026-01-10', calibrationDue: '2026-06-10', calibration: 'overdue', certificate: { note: 'Certificate 88' } })
    expect(await getInstrument(database.db, 'B000002V')).toMatchObject({ calibration: 'not_recorded', accuracy: '±3 %; Compared with the other', certificate: null })
  })
})
