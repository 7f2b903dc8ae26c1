import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { boundsOf } from '../../../../shared/domain/limits'
import { toFieldErrors } from '../../../../shared/schemas/field-errors'
import { savedProcedure } from '../../../../shared/schemas/procedure'

const rail = { section: 'rail', label: 'HT', quantity: 'voltage', nominal: '250 V' }
const dial = { section: 'dial', bandLabel: 'A', quantity: 'frequency', nominal: '320 kc' }
const said = (checkpoints: unknown[], rest = {}) => ({ seen: 0, decisionRule: 'guard_band', guardFactor: '1', checkpoints, ...rest })
const read = (point: unknown, rest = {}) => savedProcedure.parse(said([point], rest)).checkpoints[0]
function errorsOf(input: unknown) {
  const parsed = savedProcedure.safeParse(input)
  return parsed.success ? [] : toFieldErrors(parsed.error).map(({ path, message }) => `${path}: ${message}`)
}
const limited = (kind: string, amount: unknown, rest = {}) => ({ ...rail, limit: { kind, amount, ...rest } })

describe('savedProcedure', () => {
  it('reads a dial point as typed', () => {
    expect(read({ ...dial, limit: { kind: 'percent_of_setting', amount: '±2 %' } })).toEqual({
      section: 'dial', bandLabel: 'A', label: '', quantity: 'frequency', atHz: 320_000, nominal: 320_000, span: null, limit: { kind: 'percent_of_setting', amount: 2 },
    })
  })

  it('reads a dial’s limit as an amount', () => {
    expect(read({ ...dial, limit: { kind: 'absolute', amount: '5 kc' } })?.limit).toEqual({ kind: 'absolute', amount: 5000 })
  })

  it('keeps a fraction of a hertz in what a dial is set to, and whole hertz where it is drawn', () => {
    expect(read({ ...dial, nominal: '98.2505 kc' })).toMatchObject({ nominal: 98_250.5, atHz: 98_251 })
  })

  it.each<[string, string, object]>([
    ['percent_of_setting', '5', { kind: 'percent_of_setting', amount: 5 }],
    ['percent_of_setting', '+/-0,5 %', { kind: 'percent_of_setting', amount: 0.5 }],
    ['decibel', '±2 dB', { kind: 'decibel', amount: 2 }],
    ['absolute', '±500 mV', { kind: 'absolute', amount: 0.5 }],
    ['at_least', '240 V', { kind: 'at_least', value: 240 }],
    ['at_most', '0.26 kV', { kind: 'at_most', value: 260 }],
    ['none', '', { kind: 'none' }],
  ])('reads a limit %s of %j in the unit of the quantity', (kind, amount, limit) => {
    expect(read(limited(kind, amount))?.limit).toEqual(kind === 'none' ? null : limit)
  })

  it('reads limits of two amounts', () => {
    expect(read(limited('between', '240 V', { second: '260 V' }))?.limit).toEqual({ kind: 'between', lower: 240, upper: 260 })
    expect(read(limited('larger_of', '1 %', { second: '2 V', secondKind: 'absolute' }))?.limit)
      .toEqual({ kind: 'larger_of', of: [{ kind: 'percent_of_setting', amount: 1 }, { kind: 'absolute', amount: 2 }] })
  })

  it('reads a limit of full scale', () => {
    const point = { section: 'meter', bandLabel: '30 V', label: 'Half scale', quantity: 'voltage', nominal: '15 V', span: '30 V', limit: { kind: 'percent_of_span', amount: '3' } }
    expect(read(point)).toMatchObject({ span: 30, limit: { kind: 'percent_of_span', amount: 3 } })
    expect(errorsOf(said([{ ...point, span: '' }]))).toEqual(['checkpoints.0.limit.amount: A limit in per cent of full scale needs the full scale'])
    expect(errorsOf(said([{ ...point, span: '0 V' }]))[0]).toMatch(/^checkpoints\.0\.(?:span|limit\.amount): /)
  })

  it.each<[string, object, string]>([
    ['the wrong way round', limited('between', '260 V', { second: '240 V' }), 'limit.amount: The lower limit is above the upper: swap them or mend one'],
    ['below nought', limited('percent_of_setting', '-5'), 'limit.amount: A limit must be zero or more'],
    ['without its amount', limited('absolute', ''), 'limit.amount: Enter the limit'],
    ['without its second', limited('between', '240 V'), 'limit.second: Enter the limit'],
    ['without its unit', limited('absolute', '5'), 'limit.amount: Say what 5 is in: V, mV or µV.'],
    ['about nothing', { ...limited('percent_of_setting', '5'), nominal: '' }, 'limit.amount: A limit in per cent of the setting needs the setting'],
    ['of nought', { ...limited('percent_of_setting', '5'), nominal: '0 V' }, 'limit.amount: Nothing lies within this limit: state it as an amount above 0'],
    ['of no width', limited('percent_of_setting', '0'), 'limit.amount: Nothing lies within this limit: state it as an amount above 0'],
  ])('refuses a limit %s, at its field', (_, point, error) => {
    expect(errorsOf(said([rail, point]))).toEqual([`checkpoints.1.${error}`])
  })

  it.each<[string, object, string]>([
    ['a rail without a name', { ...rail, label: '' }, 'label'],
    ['an amount without a unit', { ...rail, nominal: '250' }, 'nominal'],
    ['a unit of something else', { ...rail, nominal: '250 kc' }, 'nominal'],
    ['more than can be kept', { ...rail, nominal: '1e999 V' }, 'nominal'],
    ['a dial set to nothing', { ...dial, nominal: '' }, 'nominal'],
    ['a dial below nought', { ...dial, nominal: -5 }, 'nominal'],
    ['a dial beyond all frequencies', { ...dial, nominal: 9e30 }, 'nominal'],
    ['a dial in volts', { ...dial, quantity: 'voltage', nominal: '5 V' }, 'quantity'],
    ['a frequency without a unit', { ...rail, at: '455' }, 'at'],
    ['an unknown section', { ...rail, section: 'engine' }, 'section'],
  ])('refuses %s at %s', (_, point, field) => {
    const errors = errorsOf(said([point]))
    expect(errors).toHaveLength(1)
    expect(errors[0]).toMatch(new RegExp(`^checkpoints\\.0\\.${field}: `))
  })

  it('holds 1 to 600 checkpoints', () => {
    expect(errorsOf(said([]))).toEqual(['checkpoints: A procedure reads at least one thing'])
    expect(errorsOf(said(Array.from({ length: 600 }, () => rail)))).toEqual([])
    expect(errorsOf(said(Array.from({ length: 601 }, () => rail)))).toEqual(['checkpoints: A procedure has 600 checkpoints at most'])
  })

  it('asks what was changed from the second version on', () => {
    expect(errorsOf(said([rail]))).toEqual([])
    expect(errorsOf(said([rail], { seen: 1 }))).toEqual(['why: Say what was changed since the last version'])
    expect(errorsOf(said([rail], { seen: 1, why: 'Table 5' }))).toEqual([])
  })

  it('takes a guard band of 0 to 3 times U, as finely as it is kept', () => {
    expect(savedProcedure.parse(said([rail], { guardFactor: '1.234' })).guardFactor).toBe(1.23)
    expect(savedProcedure.parse(said([rail], { guardFactor: '' })).guardFactor).toBe(1)
    expect(errorsOf(said([rail], { guardFactor: '3.1' }))[0]).toMatch(/^guardFactor: /)
    expect(errorsOf(said([rail], { warmUpMinutes: '-1' }))[0]).toMatch(/^warmUpMinutes: /)
  })

  it('lets nothing through whose limits can’t be taken or are the wrong way round', () => {
    const amounts = fc.oneof(fc.constantFrom('', '5', '±2 %', '-3', '1 V', '0', '10 mV', 'x'), fc.double({ noDefaultInfinity: true, noNaN: true }))
    const points = fc.record({
      section: fc.constantFrom('rail', 'meter', 'dial'), label: fc.constant('HT'), quantity: fc.constantFrom('voltage', 'frequency', 'level', 'power'), nominal: amounts, span: amounts,
      limit: fc.record({ kind: fc.constantFrom('none', 'percent_of_setting', 'percent_of_span', 'absolute', 'decibel', 'larger_of', 'at_least', 'at_most', 'between'), amount: amounts, second: amounts, secondKind: fc.constantFrom('absolute', 'decibel', 'percent_of_span') }),
    })
    fc.assert(fc.property(points, (point) => {
      const parsed = savedProcedure.safeParse(said([point]))
      const made = parsed.data?.checkpoints[0]
      if (!made) return
      const limits = made.limit === null ? null : boundsOf(made.limit, made)
      if (limits) expect(limits.ok && (limits.bounds.lower ?? -Infinity) <= (limits.bounds.upper ?? Infinity)).toBe(true)
      expect(made.atHz === null || Number.isSafeInteger(made.atHz)).toBe(true)
    }), { numRuns: 500 })
  })
})
