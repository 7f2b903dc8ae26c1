import type { Person } from './person'

/** What the browser needs to know of the visitor and the shop. */
export interface Me {
  person: Person | null
  /** True until the owner's account has been made. */
  firstRun: boolean
  shop: { name: string, currency: string, timeZone: string, ituRegion: number } | null
}
