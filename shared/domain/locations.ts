/** A place is a tree: room, bay, shelf, bin; any level may be left out, none may be inside a smaller one. */
export const LOCATION_KINDS = ['room', 'bay', 'shelf', 'bin'] as const
export type LocationKind = (typeof LOCATION_KINDS)[number]
export const LOCATION_KIND_LABELS: Record<LocationKind, string> = { room: 'Room', bay: 'Bay', shelf: 'Shelf', bin: 'Bin' }

/** Whether a place of one kind may stand in a place of another (null: at the top). */
export function mayStandIn(kind: LocationKind, parent: LocationKind | null): boolean {
  if (parent === null) return kind === 'room'
  return LOCATION_KINDS.indexOf(kind) > LOCATION_KINDS.indexOf(parent)
}

/** `Long store · 3 · B`: a place as people read it, from the room inwards. */
export function placeInWords(names: readonly string[]): string {
  return names.join(' · ')
}
