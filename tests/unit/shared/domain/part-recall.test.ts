import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { RecallBasis, RecallFitting, RecallLot } from '../../../../shared/domain/part-recall'
import { basisInWords, reachOf, sameValue } from '../../../../shared/domain/part-recall'
import { formatTag, makeTag } from '../../../../shared/domain/tag'

/** A lot of suppression capacitors, number `n`, unless said otherwise. */
const lot = (id: string, said: Partial<RecallLot> = {}): RecallLot => ({
  id, tag: makeTag('P', Number(id.replace(/\D/g, '')) || 1), kind: 'capacitor', description: 'Suppression capacitor', value: '', countedIn: 'piece', maker: 'Dielmark',
  madeFrom: null, madeTo: null, supplierId: null, invoiceNumber: '', parentLotId: null, donorUnitId: null, donorTag: null, fromFittingId: null, acquiredOn: '2026-01-05', ...said,
})
const fitted = (id: string, lotId: string | null, unitId: string, said: Partial<RecallFitting> = {}): RecallFitting => ({
  id, lotId, unitId, modificationId: `entry of ${id}`, quantity: 1, circuitReference: '', fittedOn: '2026-02-01', removedOn: null, oldLotId: null, enteredAt: '2026-02-01T10:00:00.000Z', ...said,
})
const oneLot = (lotId: string): RecallBasis => ({ basis: 'lot', lotId })
const pulled = (id: string, donorUnitId: string, said: Partial<RecallLot> = {}) => lot(id, { donorUnitId, donorTag: makeTag('U', 1), acquiredOn: '2026-03-01', ...said })
const lotsBy = (basis: RecallBasis, lots: RecallLot[]) => Object.fromEntries(reachOf(basis, lots, []).lots.map(({ id, how }) => [id, how]))
const unitsBy = (basis: RecallBasis, lots: RecallLot[], fittings: RecallFitting[]) => Object.fromEntries(reachOf(basis, lots, fittings).units.map(({ unitId, how }) => [unitId, how]))

// The rules of tracing lots through splits and pulls are common practice, no source; the checks below follow from their wording.
describe('the lots of a recall', () => {
  it('are one lot and those taken out of it, at any depth, and no other', () => {
    const lots = [lot('p1'), lot('p2', { parentLotId: 'p1' }), lot('p3', { parentLotId: 'p2' }), lot('p4'), lot('p5', { parentLotId: 'p4' })]
    expect(lotsBy(oneLot('p1'), lots)).toEqual({ p1: 'in_basis', p2: 'split_out', p3: 'split_out' })
    expect(lotsBy(oneLot('p2'), lots)).toEqual({ p2: 'in_basis', p3: 'split_out' })
  })
  it('are those of a supplier’s invoice, however its letters were typed', () => {
    const from = (supplierId: string, invoiceNumber: string) => ({ supplierId, invoiceNumber })
    const lots = [lot('p1', from('a', 'R 88/114')), lot('p2', from('a', 'r 88/114 ')), lot('p3', from('b', 'R 88/114')), lot('p4', from('a', 'R 88/115')), lot('p5', { parentLotId: 'p1' })]
    expect(lotsBy({ basis: 'invoice', supplierId: 'a', invoiceNumber: 'R 88/114' }, lots)).toEqual({ p1: 'in_basis', p2: 'in_basis', p5: 'split_out' })
  })
  it('are those whose date code may lie in a range, its ends included; undated ones are apart', () => {
    const made = (madeFrom: string, madeTo: string) => ({ madeFrom, madeTo })
    // A week code of the old practice says seven days; the range is March 1976.
    const lots = [
      lot('p1', made('1976-02-23', '1976-02-29')), lot('p2', made('1976-02-24', '1976-03-01')), lot('p3', made('1976-03-31', '1976-04-06')), lot('p4', made('1976-04-01', '1976-04-07')),
      lot('p5', made('1976-01-01', '1976-12-31')), lot('p6'), lot('p7', { kind: 'resistor' }), lot('p8', { maker: 'Northcap' }), lot('p9', { ...made('1976-03-08', '1976-03-14'), maker: '' }),
    ]
    const march = { basis: 'made_between', madeFrom: '1976-03-01', madeTo: '1976-03-31' } as const
    const narrowed = reachOf({ ...march, kind: 'capacitor', maker: 'dielmark' }, lots, [])
    expect(narrowed.lots.map(({ id }) => id)).toEqual(['p2', 'p3', 'p5'])
    expect(narrowed.lookAt).toEqual([{ id: 'p6', unknown: 'date' }, { id: 'p9', unknown: 'maker' }])
    const wide = reachOf({ ...march, kind: null, maker: '' }, lots, [])
    expect(wide.lots.map(({ id }) => id)).toEqual(['p2', 'p3', 'p5', 'p9'])
    expect(wide.lookAt.map(({ id }) => id)).toEqual(['p6', 'p7', 'p8'])
  })
  it('taken out of a mixed lot go by their own date code, once it has been read', () => {
    const lots = [
      lot('p1', { madeFrom: '1976-01-01', madeTo: '1976-12-31' }), lot('p2', { parentLotId: 'p1', madeFrom: '1976-11-01', madeTo: '1976-11-07' }), lot('p3', { parentLotId: 'p1' }),
    ]
    const march: RecallBasis = { basis: 'made_between', madeFrom: '1976-03-01', madeTo: '1976-03-31', kind: null, maker: '' }
    expect(lotsBy(march, lots)).toEqual({ p1: 'in_basis', p3: 'split_out' })
    expect(reachOf(march, lots, []).lookAt).toEqual([])
  })
  it('are those of a maker and a value, however it was written', () => {
    const lots = [lot('p1', { value: '0.1 µF' }), lot('p2', { value: '100 nF', maker: 'DIELMARK' }), lot('p3', { value: '0.22 µF' }), lot('p4', { value: '0.1 µF', maker: 'Northcap' }), lot('p5', { value: '0,1 uF', maker: '' })]
    const reach = reachOf({ basis: 'maker_and_value', maker: 'Dielmark', value: '0.1 µF' }, lots, [])
    expect(reach.lots.map(({ id }) => id)).toEqual(['p1', 'p2'])
    expect(reach.lookAt).toEqual([{ id: 'p5', unknown: 'maker' }])
  })
})

