import { describe, expect, it } from 'vitest'
import { describeBands } from '../../../../shared/domain/coverage'
import { decadesThatFit, groupByFunction, layBars, placeLabels, rulerFor, wordsThatFit } from '../../../../shared/domain/ruler-layout'

const band = (label: string, lowerHz: number, upperHz: number) => ({ label, function: 'generates' as const, lowerHz, upperHz })

describe('the ruler for some bands', () => {
  it('runs from 10 Hz to 1 GHz unless a band goes beyond', () => {
    const usual = rulerFor([band('A', 100_000, 320_000)])
    expect([usual.lowerHz, usual.upperHz]).toEqual([10, 1e9])
    const wide = rulerFor([band('A', 2, 12e9)])
    expect([wide.lowerHz, wide.upperHz]).toEqual([1, 1e11])
  })

  it('is not stretched by DC, which has no place on a log scale', () => {
    expect(rulerFor([band('A', 0, 50e6)]).lowerHz).toBe(10)
  })
})

describe('bars', () => {
  const scale = rulerFor([])

  it('stand by rising lower edge, neighbours in alternate rows', () => {
    const bars = layBars([band('B', 320_000, 1e6), band('A', 100_000, 320_000), band('C', 1e6, 32e5)], scale)
    expect(bars.map(bar => [bar.label, bar.row])).toEqual([['A', 0], ['B', 1], ['C', 0]])
    expect(bars[0]?.from).toBeCloseTo(0.5)
  })

  it('say where they begin at DC and where they are a spot', () => {
    const [dc, spot] = layBars([band('DC', 0, 1e6), band('IF', 10.7e6, 10.7e6)], scale)
    expect(dc).toMatchObject({ fromDc: true, from: 0, isSpot: false })
    expect(spot).toMatchObject({ fromDc: false, isSpot: true })
  })
})

describe('words along the ruler', () => {
  it('are left out where they would touch the one before', () => {
    const fits = wordsThatFit([{ at: 0.5, width: 60 }, { at: 0.6, width: 60 }])
    expect(fits[0]).toEqual(['narrow', 'middle', 'wide'])
    expect(fits[1]).toEqual(['wide'])
  })

  it('label every second decade when narrow, always the first', () => {
    const labels = rulerFor([]).decades.map(tick => tick.label ?? '')
    const fits = decadesThatFit(labels)
    expect(labels.filter((_, index) => fits[index]?.includes('narrow'))).toEqual(['10', '1\u202Fk', '100\u202Fk', '10\u202FM', '1\u202FG'])
    expect(fits.every(each => each.includes('wide'))).toBe(true)
  })

  it('take a second line before any band loses its label', () => {
    const scale = rulerFor([])
    const short = placeLabels(layBars([band('A', 100_000, 320_000), band('B', 320_000, 1e6)], scale))
    expect(short.map(label => label.line)).toEqual([0, 0])
    const long = placeLabels(layBars([band('150–400 kc', 150_000, 400_000), band('540–1600 kc', 540_000, 1.6e6)], scale))
    expect(long.map(label => label.line)).toEqual([0, 1])
    expect(long.every(label => label.fits.includes('narrow'))).toBe(true)
  })
})

it('groups by function in one order, whatever the order of the bands', () => {
  const groups = groupByFunction([{ ...band('X', 1, 2), function: 'measures' as const }, band('A', 1, 2)])
  expect(groups.map(group => group.function)).toEqual(['generates', 'measures'])
})

it('names every band for those who cannot see the drawing', () => {
  expect(describeBands([band('A', 100_000, 320_000), { ...band('IF', 455_000, 455_000), function: 'tunes' as const }]))
    .toBe('Generates: A 100–320\u202FkHz. Tunes: IF 455\u202FkHz.')
})
