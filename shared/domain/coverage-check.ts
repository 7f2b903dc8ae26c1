/**
 * Coverage as measured against coverage as published: where each band really begins and ends, what is missing between bands,
 * where they overlap, and whether the whole reaches what the plate claims. Whole hertz, both ends included, as in `coverage`.
 * That a shortfall within the dial's tolerance is no fault follows from what a dial tolerance is; no source beyond that.
 */
import { covers, gapsWithin, overlaps, unionOf } from './coverage'
import type { Interval } from './coverage'
import { formatFrequency } from './frequency'
import { FUNCTION_LABELS, FUNCTIONS } from './functions'
import type { CoverageFunction } from './functions'

/**
 * A band as published, with what was read at the two ends of its dial; null where an end was not read. Hertz. Bands of
 * different functions are never held against each other; bands that name none belong together.
 */
export interface MeasuredBand {
  label: string
  lowerHz: number
  upperHz: number
  tolerancePercent: number
  function?: CoverageFunction
  measuredLowHz: number | null
  measuredHighHz: number | null
}

export type CoverageFinding = { kind: 'reaches' | 'short' | 'gap' | 'small_gap' | 'published_gap' | 'overlap' | 'wrong_way' | 'not_read', bands: string[], sentence: string }

/** How one end of a dial stands to its plate. */
export interface EndCheck {
  kind: 'reaches' | 'within_tolerance' | 'short' | 'not_read'
  /** What is missing to the plate's edge in hertz; 0 where it is reached, null where it was not read. */
  shortHz: number | null
}

export interface BandCheck {
  label: string
  function: CoverageFunction | null
  /** From end to end as read, or null where an end was not read or the two are the wrong way round. */
  measured: Interval | null
  low: EndCheck
  high: EndCheck
  finding: CoverageFinding
}

/** Whether all bands of one function together reach what the plate claims; `not_known` where a band that matters was not read. */
export interface PlateCheck {
  function: CoverageFunction | null
  kind: 'reaches' | 'within_tolerance' | 'short' | 'not_known'
  /** What the plate claims and was not found, tolerances allowed for. */
  missing: Interval[]
  sentence: string
}

export interface CoverageReport { bands: BandCheck[], seams: CoverageFinding[], plate: PlateCheck[] }

/** A reading in whole hertz, or null for what is none. */
const readAt = (hz: number | null): number | null => hz !== null && Number.isFinite(hz) && hz >= 0 ? Math.round(hz) : null

const nameOf = (label: string): string => label ? `Band ${label}` : 'The dial'

function checkEnd(measured: number | null, edge: number, tolerancePercent: number, side: 'low' | 'high'): EndCheck {
  if (measured === null) return { kind: 'not_read', shortHz: null }
  const missing = side === 'low' ? measured - edge : edge - measured
  if (missing <= 0) return { kind: 'reaches', shortHz: 0 }
  const allowed = tolerancePercent > 0 ? edge * tolerancePercent / 100 * (1 + 1e-12) : 0
  return { kind: missing > allowed ? 'short' : 'within_tolerance', shortHz: missing }
}

function bandFinding(band: MeasuredBand, low: EndCheck, high: EndCheck): CoverageFinding {
  const { label, lowerHz, upperHz } = band
  const [from, to] = [readAt(band.measuredLowHz), readAt(band.measuredHighHz)]
  const finding = (kind: CoverageFinding['kind'], words: string): CoverageFinding => ({ kind, bands: [label], sentence: `${nameOf(label)}${words}` })
  if (from !== null && to !== null && from > to) return finding('wrong_way', ': the reading at the low end is above the one at the high end. Check which is which.')
  const problems = [
    low.kind === 'short' ? `begins at ${formatFrequency(from ?? 0)}, the plate says ${formatFrequency(lowerHz)}` : '',
    high.kind === 'short' ? `stops at ${formatFrequency(to ?? 0)}, the plate says ${formatFrequency(upperHz)}` : '',
  ].filter(Boolean)
  const unread = low.kind === 'not_read' ? '; its low end was not read' : high.kind === 'not_read' ? '; its high end was not read' : ''
  if (problems.length > 0) return finding('short', ` ${problems.join(' and ')}${unread}.`)
  if (unread) return finding('not_read', ': both ends of the dial have to be read to say what it covers.')
  return finding('reaches', low.kind === 'reaches' && high.kind === 'reaches' ? ' covers what its plate claims.' : ' covers what its plate claims, within its dial tolerance.')
}

