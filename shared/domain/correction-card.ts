/**
 * The dial correction card that a buyer keeps with the set: what a dial that says one thing really gives, and what to set for a
 * wanted frequency. Between two points of one band the relative error is taken as straight in the logarithm of frequency;
 * beyond the points read nothing is said. Hertz throughout.
 */
import type { ReadingView } from '../types/bench'
import { nearestMark } from './log-scale'

export interface CardPoint { dialHz: number, trueHz: number }
export interface CardBand {
  label: string
  points: CardPoint[]
  /** To get a wanted frequency, set the dial so; at round marks between the ends of what was read. */
  settings: { wantedHz: number, setHz: number }[]
}

const ratioAt = (from: CardPoint, to: CardPoint, hz: number): number => {
  const share = Math.log(hz / from.dialHz) / Math.log(to.dialHz / from.dialHz)
  return from.trueHz / from.dialHz * (1 - share) + to.trueHz / to.dialHz * share
}

/** What a dial set to `dialHz` gives, from the points of one band in the order of frequency; null beyond them. */
export function trueFrequency(points: readonly CardPoint[], dialHz: number): number | null {
  const at = points.findIndex((point, index) => index > 0 && dialHz >= (points[index - 1]?.dialHz ?? 0) && dialHz <= point.dialHz)
  const [from, to] = [points[at - 1], points[at]]
  return at < 1 || !from || !to ? null : dialHz * ratioAt(from, to, dialHz)
}

/** Where to set a dial for a wanted frequency; null where the points don't reach, or the dial does not rise with them. */
export function settingFor(points: readonly CardPoint[], wantedHz: number): number | null {
  const [first, last] = [points[0], points.at(-1)]
  if (!first || !last || wantedHz < first.trueHz || wantedHz > last.trueHz) return null
  let low = first.dialHz
  let high = last.dialHz
  for (let step = 0; step < 200 && high - low > 1e-9 * high; step += 1) {
    const middle = (low + high) / 2
    const got = trueFrequency(points, middle)
    if (got === null) return null
    if (got < wantedHz) low = middle
    else high = middle
  }
  return (low + high) / 2
}

/** Round marks within a span, about `count` of them, evenly spaced on the logarithm. */
function marksBetween(lowerHz: number, upperHz: number, count: number): number[] {
  const marks = Array.from({ length: count }, (_, index) => nearestMark(lowerHz * (upperHz / lowerHz) ** ((index + 0.5) / count), 2))
  return [...new Set(marks)].filter(hz => hz >= lowerHz && hz <= upperHz)
}

const MARKS = 4

/** The card's bands, from the dial readings that stand; bands with fewer than two readings say nothing of what lies between. */
export function correctionCard(readings: readonly ReadingView[]): CardBand[] {
  const read = readings.flatMap((reading) => {
    const value = (reading.left ?? reading.found)?.result.value
    return reading.section === 'dial' && reading.nominal !== null && reading.nominal > 0 && value !== undefined
      ? [{ label: reading.bandLabel, dialHz: reading.nominal, trueHz: value }]
      : []
  })
  return [...new Set(read.map(({ label }) => label))].map((label) => {
    const points = read.filter(point => point.label === label).map(({ dialHz, trueHz }) => ({ dialHz, trueHz })).sort((a, b) => a.dialHz - b.dialHz)
    const [first, last] = [points[0], points.at(-1)]
    const wanted = first && last && points.length > 1 ? marksBetween(Math.max(first.trueHz, first.dialHz), Math.min(last.trueHz, last.dialHz), MARKS) : []
    return {
      label, points,
      settings: wanted.flatMap((wantedHz) => {
        const setHz = settingFor(points, wantedHz)
        return setHz === null ? [] : [{ wantedHz, setHz }]
      }),
    }
  })
}
