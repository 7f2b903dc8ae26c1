/**
 * The dial correction card that a buyer keeps with the set: what a dial that says one thing really gives, and what to set for a
 * wanted frequency. Between two points of one band the relative error is taken as straight in the logarithm of frequency;
 * beyond the points read nothing is said. Hertz throughout.
 */
import type { ReadingView } from '../types/bench'
import { nearestMark } from './log-scale'
import { mean } from './statistics'

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

/** Whether what the dial gives rises with what it says from point to point: else one frequency could be had at two settings. */
const isRising = (points: readonly CardPoint[]): boolean => points.every((point, index) => {
  const before = points[index - 1]
  return !before || (point.dialHz > before.dialHz && point.trueHz > before.trueHz)
})

/** Where to set a dial for a wanted frequency; null where the points don't reach, or what the dial gives does not rise with it. */
export function settingFor(points: readonly CardPoint[], wantedHz: number): number | null {
  const [first, last] = [points[0], points.at(-1)]
  if (!first || !last || !isRising(points) || wantedHz < first.trueHz || wantedHz > last.trueHz) return null
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
/** What a buyer most often sets a generator to: the usual intermediate frequencies. Common practice, no source. */
const USUAL_HZ = [455_000, 465_000, 10_700_000]

/** A band's points in the order of frequency; a setting that was read more than once stands with the mean. */
function inOrder(read: readonly CardPoint[]): CardPoint[] {
  return [...new Set(read.map(({ dialHz }) => dialHz))].sort((a, b) => a - b)
    .map(dialHz => ({ dialHz, trueHz: mean(read.filter(point => point.dialHz === dialHz).map(({ trueHz }) => trueHz)) }))
}

/** The frequencies that a card says the setting of, within what both the dial says and the points reach. */
function wantedWithin(points: readonly CardPoint[]): number[] {
  const [first, last] = [points[0], points.at(-1)]
  if (!first || !last || points.length < 2) return []
  const [lowest, highest] = [Math.max(first.trueHz, first.dialHz), Math.min(last.trueHz, last.dialHz)]
  const usual = USUAL_HZ.filter(hz => hz >= lowest && hz <= highest)
  return [...new Set([...marksBetween(lowest, highest, MARKS), ...usual])].sort((a, b) => a - b)
}

/** The card's bands, from the dial readings that stand; bands with fewer than two readings say nothing of what lies between. */
export function correctionCard(readings: readonly ReadingView[]): CardBand[] {
  const read = readings.flatMap((reading) => {
    const value = (reading.left ?? reading.found)?.result.value
    return reading.section === 'dial' && reading.nominal !== null && reading.nominal > 0 && value !== undefined
      ? [{ label: reading.bandLabel, dialHz: reading.nominal, trueHz: value }]
      : []
  })
  return [...new Set(read.map(({ label }) => label))].map((label) => {
    const points = inOrder(read.filter(point => point.label === label))
    return {
      label, points,
      settings: wantedWithin(points).flatMap((wantedHz) => {
        const setHz = settingFor(points, wantedHz)
        return setHz === null ? [] : [{ wantedHz, setHz }]
      }),
    }
  })
}
