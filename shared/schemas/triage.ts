import { z } from 'zod'
import { FITTING_CONDITIONS, HAZARDS, SAFETY_CLASSES, TRIAGE_VERDICTS } from '../domain/triage'
import { optionalLine, optionalProse } from './common'

const condition = (of: string) => z.enum(FITTING_CONDITIONS, { error: `Choose the condition of the ${of}` })

/** The safety look before any power, in the order of the look. */
export const newTriage = z.object({
  safetyClass: z.enum(SAFETY_CLASSES, { error: 'Choose the safety class' }),
  lead: condition('lead'),
  plug: condition('plug'),
  fuse: condition('fuse'),
  fuseRating: optionalLine('the fuse rating'),
  voltageSetting: optionalLine('the voltage setting'),
  hazards: z.array(z.enum(HAZARDS, { error: 'Choose hazards from the list' })).max(HAZARDS.length, 'Each hazard is ticked once').default([])
    .transform(ticked => HAZARDS.filter(hazard => ticked.includes(hazard))),
  note: optionalProse('the note'),
  verdict: z.enum(TRIAGE_VERDICTS, { error: 'Choose the verdict' }),
  /** Why it is held, for a hazard hold; it shows wherever the unit does. */
  holdBecause: optionalLine('why it is held', 400),
  /** What was done about the hazard, when this look lifts a hold. */
  liftedBecause: optionalLine('what was done about the hazard', 400),
}).superRefine((said, context) => {
  if (said.verdict === 'hazard_hold' && said.holdBecause === '') context.addIssue({ code: 'custom', path: ['holdBecause'], message: 'Enter why it is held' })
})
export type NewTriage = z.output<typeof newTriage>
