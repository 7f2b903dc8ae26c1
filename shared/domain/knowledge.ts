/**
 * A fact about a unit is either known or missing in one of four ways, and the four are different answers:
 * nobody knows, nobody looked, somebody looked and could not tell, or the question does not arise.
 */
export const KNOWLEDGE = ['known', 'not_known', 'not_looked', 'could_not_tell', 'not_applicable'] as const
export type Knowledge = (typeof KNOWLEDGE)[number]
export type Unknown = Exclude<Knowledge, 'known'>

export const UNKNOWNS = ['not_known', 'not_looked', 'could_not_tell', 'not_applicable'] as const satisfies readonly Unknown[]

export const KNOWLEDGE_LABELS: Record<Knowledge, string> = {
  known: 'Known',
  not_known: 'not known',
  not_looked: 'not looked',
  could_not_tell: 'looked, couldn’t tell',
  not_applicable: 'not applicable',
}

/** The fact in words: its text if known, else which of the four answers it is. */
export function factInWords(answer: Knowledge, text: string | null | undefined): string {
  return answer === 'known' && text ? text : KNOWLEDGE_LABELS[answer === 'known' ? 'not_known' : answer]
}
