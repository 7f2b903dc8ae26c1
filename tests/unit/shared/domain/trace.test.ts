import { describe, expect, it } from 'vitest'
import type { TraceDirection, TraceEdge, TraceKey, TraceNode } from '../../../../shared/types/trace'
import { edgeInWords, findCertain, traceRows, walkTrace } from '../../../../shared/domain/trace'

const node = (key: TraceKey): TraceNode => ({ key, kind: key.startsWith('lot') ? 'lot' : key.startsWith('unit') ? 'unit' : 'buyer', tag: null, title: key, standing: '', href: null })
const edge = (from: TraceKey, kind: TraceEdge['kind'], to: TraceKey, said: Partial<TraceEdge> = {}): TraceEdge => ({ from, to, kind, on: '2026-01-01', detail: '', fittingId: null, isRemoved: false, ...said })
const walk = (start: TraceKey, edges: TraceEdge[], direction: TraceDirection = 'forwards') =>
  walkTrace(start, [...new Set([start, ...edges.flatMap(({ from, to }) => [from, to])])].map(node), edges, direction)
const told = (start: TraceKey, edges: TraceEdge[], direction: TraceDirection = 'forwards') => {
  const root = walk(start, edges, direction)
  return root ? traceRows(root).map(({ node: { key }, depth, isCertain }) => `${depth} ${key}${isCertain ? '' : ' (another part)'}`) : []
}

describe('the walk through the graph of parts', () => {
  it('walks a cycle once: a part pulled, fitted, and pulled again', () => {
    const edges = [
      edge('lot:a', 'fitted', 'unit:1', { fittingId: 'f' }), edge('unit:1', 'pulled', 'lot:b', { fittingId: 'f' }),
      edge('lot:b', 'fitted', 'unit:2', { fittingId: 'g' }), edge('unit:2', 'pulled', 'lot:a', { fittingId: 'g' }),
    ]
    expect(told('lot:a', edges)).toEqual(['0 lot:a', '1 unit:1', '2 lot:b', '3 unit:2'])
    expect(walk('lot:a', edges)?.children[0]?.children[0]?.children[0]?.again).toMatchObject([{ node: { key: 'lot:a' } }])
  })
  it('tells the very part from another part of the same piece, forwards', () => {
    const edges = [
      edge('lot:a', 'fitted', 'unit:1', { fittingId: 'f' }),
      edge('unit:1', 'pulled', 'lot:same', { fittingId: 'f' }), edge('unit:1', 'pulled', 'lot:other'), edge('unit:1', 'pulled', 'lot:third', { fittingId: 'x' }),
      edge('lot:same', 'split', 'lot:half'), edge('lot:other', 'fitted', 'unit:2', { fittingId: 'h' }), edge('unit:1', 'sold', 'buyer:m'),
    ]
    expect(told('lot:a', edges).sort()).toEqual([
      '0 lot:a', '1 unit:1', '2 buyer:m', '2 lot:other (another part)', '2 lot:same', '2 lot:third (another part)', '3 lot:half', '3 unit:2 (another part)',
    ])
  })
  it('tells it backwards too: only the fitting that came out leads to an earlier lot', () => {
    const edges = [
      edge('unit:1', 'pulled', 'lot:b', { fittingId: 'f' }), edge('lot:a', 'fitted', 'unit:1', { fittingId: 'f' }), edge('lot:x', 'fitted', 'unit:1', { fittingId: 'e' }),
    ]
    expect(told('lot:b', edges, 'backwards').sort()).toEqual(['0 lot:b', '1 unit:1', '2 lot:a', '2 lot:x (another part)'])
  })
  it('means every part where the walk starts at the piece itself', () => {
    expect(findCertain('unit:1', [edge('unit:1', 'pulled', 'lot:a'), edge('unit:1', 'pulled', 'lot:b', { fittingId: 'f' })], 'forwards')).toEqual(new Set(['unit:1', 'lot:a', 'lot:b']))
  })
  it('finds the very part by whichever of two ways is met later', () => {
    // Unit 1 is met first by a part of no word on which it was; the fitting that leads on is met afterwards.
    const edges = [
      edge('lot:a', 'split', 'lot:c'), edge('lot:a', 'fitted', 'unit:1', { fittingId: 'f' }), edge('unit:1', 'pulled', 'lot:d', { fittingId: 'g' }), edge('lot:c', 'fitted', 'unit:1', { fittingId: 'g', on: '2026-02-01' }),
    ]
    expect(findCertain('lot:a', edges, 'forwards')).toContain('lot:d')
  })
  it('is told by day, then by name, whatever order the edges came in', () => {
    const edges = [edge('lot:a', 'fitted', 'unit:3', { on: '2026-03-01' }), edge('lot:a', 'fitted', 'unit:2'), edge('lot:a', 'fitted', 'unit:1')]
    expect(told('lot:a', edges)).toEqual(told('lot:a', [...edges].reverse()))
    expect(told('lot:a', edges).slice(1)).toEqual(['1 unit:1', '1 unit:2', '1 unit:3'])
  })
  it('has words for every kind of edge in both directions', () => {
    for (const kind of ['supplied', 'fitted', 'pulled', 'split', 'sold'] as const) {
      for (const direction of ['forwards', 'backwards'] as const) expect(edgeInWords(edge('lot:a', kind, 'unit:1'), direction)).toMatch(/^[a-z ]+$/u)
    }
  })
  it('has nothing to tell of a thing that is not there', () => {
    expect(walkTrace('lot:a', [], [], 'forwards')).toBeNull()
  })
})
