import { and, sql } from 'drizzle-orm'
import type { SQL } from 'drizzle-orm'
import { models, units } from '../../drizzle/schema'
import { EQUIPMENT_KIND_LABELS, EQUIPMENT_KIND_WORDS, EQUIPMENT_KINDS } from '../../shared/domain/equipment-kinds'
import { parseTag } from '../../shared/domain/tag'
import { MOST_SEARCH_WORDS } from '../../shared/schemas/units-list'

/** How alike a typed word and a stored one must be, by shared trigrams from 0 to 1: one slip in a word of six letters passes. */
const ALIKE = 0.5

const kinds = EQUIPMENT_KINDS.map(kind => ({ kind, words: `${EQUIPMENT_KIND_LABELS[kind]} ${EQUIPMENT_KIND_WORDS[kind]}` }))
const kindWords = sql.join(kinds.map(({ kind, words }) => sql`(${kind}, ${words})`), sql`, `)

/** For `like`: the word as it stands, anywhere. */
const anywhere = (word: string) => `%${word.replace(/[\\%_]/g, '\\$&')}%`

/**
 * Every word must be found in the unit's maker, designation or kind (typing errors forgiven), or be part of its serial
 * or tag. A whole tag, typed any way, finds that unit alone.
 */
export function matchesWords(typed: string): SQL | undefined {
  const tag = parseTag(typed)
  if (tag.ok) return sql`${units.tag} = ${tag.tag}`
  const words = typed.split(/\s+/).filter(Boolean).slice(0, MOST_SEARCH_WORDS)
  return and(...words.map(matchesWord))
}

function matchesWord(word: string): SQL {
  const name = sql`(${models.maker} || ' ' || ${models.designation})`
  const inTag = anywhere(word.toUpperCase().replace(/[^0-9A-Z]/g, ''))
  return sql`(
    ${name} ilike ${anywhere(word)}
    or word_similarity(${word}, ${name}) >= ${ALIKE}
    or ${units.serial} ilike ${anywhere(word)}
    or ${inTag} <> '%%' and ${units.tag} like ${inTag}
    or ${models.kind}::text in (
      select kind from (values ${kindWords}) as known (kind, words)
      where words ilike ${anywhere(word)} or word_similarity(${word}, words) >= ${ALIKE}
    )
  )`
}
