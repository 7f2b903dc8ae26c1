import type { UnitNeed } from '../domain/unit-needs'
import type { UnitState } from '../domain/unit-state-names'
import type { StoryEntry } from './unit'

export interface TodayUnit { tag: string, name: string, state: UnitState, hazardHold: string | null, note: string }

/** One line of the day-book: what waits, how many, and the first of them. */
export interface TodayLine { key: UnitNeed, total: number, units: TodayUnit[] }

export interface TodayView {
  inStock: number
  lines: TodayLine[]
  story: (StoryEntry & { tag: string, name: string })[]
}
