import { beforeAll, describe, expect, it } from 'vitest'
import { getLotView } from '../../../server/services/lot-view'
import type { Person } from '../../../shared/types/person'
import { useBrowser } from '../../support/browser'
import { makeLot } from '../../support/lots'
import { makeShop, makeUnit } from '../../support/records'
import { useTestServer } from '../../support/server'
import { makeAccount, useSignedIn } from '../../support/sign-in'

/** How many take the last one at once. */
const AT_ONCE = 24

describe('parts by request', { timeout: 120_000 }, () => {
  const server = useTestServer()
  const open = useBrowser()
  const openAs = useSignedIn(open, () => server().url)
  const db = () => server().database.db
  let owner: Person

  beforeAll(async () => {
    await makeShop(db())
    owner = await makeAccount(db(), 'owner')
    await makeAccount(db(), 'floor')
  })

  it('gives the last one to one of many that ask at the same moment, and half-writes nothing for the others', async () => {
    const lot = await makeLot(db(), owner, { quantity: '1', cost: '0.99' })
    const pieces = await Promise.all(Array.from({ length: AT_ONCE }, () => makeUnit(db(), owner, { state: 'bench' })))
    const { request } = (await openAs('owner')).context()
    const answers = await Promise.all(pieces.map(({ tag }) => request.post(`/api/units/${tag}/modifications`, {
      data: { hand: 'done_by_us', before: 'Open', after: 'Renewed', reversibility: 're_solder', disposition: 'discarded', fittings: [{ lotTag: lot.tag, circuitReference: 'C1' }] },
    })))
    const statuses = answers.map(answer => answer.status())
    expect(statuses.filter(status => status === 201)).toHaveLength(1)
    expect(statuses.filter(status => status === 409)).toHaveLength(AT_ONCE - 1)
    const refused = answers.find(answer => answer.status() === 409)
    expect(await refused?.json()).toMatchObject({ code: 'not-enough', detail: expect.stringContaining('none is left, and 1 is wanted. Nothing was taken.') })
    const logs = await Promise.all(pieces.map(async ({ tag }) => (await request.get(`/api/units/${tag}/modifications`)).json()))
    expect(logs.filter(entries => entries.length > 0)).toHaveLength(1)
    expect(await getLotView(db(), owner, lot.tag)).toMatchObject({ quantity: 0, costMinor: 0, balance: { cameIn: 1, fitted: 1, inDrawer: 0 } })
  })

  it('gives the trace as JSON, and as PROV-O in JSON-LD to whoever asks for that', async () => {
    const lot = await makeLot(db(), owner)
    const { request } = (await openAs('owner')).context()
    const plain = await request.get(`/api/parts/${lot.tag}/trace`)
    expect(await plain.json()).toMatchObject({ nodes: [{ tag: lot.tag }, { title: 'Distributor A' }], backwards: { edges: [{ kind: 'supplied' }], isCut: false } })
    const linked = await request.get(`/api/parts/${lot.tag}/trace`, { headers: { accept: 'application/ld+json' } })
    expect(linked.headers()['content-type']).toContain('application/ld+json')
    expect(await linked.json()).toMatchObject({ '@context': { prov: 'http://www.w3.org/ns/prov#' }, '@graph': expect.arrayContaining([expect.objectContaining({ '@id': `${server().url}/s/${lot.tag}`, '@type': 'prov:Entity' })]) })
  })

  it('tells the floor neither what a lot cost nor who sold it', async () => {
    const lot = await makeLot(db(), owner)
    const { request } = (await openAs('floor')).context()
    for (const path of [`/api/parts/${lot.tag}`, '/api/parts', `/api/parts/${lot.tag}/trace`]) {
      const text = await (await request.get(path)).text()
      expect(text).not.toMatch(/Distributor A|88\/114|1250/u)
    }
    expect((await request.get('/api/parts/suppliers')).status()).toBe(403)
    expect((await request.post(`/api/parts/${lot.tag}/standing`, { data: { standing: 'withdrawn', why: 'x', version: 1 } })).status()).toBe(403)
  })
})
