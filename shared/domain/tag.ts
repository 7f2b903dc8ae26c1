/**
 * Tags: the scannable identity of any physical thing in the shop.
 *
 * A tag is a kind letter, a running number of at least five digits and one check character,
 * ISO/IEC 7064 hybrid system MOD 37,36, computed over letter and digits. It is stored compact
 * (`U0000016`), shown grouped (`U 000001 6`) and may be typed any way.
 */

/** The kinds of thing that carry a tag, by their letter. */
export const TAG_KINDS = ['U', 'K', 'P', 'L', 'B'] as const
export type TagKind = (typeof TAG_KINDS)[number]

/** What each letter stands for, in the interface's words. */
export const TAG_KIND_LABELS: Record<TagKind, string> = {
  U: 'Unit',
  K: 'Kept-with item',
  P: 'Part lot',
  L: 'Location',
  B: 'Bench instrument',
}

/** Digits the running number is padded to when a tag is made. */
export const TAG_DIGITS = 6
/** The fewest digits accepted when a tag is read. */
export const TAG_DIGITS_LEAST = 5
/** The most digits accepted when a tag is read. */
export const TAG_DIGITS_MOST = 12

export type TagProblem = 'not-a-tag' | 'one-character-off' | 'ambiguous'

export interface ReadTag { ok: true, tag: string, kind: TagKind, number: number }
export type TagReading
  = | ReadTag
    | { ok: false, reason: 'not-a-tag' | 'one-character-off' }
    /** `suggestion` is the compact tag that was probably meant. */
    | { ok: false, reason: 'ambiguous', suggestion: string }

/** ISO/IEC 7064 character values: the digit or letter at index n has value n. */
const ALPHABET = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ'

/** Characters that a hand or an eye confuses, as a check character. */
const LOOK_ALIKES: Record<string, string> = { O: '0', 0: 'O', I: '1', 1: 'I' }

/**
 * The ISO/IEC 7064 MOD 37,36 check character of `body` (digits and capital letters).
 * Throws a RangeError for an empty body or any other character.
 */
export function checkCharacter(body: string): string {
  if (body === '') throw new RangeError('A check character needs something to check')
  let product = 36
  for (const character of body) {
    const value = ALPHABET.indexOf(character)
    if (value < 0) throw new RangeError(`"${character}" has no value in ISO/IEC 7064`)
    const sum = (product + value) % 36
    product = (sum === 0 ? 36 : sum) * 2 % 37
  }
  return ALPHABET.charAt((37 - product) % 36)
}

/** Whether the last character of `text` (digits and capital letters) is the check character of the rest. */
export function endsInItsCheck(text: string): boolean {
  return /^[0-9A-Z]{2,}$/.test(text) && checkCharacter(text.slice(0, -1)) === text.slice(-1)
}

/** Whether a letter is the letter of a kind of tag. */
export function isTagKind(letter: string): letter is TagKind {
  return TAG_KINDS.some(kind => kind === letter)
}

/**
 * The compact tag of the `number`th thing of a kind, for example `U0000016`.
 * Throws a RangeError unless the number is whole, positive and at most twelve digits.
 */
export function makeTag(kind: TagKind, number: number): string {
  if (!Number.isSafeInteger(number) || number < 1 || String(number).length > TAG_DIGITS_MOST) {
    throw new RangeError(`${number} is not a running number`)
  }
  const body = kind + String(number).padStart(TAG_DIGITS, '0')
  return body + checkCharacter(body)
}

/** A compact tag as it is shown and spoken: `U0000016` becomes `U 000001 6`. Other text comes back unchanged. */
export function formatTag(tag: string): string {
  const parts = /^([A-Z])(\d{5,12})([0-9A-Z])$/.exec(tag)
  return parts ? parts.slice(1).join(' ') : tag
}

/** Capital letters and digits only: spaces, dashes and case carry no meaning in a tag. */
function squeeze(typed: string): string {
  return typed.replace(/[\s\-\u00AD\u2010-\u2015\u2212\u200B\u2060]/g, '').toUpperCase()
}

/** The number's digits with O read as 0 and I as 1: no letter belongs there. */
function forgiveDigits(middle: string): string {
  return middle.replaceAll('O', '0').replaceAll('I', '1')
}

/** How many letters must stand for digits in the number before the check character is given the same benefit. */
const LETTERS_THAT_TELL = 2

interface TagParts {
  letter: string
  digits: string
  check: string
  /** The number was typed with letters for digits more than once: not a slip, but how this person types. */
  lettersForDigits: boolean
}

/** Splits squeezed text into kind letter, forgiven digits and check, if it has a tag's length and alphabet. */
function takeApart(squeezed: string): TagParts | null {
  if (!/^[0-9A-Z]+$/.test(squeezed)) return null
  const length = squeezed.length - 2
  if (length < TAG_DIGITS_LEAST || length > TAG_DIGITS_MOST) return null
  const middle = squeezed.slice(1, -1)
  return {
    letter: squeezed.charAt(0),
    digits: forgiveDigits(middle),
    check: squeezed.slice(-1),
    lettersForDigits: (middle.match(/[OI]/g) ?? []).length >= LETTERS_THAT_TELL,
  }
}