describe('two values', () => {
  // SI prefixes: 1 µF = 1000 nF, 1 MΩ = 1000 kΩ (SI Brochure, 9th edition, table 7).
  it.each([['0.1 µF', '100 nF', true], ['0,1 µF', '0.1µF', true], ['1 MΩ', '1000 kΩ', true], ['10 mH', '10 MΩ', false], ['0.1 µF', '0.22 µF', false], ['Type 12 A', 'type 12a ', true], ['Type 12 A', 'Type 12 B', false]])(
    '%s and %s', (one, other, are) => {
      expect(sameValue(one, other)).toBe(are)
      expect(sameValue(other, one)).toBe(are)
    })
})

describe('the units of a recall', () => {
  it('have such a part in them, or had it and it was taken out again', () => {
    const lots = [lot('p1'), lot('p2', { parentLotId: 'p1' }), lot('p9')]
    const fittings = [fitted('f1', 'p1', 'stands'), fitted('f2', 'p2', 'out', { removedOn: '2026-02-20' }), fitted('f3', 'p9', 'other')]
    expect(unitsBy(oneLot('p1'), lots, fittings)).toEqual({ stands: 'fitted', out: 'taken_out' })
  })
  it('say which parts, those that stand first', () => {
    const lots = [lot('p4'), lot('p5', { description: 'TO-3 pair', parentLotId: 'p4' })]
    const { units: [unit] } = reachOf(oneLot('p4'), lots, [
      fitted('f1', 'p4', 'u', { circuitReference: 'C2', removedOn: '2026-02-20' }), fitted('f2', 'p4', 'u', { circuitReference: 'C14', quantity: 2 }),
      fitted('f3', 'p4', 'u', { circuitReference: 'C3' }), fitted('f4', 'p5', 'u', { circuitReference: 'TR1' }),
    ])
    const tag = formatTag(makeTag('P', 4))
    expect(unit?.reasons).toEqual([
      `C3: suppression capacitor, ${tag}`, `C14: 2 × suppression capacitor, ${tag}`, expect.stringMatching(/^TR1: TO-3 pair, P 000005 /u), `C2: suppression capacitor, ${tag}, taken out again`,
    ])
    expect(unit?.how).toBe('fitted')
  })
  it('keep the newest day on which one was entered, for what was decided before it', () => {
    const { units: [unit] } = reachOf(oneLot('p1'), [lot('p1')], [fitted('f1', 'p1', 'u', { enteredAt: '2026-05-01T10:00:00.000Z' }), fitted('f2', 'p1', 'u')])
    expect(unit?.lastEnteredAt).toBe('2026-05-01T10:00:00.000Z')
  })
})

