import { z } from 'zod'
import { optionalLine } from './common'

/** What is sent beside a document's file. */
export const newDocument = z.object({
  /** Empty: the file's own name. */
  title: optionalLine('the title'),
  /** From a multipart form, so text. */
  isPublic: z.enum(['true', 'false'], { error: 'Say whether the buyer’s sheet may offer it' }).default('false').transform(text => text === 'true'),
})
export type NewDocument = z.output<typeof newDocument>