function checkBand(band: MeasuredBand): BandCheck {
  const [lowerHz, upperHz] = [readAt(band.measuredLowHz), readAt(band.measuredHighHz)]
  const low = checkEnd(lowerHz, band.lowerHz, band.tolerancePercent, 'low')
  const high = checkEnd(upperHz, band.upperHz, band.tolerancePercent, 'high')
  return {
    label: band.label,
    function: band.function ?? null,
    measured: lowerHz !== null && upperHz !== null && lowerHz <= upperHz ? { lowerHz, upperHz } : null,
    low,
    high,
    finding: bandFinding(band, low, high),
  }
}

/** A band that was read from end to end, with its plate. */
interface ReadBand extends BandCheck { measured: Interval, published: Interval }
/** The bands of one function: those read from end to end, and what the others claim. */
interface Group { function: CoverageFunction | null, read: ReadBand[], published: Interval[], unread: { label: string, published: Interval }[] }

function groupOf(bands: readonly MeasuredBand[], name: CoverageFunction | null): Group {
  const own = bands.filter(band => (band.function ?? null) === name)
  const checked = own.map(band => ({ ...checkBand(band), published: { lowerHz: band.lowerHz, upperHz: band.upperHz } }))
  return {
    function: name,
    read: checked.flatMap((band): ReadBand[] => band.measured ? [{ ...band, measured: band.measured }] : []).sort((a, b) => a.measured.lowerHz - b.measured.lowerHz),
    published: own.map(({ lowerHz, upperHz }) => ({ lowerHz, upperHz })),
    unread: checked.flatMap(({ label, measured, published }) => measured ? [] : [{ label, published }]),
  }
}

const groupsOf = (bands: readonly MeasuredBand[]): Group[] =>
  [null, ...FUNCTIONS].map(name => groupOf(bands, name)).filter(({ published }) => published.length > 0)

interface Seam { at: number, finding: CoverageFinding }

/**
 * A gap in what was measured: one that the plate does not have, one that it has, or one between two end marks that are both
 * within the dial's tolerance, which is told but is no fault: most dials turn a little beyond their marks.
 */
function describeGap(gap: Interval, below: ReadBand, above: ReadBand, published: readonly Interval[]): CoverageFinding {
  const bands = [below.label, above.label]
  const [from, to] = [formatFrequency(gap.lowerHz - 1), formatFrequency(gap.upperHz + 1)]
  const isPublished = above.published.lowerHz > below.published.upperHz
    && !covers(published, { lowerHz: below.published.upperHz, upperHz: above.published.lowerHz })
  if (isPublished) return { kind: 'published_gap', bands, sentence: `Between ${from} and ${to} nothing is covered (bands ${below.label} and ${above.label}); the publication has a gap there too.` }
  if (below.high.kind !== 'short' && above.low.kind !== 'short') {
    return { kind: 'small_gap', bands, sentence: `The end marks of bands ${below.label} and ${above.label} leave ${from} to ${to} between them, within the dial’s tolerance.` }
  }
  return { kind: 'gap', bands, sentence: `Between ${from} and ${to} nothing is covered (bands ${below.label} and ${above.label}); by the publication they meet.` }
}

/** Gaps in what was measured, save where a band that was not read may lie. */
function gapsOf({ read, published, unread }: Group): Seam[] {
  const union = unionOf(read.map(({ measured }) => measured))
  const span = { lowerHz: union[0]?.lowerHz ?? 0, upperHz: union.at(-1)?.upperHz ?? -1 }
  return gapsWithin(union, span).flatMap((gap) => {
    const below = read.find(({ measured }) => measured.upperHz === gap.lowerHz - 1)
    const above = read.find(({ measured }) => measured.lowerHz === gap.upperHz + 1)
    const isUnsure = overlaps(unread.map(each => each.published), gap)
    return below && above && !isUnsure ? [{ at: gap.lowerHz, finding: describeGap(gap, below, above, published) }] : []
  })
}

