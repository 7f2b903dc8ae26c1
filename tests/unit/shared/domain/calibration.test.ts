import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { calibrationOn, calibrationState } from '../../../../shared/domain/calibration'
import type { CalibrationDays } from '../../../../shared/domain/calibration'

const days = (calibratedOn: string | null, dueOn: string | null): CalibrationDays => ({ calibratedOn, dueOn })
const old = days('2023-01-10', '2024-01-10')
const mid = days('2024-02-01', '2025-02-01')
const now = days('2025-03-01', '2026-03-01')

// How a calibration is kept in force by its days: common practice, no source.
describe('the certificate in force on a day', () => {
  it.each([
    ['2022-12-31', null], ['2023-01-10', old], ['2024-01-31', old], ['2024-02-01', mid], ['2025-02-28', mid], ['2025-03-01', now], ['2030-01-01', now],
  ])('on %s', (day, certificate) => {
    expect(calibrationOn([mid, now, old], day)).toBe(certificate)
  })
  it('is one without a day of calibration only until a dated one was given', () => {
    const undated = days(null, '2026-01-01')
    expect([calibrationOn([undated, now], '2025-02-28'), calibrationOn([now, undated], '2025-03-01')]).toEqual([undated, now])
    expect(calibrationOn([], '2025-03-01')).toBeNull()
  })
  it('is the one entered last of two of the same day', () => {
    const again = days('2025-03-01', '2027-03-01')
    expect(calibrationOn([now, again], '2025-03-01')).toBe(again)
  })
  it('was never given after the day, and none given between it and the day is passed over', () => {
    const day = fc.integer({ min: 0, max: 3000 }).map(count => new Date(Date.UTC(2020, 0, 1 + count)).toISOString().slice(0, 10))
    fc.assert(fc.property(fc.array(day), day, (given, on) => {
      const inForce = calibrationOn(given.map(each => days(each, null)), on)
      expect(inForce?.calibratedOn).toBe(given.filter(each => each <= on).sort().at(-1))
    }))
  })
})

describe('how the calibration stands', () => {
  it.each([
    ['the day before it is due', now, '2026-02-28', 'in_date'], ['on the day it is due', now, '2026-03-01', 'in_date'], ['the day after', now, '2026-03-02', 'overdue'],
    ['without a day due', days('2001-01-01', null), '2026-03-02', 'in_date'], ['without any certificate', null, '2026-03-02', 'not_recorded'],
    ['with a day due but none of calibration', days(null, '2026-03-01'), '2026-02-01', 'not_recorded'], ['and that day past', days(null, '2026-03-01'), '2026-03-02', 'overdue'],
    ['with neither', days(null, null), '2026-03-02', 'not_recorded'],
  ] as const)('%s', (_name, certificate, day, state) => {
    expect(calibrationState(certificate, day)).toBe(state)
  })
})
