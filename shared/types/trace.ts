/** A thing in the graph of parts. Suppliers and buyers are named only to those who may see names. */
export type TraceKind = 'lot' | 'unit' | 'supplier' | 'buyer'

/** `lot:` and the row's id: what an edge names its ends by. */
export type TraceKey = `${TraceKind}:${string}`

export interface TraceNode {
  key: TraceKey
  kind: TraceKind
  /** Of lots and units. */
  tag: string | null
  title: string
  /** Where it stands: "sold", "in quarantine", "3 left". */
  standing: string
  /** Its page; null where this reader has none. */
  href: string | null
}

/** `from` came first: supplier to lot, lot to unit, donor to lot, lot to the lot taken out of it, unit to buyer. */
export interface TraceEdge {
  from: TraceKey
  to: TraceKey
  kind: 'supplied' | 'fitted' | 'pulled' | 'split' | 'sold'
  /** A calendar day. */
  on: string
  /** Where in the circuit, for a fitting; how many. */
  detail: string
  /** Of a fitting: itself. Of a pulled lot: the fitting that came out, null where it was no part that we had fitted, or nobody knows. */
  fittingId: string | null
  /** A part that was taken out again since. */
  isRemoved: boolean
}

export const TRACE_DIRECTIONS = ['forwards', 'backwards'] as const
export type TraceDirection = (typeof TRACE_DIRECTIONS)[number]

/** What is reached in one direction; `isCut` when there is more than is told. */
export interface TraceWalk { edges: TraceEdge[], isCut: boolean }

/** Everything that a thing came from, and everything it went to. */
export interface TraceView {
  start: TraceKey
  nodes: TraceNode[]
  /** Null where that direction was not asked for. */
  forwards: TraceWalk | null
  backwards: TraceWalk | null
}
