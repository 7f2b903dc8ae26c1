import { z } from 'zod'
import { DISCLOSURE_KEYS, DISCLOSURES } from '../domain/disclosures'
import { KNOWLEDGE } from '../domain/knowledge'
import { optionalProse } from './common'

/** One answer: its words, or which of the four kinds of "not known" it is. */
const disclosureAnswer = z.object({
  key: z.enum(DISCLOSURE_KEYS),
  answer: z.enum(KNOWLEDGE, { error: 'Choose an answer' }),
  text: optionalProse('the answer'),
  /** The version the form was opened on; 0 where nobody had answered. */
  version: z.int().min(0),
}).superRefine((entry, context) => {
  if (entry.answer === 'known' && entry.text === '') {
    context.addIssue({ code: 'custom', path: ['text'], message: `${DISCLOSURES[entry.key].label}: write the answer, or choose one of the others` })
  }
})

export const disclosureAnswers = z.object({
  answers: z.array(disclosureAnswer).min(1, 'Answer at least one before saving').max(DISCLOSURE_KEYS.length),
}).superRefine(({ answers }, context) => {
  const keys = answers.map(entry => entry.key)
  if (new Set(keys).size !== keys.length) context.addIssue({ code: 'custom', path: ['answers'], message: 'Each topic is answered once' })
})
export type DisclosureAnswers = z.output<typeof disclosureAnswers>