function overlapsOf({ read }: Group): Seam[] {
  return read.flatMap((below, index) => read.slice(index + 1).flatMap((above): Seam[] => {
    const [from, to] = [above.measured.lowerHz, Math.min(below.measured.upperHz, above.measured.upperHz)]
    if (from >= to) return []
    const sentence = `Bands ${below.label} and ${above.label} overlap from ${formatFrequency(from)} to ${formatFrequency(to)}.`
    return [{ at: from, finding: { kind: 'overlap', bands: [below.label, above.label], sentence } }]
  }))
}

const seamsOf = (group: Group): CoverageFinding[] =>
  [...gapsOf(group), ...overlapsOf(group)].sort((a, b) => a.at - b.at).map(({ finding }) => finding)

/** What a band covers when an end that falls short within its tolerance counts as reaching its edge. */
function allowedFor({ measured, published, low, high }: ReadBand): Interval {
  return {
    lowerHz: low.kind === 'within_tolerance' ? published.lowerHz : measured.lowerHz,
    upperHz: high.kind === 'within_tolerance' ? published.upperHz : measured.upperHz,
  }
}

/** The parts of what the plate claims that `intervals` miss. */
const missingFrom = (intervals: readonly Interval[], claims: readonly Interval[]): Interval[] => claims.flatMap(claim => gapsWithin(intervals, claim))

/** "311 kHz to 320 kHz": a missing part, named by the edges of what is there. */
function nameMissing({ lowerHz, upperHz }: Interval, claims: readonly Interval[]): string {
  const from = claims.some(claim => claim.lowerHz === lowerHz) ? lowerHz : lowerHz - 1
  const to = claims.some(claim => claim.upperHz === upperHz) ? upperHz : upperHz + 1
  return from === to ? formatFrequency(from) : `${formatFrequency(from)} to ${formatFrequency(to)}`
}

function checkPlate(group: Group): PlateCheck {
  const claims = unionOf(group.published)
  const allowed = group.read.map(allowedFor)
  const unsure = group.unread.filter(({ published }) => !covers(allowed, published))
  const missing = missingFrom([...allowed, ...unsure.map(({ published }) => published)], claims)
  const opening = group.function ? `${FUNCTION_LABELS[group.function]}: ` : 'Overall '
  const base = { function: group.function, missing }
  if (missing.length > 0) {
    return { ...base, kind: 'short', sentence: `${opening}it does not reach all that its plate claims: ${missing.map(part => nameMissing(part, claims)).join(', ')} ${missing.length === 1 ? 'is' : 'are'} missing.` }
  }
  if (unsure.length > 0) return { ...base, kind: 'not_known', sentence: `${opening}it can’t be said whether it reaches what its plate claims: read both ends of ${unsure.map(({ label }) => label ? `band ${label}` : 'the dial').join(', ')}.` }
  const isWhole = missingFrom(group.read.map(({ measured }) => measured), claims).length === 0
  const words = `${opening}it reaches what its plate claims, ${claims.map(claim => `${formatFrequency(claim.lowerHz)} to ${formatFrequency(claim.upperHz)}`).join(' and ')}`
  return isWhole
    ? { ...base, kind: 'reaches', sentence: `${words}.` }
    : { ...base, kind: 'within_tolerance', sentence: `${words}, within its dial tolerance.` }
}

/** The whole check: each band in the order given, the seams between them, and what the plate claims, by function. */
export function reportCoverage(bands: readonly MeasuredBand[]): CoverageReport {
  const groups = groupsOf(bands)
  return { bands: bands.map(checkBand), seams: groups.flatMap(seamsOf), plate: groups.map(checkPlate) }
}

/** Every finding, band by band in the order given and then seam by seam in the order of frequency, function by function. */
export function checkCoverage(bands: readonly MeasuredBand[]): CoverageFinding[] {
  const { bands: checked, seams } = reportCoverage(bands)
  return [...checked.map(({ finding }) => finding), ...seams]
}
