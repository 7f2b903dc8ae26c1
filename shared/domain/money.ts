/**
 * Money: whole minor units (pence, cents) with an ISO 4217 currency code. Never a fraction, never a bare number.
 */
export interface Money {
  /** Whole minor units, negative for money going back. */
  minor: number
  /** ISO 4217 code, for example "GBP". */
  currency: string
}

/** The largest amount kept, in minor units either way. */
export const MOST_MINOR = 999_999_999_999

/** ISO 4217: the currencies whose minor unit is not a hundredth, by their decimals. */
const NO_DECIMALS = ['BIF', 'CLP', 'DJF', 'GNF', 'ISK', 'JPY', 'KMF', 'KRW', 'PYG', 'RWF', 'UGX', 'UYI', 'VND', 'VUV', 'XAF', 'XOF', 'XPF']
const THREE_DECIMALS = ['BHD', 'IQD', 'JOD', 'KWD', 'LYD', 'OMR', 'TND']

const SYMBOLS: Record<string, readonly string[]> = {
  '£': ['GBP'],
  '€': ['EUR'],
  '$': ['USD', 'AUD', 'CAD', 'NZD', 'HKD', 'SGD'],
  '¥': ['JPY', 'CNY'],
}

/** Whether text has the form of an ISO 4217 code. */
export function isCurrencyCode(code: string): boolean {
  return /^[A-Z]{3}$/.test(code)
}

/** Decimals of a currency's major unit by ISO 4217: 0, 2 or 3. */
export function currencyDecimals(currency: string): 0 | 2 | 3 {
  if (NO_DECIMALS.includes(currency)) return 0
  return THREE_DECIMALS.includes(currency) ? 3 : 2
}

export type MoneyProblem = 'empty' | 'not-an-amount' | 'ambiguous' | 'too-fine' | 'negative' | 'too-large' | 'other-currency'
export type MoneyReading = { ok: true, minor: number, currency: string } | { ok: false, reason: MoneyProblem, sentence: string }

const refuse = (reason: MoneyProblem, sentence: string): MoneyReading => ({ ok: false, reason, sentence })

/** An example of an amount in a currency, for hints and refusals. */
function example(currency: string): string {
  return ['1250', '1250.00', '1250.00', '1250.000'][currencyDecimals(currency)] ?? '1250'
}

const SIGN = '[a-z]{0,2}[£€$¥]|[a-z]{3}'
const SIGNED_AMOUNT = new RegExp(`^([-+\\u2212]?)\\s*(${SIGN})?\\s*([-+\\u2212]?[\\d.,\\s']+)(${SIGN})?$`, 'i')

/** Whether a sign as typed ("£", "US$", "gbp") can stand for a currency. */
function canStandFor(sign: string, currency: string): boolean {
  if (sign.toUpperCase() === currency) return true
  const country = sign.slice(0, -1).toUpperCase()
  return (SYMBOLS[sign.slice(-1)]?.includes(currency) ?? false) && currency.startsWith(country)
}

/** Takes a currency sign or code off either end; says so if it belongs to another currency. */
function withoutSign(text: string, currency: string): { number: string } | { other: string } {
  const parts = SIGNED_AMOUNT.exec(text)
  if (!parts) return { number: text }
  const other = [parts[2], parts[4]].find(sign => sign !== undefined && !canStandFor(sign, currency))
  return other === undefined ? { number: `${parts[1] ?? ''}${parts[3] ?? ''}` } : { other }
}

