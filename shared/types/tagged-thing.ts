import type { TagKind } from '../domain/tag'

/** What a tag stands for, and the page to open for it. */
export interface TaggedThing {
  /** Compact. */
  tag: string
  kind: TagKind
  /** Maker and type; a place's name; what an item is. */
  title: string
  /** "with U 000041 N", a place's path, an instrument's serial; may be empty. */
  subtitle: string
  href: string
}
