import type { LocationKind } from '../../shared/domain/locations'

/** The shop's places as paths from the room inwards; a path's last part is the place, its kind beside it. */
export const DEMO_PLACES: readonly [path: string, kind: LocationKind][] = [
  ['Shop room', 'room'], ['Shop room/Window', 'shelf'], ['Shop room/Case', 'bay'], ['Shop room/Case/1', 'shelf'], ['Shop room/Case/2', 'shelf'],
  ['Bench room', 'room'], ['Bench room/Bench 1', 'shelf'], ['Bench room/Bench 2', 'shelf'], ['Bench room/Soak shelf', 'shelf'],
  ['Long store', 'room'],
  ...Array.from({ length: 9 }, (_, bay): [string, LocationKind][] => [
    [`Long store/L${bay + 1}`, 'bay'],
    ...['A', 'B', 'C', 'D', 'floor'].map((shelf): [string, LocationKind] => [`Long store/L${bay + 1}/${shelf}`, 'shelf']),
  ]).flat(),
  ['Hazard cage', 'room'], ['Quarantine', 'room'], ['Hold shelf', 'room'], ['Photo corner', 'room'], ['Packing table', 'room'],
]
