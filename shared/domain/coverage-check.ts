/** Coverage as measured against coverage as published: where each band really begins and ends, gaps, and what the plate claims. */
import { formatFrequency } from './frequency'

/** A band as published, with what was read at the two ends of its dial; null where an end was not read. Hertz. */
export interface MeasuredBand { label: string, lowerHz: number, upperHz: number, tolerancePercent: number, measuredLowHz: number | null, measuredHighHz: number | null }

export type CoverageFinding = { kind: 'reaches' | 'short' | 'gap' | 'small_gap' | 'published_gap' | 'overlap' | 'not_read', bands: string[], sentence: string }

/** Where a reading fails to reach an edge by more than the dial's tolerance. */
function shortfall(measured: number, edge: number, tolerancePercent: number, side: 'low' | 'high'): number {
  const missing = side === 'low' ? measured - edge : edge - measured
  return missing > edge * tolerancePercent / 100 * (1 + 1e-12) ? missing : 0
}

function checkBand(band: MeasuredBand): CoverageFinding[] {
  const { label, lowerHz, upperHz, tolerancePercent, measuredLowHz, measuredHighHz } = band
  if (measuredLowHz === null || measuredHighHz === null) return [{ kind: 'not_read', bands: [label], sentence: `Band ${label}: both ends of the dial have to be read to say what it covers.` }]
  const problems = [
    shortfall(measuredLowHz, lowerHz, tolerancePercent, 'low') > 0 ? `begins at ${formatFrequency(Math.round(measuredLowHz))}, the plate says ${formatFrequency(lowerHz)}` : '',
    shortfall(measuredHighHz, upperHz, tolerancePercent, 'high') > 0 ? `stops at ${formatFrequency(Math.round(measuredHighHz))}, the plate says ${formatFrequency(upperHz)}` : '',
  ].filter(Boolean)
  return [problems.length > 0
    ? { kind: 'short', bands: [label], sentence: `Band ${label} ${problems.join(' and ')}.` }
    : { kind: 'reaches', bands: [label], sentence: `Band ${label} covers what its plate claims, within its dial tolerance.` }]
}

interface Ends { label: string, lowerHz: number, upperHz: number, tolerancePercent: number, low: number, high: number }

/**
 * Between two bands that follow each other: a gap that the plate does not have, one that it has, or an overlap. A gap between
 * two end marks that are both within the dial's tolerance is told, but is no fault: most dials turn a little beyond their marks.
 */
function checkSeam(below: Ends, above: Ends): CoverageFinding[] {
  const bands = [below.label, above.label]
  const publishedGap = above.lowerHz > below.upperHz
  if (above.low > below.high) {
    const words = `${formatFrequency(Math.round(below.high))} and ${formatFrequency(Math.round(above.low))} nothing is covered (bands ${below.label} and ${above.label})`
    const isSmall = shortfall(below.high, below.upperHz, below.tolerancePercent, 'high') === 0 && shortfall(above.low, above.lowerHz, above.tolerancePercent, 'low') === 0
    if (!publishedGap && isSmall) return [{ kind: 'small_gap', bands, sentence: `The end marks of bands ${below.label} and ${above.label} leave ${formatFrequency(Math.round(below.high))} to ${formatFrequency(Math.round(above.low))} between them, within the dial’s tolerance.` }]
    return [publishedGap
      ? { kind: 'published_gap', bands, sentence: `Between ${words}; the publication has a gap there too.` }
      : { kind: 'gap', bands, sentence: `Between ${words}; by the publication they meet.` }]
  }
  return below.high > above.low ? [{ kind: 'overlap', bands, sentence: `Bands ${below.label} and ${above.label} overlap from ${formatFrequency(Math.round(above.low))} to ${formatFrequency(Math.round(below.high))}.` }] : []
}

/** Every finding of a set of bands of one function, band by band and then seam by seam in the order of frequency. */
export function checkCoverage(bands: readonly MeasuredBand[]): CoverageFinding[] {
  const read = bands.flatMap((band): Ends[] => band.measuredLowHz === null || band.measuredHighHz === null
    ? []
    : [{ label: band.label, lowerHz: band.lowerHz, upperHz: band.upperHz, tolerancePercent: band.tolerancePercent, low: band.measuredLowHz, high: band.measuredHighHz }])
    .sort((a, b) => a.lowerHz - b.lowerHz)
  const seams = read.flatMap((band, index) => {
    const next = read[index + 1]
    return next ? checkSeam(band, next) : []
  })
  return [...bands.flatMap(checkBand), ...seams]
}
