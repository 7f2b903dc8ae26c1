/**
 * A hand scanner that types: told from a person by its speed. Pure: keys and times go in, a decision comes out.
 * Times are milliseconds on any steady clock.
 */

/** Longest pause between two keys of a scanner; slow wireless ones take about 30 ms, a fast typist seldom under 60 (common practice, no source). */
export const WEDGE_GAP_MOST = 50
/** Longest average pause over a whole burst: a person may strike two keys at once, but not eight. */
export const WEDGE_AVERAGE_MOST = 35
/** A tag in its shortest form. */
export const WEDGE_LENGTH_LEAST = 7
const LENGTH_MOST = 300

/** What has been typed since the last pause. */
export interface WedgeState {
  text: string
  startedAt: number
  lastAt: number
}

/** Nothing typed yet. */
export const WEDGE_IDLE: WedgeState = { text: '', startedAt: 0, lastAt: Number.NEGATIVE_INFINITY }

export type WedgeKey
  = | { kind: 'character', character: string, at: number }
    | { kind: 'enter', at: number }
    /** Shift and its like, which a scanner presses between characters. */
    | { kind: 'modifier', at: number }
    /** Anything else: arrows, Backspace, a shortcut, a dead key. */
    | { kind: 'other', at: number }

export interface WedgeStep {
  state: WedgeState
  /** A burst begins with this key: what the field holds now is what it held before the scan. */
  begins: boolean
  /** The whole text of a burst that has ended in Enter; null otherwise. */
  burst: string | null
}

/** One key further. */
export function stepWedge(state: WedgeState, key: WedgeKey): WedgeStep {
  if (key.kind === 'modifier') return { state, begins: false, burst: null }
  if (key.kind === 'other') return { state: WEDGE_IDLE, begins: false, burst: null }
  const follows = state.text !== '' && key.at - state.lastAt <= WEDGE_GAP_MOST && key.at >= state.lastAt
  if (key.kind === 'enter') return { state: WEDGE_IDLE, begins: false, burst: follows && isBurst(state, key.at) ? state.text : null }
  if (follows && state.text.length < LENGTH_MOST) {
    return { state: { ...state, text: state.text + key.character, lastAt: key.at }, begins: false, burst: null }
  }
  return { state: { text: key.character, startedAt: key.at, lastAt: key.at }, begins: true, burst: null }
}

function isBurst(state: WedgeState, endedAt: number): boolean {
  const keys = Array.from(state.text).length
  return keys >= WEDGE_LENGTH_LEAST && (endedAt - state.startedAt) / keys <= WEDGE_AVERAGE_MOST
}