describe('parts that were pulled again', () => {
  it('carry the recall into every unit they went into, and on from there', () => {
    const lots = [lot('p1'), pulled('p2', 'first', { fromFittingId: 'f1', description: 'Capacitor' }), lot('p3', { parentLotId: 'p2' }), pulled('p4', 'second', { fromFittingId: 'f2' })]
    const fittings = [fitted('f1', 'p1', 'first', { removedOn: '2026-03-01' }), fitted('f2', 'p3', 'second', { removedOn: '2026-03-01' }), fitted('f3', 'p4', 'third')]
    const reach = reachOf(oneLot('p1'), lots, fittings)
    expect(Object.fromEntries(reach.lots.map(({ id, how }) => [id, how]))).toEqual({ p1: 'in_basis', p2: 'pulled', p3: 'split_out', p4: 'pulled' })
    expect(unitsBy(oneLot('p1'), lots, fittings)).toEqual({ first: 'taken_out', second: 'taken_out', third: 'fitted' })
    expect(reach.units.find(({ unitId }) => unitId === 'third')?.reasons[0]).toContain('pulled from U 000001 6')
  })
  it('may be anywhere that a part of their kind went, where nobody said which it was', () => {
    const lots = [lot('p1'), pulled('p2', 'donor'), pulled('p3', 'donor', { kind: 'knob' }), lot('p4', { parentLotId: 'p2' })]
    const fittings = [fitted('f1', 'p1', 'donor'), fitted('f2', 'p2', 'next'), fitted('f3', 'p3', 'knobs'), fitted('f4', 'p4', 'later', { removedOn: '2026-05-01' })]
    expect(unitsBy(oneLot('p1'), lots, fittings)).toEqual({ donor: 'fitted', next: 'may_be', later: 'may_be' })
    expect(reachOf(oneLot('p1'), lots, fittings).units.find(({ unitId }) => unitId === 'next')?.reasons[0]).toContain('may be one of them')
  })
  it('may be in an assembly', () => {
    expect(unitsBy(oneLot('p1'), [lot('p1'), pulled('p2', 'donor', { kind: 'assembly' })], [fitted('f1', 'p1', 'donor'), fitted('f2', 'p2', 'next')])).toMatchObject({ next: 'may_be' })
  })
  it('are not where the recalled one can’t have been', () => {
    const next = (pull: Partial<RecallLot>, first: Partial<RecallFitting> = {}, more: RecallFitting[] = []) =>
      unitsBy(oneLot('p1'), [lot('p1'), pulled('p2', 'donor', pull)], [fitted('f1', 'p1', 'donor', first), fitted('f2', 'p2', 'next'), ...more])
    expect(next({}), 'a part pulled while it stood').toHaveProperty('next')
    expect(next({ acquiredOn: '2026-01-31' }), 'pulled before it was fitted').not.toHaveProperty('next')
    expect(next({}, { removedOn: '2026-02-28' }), 'pulled after it was taken out').not.toHaveProperty('next')
    expect(next({}, { oldLotId: 'p2' }), 'the part whose place it took').not.toHaveProperty('next')
    const c14 = { circuitReference: 'C14' }
    const oldPart = (said: Partial<RecallFitting>) => fitted('f3', 'p7', 'donor', { oldLotId: 'p2', ...said })
    expect(next({}, c14, [oldPart({ circuitReference: 'C15' })]), 'the part that was at another place').not.toHaveProperty('next')
    expect(next({}, c14, [oldPart({ circuitReference: 'c14' })]), 'the part that was at its place').toHaveProperty('next')
    expect(next({}, {}, [oldPart({ modificationId: 'entry of f1' })]), 'a part that came out in the same work').not.toHaveProperty('next')
  })
  it('are one more lot, where somebody said which part it was', () => {
    const lots = [lot('p1'), pulled('p2', 'donor', { fromFittingId: 'f1' }), pulled('p3', 'donor')]
    expect(unitsBy(oneLot('p1'), lots, [fitted('f1', 'p1', 'donor', { removedOn: '2026-03-01' }), fitted('f2', 'p2', 'right'), fitted('f3', 'p3', 'left')])).toEqual({ donor: 'taken_out', right: 'fitted' })
  })
  it('are known where they are known, and may be is said only of the rest', () => {
    const lots = [lot('p1'), pulled('p2', 'donor')]
    const both = [fitted('f1', 'p1', 'donor'), fitted('f2', 'p2', 'u'), fitted('f3', 'p1', 'u', { removedOn: '2026-02-03' })]
    expect(unitsBy(oneLot('p1'), lots, both)).toEqual({ donor: 'fitted', u: 'may_be' })
    expect(unitsBy(oneLot('p1'), lots, [...both, fitted('f4', 'p1', 'u')])).toEqual({ donor: 'fitted', u: 'fitted' })
  })
  it('that went round in a circle are walked once', () => {
    const lots = [lot('p1', { donorUnitId: 'b', fromFittingId: 'f2' }), pulled('p2', 'a', { fromFittingId: 'f1' }), pulled('p3', 'b'), pulled('p4', 'a')]
    const fittings = [fitted('f1', 'p1', 'a'), fitted('f2', 'p2', 'b'), fitted('f3', 'p3', 'a'), fitted('f4', 'p4', 'b')]
    expect(unitsBy(oneLot('p1'), lots, fittings)).toEqual({ a: 'fitted', b: 'fitted' })
  })
})

