import { z } from 'zod'
import { DEFAULT_SHEET_KEY, findSheet, labelsPerSheet } from '../domain/label-stock'
import { parseTag, tagProblemSentence } from '../domain/tag'

/** Most tags in one run of labels. */
export const LABEL_TAGS_MOST = 500
export const LABEL_COPIES_MOST = 20
/** Most labels in one file, copies counted. */
export const LABELS_MOST = 2000

/** A tag of any kind, typed any way; gives the compact form. The message names the tag, for it may be one of hundreds. */
export const anyTag = z.string({ error: 'Enter a tag' }).transform((typed, context) => {
  const read = parseTag(typed)
  if (read.ok) return read.tag
  context.addIssue({ code: 'custom', message: `${typed.slice(0, 40)}: ${tagProblemSentence(read.reason)}` })
  return z.NEVER
})

const sheet = z.string({ error: 'Choose a sheet' }).refine(key => findSheet(key) !== null, 'There is no such sheet. Choose one from the list.')
const tagList = z.array(anyTag).min(1, 'Choose at least one thing to label').max(LABEL_TAGS_MOST, `At most ${LABEL_TAGS_MOST} tags go into one run: print the rest afterwards`)

const wholeNumber = (label: string, most: number) => z.coerce.number({ error: `${label} must be a number` })
  .int(`${label} must be a whole number`).min(1, `${label} must be 1 or more`).max(most, `${label} must be ${most} or less`)

/** `?tags=U0000016,K0000021&sheet=…&start=…&copies=…` */
export const labelQuery = z.object({
  tags: z.string({ error: 'Say which tags to print: tags=U0000016,U0000025' }).max(20_000, 'That list of tags is too long')
    .transform(text => text.split(',').map(tag => tag.trim()).filter(tag => tag !== '')).pipe(tagList),
  sheet: sheet.default(DEFAULT_SHEET_KEY),
  /** The first free place on a part-used sheet, counted from 1 along the rows. */
  start: wholeNumber('The start position', 1000).default(1),
  copies: wholeNumber('Copies', LABEL_COPIES_MOST).default(1),
}).superRefine((query, context) => {
  const found = findSheet(query.sheet)
  if (found && query.start > labelsPerSheet(found)) {
    context.addIssue({ code: 'custom', path: ['start'], message: `This sheet has ${labelsPerSheet(found)} labels: start at one of them` })
  }
  if (query.tags.length * query.copies > LABELS_MOST) {
    context.addIssue({ code: 'custom', path: ['copies'], message: `That is ${query.tags.length * query.copies} labels; at most ${LABELS_MOST} go into one file` })
  }
})
export type LabelQuery = z.output<typeof labelQuery>

/** What has been printed, for the story of each unit. */
export const labelsPrinted = z.object({ tags: tagList, sheet })
export type LabelsPrinted = z.output<typeof labelsPrinted>

export const tagParams = z.object({ tag: anyTag })
