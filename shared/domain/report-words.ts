/** Words of a printed report that must not be parted by the end of a line. */
import { NARROW_SPACE } from './frequency'
import { formatTag } from './tag'

const NO_BREAK = '\u00A0'

/** A tag in its groups, as one word. */
export const boundTag = (tag: string): string => formatTag(tag).replaceAll(' ', NO_BREAK)

/** A number and its unit as one word. */
export const bound = (text: string): string =>
  text.replaceAll(/(\d) (?=(?:%|°C|ppm|dB|[kMGmµn]?(?:Hz|V|A|W|F|H|Ω|s|c)|digits?|minutes?)(?![\p{L}\d]))/gu, `$1${NARROW_SPACE}`)
