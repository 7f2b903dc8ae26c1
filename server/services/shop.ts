import { sql } from 'drizzle-orm'
import { shop } from '../../drizzle/schema'
import { DECISION_RULE_LABELS } from '../../shared/domain/decision'
import type { FieldChange } from '../../shared/domain/ledger-events'
import type { ShopChange } from '../../shared/schemas/shop'
import type { ShopView } from '../../shared/types/shop'
import type { Database } from '../utils/db'
import { conflict, stale } from '../utils/errors'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { SHOP_SUBJECT } from './first-run'

/** The shop's settings; 409 before the first run has written them. */
export async function getShop(db: Database): Promise<ShopView> {
  const [row] = await db.select().from(shop)
  if (!row) throw notOpen()
  return toShopView(row)
}

/** Changes the shop's settings; a stale version is refused with the settings as they stand. */
export async function changeShop(db: Database, actor: Actor, { version, ...change }: ShopChange): Promise<ShopView> {
  return db.transaction(async (tx) => {
    const [row] = await tx.select().from(shop).for('update')
    if (!row) throw notOpen()
    if (row.version !== version) throw stale('page', toShopView(row))
    const [changed] = await tx.update(shop).set({ ...change, version: sql`${shop.version} + 1` }).returning()
    if (!changed) throw notOpen()
    const changes = differences(toShopView(row), toShopView(changed))
    if (changes.length) await appendLedger(tx, actor, SHOP_SUBJECT, 'changed', { name: changed.name, changes })
    return toShopView(changed)
  })
}

const FIELDS = {
  name: 'name', address: 'address', currency: 'currency', timeZone: 'time zone', ituRegion: 'ITU region', defaultTerms: 'usual terms',
  earthBondLimitMilliohm: 'earth bond limit, mΩ', insulationLimitKilohm: 'insulation limit, kΩ', leakageLimitMicroamp: 'leakage limit, µA',
  safetyLimitsOrigin: 'where the limits come from', decisionRule: 'how a reading is judged', guardFactor: 'factor of the guard band',
} as const satisfies Partial<Record<keyof ShopView, string>>

function differences(before: ShopView, after: ShopView): FieldChange[] {
  const keys: (keyof typeof FIELDS)[] = [
    'name', 'address', 'currency', 'timeZone', 'ituRegion', 'defaultTerms', 'earthBondLimitMilliohm', 'insulationLimitKilohm', 'leakageLimitMicroamp', 'safetyLimitsOrigin',
    'decisionRule', 'guardFactor',
  ]
  return keys.filter(key => before[key] !== after[key]).map(key => ({ field: FIELDS[key], from: said(before, key), to: said(after, key) }))
}

const said = (view: ShopView, key: keyof typeof FIELDS): string => key === 'decisionRule' ? DECISION_RULE_LABELS[view.decisionRule] : String(view[key])

function notOpen() {
  return conflict('not-open', 'This shop has not been opened yet: make the owner’s account first.')
}

function toShopView(row: typeof shop.$inferSelect): ShopView {
  const {
    name, address, currency, timeZone, ituRegion, defaultTerms, earthBondLimitMilliohm, insulationLimitKilohm, leakageLimitMicroamp, safetyLimitsOrigin,
    decisionRule, guardFactor, version,
  } = row
  return {
    name, address, currency, timeZone, ituRegion, defaultTerms, earthBondLimitMilliohm, insulationLimitKilohm, leakageLimitMicroamp, safetyLimitsOrigin,
    decisionRule, guardFactor, version,
  }
}
