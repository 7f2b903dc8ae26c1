import type { KeptWithKind } from '../domain/kept-with'
import type { LocationKind } from '../domain/locations'

/** A place of the shop. Counts are of what stands in it itself, not in the places inside it. */
export interface LocationView {
  tag: string
  kind: LocationKind
  name: string
  /** From the room inwards: `Long store · 3 · B`. */
  path: string
  /** How many places it is inside of. */
  depth: number
  parentTag: string | null
  note: string
  retiredAt: string | null
  units: number
  keptWith: number
  version: number
}

/** A kept-with item that is here and not with its unit. */
export interface ItemHere { tag: string, kind: KeptWithKind, description: string, unitTag: string, path: string }

export interface LocationContents extends LocationView { items: ItemHere[] }

/** Where a unit has just been put. */
export interface PlacedUnit { tag: string, place: { tag: string, path: string } | null, version: number }