/**
 * Whether text has the shape of a tag (kind letter, at least five digits, one more character),
 * whatever its check character says. For telling a tag from a search word.
 */
export function looksLikeTag(text: string): boolean {
  const parts = takeApart(squeeze(text))
  return parts !== null && isTagKind(parts.letter) && /^\d+$/.test(parts.digits)
}

/** Whether replacing the one character that doesn't belong gives a tag that checks. */
function oneMendAway(letter: string, digits: string, check: string): boolean {
  const misfits = [...digits].flatMap((character, index) => /\d/.test(character) ? [] : [index])
  const [at] = misfits
  if (!isTagKind(letter)) {
    return misfits.length === 0 && TAG_KINDS.some(kind => checkCharacter(kind + digits) === check)
  }
  if (misfits.length !== 1 || at === undefined) return false
  return [...'0123456789'].some(digit =>
    checkCharacter(letter + digits.slice(0, at) + digit + digits.slice(at + 1)) === check)
}

/**
 * Reads a tag as a person types it. Spaces, dashes and case don't matter. In the number O is read as 0 and I as 1, for
 * no letter belongs there. As check character O and 0, or I and 1, are taken for each other when the number, too, was
 * typed with letters for digits. Otherwise a check character that would have to be forgiven is `ambiguous`, with the
 * tag probably meant as suggestion: U 000069 O may be U 000069 0, but just as well U 000099 O with one wrong digit,
 * and no single wrong character may open another thing's record.
 *
 * - `one-character-off`: it has the shape of a tag but its check character disagrees, or one
 *   character doesn't belong where it stands and another in its place would check.
 *
 * The tag returned is the padded, compact form under which things are stored.
 */
export function parseTag(typed: string): TagReading {
  const parts = typed.length > 100 ? null : takeApart(squeeze(typed))
  if (!parts) return { ok: false, reason: 'not-a-tag' }
  const { letter, digits, check } = parts
  if (!isTagKind(letter) || !/^\d+$/.test(digits)) {
    return { ok: false, reason: oneMendAway(letter, digits, check) ? 'one-character-off' : 'not-a-tag' }
  }
  const number = Number(digits)
  const due = checkCharacter(letter + digits)
  const forgiven = check !== due && LOOK_ALIKES[check] === due
  if (check !== due && !forgiven) return { ok: false, reason: 'one-character-off' }
  if (number === 0) return { ok: false, reason: 'not-a-tag' }
  const tag = makeTag(letter, number)
  if (forgiven && !parts.lettersForDigits) return { ok: false, reason: 'ambiguous', suggestion: tag }
  return { ok: true, tag, kind: letter, number }
}

const PROBLEM_SENTENCES: Record<TagProblem, string> = {
  'not-a-tag': 'This is not a tag. A tag is a letter, a number and one check character, like U 000001 6.',
  'one-character-off': 'One character is off. Compare it with the label and type it again.',
  'ambiguous': 'The last character can be read two ways: the letter O or a nought, the letter I or a one. Compare the whole tag with the label.',
}

/** What a person is told about a tag that could not be read. */
export function tagProblemSentence(reason: TagProblem): string {
  return PROBLEM_SENTENCES[reason]
}

export type ScanReading = TagReading | { ok: false, reason: 'another-address', host: string }

/** What a person is told about a scan that could not be read. */
export function scanProblemSentence(reading: Extract<ScanReading, { ok: false }>): string {
  return reading.reason === 'another-address'
    ? `This label was printed for another address (${reading.host}), so its tag may be somebody else's.`
    : tagProblemSentence(reading.reason)
}

function addressIn(text: string): URL | null {
  return /^https?:\/\//i.test(text) && URL.canParse(text) ? new URL(text) : null
}

function decoded(piece: string): string {
  try {
    return decodeURIComponent(piece)
  } catch {
    return piece
  }
}

/**
 * Reads what a scanner saw: a bare tag, or the address a label's QR code holds
 * (`https://host/s/U0000016`, in capitals or not).
 * With `knownHost` (host and port, or several), an address elsewhere is refused as `another-address`:
 * the same running number is another thing in another shop.
 */
export function readScannedText(text: string, knownHost?: string | readonly string[]): ScanReading {
  const trimmed = text.trim().slice(0, 2000)
  const address = addressIn(trimmed)
  if (!address) return parseTag(trimmed)
  const found = /\/s\/([^/]+)\/?$/i.exec(address.pathname)
  if (!found?.[1]) return { ok: false, reason: 'not-a-tag' }
  const hosts = knownHost === undefined ? [] : [knownHost].flat()
  if (hosts.length > 0 && !hosts.some(host => host.toLowerCase() === address.host)) {
    return { ok: false, reason: 'another-address', host: address.host }
  }
  return parseTag(decoded(found[1]))
}
