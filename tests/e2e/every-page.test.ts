import { readdirSync } from 'node:fs'
import { and, eq, isNull, sql } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { keptWithItems, locations, models, instruments, modifications, parties, partLots, publications, testSheets, units } from '../../drizzle/schema'
import { inRoot } from '../../scripts/lib/paths.mjs'
import { loadDemoShop } from '../../scripts/demo/load'
import type { Database } from '../../server/utils/db'
import { runAxe, signIn, useBrowser, visit } from '../support/browser'
import { useTestServer } from '../support/server'

/**
 * Every page of the product, in the demo shop, at a phone's width in the dark and a desk's in the light: nothing complains (hydration,
 * content security policy, errors, missing resources) and axe finds nothing serious. A page that is not listed fails.
 */
const PASSWORD = 'anode-vernier-brass-2207'
const server = useTestServer({
  prepare: async ({ database }) => {
    await loadDemoShop(database.db, null, PASSWORD)
  },
})
const open = useBrowser()

async function only<T>(query: Promise<T[]>): Promise<T> {
  const [row] = await query
  if (row === undefined) throw new Error('The demo shop lacks what this page shows')
  return row
}

/** For each page file an address to open it at, or null where another test opens it and why. */
async function addresses(db: Database): Promise<Record<string, string | null>> {
  const inState = async (state: 'intake' | 'bench' | 'ready' | 'offered' | 'held' | 'sold' | 'dispatched' | 'parted') =>
    (await only(db.select({ tag: units.tag }).from(units).where(and(eq(units.state, state), isNull(units.hazardHold))).orderBy(units.tag).limit(1))).tag
  const [bench, ready, offered, held, sold] = [await inState('bench'), await inState('ready'), await inState('offered'), await inState('held'), await inState('sold')]
  const worked = await only(db.select({ tag: units.tag, id: modifications.id }).from(modifications).innerJoin(units, eq(units.id, modifications.unitId)).where(eq(units.state, 'offered')).limit(1))
  const sheet = await only(db.select({ tag: units.tag, number: testSheets.number }).from(testSheets).innerJoin(units, eq(units.id, testSheets.unitId)).where(isNull(testSheets.signedAt)).limit(1))
  const signed = await only(db.select({ tag: units.tag, number: testSheets.number }).from(testSheets).innerJoin(units, eq(units.id, testSheets.unitId)).where(and(eq(units.serial, '4417'), eq(testSheets.number, 2))))
  const kept = await only(db.select({ tag: units.tag, item: keptWithItems.tag }).from(keptWithItems).innerJoin(units, eq(units.id, keptWithItems.unitId)).where(eq(units.state, 'ready')).limit(1))
  const model = await only(db.select({ id: models.id }).from(models).where(eq(models.designation, '307-G')))
  const place = await only(db.select({ tag: locations.tag }).from(locations).where(eq(locations.name, 'Quarantine')))
  const instrument = await only(db.select({ tag: instruments.tag }).from(instruments).limit(1))
  const lot = await only(db.select({ tag: partLots.tag }).from(partLots).where(eq(partLots.dateCode, '2308')))
  const supplier = await only(db.select({ id: parties.id }).from(parties).where(eq(parties.name, 'Distributor A')))
  const broken = await inState('parted')
  const sheetOf = await only(db.select({ token: publications.token }).from(publications).where(isNull(publications.revokedAt)).orderBy(sql`random()`).limit(1))
  return {
    '/': '/',
    '/account': '/account',
    '/account/password': '/account/password',
    '/bench': '/bench',
    '/first-run': null, // Only in an empty shop: tests/e2e of signing in.
    '/instruments': '/instruments',
    '/instruments/new': '/instruments/new',
    '/instruments/[tag]': `/instruments/${instrument.tag}`,
    '/instruments/[tag]/recall': `/instruments/${instrument.tag}/recall`,
    '/instruments/[tag]/recalls/[number]': null, // The demo's instruments are right: bench/instrument.test.ts.
    '/labels': `/labels?tags=${offered}`,
    '/locations': '/locations',
    '/locations/[tag]': `/locations/${place.tag}`,
    '/models': '/models',
    '/models/new': '/models/new',
    '/models/[id]': `/models/${model.id}`,
    '/models/[id]/edit': `/models/${model.id}/edit`,
    '/models/[id]/procedure': `/models/${model.id}/procedure`,
    '/p/[token]': `/p/${sheetOf.token}`,
    '/parts': '/parts',
    '/parts/count': '/parts/count',
    '/parts/new': '/parts/new',
    '/parts/[tag]': `/parts/${lot.tag}`,
    '/parts/[tag]/edit': `/parts/${lot.tag}/edit`,
    '/parts/[tag]/trace': `/parts/${lot.tag}/trace`,
    '/parts/markings': '/parts/markings',
    '/parts/recalls': '/parts/recalls',
    '/parts/recalls/new': '/parts/recalls/new',
    '/parts/recalls/[number]': null, // The demo's parts are good: parts/recalls.test.ts.
    '/parts/reorder': '/parts/reorder',
    '/people': '/people',
    '/s/[tag]': null, // Answered by the server, or says a refusal: labels/scanning.test.ts.
    '/scan': '/scan',
    '/settings': '/settings',
    '/shop': '/shop',
    '/sign-in': null, // Signed in already: tests/e2e of signing in.
    '/stock': '/stock?q=covers%20455%20kc',
    '/stock/book-in': '/stock/book-in',
    '/suppliers/[id]': `/suppliers/${supplier.id}`,
    '/units/[tag]': `/units/${worked.tag}`,
    '/units/[tag]/ceiling': `/units/${bench}/ceiling`,
    '/units/[tag]/break': `/units/${broken}/break`,
    '/units/[tag]/trace': `/units/${broken}/trace`,
    '/units/[tag]/disclosures': `/units/${ready}/disclosures`,
    '/units/[tag]/edit': `/units/${bench}/edit`,
    '/units/[tag]/hold': `/units/${offered}/hold`,
    '/units/[tag]/kept-with/new': `/units/${kept.tag}/kept-with/new`,
    '/units/[tag]/kept-with/[item]': `/units/${kept.tag}/kept-with/${kept.item}`,
    '/units/[tag]/log': `/units/${bench}/log`,
    '/units/[tag]/modifications/[id]': `/units/${worked.tag}/modifications/${worked.id}`,
    '/units/[tag]/not-energised': `/units/${bench}/not-energised`,
    '/units/[tag]/pack': `/units/${sold}/pack`,
    '/units/[tag]/photos': `/units/${bench}/photos`,
    '/units/[tag]/price': `/units/${ready}/price`,
    '/units/[tag]/provenance': `/units/${offered}/provenance`,
    '/units/[tag]/safety': `/units/${bench}/safety`,
    '/units/[tag]/sell': `/units/${held}/sell`,
    '/units/[tag]/take-back': `/units/${sold}/take-back`,
    '/units/[tag]/test': `/units/${ready}/test`,
    '/units/[tag]/test-sheets/[number]': `/units/${sheet.tag}/test-sheets/${sheet.number}`,
    '/units/[tag]/test-sheets/[number], signed': `/units/${signed.tag}/test-sheets/${signed.number}`,
    '/units/[tag]/triage': `/units/${bench}/triage`,
  }
}

