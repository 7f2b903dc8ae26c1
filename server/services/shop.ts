import { sql } from 'drizzle-orm'
import { shop } from '../../drizzle/schema'
import { DECISION_RULE_LABELS } from '../../shared/domain/decision'
import type { FieldChange } from '../../shared/domain/ledger-events'
import { formatMoney, parseMoney } from '../../shared/domain/money'
import type { Role } from '../../shared/domain/roles'
import { may } from '../../shared/domain/roles'
import type { ShopChange } from '../../shared/schemas/shop'
import { MOST_BENCH_RATE } from '../../shared/schemas/shop'
import type { ShopView } from '../../shared/types/shop'
import type { Database } from '../utils/db'
import { conflict, invalid, stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { SHOP_SUBJECT } from './first-run'

type ShopRow = typeof shop.$inferSelect

/** The shop's settings, without what an hour costs for those who may not see costs; 409 before the first run has written them. */
export async function getShop(db: Database, { role }: { role: Role }): Promise<ShopView> {
  const [row] = await db.select().from(shop)
  if (!row) throw notOpen()
  return may(role, 'cost.read') ? toShopView(row) : { ...toShopView(row), benchRateMinor: null }
}

/**
 * Changes the shop's settings; a stale version is refused with the settings as they stand. 422 for a bench rate that is no
 * amount of the shop's currency.
 */
export async function changeShop(db: Database, actor: Actor, { version, benchRate, ...change }: ShopChange): Promise<ShopView> {
  return db.transaction(async (tx) => {
    const [row] = await tx.select().from(shop).for('update')
    if (!row) throw notOpen()
    if (row.version !== version) throw stale('page', toShopView(row))
    const benchRateMinor = rateAfter(row, change.currency, benchRate)
    const [changed] = await tx.update(shop).set({ ...change, benchRateMinor, version: sql`${shop.version} + 1` }).returning()
    if (!changed) throw notOpen()
    const changes = differences(toShopView(row), toShopView(changed))
    if (changes.length) await appendLedger(tx, actor, SHOP_SUBJECT, 'changed', { name: changed.name, changes })
    return toShopView(changed)
  })
}

/** What an hour costs from now on; null where none is set. One left out stays, unless the currency it was in does not. */
function rateAfter(row: ShopRow, currency: string, typed: string | undefined): number | null {
  if (typed === undefined) return currency === row.currency ? row.benchRateMinor : null
  if (typed === '') return null
  const reading = parseMoney(typed, currency)
  if (!reading.ok) throw invalid([{ path: 'benchRate', message: reading.sentence }])
  if (reading.minor > MOST_BENCH_RATE) throw invalid([{ path: 'benchRate', message: 'The bench rate is more than an hour can cost. Check the noughts' }])
  return reading.minor
}

const FIELDS = {
  name: 'name', address: 'address', currency: 'currency', timeZone: 'time zone', ituRegion: 'ITU region', defaultTerms: 'usual terms',
  earthBondLimitMilliohm: 'earth bond limit, mΩ', insulationLimitKilohm: 'insulation limit, kΩ', leakageLimitMicroamp: 'leakage limit, µA',
  safetyLimitsOrigin: 'where the limits come from', decisionRule: 'how a reading is judged', guardFactor: 'factor of the guard band',
  benchRateMinor: 'bench rate',
} as const satisfies Partial<Record<keyof ShopView, string>>

function differences(before: ShopView, after: ShopView): FieldChange[] {
  const keys: (keyof typeof FIELDS)[] = [
    'name', 'address', 'currency', 'timeZone', 'ituRegion', 'defaultTerms', 'earthBondLimitMilliohm', 'insulationLimitKilohm', 'leakageLimitMicroamp', 'safetyLimitsOrigin',
    'decisionRule', 'guardFactor', 'benchRateMinor',
  ]
  return keys.filter(key => before[key] !== after[key]).map(key => ({ field: FIELDS[key], from: said(before, key), to: said(after, key) }))
}

function said(view: ShopView, key: keyof typeof FIELDS): string | null {
  if (key === 'decisionRule') return DECISION_RULE_LABELS[view.decisionRule]
  if (key === 'benchRateMinor') return view.benchRateMinor === null ? null : `${formatMoney({ minor: view.benchRateMinor, currency: view.currency })} an hour`
  return String(view[key])
}

function notOpen() {
  return conflict('not-open', 'This shop has not been opened yet: make the owner’s account first.')
}

function toShopView(row: ShopRow): ShopView {
  const {
    name, address, currency, timeZone, ituRegion, defaultTerms, earthBondLimitMilliohm, insulationLimitKilohm, leakageLimitMicroamp, safetyLimitsOrigin,
    decisionRule, guardFactor, benchRateMinor, version,
  } = row
  return {
    name, address, currency, timeZone, ituRegion, defaultTerms, earthBondLimitMilliohm, insulationLimitKilohm, leakageLimitMicroamp, safetyLimitsOrigin,
    decisionRule, guardFactor, benchRateMinor, version,
  }
}
