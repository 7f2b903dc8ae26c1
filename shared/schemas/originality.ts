import { z } from 'zod'
import { day, optionalLine, versionSeen } from './common'

/** Who looked inside a piece, when and how far. No day: nobody has. */
export const examinedInside = z.object({
  on: z.preprocess(value => value === '' ? null : value, day('the day somebody looked inside').nullable().default(null)),
  note: optionalLine('how far it was looked into', 400),
  version: versionSeen,
})
export type ExaminedInside = z.output<typeof examinedInside>
