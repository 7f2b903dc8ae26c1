/**
 * Walks the graph of parts: breadth first, each thing once whatever cycles there are (a part pulled, fitted and pulled again),
 * and tells the very part that was asked after from other parts of the same piece.
 */
import type { TraceDirection, TraceEdge, TraceKey, TraceNode } from '../types/trace'

/** A thing where the walk first met it. */
export interface TraceStep {
  node: TraceNode
  /** The first edge that led here; null at the start. */
  edge: TraceEdge | null
  depth: number
  /** Whether the very part leads here, and not only another part of a piece on the way. */
  isCertain: boolean
  children: TraceStep[]
  /** Other edges from here to things that stand elsewhere in the walk. */
  again: { edge: TraceEdge, node: TraceNode }[]
}

/** The end of an edge that the walk goes on from, and the one it comes from. */
const ahead = (edge: TraceEdge, direction: TraceDirection): TraceKey => direction === 'forwards' ? edge.to : edge.from
const behind = (edge: TraceEdge, direction: TraceDirection): TraceKey => direction === 'forwards' ? edge.from : edge.to

function groupBehind(edges: readonly TraceEdge[], direction: TraceDirection): Map<TraceKey, TraceEdge[]> {
  const groups = new Map<TraceKey, TraceEdge[]>()
  for (const edge of edges) {
    const key = behind(edge, direction)
    const group = groups.get(key)
    if (group) group.push(edge)
    else groups.set(key, [edge])
  }
  // By day, so that the walk is told in the order in which it happened.
  for (const group of groups.values()) group.sort((a, b) => a.on < b.on ? -1 : a.on > b.on ? 1 : ahead(a, direction) < ahead(b, direction) ? -1 : 1)
  return groups
}

/**
 * The things that the very part leads to. Through a piece it goes on only by its own fitting: forwards out of a donor by the lot
 * that was made of that fitting, backwards into a donor by the fitting that the lot was made of. Where the walk starts at the
 * piece itself, every part of it is meant.
 */
export function findCertain(start: TraceKey, edges: readonly TraceEdge[], direction: TraceDirection): Set<TraceKey> {
  const certain = new Set<TraceKey>([start])
  const leading = groupBehind(edges, direction)
  /** Fittings that a certain thing is bound to: of a lot, those it was fitted by or was made of. */
  const fittings = new Set<string>()
  const held: TraceEdge[] = []
  const waiting: TraceKey[] = [start]
  const take = (edge: TraceEdge) => {
    const key = ahead(edge, direction)
    if (certain.has(key)) return
    certain.add(key)
    waiting.push(key)
  }
  /** Out of a piece on the way, only what its certain fittings lead to. */
  const opens = (edge: TraceEdge) => behind(edge, direction) === start || !behind(edge, direction).startsWith('unit:') || edge.kind === 'sold' || edge.kind === 'supplied'
    || (edge.fittingId !== null && fittings.has(edge.fittingId))
  for (let key = waiting.shift(); key !== undefined; key = waiting.shift()) {
    for (const edge of leading.get(key) ?? []) {
      if (!opens(edge)) {
        held.push(edge)
        continue
      }
      // The edge of a lot binds its fitting; one out of a piece does not bind it anew.
      if (edge.fittingId !== null && !key.startsWith('unit:')) fittings.add(edge.fittingId)
      take(edge)
    }
    for (const edge of held.splice(0)) {
      if (opens(edge)) take(edge)
      else held.push(edge)
    }
  }
  return certain
}

/** The walk as a tree from `start`, in a fixed order. Edges to things that are not among `nodes` are left out. */
export function walkTrace(start: TraceKey, nodes: readonly TraceNode[], edges: readonly TraceEdge[], direction: TraceDirection): TraceStep | null {
  const byKey = new Map(nodes.map(node => [node.key, node]))
  const startNode = byKey.get(start)
  if (!startNode) return null
  const leading = groupBehind(edges, direction)
  const certain = findCertain(start, edges, direction)
  const root: TraceStep = { node: startNode, edge: null, depth: 0, isCertain: true, children: [], again: [] }
  const met = new Map<TraceKey, TraceStep>([[start, root]])
  const queue = [root]
  for (let at = 0; at < queue.length; at++) {
    const step = queue[at]
    if (!step) break
    for (const edge of leading.get(step.node.key) ?? []) {
      const node = byKey.get(ahead(edge, direction))
      if (!node) continue
      if (met.has(node.key)) {
        step.again.push({ edge, node })
        continue
      }
      const child: TraceStep = { node, edge, depth: step.depth + 1, isCertain: certain.has(node.key), children: [], again: [] }
      met.set(node.key, child)
      step.children.push(child)
      queue.push(child)
    }
  }
  return root
}

/** The tree's steps as rows, parents before children. */
export function traceRows(root: TraceStep): TraceStep[] {
  const rows: TraceStep[] = []
  const stack = [root]
  for (let step = stack.pop(); step !== undefined; step = stack.pop()) {
    rows.push(step)
    stack.push(...[...step.children].reverse())
  }
  return rows
}

const KIND_WORDS: Record<TraceDirection, Record<TraceEdge['kind'], string>> = {
  forwards: { supplied: 'supplied', fitted: 'fitted to', pulled: 'was broken for', split: 'taken out as', sold: 'sold to' },
  backwards: { supplied: 'came from', fitted: 'has in it', pulled: 'pulled from', split: 'taken out of', sold: 'sold by' },
}

/** How an edge is told in the direction of the walk: "fitted to", "pulled from". */
export const edgeInWords = (edge: TraceEdge, direction: TraceDirection): string => KIND_WORDS[direction][edge.kind]
