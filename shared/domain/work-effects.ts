/**
 * What an entry of the work log may have done to what was measured before it. Its words are only read to say why; whether a
 * sheet goes stale never depends on them.
 *
 * Sources: that a rectifier valve of a look-alike type shifts the HT (by about 50 V), so that the dial holds only for the
 * very rectifier it was calibrated with, is said in the handbook of an audio oscillator of 1961. The rest is common
 * practice, no source.
 */
import type { Path } from './paths'

/** A kind of work, what it is called in a sentence and what it may have moved. */
interface Effect {
  /** The part it belongs to; null: a valve may stand in any. */
  path: Path | null
  words: RegExp
  /** Ends in "after it was signed". */
  opening: string
  effect: string
  /** The same where a dial was measured, if that says more. */
  onDial?: string
}

/** Words that name a part without meaning it: the cores of a flex, the holder of a valve. */
const NOT_MEANT = /\b(?:\d|two|three|twin)[\s-]?core\b|\bvalve[\s-]?(?:holder|socket|base|voltmeter|tester)s?\b/g

/** In the order in which they are asked: a rectifier valve is a rectifier first, the rectifier of a meter is of the meter. */
const EFFECTS: readonly Effect[] = [
  {
    path: 'meter', words: /(?:\bmeter|\binstrument|copper[\s-]?oxide)[^:]*rectifier|rectifier[^:]*\bmeter\b/,
    opening: 'The rectifier of its meter was changed after it was signed', effect: 'what it shows may have changed',
  },
  {
    path: 'supply', words: /rectifier|selenium|^[sm]r\d+\b/, opening: 'A rectifier was changed after it was signed',
    effect: 'the HT may have shifted, and every reading with it', onDial: 'the HT may have shifted, and with it the dial',
  },
  {
    path: null, words: /\bvalves?\b|^v\d+[a-z]?:/, opening: 'A valve was changed after it was signed',
    effect: 'its stage may have changed', onDial: 'its stage may have changed, and with it the dial',
  },
  {
    path: 'oscillator', words: /align|trimmer|\bcores?\b|\bslugs?\b|padder|padding/, opening: 'Its alignment was touched after it was signed',
    effect: 'what is tuned may have moved', onDial: 'the dial may have moved all along a band',
  },
  {
    path: 'supply', words: /\brails?\b|smoothing|electrolytic|reservoir|regulator|stabili[sz]er|\be?ht\b|dropper|power supply|mains transformer/,
    opening: 'A part of its supply was changed after it was signed',
    effect: 'the rails may have shifted, and every reading with them', onDial: 'the rails may have shifted, and with them the dial',
  },
  {
    path: 'output', words: /attenuator|output (?:stage|socket|transformer)|\boutputs\b/,
    opening: 'Its output was worked on after it was signed', effect: 'the level and each step of it may have changed',
  },
  { path: 'modulator', words: /modulat/, opening: 'Its modulator was worked on after it was signed', effect: 'the depth may have changed' },
  { path: 'sweep', words: /time[\s-]?base/, opening: 'Its time base was worked on after it was signed', effect: 'every time read by it may have changed' },
  { path: 'sweep', words: /\bsweep\b|deflection|\bcrt\b/, opening: 'Its sweep was worked on after it was signed', effect: 'speeds and deflection may have changed' },
  { path: 'meter', words: /\bmeters?\b|\bmovement\b|\bshunts?\b/, opening: 'Its meter was worked on after it was signed', effect: 'what it shows may have changed' },
]

/** The opening and the effect of one kind of work, to stand before and after the words of the entry. */
export interface WorkEffect { opening: string, effect: string }

const ANY: WorkEffect = { opening: 'Work was logged after it was signed', effect: 'what was measured then may have changed' }

/**
 * What an entry's own words say it may have done. `words` is place, before and after, joined by ": "; `touches` is what it
 * was said to touch (null: not said) and rules out every other kind; `dial` says whether a dial was among what was measured.
 */
export function effectOfWork(words: string, touches: readonly Path[] | null, dial: boolean): WorkEffect {
  const meant = words.toLowerCase().replace(NOT_MEANT, ' ')
  const found = EFFECTS.find(({ path, words: pattern }) => (path === null || touches === null || touches.includes(path)) && pattern.test(meant))
  if (!found) return ANY
  return { opening: found.opening, effect: dial && found.onDial !== undefined ? found.onDial : found.effect }
}
