import { z } from 'zod'
import { LOCATION_KINDS } from '../domain/locations'
import { changedLine, line, optionalLine, versionSeen } from './common'
import { tagOf } from './params'

const noPlaceAsNull = (value: unknown) => value === '' || value === undefined ? null : value

/** A new room, bay, shelf or bin. */
export const newLocation = z.object({
  kind: z.enum(LOCATION_KINDS, { error: 'Choose what kind of place it is' }),
  name: line('the place’s name', 60),
  /** The tag of the place it stands in; null for a room. */
  parentTag: z.preprocess(noPlaceAsNull, tagOf('L').nullable()),
  note: optionalLine('the note', 400),
})
export type NewLocation = z.output<typeof newLocation>

/** What may change of a place; what is left out stays. A place's kind never changes: what is inside depends on it. */
export const locationChange = z.object({
  name: line('the place’s name', 60).optional(),
  parentTag: tagOf('L').nullable().optional(),
  note: changedLine('the note', 400),
  /** Taken out of use, or back into it. */
  retired: z.boolean({ error: 'Say whether the place is still used' }).optional(),
  version: versionSeen,
})
export type LocationChange = z.output<typeof locationChange>

export const locationParams = z.object({ tag: tagOf('L') })

/** Puts a unit somewhere, or nowhere. */
export const unitPlacing = z.object({
  locationTag: z.preprocess(noPlaceAsNull, tagOf('L').nullable()),
  why: optionalLine('the reason', 200),
  version: versionSeen.optional(),
})
export type UnitPlacing = z.output<typeof unitPlacing>
