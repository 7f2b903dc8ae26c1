import { describe, expect, it } from 'vitest'
import { toFieldErrors } from '../../../../shared/schemas/field-errors'
import { changedUnit, newUnit } from '../../../../shared/schemas/unit'

const typed = {
  modelId: '3f0e4f0c-2f7d-4b52-9a55-0a4c4c6d8b11', serialAnswer: 'known', serial: ' 4417 ', ownership: 'bought', sourceKind: 'auction', acquiredOn: '2026-03-02',
}
const pathsOf = (values: object) => {
  const parsed = newUnit.safeParse({ ...typed, ...values })
  return parsed.success ? [] : toFieldErrors(parsed.error).map(error => error.path)
}

describe('newUnit', () => {
  it('trims a serial, and drops one that stands beside another answer', () => {
    expect(newUnit.parse(typed).serial).toBe('4417')
    expect(newUnit.parse({ ...typed, serialAnswer: 'not_looked' }).serial).toBeNull()
  })

  it.each(['SN-\u{1F4FB}\u{1F468}\u200D\u{1F527}-7', 'מספר-12', 'رقم ٤٤', '№ 7'])('keeps the serial %s as it is', (serial) => {
    expect(newUnit.parse({ ...typed, serial }).serial).toBe(serial)
  })

  it('says all that is missing at once', () => {
    const parsed = newUnit.safeParse({})
    expect(parsed.success ? [] : toFieldErrors(parsed.error).map(error => error.path).sort())
      .toEqual(['acquiredOn', 'model', 'ownership', 'serialAnswer', 'sourceKind'])
  })

  it('asks a consignor\'s name and no cost of a consigned piece', () => {
    expect(pathsOf({ ownership: 'consigned' })).toEqual(['sourceName'])
    expect(pathsOf({ ownership: 'consigned', sourceName: 'Harold Pym', cost: '4' })).toEqual(['cost'])
    expect(pathsOf({ ownership: 'consigned', sourceName: 'Harold Pym' })).toEqual([])
  })

  it.each([
    [{ serial: '' }, 'serial'], [{ serial: 'x'.repeat(81) }, 'serial'], [{ serial: {} }, 'serial'], [{ modelId: 'the green one' }, 'modelId'],
    [{ newModel: { maker: 'Oxmarden', designation: '1', kind: 'other' } }, 'model'], [{ modelId: null, newModel: { maker: 'Oxmarden', designation: '', kind: 'other' } }, 'newModel.designation'],
    [{ acquiredOn: '2026-02-30' }, 'acquiredOn'], [{ placeTag: 'U 000001 6' }, 'placeTag'], [{ kit: [{ kitItemId: 'x', found: 'here' }] }, 'kit.0.kitItemId'],
    [{ extras: [{ kind: 'lead', description: '' }] }, 'extras.0.description'], [{ cost: {} }, 'cost'],
  ])('refuses %j at its field', (values, path) => {
    expect(pathsOf(values)).toEqual([path])
  })
})

describe('changedUnit', () => {
  it('leaves alone what is not sent', () => {
    expect(changedUnit.parse({ version: 3 })).toEqual({ version: 3, serial: undefined })
  })

  it('takes a serial only with its answer', () => {
    expect(changedUnit.safeParse({ version: 1, serial: '44' }).success).toBe(false)
    expect(changedUnit.safeParse({ version: 1, serialAnswer: 'known' }).success).toBe(false)
    expect(changedUnit.parse({ version: 1, serialAnswer: 'not_applicable', serial: '44' }).serial).toBeNull()
  })
})
