import { describe, expect, it } from 'vitest'
import { toFieldErrors } from '../../../../shared/schemas/field-errors'
import { newModel } from '../../../../shared/schemas/model'

const typed = { maker: 'Oxmarden', designation: '307-G', kind: 'rf_generator' }
const band = { label: 'A', function: 'generates', lower: '100 kc', upper: '320 kc', tolerance: '' }
const errorsOf = (values: object) => {
  const parsed = newModel.safeParse({ ...typed, ...values })
  return parsed.success ? [] : toFieldErrors(parsed.error)
}

describe('newModel', () => {
  it('takes a model by its name alone', () => {
    expect(newModel.parse(typed)).toMatchObject({ technology: null, yearsFrom: null, dialTolerancePercent: null, modulationHz: null, bands: [], kit: [] })
  })

  it('reads edges, tolerance and tone as they stand on dial and in handbook', () => {
    const model = newModel.parse({ ...typed, dialTolerancePercent: '±0,5 %', modulationHz: '400 c/s', bands: [band, { ...band, lower: '1.703 Mc', upper: 3_200_000, tolerance: '1' }] })
    expect(model).toMatchObject({ dialTolerancePercent: 0.5, modulationHz: 400 })
    expect(model.bands.map(({ lowerHz, upperHz, dialTolerancePercent }) => [lowerHz, upperHz, dialTolerancePercent])).toEqual([[100_000, 320_000, null], [1_703_000, 3_200_000, 1]])
  })

  it.each([
    [{ lower: '0' }, 'bands.0.lower'], [{ lower: 0 }, 'bands.0.lower'], [{ lower: '-1' }, 'bands.0.lower'], [{ lower: '1e30' }, 'bands.0.lower'],
    [{ lower: 'banana' }, 'bands.0.lower'], [{ upper: '' }, 'bands.0.upper'], [{ upper: '0 Hz' }, 'bands.0.upper'], [{ upper: null }, 'bands.0.upper'],
    [{ lower: '1 Mc' }, 'bands.0.lower'], [{ label: ' ' }, 'bands.0.label'], [{ function: 'hums' }, 'bands.0.function'], [{ tolerance: '-2' }, 'bands.0.tolerance'],
    [{ tolerance: '0' }, 'bands.0.tolerance'], [{ tolerance: '101' }, 'bands.0.tolerance'], [{ lower: [] }, 'bands.0.lower'],
  ])('refuses the band %j at its field, with a sentence', (values, path) => {
    const [error] = errorsOf({ bands: [{ ...band, ...values }] })
    expect(error?.path).toBe(path)
    expect(error?.message).toMatch(/^["\dA-Z-].{10,}/u)
  })

  it('lets only what measures or passes begin at DC', () => {
    expect(errorsOf({ bands: [{ ...band, function: 'measures', lower: 'DC' }] })).toEqual([])
    expect(errorsOf({ bands: [{ ...band, function: 'passes', lower: '0' }] })).toEqual([])
    expect(errorsOf({ bands: [{ ...band, function: 'tunes', lower: 'DC' }] })).toHaveLength(1)
  })

  it('takes a spot frequency', () => {
    expect(errorsOf({ bands: [{ ...band, lower: '19 kc', upper: '19 kc' }] })).toEqual([])
  })

  it('refuses years that run backwards, wrong types and too many bands', () => {
    expect(errorsOf({ yearsFrom: '1960', yearsTo: '1950' })[0]?.path).toBe('yearsTo')
    expect(errorsOf({ yearsFrom: 'the fifties' })[0]?.path).toBe('yearsFrom')
    expect(errorsOf({ maker: 7, designation: null, kind: 'toaster', bands: 'all', kit: 3 }).map(error => error.path)).toEqual(['maker', 'designation', 'kind', 'bands', 'kit'])
    expect(errorsOf({ bands: Array.from({ length: 61 }, () => band) })[0]?.path).toBe('bands')
  })
})
