import { z } from 'zod'
import { DISPOSITIONS, HANDS, NATURES, REASONS, REVERSIBILITIES } from '../domain/modifications'
import { PATHS } from '../domain/paths'
import { day, line, optionalLine, versionSeen } from './common'
import { MOST_FITTINGS, newFitting } from './fitting'
import { typedMinutes } from './typed'

/** Longest description of what was or is there. */
export const CHANGE_TEXT = 600

const blankAsNull = (value: unknown) => value === '' ? null : value

/** The questions of the work log, in the order they are asked. */
const answers = z.object({
  hand: z.enum(HANDS, { error: 'Choose who did it' }),
  before: optionalLine('what was there', CHANGE_TEXT),
  after: optionalLine('what is there now', CHANGE_TEXT),
  reversibility: z.preprocess(blankAsNull, z.enum(REVERSIBILITIES, { error: 'Choose whether it can be undone' }).nullable().default(null)),
  /** How far it changes what the piece is; null: nobody said. */
  nature: z.preprocess(blankAsNull, z.enum(NATURES, { error: 'Choose how far it changes the piece' }).nullable().default(null)),
  disposition: z.enum(DISPOSITIONS, { error: 'Choose what became of the original parts' }),
  dispositionNote: optionalLine('where the original parts are', 400),
  reason: z.enum(REASONS, { error: 'Choose why it was done' }).default('not_known'),
  place: optionalLine('the place'),
  parts: optionalLine('the parts', 2000),
  testedAfter: optionalLine('what was tested after', 1000),
  minutes: typedMinutes('the minutes'),
  /** The day of the work; not said for work of ours: today. */
  doneOn: z.preprocess(blankAsNull, day('the date of the work').nullable().default(null)),
  ownerConsent: optionalLine('the owner’s consent', 1000),
  /** For work of ours, the only parts that it could have changed; null or none named: not said, so it could be any. */
  touches: z.array(z.enum(PATHS, { error: 'Choose the parts from the list' })).max(PATHS.length, 'Name each part once').nullable().default(null)
    .transform(paths => paths?.length ? PATHS.filter(path => paths.includes(path)) : null),
  /** For work of ours, why it could not have changed what was measured; null: it could, or nobody is sure. */
  affectsNothingBecause: line('why it could not have changed what was measured', 400).nullable().default(null),
})

type Answers = z.output<typeof answers>
type Issue = (path: keyof Answers, message: string) => void

/** Rules between the answers. What was left alone is not undoable and has nothing "after"; the rest says what is there now. */
function checkTogether(said: Answers, issue: Issue): void {
  checkReach(said, issue)
  if (said.hand === 'left_alone') {
    if (said.before === '') issue('before', 'Enter what was left alone')
    if (said.nature !== null) issue('nature', 'What was left alone changes nothing: leave this unanswered')
    if (said.reversibility !== null) issue('reversibility', 'What was left alone has nothing to undo: leave this unanswered')
    return
  }
  if (said.hand === 'done_by_us' && said.before === '') issue('before', 'Enter what was there before')
  if (said.after === '') issue('after', 'Enter what is there now')
  if (said.reversibility === null) issue('reversibility', 'Choose whether it can be undone')
}

/** What work could have changed: asked of ours alone, and answered in one way. */
function checkReach({ hand, touches, affectsNothingBecause }: Answers, issue: Issue): void {
  if (hand !== 'done_by_us') {
    if (touches !== null) issue('touches', 'Only work of ours comes after a measurement: leave this unanswered')
    if (affectsNothingBecause !== null) issue('affectsNothingBecause', 'Only work of ours comes after a measurement: leave this unanswered')
    return
  }
  if (touches === null) return
  if (affectsNothingBecause !== null) issue('touches', 'Say which parts it could have changed, or why it could have changed none, not both')
  if (touches.includes('nothing_measured') && touches.length > 1) issue('touches', 'Choose “Nothing that is measured” on its own, or the parts')
}

const together = (said: Answers, context: z.RefinementCtx) =>
  checkTogether(said, (path, message) => context.addIssue({ code: 'custom', path: [path], message }))

export const newModification = answers.extend({
  /** Parts fitted, each out of its lot: the drawers fall as the entry is written. */
  fittings: z.array(newFitting, { error: 'The parts fitted must be a list' }).max(MOST_FITTINGS, `Log ${MOST_FITTINGS} parts at a time at most`).default([]),
  /** The removed parts are put in a bag that gets a tag of its own; the words describe the bag. */
  removedPartsBag: optionalLine('what is in the bag'),
}).superRefine((said, context) => {
  together(said, context)
  if (said.fittings.length > 0 && said.hand !== 'done_by_us') context.addIssue({ code: 'custom', path: ['fittings'], message: 'Only parts that we fitted come out of our drawers: take them off this entry, or say that we did it' })
  if (said.removedPartsBag !== '' && said.disposition !== 'kept_with_unit') {
    context.addIssue({ code: 'custom', path: ['removedPartsBag'], message: 'A bag is kept with the unit: choose “Kept with the unit” for the original parts' })
  }
})
export type NewModification = z.output<typeof newModification>

/** The entry as it should have been, and why it is put right. */
export const correctedModification = answers.extend({
  why: line('why it is corrected', 400),
  version: versionSeen,
}).superRefine(together)
export type CorrectedModification = z.output<typeof correctedModification>

export const withdrawnModification = z.object({
  why: line('why it is withdrawn', 400),
  version: versionSeen,
})
export type WithdrawnModification = z.output<typeof withdrawnModification>

/** Said from a stale sheet: the work did not change what was measured. */
export const unaffectingModification = z.object({
  why: line('why it does not affect what was measured', 400),
  version: versionSeen,
})
export type UnaffectingModification = z.output<typeof unaffectingModification>