const pageFiles = readdirSync(inRoot('pages'), { recursive: true, encoding: 'utf8' }).filter(file => file.endsWith('.vue'))
const patterns = pageFiles.map(file => `/${file.replace(/\.vue$/, '').replace(/(^|\/)index$/, '')}`).sort()

describe('every page', () => {
  let known: Record<string, string | null> = {}
  beforeAll(async () => {
    known = await addresses(server().database.db)
  })

  it('is listed here', () => {
    expect(patterns.filter(pattern => !(pattern in known))).toEqual([])
  })

  // Colours do not depend on the width, nor the width on the colours: each pair looks at both once.
  for (const [viewport, colorScheme] of [['phone', 'dark'], ['desk', 'light']] as const) {
    it(`complains of nothing, fits, and has no serious axe finding (${viewport}, ${colorScheme})`, { timeout: 280_000 }, async () => {
      const page = await open(server().url, { viewport, colorScheme })
      await signIn(page, 'owner@demo.invalid', PASSWORD)
      const found: string[] = []
      for (const [pattern, address] of Object.entries(known)) {
        if (!address) continue
        await visit(page, address)
        const violations = await runAxe(page)
        found.push(...violations.map(violation => `${pattern}: ${violation.rule} (${violation.targets.join('; ')})`))
        found.push(...page.complaints.splice(0).map(complaint => `${pattern}: ${complaint}`))
        const overflow = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
        if (overflow > 0) found.push(`${pattern}: is ${overflow} px wider than the screen`)
      }
      expect(found).toEqual([])
    })
  }
})