describe('any graph of lots', () => {
  const some = (letter: string, most: number) => fc.nat(most).map(n => `${letter}${n}`)
  const graph = fc.record({
    lots: fc.array(fc.record({ parentLotId: fc.option(some('p', 9)), donorUnitId: fc.option(some('u', 5)), fromFittingId: fc.option(some('f', 14)) }), { minLength: 1, maxLength: 10 })
      .map(links => links.map((link, index) => lot(`p${index}`, link))),
    fittings: fc.array(fc.record({ lotId: some('p', 9), unitId: some('u', 5), removedOn: fc.option(fc.constant('2026-02-02')) }), { maxLength: 15 })
      .map(links => links.map(({ lotId, unitId, removedOn }, index) => fitted(`f${index}`, lotId, unitId, { removedOn }))),
  })
  it('ends, reaches every unit of a recalled lot once, and no unit without a part of a reached lot', () => {
    fc.assert(fc.property(graph, ({ lots, fittings }) => {
      const { lots: reached, units } = reachOf(oneLot('p0'), lots, fittings)
      const ids = reached.map(({ id }) => id)
      expect(ids).toContain('p0')
      expect(new Set(ids).size).toBe(ids.length)
      expect(units.map(({ unitId }) => unitId).sort()).toEqual([...new Set(fittings.filter(({ lotId }) => lotId !== null && ids.includes(lotId)).map(({ unitId }) => unitId))].sort())
    }))
  })
  it('reaches no less when one more part is fitted', () => {
    fc.assert(fc.property(graph, some('p', 9), ({ lots, fittings }, lotId) => {
      const reach = (all: RecallFitting[]) => reachOf(oneLot('p0'), lots, all).units.map(({ unitId }) => unitId)
      expect(reach([...fittings, fitted('f99', lotId, 'new')])).toEqual(expect.arrayContaining(reach(fittings)))
    }))
  })
})

describe('what a recall goes by, in words', () => {
  const nothing = { lotTitle: null, supplier: null, invoiceNumber: null, kindLabel: null, maker: '', value: '', made: '' }
  it('names what is known of each, and no supplier to those who may not read names', () => {
    expect(basisInWords({ ...nothing, basis: 'lot', lotTitle: 'Suppression capacitor (P 000004 X)' })).toBe('Suppression capacitor (P 000004 X)')
    expect(basisInWords({ ...nothing, basis: 'invoice', supplier: 'Distributor A', invoiceNumber: '88/114' })).toBe('Invoice 88/114 of Distributor A')
    expect(basisInWords({ ...nothing, basis: 'invoice' })).toBe('A supplier’s invoice')
    expect(basisInWords({ ...nothing, basis: 'maker_and_value', maker: 'Dielmark', value: '0.1 µF' })).toBe('Dielmark, 0.1 µF')
    expect(basisInWords({ ...nothing, basis: 'made_between', kindLabel: 'Capacitor', maker: 'Dielmark', made: '1 to 31 Mar 1976' })).toBe('Capacitor marked Dielmark, made 1 to 31 Mar 1976')
    expect(basisInWords({ ...nothing, basis: 'made_between', made: '1 to 31 Mar 1976' })).toBe('Any part, made 1 to 31 Mar 1976')
  })
})
