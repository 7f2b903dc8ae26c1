import { z } from 'zod'
import type { TagKind } from '../domain/tag'
import { parseTag, TAG_KIND_LABELS, tagProblemSentence } from '../domain/tag'

/** A tag in a path, typed any way; gives the compact form. A wrong character says so. */
export const tagOf = (kind: TagKind) => z.string().transform((typed, context) => {
  const read = parseTag(typed)
  if (read.ok && read.kind === kind) return read.tag
  context.addIssue({
    code: 'custom',
    message: read.ok ? `${typed} is the tag of a ${TAG_KIND_LABELS[read.kind].toLowerCase()}, not of a ${TAG_KIND_LABELS[kind].toLowerCase()}.` : tagProblemSentence(read.reason),
  })
  return z.NEVER
})

export const unitParams = z.object({ tag: tagOf('U') })
export const idParams = z.object({ id: z.uuid('There is nothing at this address.') })
export const unitItemParams = unitParams.extend({ id: z.uuid('There is nothing at this address.') })
export const unitNumberParams = unitParams.extend({ number: z.coerce.number().int().min(1).max(100000) })
