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
  version: number
}
