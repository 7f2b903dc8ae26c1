/** What a piece has really cost: what was paid, less what parts pulled from it took with them, the parts fitted, and the time on the bench. */
import { formatMinutes } from './minutes'
import type { Money } from './money'
import { formatMoney } from './money'

export interface UnitCostFacts {
  /** The shop's: what is in another is listed apart and never added. */
  currency: string
  /** A consigned piece was not paid for. */
  isConsigned: boolean
  /** What was paid; null where it is not known, and for a consigned piece. */
  purchase: Money | null
  /** What each lot pulled from it took of its cost, which may be nothing; null where the lot's cost is not known. */
  shares: readonly (Money | null)[]
  /** What each fitting that was not undone took out of its lot, one per line of the log; null where it is not known. */
  fittings: readonly (Money | null)[]
  /** Whole minutes of work of ours, of entries that stand. */
  minutes: number
  /** Entries of work of ours whose minutes nobody noted. */
  entriesWithoutMinutes: number
  /** Minor units of the shop's currency an hour; null where none is set. */
  benchRateMinor: number | null
  /** What it was sold for, or else is asked for; null without either. */
  price: Money | null
  isSold: boolean
}

export type CostLineKey = 'purchase' | 'shares' | 'parts' | 'bench'
/** One line in words; `minor` is below nought for what comes off. */
export interface CostLine { key: CostLineKey, term: string, minor: number }

export interface UnitCost {
  currency: string
  /** They add up to `totalMinor`, to the minor unit. */
  lines: CostLine[]
  totalMinor: number
  /** Price less total; null without a price in the shop's currency. */
  marginMinor: number | null
  /** The same with the bench time left out of the total. */
  marginBeforeBenchMinor: number | null
  price: Money | null
  isSold: boolean
  /** Amounts in other currencies, which are in no sum here. */
  apart: { term: string, minor: number, currency: string }[]
  /** What is missing from the sum, one sentence each. Empty: the sum is whole. */
  missing: string[]
}

/** "2 parts", "one part": a count with its noun. */
const counted = (count: number, one: string, many: string) => count === 1 ? `one ${one}` : `${count} ${many}`
const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

/**
 * What minutes cost at a rate an hour, both whole and not below 0, in minor units: exact, and rounded once, to the nearest (a half
 * upwards).
 */
export function benchCost(minutes: number, rateMinor: number): number {
  // In BigInt: minutes × rate may pass 2⁵³.
  return Number((BigInt(minutes) * BigInt(rateMinor) + 30n) / 60n)
}

interface Group { key: CostLineKey, term: (count: number) => string, amounts: readonly (Money | null)[] }

function groupsOf(facts: UnitCostFacts): Group[] {
  const { currency, minutes, benchRateMinor } = facts
  const rate = benchRateMinor === null ? null : { minor: benchRateMinor, currency }
  const time = rate === null || minutes === 0 ? null : { minor: benchCost(minutes, rate.minor), currency }
  return [
    { key: 'purchase', term: () => 'Bought for', amounts: [facts.isConsigned ? null : facts.purchase] },
    { key: 'shares', term: count => `Less ${count === 1 ? 'the share' : 'shares'} of ${counted(count, 'lot', 'lots')} pulled from it`, amounts: facts.shares.filter(share => share?.minor !== 0).map(negative) },
    { key: 'parts', term: count => capital(`${counted(count, 'part', 'parts')} fitted`), amounts: facts.fittings },
    { key: 'bench', term: () => rate === null ? '' : `${formatMinutes(minutes)} on the bench at ${formatMoney(rate)} an hour`, amounts: [time] },
  ]
}

const negative = (amount: Money | null): Money | null => amount && { ...amount, minor: 0 - amount.minor }

/** A group's amounts, one sum for each currency. */
function sumsOf({ key, term, amounts }: Group): { key: CostLineKey, term: string, minor: number, currency: string }[] {
  const known = amounts.filter(amount => amount !== null)
  return [...new Set(known.map(({ currency }) => currency))].map((currency) => {
    const these = known.filter(amount => amount.currency === currency)
    return { key, term: term(these.length), minor: these.reduce((sum, { minor }) => sum + minor, 0), currency }
  })
}