/** Splits a written number at its decimal separator; null when the separators make no sense. */
function splitAmount(number: string, decimals: number): { whole: string, fraction: string } | 'ambiguous' | null {
  const compact = number.replace(/[\s\u00A0\u2009\u202F']+/g, ' ').trim()
  const joined = compact.replace(/ (?=\d{3}(?!\d))/g, '')
  const plain = /^(\d*)(?:[.,](\d*))?$/.exec(joined)
  if (plain) {
    const whole = plain[1] ?? ''
    const fraction = plain[2] ?? ''
    if (fraction.length !== 3 || !/^[1-9]\d{0,2}$/.test(whole)) return whole + fraction === '' ? null : { whole, fraction }
    if (decimals === 3) return joined.includes('.') ? { whole, fraction } : 'ambiguous'
    return joined.includes(',') ? { whole: whole + fraction, fraction: '' } : 'ambiguous'
  }
  const grouped = /^(\d{1,3}(?:,\d{3})+)(?:\.(\d*))?$/.exec(joined) ?? /^(\d{1,3}(?:\.\d{3})+)(?:,(\d*))?$/.exec(joined)
  return grouped ? { whole: (grouped[1] ?? '').replace(/[.,]/g, ''), fraction: grouped[2] ?? '' } : null
}

/**
 * Reads an amount as a person types it ("£1,250", "1250.00", "1 250,00") in the given ISO 4217 currency.
 * Refused with a sentence: another currency's sign, finer than the minor unit, negative (unless allowed),
 * more than can be kept, "1.250" (thousands or decimals?), and what is no amount.
 */
export function parseMoney(text: string, currency: string, options: { allowNegative?: boolean } = {}): MoneyReading {
  const decimals = currencyDecimals(currency)
  const trimmed = text.trim()
  if (trimmed === '') return refuse('empty', `Enter an amount, like ${example(currency)}.`)
  const nonsense = refuse('not-an-amount', `"${trimmed.slice(0, 40)}" is not an amount. Write it like ${example(currency)}.`)
  if (trimmed.length > 60) return nonsense
  const taken = withoutSign(trimmed, currency)
  if ('other' in taken) return refuse('other-currency', `"${taken.other}" is another currency. This amount is kept in ${currency}.`)
  const negative = /^[-\u2212]/.test(taken.number)
  const parts = splitAmount(taken.number.replace(/^[-+\u2212]\s*/, ''), decimals)
  if (parts === null) return nonsense
  if (parts === 'ambiguous') return refuse('ambiguous', `"${trimmed}" can be read two ways. Write it like ${example(currency)}, with nothing between the thousands.`)
  const fraction = parts.fraction.replace(/0+$/, '')
  if (fraction.length > decimals) {
    return refuse('too-fine', decimals === 0 ? `${currency} has no smaller unit. Write a whole amount.` : `${currency} has ${decimals} decimals at most. Round the amount.`)
  }
  const minor = Number(parts.whole + fraction.padEnd(decimals, '0'))
  if (minor > MOST_MINOR) return refuse('too-large', 'This amount is larger than can be kept. Check the noughts.')
  if (negative && minor > 0 && !(options.allowNegative ?? false)) return refuse('negative', 'An amount can’t be below zero.')
  return { ok: true, minor: negative && minor > 0 ? -minor : minor, currency }
}

/** An amount in minor units as a plain decimal with a point, for forms and files: 125000 GBP is "1250.00". */
export function moneyAsDecimal({ minor, currency }: Money): string {
  const decimals = currencyDecimals(currency)
  const digits = String(Math.abs(minor)).padStart(decimals + 1, '0')
  const cut = digits.length - decimals
  return `${minor < 0 ? '-' : ''}${digits.slice(0, cut)}${decimals > 0 ? `.${digits.slice(cut)}` : ''}`
}

/** An amount as it is shown, "£1,250.00", by the rules of a locale (en-GB unless told). */
export function formatMoney(money: Money, locale = 'en-GB'): string {
  const decimals = currencyDecimals(money.currency)
  return new Intl.NumberFormat(locale, {
    style: 'currency',
    currency: money.currency,
    minimumFractionDigits: decimals,
    maximumFractionDigits: decimals,
  }).format(Number(moneyAsDecimal(money)))
}

/**
 * Shares an amount in minor units by whole non-negative weights: each share is the exact one rounded down, and what is
 * left goes one by one to the largest remainders (the earlier on a tie), so that the shares always add up to the total.
 * All weights 0 share equally. Throws a RangeError for no weights, or one that is negative or not whole.
 */
export function allocate(totalMinor: number, weights: readonly number[]): number[] {
  if (weights.length === 0) throw new RangeError('Nothing to share an amount among')
  if (!Number.isSafeInteger(totalMinor) || weights.some(weight => !Number.isSafeInteger(weight) || weight < 0)) {
    throw new RangeError('Amounts and weights must be whole, and weights not below zero')
  }
  const shares = weights.every(weight => weight === 0) ? weights.map(() => 1n) : weights.map(BigInt)
  const sum = shares.reduce((a, b) => a + b)
  const total = BigInt(Math.abs(totalMinor))
  const rounded = shares.map((share, index) => ({ index, whole: total * share / sum, rest: total * share % sum }))
  const left = Number(total - rounded.reduce((a, { whole }) => a + whole, 0n))
  const lucky = new Set([...rounded]
    .sort((a, b) => a.rest === b.rest ? a.index - b.index : a.rest < b.rest ? 1 : -1)
    .slice(0, left)
    .map(({ index }) => index))
  return rounded.map(({ index, whole }) => {
    const size = Number(whole) + (lucky.has(index) ? 1 : 0)
    return totalMinor < 0 && size > 0 ? -size : size
  })
}

/** The sum of amounts in minor units of one currency. Throws a RangeError when the currencies differ. */
export function addMoney(first: Money, ...others: readonly Money[]): Money {
  if (others.some(other => other.currency !== first.currency)) throw new RangeError('Amounts in different currencies can’t be added')
  return { minor: others.reduce((sum, other) => sum + other.minor, first.minor), currency: first.currency }
}
