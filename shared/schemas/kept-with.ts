import { z } from 'zod'
import { KEPT_WITH_KINDS, ORIGINALITIES, WHEREABOUTS } from '../domain/kept-with'
import { line, optionalLine, versionSeen } from './common'
import { tagOf } from './params'

const item = z.object({
  kind: z.enum(KEPT_WITH_KINDS, { error: 'Choose what kind of thing it is' }),
  description: line('what it is'),
  originality: z.enum(ORIGINALITIES, { error: 'Choose whether it is the original' }),
  condition: optionalLine('the condition', 400),
  whereabouts: z.enum(WHEREABOUTS, { error: 'Choose where it is now' }),
  /** The place's tag, when it is elsewhere. */
  placeTag: z.preprocess(value => value === '' ? null : value, tagOf('L').nullable().default(null)),
  absenceDisclosed: optionalLine('what the buyer is told', 400),
})

type Placed = Pick<z.output<typeof item>, 'whereabouts' | 'placeTag' | 'absenceDisclosed'>

/** An item is elsewhere exactly when a place is named, and only an item that is not here can have its absence disclosed. */
const saysWhere = (value: Placed, context: z.RefinementCtx<Placed>) => {
  if (value.whereabouts === 'elsewhere' && value.placeTag === null) {
    context.addIssue({ code: 'custom', path: ['placeTag'], message: 'Choose the place where it is' })
  }
}
/** What no longer applies is dropped, so that a changed answer leaves nothing behind it. */
const settle = <T extends Placed>(value: T): T => ({
  ...value,
  placeTag: value.whereabouts === 'elsewhere' ? value.placeTag : null,
  absenceDisclosed: value.whereabouts === 'with_unit' ? '' : value.absenceDisclosed,
})

/** A new kept-with item. */
export const newKeptWith = item.superRefine(saysWhere).transform(settle)
export type NewKeptWith = z.output<typeof newKeptWith>

/** A kept-with item as it should be now, and the version it was changed from. */
export const changedKeptWith = item.extend({ version: versionSeen }).superRefine(saysWhere).transform(settle)
export type ChangedKeptWith = z.output<typeof changedKeptWith>

export const removedKeptWith = z.object({ why: line('why it no longer belongs to the unit', 400), version: versionSeen })
export type RemovedKeptWith = z.output<typeof removedKeptWith>

export const packedTick = z.object({ packed: z.boolean({ error: 'Say whether it is packed' }) })
export type PackedTick = z.output<typeof packedTick>

export const keptWithParams = z.object({ tag: tagOf('K') })
