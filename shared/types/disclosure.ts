import type { DisclosureKey } from '../domain/disclosures'
import type { Knowledge } from '../domain/knowledge'

/** One thing a buyer must be told of a unit, and what the record itself says about it. */
export interface DisclosureView {
  key: DisclosureKey
  /** Null while nobody has answered. */
  answer: Knowledge | null
  text: string | null
  /** What the record holds, in words that may be taken over; empty where it holds nothing. */
  fromRecord: string
  answeredBy: string | null
  answeredAt: string | null
  /** 0 while unanswered. */
  version: number
}
