/**
 * Plain decimal numbers as text, so that what a person typed is scaled exactly and never
 * through a binary fraction.
 */

/** A decimal number: sign, the digits before and after the point (either may be empty, not both). */
export interface Decimal {
  negative: boolean
  whole: string
  fraction: string
}

export type DecimalReading
  = | { ok: true, decimal: Decimal }
    | { ok: false, reason: 'not-a-number' | 'ambiguous-comma', sentence: string }

const SPACES = /(?<=\d)[\s\u00A0\u2009\u202F']+(?=\d{3}(?!\d))/g

function ambiguous(text: string): DecimalReading {
  const fraction = text.replace(',', '.')
  const whole = text.replace(',', '')
  return {
    ok: false,
    reason: 'ambiguous-comma',
    sentence: `${text} can mean ${whole} or ${fraction}. Write it without a comma, or with a point.`,
  }
}

/** Takes separators out: what is left has at most one point. Null when they make no sense. */
function withoutSeparators(text: string): string | 'ambiguous' | null {
  const commas = text.split(',').length - 1
  const points = text.split('.').length - 1
  if (commas === 0 && points <= 1) return text
  if (commas === 1 && points === 0) {
    return /^[+-]?[1-9]\d{0,2},\d{3}$/.test(text) ? 'ambiguous' : text.replace(',', '.')
  }
  if (/^[+-]?\d{1,3}(?:,\d{3})+(?:\.\d*)?$/.test(text)) return text.replaceAll(',', '')
  if (/^[+-]?\d{1,3}(?:\.\d{3})+(?:,\d*)?$/.test(text)) return text.replaceAll('.', '').replace(',', '.')
  return null
}

/**
 * Reads a number with a decimal point or comma, spaces or commas between thousands and an optional
 * power of ten. One comma before exactly three digits ("1,250") is refused as ambiguous.
 */
export function parseDecimal(text: string): DecimalReading {
  const refused: DecimalReading = { ok: false, reason: 'not-a-number', sentence: `"${text.trim().slice(0, 40)}" is not a number.` }
  const compact = text.trim().replace(/[\u2212\u2013]/g, '-').replace(SPACES, '').replace(/^([+-])\s+/, '$1')
  if (compact.length > 60) return refused
  const [mantissa = '', power = '0', ...more] = compact.split(/e/i)
  if (more.length > 0 || !/^[+-]?\d{1,4}$/.test(power)) return refused
  const plain = withoutSeparators(mantissa)
  if (plain === 'ambiguous') return ambiguous(mantissa)
  const parts = plain === null ? null : /^([+-]?)(\d*)(?:\.(\d*))?$/.exec(plain)
  if (!parts || (parts[2] ?? '') + (parts[3] ?? '') === '') return refused
  const decimal = { negative: parts[1] === '-', whole: parts[2] ?? '', fraction: parts[3] ?? '' }
  return { ok: true, decimal: shiftDecimal(decimal, Number(power)) }
}

/** The number times 10^places, exactly. */
export function shiftDecimal(decimal: Decimal, places: number): Decimal {
  const digits = decimal.whole + decimal.fraction
  const point = decimal.whole.length + places
  if (point <= 0) return { ...decimal, whole: '', fraction: '0'.repeat(-point) + digits }
  return { ...decimal, whole: digits.slice(0, point).padEnd(point, '0'), fraction: digits.slice(point) }
}

/** Whether the number is nought. */
export function isZero(decimal: Decimal): boolean {
  return /^0*$/.test(decimal.whole + decimal.fraction)
}

/** Whether nothing but noughts stands after the point. */
export function isWhole(decimal: Decimal): boolean {
  return /^0*$/.test(decimal.fraction)
}

/** The nearest binary number. */
export function toNumber(decimal: Decimal): number {
  const size = Number(`${decimal.whole || '0'}.${decimal.fraction || '0'}`)
  return decimal.negative && size !== 0 ? -size : size
}

/** A finite number as a decimal, with the digits JavaScript prints. */
export function fromNumber(value: number): Decimal {
  const [mantissa = '0', power = '0'] = String(Math.abs(value)).split('e')
  const [whole = '', fraction = ''] = mantissa.split('.')
  return shiftDecimal({ negative: value < 0, whole, fraction }, Number(power))
}

/** Written out: no needless noughts at either end, `space` between thousands, a real minus sign. */
export function writeDecimal(decimal: Decimal, space: string): string {
  const whole = decimal.whole.replace(/^0+(?=\d)/, '') || '0'
  const fraction = decimal.fraction.replace(/0+$/, '')
  const grouped = whole.replace(/\B(?=(?:\d{3})+$)/g, space)
  return (decimal.negative ? '\u2212' : '') + grouped + (fraction ? `.${fraction}` : '')
}
