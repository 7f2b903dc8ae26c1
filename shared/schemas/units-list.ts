import { z } from 'zod'
import { parseCoverageParameter } from '../domain/frequency-query'
import { FUNCTIONS } from '../domain/functions'
import { parseTag, tagProblemSentence } from '../domain/tag'
import { UNIT_NEEDS } from '../domain/unit-needs'
import { UNIT_STATES } from '../domain/unit-state-names'
import { pageQuery } from './common'

/** The longest search, in characters, and the most words of it that are looked at. */
export const LONGEST_SEARCH = 200
export const MOST_SEARCH_WORDS = 10
/** How many frequencies or ranges one request may ask for at once. */
export const MOST_RANGES = 5

/** A parameter given once, several times, or once with commas. */
function severalOf(value: unknown): unknown {
  return [value].flat().flatMap(each => typeof each === 'string' ? each.split(',').map(part => part.trim()).filter(Boolean) : [each])
}

/** One frequency or range, or several by repeating the parameter; the messages are the strict reader's own. */
const ranges = (name: string) => z.preprocess(
  value => [value].flat(),
  z.array(z.string({ error: `${name} must be a frequency or a range, like 455kHz or 88-108MHz` })).max(MOST_RANGES, `Ask for ${MOST_RANGES} ranges at most in ${name}`),
).transform((texts, context) => texts.flatMap((text) => {
  const reading = parseCoverageParameter(text)
  if (reading.ok) return [reading.range]
  context.addIssue({ code: 'custom', message: reading.sentence })
  return []
})).optional()

const oneOf = <Value extends string>(name: string, values: readonly [Value, ...Value[]]) => z.preprocess(
  severalOf, z.array(z.enum(values, { error: `${name} must be one or more of ${values.join(', ')}` })).max(values.length * 2, `${name} is given too often`),
).optional()

/** A place's tag, typed any way. */
const placeTag = z.string({ error: 'location must be the tag of a place, like L 000001 7' }).transform((typed, context) => {
  const read = parseTag(typed)
  if (read.ok && read.kind === 'L') return read.tag
  context.addIssue({ code: 'custom', message: read.ok ? 'location must be the tag of a place: it begins with L' : tagProblemSentence(read.reason) })
  return z.NEVER
}).optional()

/** What `GET /api/units` takes. */
export const unitsListQuery = pageQuery.extend({
  q: z.string({ error: 'q must be words' }).max(LONGEST_SEARCH, `Search for ${LONGEST_SEARCH} characters at most`)
    .transform(text => text.normalize('NFC').replace(/\p{Cc}/gu, ' ').trim()).optional(),
  covers: ranges('covers'),
  overlaps: ranges('overlaps'),
  function: oneOf('function', FUNCTIONS),
  state: oneOf('state', UNIT_STATES),
  location: placeTag,
  model: z.uuid({ error: 'model must be the id of a model' }).optional(),
  needs: z.enum(UNIT_NEEDS, { error: `needs must be one of ${UNIT_NEEDS.join(', ')}` }).optional(),
})
export type UnitsListQuery = z.output<typeof unitsListQuery>