function missingFrom(facts: UnitCostFacts): string[] {
  const parts = facts.fittings.filter(cost => cost === null).length
  const lots = facts.shares.filter(share => share === null).length
  return [
    facts.isConsigned ? 'It is on consignment: its owner’s share of the price is still to come off' : facts.purchase === null && 'What was paid for it is not known yet',
    lots > 0 && !facts.isConsigned && `${capital(counted(lots, 'lot', 'lots'))} pulled from it took no share of its cost`,
    parts > 0 && capital(counted(parts, 'part of unknown cost', 'parts of unknown cost')),
    facts.benchRateMinor === null && facts.minutes > 0 && `${formatMinutes(facts.minutes)} on the bench: no rate an hour is set`,
    facts.entriesWithoutMinutes > 0 && capital(counted(facts.entriesWithoutMinutes, 'entry of work without its minutes', 'entries of work without their minutes')),
  ].filter(sentence => sentence !== false)
}

/**
 * The cost of a piece and what is left of its price. Two margins, for they differ, often in sign: before and after bench time
 * (common practice, no source). Taxes, fees, packing and carriage are in neither.
 */
export function unitCost(facts: UnitCostFacts): UnitCost {
  const { currency, price, isSold } = facts
  const sums = groupsOf(facts).flatMap(sumsOf)
  const lines = sums.filter(sum => sum.currency === currency).map(({ key, term, minor }) => ({ key, term, minor }))
  const totalMinor = lines.reduce((sum, { minor }) => sum + minor, 0)
  const benchMinor = lines.find(({ key }) => key === 'bench')?.minor ?? 0
  const marginMinor = price?.currency === currency ? price.minor - totalMinor : null
  return {
    currency, lines, totalMinor, marginMinor, marginBeforeBenchMinor: marginMinor === null ? null : marginMinor + benchMinor, price, isSold,
    apart: sums.filter(sum => sum.currency !== currency).map(({ term, minor, currency: other }) => ({ term, minor, currency: other })),
    missing: missingFrom(facts),
  }
}

/** How bench time stands against its ceiling: near from 80 % of it, passed beyond it (common practice, no source). */
export type CeilingStanding = 'none' | 'under' | 'near' | 'passed'

export interface BenchTime {
  standing: CeilingStanding
  sentence: string
}

function standingOf(minutes: number, ceiling: number | null): CeilingStanding {
  if (ceiling === null) return 'none'
  if (minutes > ceiling) return 'passed'
  return minutes * 5 >= ceiling * 4 ? 'near' : 'under'
}

function left(minutes: number, ceiling: number, isEntered: boolean): string {
  const over = isEntered ? 'over the ceiling' : `${formatMinutes(minutes - ceiling)} over the ceiling`
  if (minutes > ceiling) return `${over}. Stop and think.`
  return minutes === ceiling ? 'none is left.' : `${formatMinutes(ceiling - minutes)} left.`
}

/**
 * Minutes spent on a piece against its ceiling (null: none is set), and what an entry being written would make of it. Whole minutes.
 * "1 h 40 of 4 h spent; this entry makes it 4 h 10: over the ceiling. Stop and think."
 */
export function benchTime(spent: number, ceiling: number | null, entered = 0): BenchTime {
  const after = spent + entered
  const standing = standingOf(after, ceiling)
  const said = `${formatMinutes(spent)}${ceiling === null ? '' : ` of ${formatMinutes(ceiling)}`} spent${entered > 0 ? `; this entry makes it ${formatMinutes(after)}` : ''}`
  if (ceiling === null) return { standing, sentence: `${said}. No ceiling is set.` }
  return { standing, sentence: standing === 'under' ? `${said}.` : `${said}: ${left(after, ceiling, entered > 0)}` }
}
