import type { DecisionRuleName } from '../domain/decision'

/** The shop's settings. */
export interface ShopView {
  name: string
  address: string
  currency: string
  timeZone: string
  ituRegion: number
  defaultTerms: string
  earthBondLimitMilliohm: number
  insulationLimitKilohm: number
  leakageLimitMicroamp: number
  safetyLimitsOrigin: string
  /** How a reading is judged unless a procedure says otherwise; r in the guard band w = r·U. */
  decisionRule: DecisionRuleName
  guardFactor: number
  /** What an hour on the bench costs the shop, minor units of its currency; null where none is set, and for those who may not see costs. */
  benchRateMinor: number | null
  version: number
}
