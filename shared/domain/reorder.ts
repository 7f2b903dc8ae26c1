/** What is to be bought again: words and figures for a list that goes to a supplier. */
import { currencyDecimals } from './money'
import type { CountedIn } from './part-quantity'
import { COUNTED_IN_LABELS, quantityAsTyped } from './part-quantity'

/** What came in together, in the smallest unit, and what it cost together, in minor units. */
export interface BoughtFor { quantity: number, costMinor: number, currency: string }

/** How the price of one is said, and how many of the smallest unit that is. */
const PER: Record<CountedIn, readonly [string, number]> = {
  piece: ['each', 1], pair: ['a pair', 1], set: ['a set', 1], millimetre: ['a metre', 1000], gram: ['a gram', 1], millilitre: ['a millilitre', 1],
}

/** What one cost, in major units with two decimals more than the currency has: a resistor costs less than a penny. */
function costOfOne({ quantity, costMinor, currency }: BoughtFor, countedIn: CountedIn): string {
  const decimals = currencyDecimals(currency)
  return (costMinor * PER[countedIn][1] / quantity / 10 ** decimals).toFixed(decimals + 2)
}

/** "£0.0125 each", "£1.20 a metre": what one of a lot cost, as its price would be quoted. `quantity` is above 0. */
export function costOfOneInWords(bought: BoughtFor, countedIn: CountedIn): string {
  const decimals = currencyDecimals(bought.currency)
  const amount = new Intl.NumberFormat('en-GB', { style: 'currency', currency: bought.currency, minimumFractionDigits: decimals, maximumFractionDigits: decimals + 2 })
  return `${amount.format(Number(costOfOne(bought, countedIn)))} ${PER[countedIn][0]}`
}

interface CsvLine {
  type: { description: string, value: string, tolerance: string, rating: string, package: string, countedIn: CountedIn }
  inStock: number
  minimum: number
  short: number
  lastSupplier: string | null
  lastBought: BoughtFor | null
}
interface Column { head: string, cell: (line: CsvLine) => string }

const COLUMNS: readonly Column[] = [
  { head: 'Part', cell: ({ type }) => type.description },
  { head: 'Value', cell: ({ type }) => type.value },
  { head: 'Tolerance', cell: ({ type }) => type.tolerance },
  { head: 'Rating', cell: ({ type }) => type.rating },
  { head: 'Package', cell: ({ type }) => type.package },
  { head: 'In stock', cell: ({ type, inStock }) => quantityAsTyped(inStock, type.countedIn) },
  { head: 'Minimum', cell: ({ type, minimum }) => quantityAsTyped(minimum, type.countedIn) },
  { head: 'Short', cell: ({ type, short }) => quantityAsTyped(short, type.countedIn) },
  { head: 'Counted in', cell: ({ type }) => COUNTED_IN_LABELS[type.countedIn] },
]
const SUPPLIER: Column = { head: 'Last supplier', cell: ({ lastSupplier }) => lastSupplier ?? '' }
const COST: readonly Column[] = [
  { head: 'Last cost of one', cell: ({ type, lastBought }) => lastBought ? costOfOne(lastBought, type.countedIn) : '' },
  { head: 'Currency', cell: ({ lastBought }) => lastBought?.currency ?? '' },
]

/** RFC 4180, section 2: quoted where it must be. A word that a spreadsheet would take for a formula is kept a word (OWASP, CSV injection). */
function quoted(cell: string): string {
  const word = /^[=+\-@\t]/u.test(cell) ? `'${cell}` : cell
  return /[",\r\n]/u.test(word) ? `"${word.replaceAll('"', '""')}"` : word
}

/** The list as CSV text (RFC 4180), with a line of headings. Columns that the reader may not see are left out whole. */
export function reorderCsv(lines: readonly CsvLine[], sees: { names: boolean, costs: boolean }): string {
  const columns = [...COLUMNS, ...sees.names ? [SUPPLIER] : [], ...sees.costs ? COST : []]
  const rows = [columns.map(({ head }) => head), ...lines.map(line => columns.map(({ cell }) => cell(line)))]
  return rows.map(row => `${row.map(quoted).join(',')}\r\n`).join('')
}
