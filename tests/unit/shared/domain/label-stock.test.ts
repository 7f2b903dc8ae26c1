import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DEFAULT_SHEET_KEY, findSheet, LABEL_SHEETS, labelPosition, labelsPerSheet, sheetFits, sheetName } from '../../../../shared/domain/label-stock'

const anySheet = fc.constantFrom(...LABEL_SHEETS)

describe('label sheets', () => {
  it('names the usual sheet by its dimensions only, under a key that stays', () => {
    const sheet = findSheet(DEFAULT_SHEET_KEY)
    expect(sheet && sheetName(sheet)).toBe('A4, 3 × 8, 63.5 × 33.9 mm')
    expect(LABEL_SHEETS[0]).toBe(sheet)
    expect(new Set(LABEL_SHEETS.map(({ key }) => key)).size).toBe(LABEL_SHEETS.length)
    expect(findSheet('a4-9x9-1x1')).toBeNull()
  })

  it('keeps every label of every sheet on the paper', () => {
    expect(LABEL_SHEETS.filter(sheet => !sheetFits(sheet))).toEqual([])
    fc.assert(fc.property(anySheet, fc.nat(3000), (sheet, index) => {
      const { page, x, y } = labelPosition(sheet, index)
      return page === Math.floor(index / labelsPerSheet(sheet)) && x >= 0 && y >= 0
        && x + sheet.width <= sheet.paperWidth + 0.001 && y + sheet.height <= sheet.paperHeight + 0.001
    }))
  })

  it('puts no two labels on one another', () => {
    fc.assert(fc.property(anySheet, fc.nat(200), fc.nat(200), (sheet, a, b) => {
      fc.pre(a !== b)
      const [one, two] = [labelPosition(sheet, a), labelPosition(sheet, b)]
      return one.page !== two.page || Math.abs(one.x - two.x) >= sheet.width - 0.001 || Math.abs(one.y - two.y) >= sheet.height - 0.001
    }))
  })

  it('counts along the rows', () => {
    const sheet = findSheet(DEFAULT_SHEET_KEY) ?? LABEL_SHEETS[0]
    if (!sheet) throw new Error('There are no sheets')
    expect(labelPosition(sheet, 0)).toEqual({ page: 0, x: 7.21, y: 12.9 })
    expect(labelPosition(sheet, 4)).toMatchObject({ page: 0, x: expect.closeTo(73.25, 6), y: expect.closeTo(46.8, 6) })
    expect(labelPosition(sheet, 24)).toEqual({ page: 1, x: 7.21, y: 12.9 })
    expect(() => labelPosition(sheet, -1)).toThrow(RangeError)
    expect(() => labelPosition(sheet, 1.5)).toThrow(RangeError)
  })

  // Entries of an open XML set of label templates (commit 4c0ce11) that run off their page.
  it.each([
    ['2 × 4 of 63 × 120, pitch 130', { columns: 2, rows: 4, width: 63, height: 120, left: 10, top: 23.5, pitchX: 63, pitchY: 130 }],
    ['2 × 7 of 83.8 × 42.3 from 21.5', { columns: 2, rows: 7, width: 83.8, height: 42.3, left: 10, top: 21.5, pitchX: 83.8, pitchY: 42.3 }],
    ['4 × 12 of 83.8 × 21.2, pitch 87.6', { columns: 4, rows: 12, width: 83.8, height: 21.2, left: 10, top: 21.3, pitchX: 87.6, pitchY: 21.2 }],
    ['3 × 8 of 70.2 × 37.04', { columns: 3, rows: 8, width: 70.2, height: 37.04, left: 0, top: 0.3, pitchX: 70.2, pitchY: 37.04 }],
    ['labels over one another', { columns: 2, rows: 2, width: 50, height: 30, left: 5, top: 5, pitchX: 49, pitchY: 30 }],
  ])('refuses %s', (_name, row) => {
    expect(sheetFits({ paperWidth: 210, paperHeight: 297, ...row })).toBe(false)
  })
})
