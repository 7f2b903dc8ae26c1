import type { Face, FaceStack } from './fonts'

/** A stretch of text that one face can draw. */
export interface Run { face: Face, text: string }

/** Joiners and selectors that shape what stands beside them and have no drawing of their own. */
const UNDRAWN = /[\u200B-\u200F\u202A-\u202E\u2060-\u2069\uFEFF]|\p{Variation_Selector}/gu
/** A narrow no-break space, which Work Sans lacks; lines are never broken at the thin space it is drawn as. */
const NARROW = /\u202F/gu

/** What no face has is spelt out, so that it shows as itself and never as a box: an emoji in a serial as `[U+1F600]`. */
const spellOut = (character: string) => `[U+${(character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, '0')}]`

/** Text as it will be drawn: composed, on one line, and without what cannot be drawn. */
export function drawable(text: string, stack: FaceStack): string {
  const plain = text.normalize('NFC').replace(NARROW, '\u2009').replace(UNDRAWN, '').replace(/\p{Cc}/gu, ' ')
  return Array.from(plain, (character) => {
    const point = character.codePointAt(0) ?? 0
    return stack.some(face => face.covers.has(point)) ? character : spellOut(character)
  }).join('')
}

/**
 * Cuts text (already `drawable`) into runs, each in the first face of the stack that has the character. A space stays
 * in the face before it where that has one, so that words of one script are laid out together.
 */
export function runsOf(text: string, stack: FaceStack): Run[] {
  const runs: Run[] = []
  for (const character of text) {
    const point = character.codePointAt(0) ?? 0
    const last = runs.at(-1)
    const face = character === ' ' && last?.face.covers.has(point) ? last.face : stack.find(each => each.covers.has(point))
    if (!face) continue
    if (last?.face === face) last.text += character
    else runs.push({ face, text: character })
  }
  return runs
}
