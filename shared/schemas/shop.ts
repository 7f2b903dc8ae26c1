import { z } from 'zod'
import { DECISION_RULES, MOST_GUARD_FACTOR } from '../domain/decision'
import { line, LONG_TEXT, optionalLine, optionalProse, versionSeen } from './common'
import { typedShare } from './measure'
import { typedAmount } from './typed'

/** ISO 4217 codes that the runtime knows. */
export const CURRENCIES: readonly string[] = Intl.supportedValuesOf('currency')
const knownCurrencies = new Set(CURRENCIES)

export const currency = z.string({ error: 'Enter the currency' }).trim().toUpperCase()
  .min(1, 'Enter the currency')
  .refine(code => knownCurrencies.has(code), 'Currency must be a three-letter ISO 4217 code, such as GBP or EUR')

/** A name of the IANA time zone database, as the runtime spells it. */
export const timeZone = z.string({ error: 'Enter the time zone' }).trim()
  .min(1, 'Enter the time zone')
  .refine(isTimeZone, 'Time zone must be a name such as Europe/London')

/** ITU Radio Regulations, article 5: Europe and Africa; the Americas; Asia and Oceania. */
export const ITU_REGIONS = [1, 2, 3] as const
export const ITU_REGION_LABELS: Record<(typeof ITU_REGIONS)[number], string> = {
  1: 'Region 1: Europe, Africa, the Middle East, northern Asia',
  2: 'Region 2: the Americas',
  3: 'Region 3: the rest of Asia, Oceania',
}
export const ituRegion = z.coerce.number({ error: 'Choose the ITU region' }).pipe(z.literal(ITU_REGIONS, { error: 'Choose the ITU region' }))

/** r in the guard band w = r·U, kept to two decimals. */
const guardFactor = typedShare('the factor of the guard band').transform((factor, context) => {
  const problem = problemOfFactor(factor)
  if (factor !== null && problem === null) return factor
  context.addIssue({ code: 'custom', message: problem ?? '' })
  return z.NEVER
})
function problemOfFactor(factor: number | null): string | null {
  if (factor === null) return 'Enter the factor of the guard band, usually 1'
  if (factor > MOST_GUARD_FACTOR) return `The factor of the guard band is ${MOST_GUARD_FACTOR} at most, usually 1`
  return Math.abs(factor * 100 - Math.round(factor * 100)) < 1e-9 ? null : 'Give the factor of the guard band with two decimals at most'
}

/** A limit typed into a form: whole, above zero. */
const limit = (label: string, most: number, unit: string) => z.coerce.number({ error: `${label} must be a whole number of ${unit}` })
  .int(`${label} must be a whole number of ${unit}`)
  .min(1, `${label} must be 1 ${unit} or more`)
  .max(most, `${label} must be ${most} ${unit} or less`)

/** The most that an hour may cost, minor units. */
export const MOST_BENCH_RATE = 1_000_000_000

export const shopChange = z.object({
  name: line('the shop’s name'),
  address: optionalLine('the address', 400),
  currency,
  timeZone,
  ituRegion,
  defaultTerms: optionalProse('the usual terms').pipe(z.string().max(LONG_TEXT)),
  earthBondLimitMilliohm: limit('Earth bond limit', 100_000, 'mΩ'),
  insulationLimitKilohm: limit('Insulation limit', 1_000_000, 'kΩ'),
  leakageLimitMicroamp: limit('Leakage limit', 100_000, 'µA'),
  safetyLimitsOrigin: line('where these limits come from', 400),
  decisionRule: z.enum(DECISION_RULES, { error: 'Choose how a reading is judged' }),
  guardFactor,
  /** What an hour on the bench costs, as typed in the shop's currency; empty takes it off, left out it stays. */
  benchRate: typedAmount('the bench rate').transform(typed => typed.replace(/\s*(?:\/|per|an)\s*(?:h|hr|hour)$/iu, '')).optional(),
  version: versionSeen,
})
export type ShopChange = z.output<typeof shopChange>

function isTimeZone(name: string): boolean {
  try {
    return new Intl.DateTimeFormat('en', { timeZone: name }).resolvedOptions().timeZone !== ''
  } catch {
    return false
  }
}
