import fc from 'fast-check'
import jsonld from 'jsonld'
import { beforeAll, describe, expect, it } from 'vitest'
import type { fittings, partLots, units } from '../../../../drizzle/schema'
import { traceToProv } from '../../../../shared/domain/trace-prov'
import type { TraceDirection, TraceKey, TraceView } from '../../../../shared/types/trace'
import type { Person } from '../../../../shared/types/person'
import { traceLot, traceSupplier, traceUnit } from '../../../../server/services/trace'
import { useTestDatabase } from '../../../support/database'
import { insertFitting, insertPartLot, insertParty, insertSale } from '../../../support/parts'
import { makeModel, makePerson, makeShop, makeUnit } from '../../../support/records'

const database = useTestDatabase()
let owner: Person
let floor: Person
let modelId: string
beforeAll(async () => {
  await makeShop(database.db)
  owner = await makePerson(database.db, 'owner')
  floor = await makePerson(database.db, 'floor')
  modelId = (await makeModel(database.db)).id
})
const unit = (values: Partial<typeof units.$inferInsert> = {}) => makeUnit(database.db, owner, { modelId, state: 'bench', ...values })
const lot = (values: Partial<typeof partLots.$inferInsert> = {}) => insertPartLot(database.db, owner, values)
const fit = (unitId: string, lotId: string, values: Partial<typeof fittings.$inferInsert> = {}) => insertFitting(database.db, owner, unitId, lotId, values)
const titles = (view: TraceView, direction: TraceDirection) => {
  const ends = new Set((view[direction]?.edges ?? []).map(edge => direction === 'forwards' ? edge.to : edge.from))
  return view.nodes.filter(({ key }) => ends.has(key)).map(({ title, tag }) => tag ?? title).sort()
}

interface Graph { units: number, lots: { donor: number | null, parent: number | null }[], fittings: { lot: number, unit: number, undone: boolean }[] }

/** Graphs with any cycle: lots from donors that hold lots from donors … */
const graphs = fc.integer({ min: 1, max: 6 }).chain(unitCount => fc.integer({ min: 1, max: 8 }).chain(lotCount => fc.record({
  units: fc.constant(unitCount),
  lots: fc.array(fc.record({ donor: fc.option(fc.nat(unitCount - 1)), parent: fc.option(fc.nat(lotCount - 1)) }), { minLength: lotCount, maxLength: lotCount }),
  fittings: fc.array(fc.record({ lot: fc.nat(lotCount - 1), unit: fc.nat(unitCount - 1), undone: fc.boolean() }), { maxLength: 14 }),
})))

async function write(graph: Graph) {
  const unitRows = []
  for (let index = 0; index < graph.units; index++) unitRows.push(await unit())
  const lotRows: (typeof partLots.$inferSelect)[] = []
  for (const [index, { donor, parent }] of graph.lots.entries()) {
    const donorUnitId = donor === null ? null : unitRows[donor]?.id ?? null
    // Only an earlier lot can be a parent; a lot is of a donor or of a parent.
    const parentLotId = donorUnitId === null && parent !== null && parent < index ? lotRows[parent]?.id ?? null : null
    lotRows.push(await lot({ donorUnitId, parentLotId, sourceKind: donorUnitId ? 'donor' : parentLotId ? 'split' : 'old_stock', quantity: 50 }))
  }
  for (const { lot: at, unit: into, undone } of graph.fittings) {
    await fit(unitRows[into]?.id ?? '', lotRows[at]?.id ?? '', undone ? { undoneAt: new Date(), undoneBecause: 'A slip' } : {})
  }
  return { unitRows, lotRows }
}

/** An independent breadth-first walk over the same graph, written from the rows and not from the statement. */
function walkByHand(rows: Awaited<ReturnType<typeof write>>, graph: Graph, start: TraceKey, direction: TraceDirection): { nodes: Set<string>, edges: string[] } {
  const arrows: [string, string][] = []
  for (const each of rows.lotRows) {
    if (each.donorUnitId) arrows.push([`unit:${each.donorUnitId}`, `lot:${each.id}`])
    if (each.parentLotId) arrows.push([`lot:${each.parentLotId}`, `lot:${each.id}`])
  }
  for (const each of graph.fittings) {
    if (!each.undone) arrows.push([`lot:${rows.lotRows[each.lot]?.id}`, `unit:${rows.unitRows[each.unit]?.id}`])
  }
  const turned = direction === 'forwards' ? arrows : arrows.map(([from, to]): [string, string] => [to, from])
  const nodes = new Set<string>([start])
  for (let front = [String(start)]; front.length > 0;) {
    front = turned.filter(([from]) => front.includes(from)).map(([, to]) => to).filter(to => !nodes.has(to) && nodes.add(to))
  }
  return { nodes, edges: turned.filter(([from]) => nodes.has(from)).map(([from, to]) => `${from} ${to}`).sort() }
}

describe('the trace of random graphs with cycles', () => {
  it('reaches what an independent breadth-first walk reaches, by the same edges', { timeout: 120_000 }, async () => {
    await fc.assert(fc.asyncProperty(graphs, async (graph) => {
      const rows = await write(graph)
      for (const start of [rows.lotRows[0], rows.lotRows.at(-1)]) {
        if (!start) continue
        const view = await traceLot(database.db, owner, { tag: start.tag, direction: 'both' })
        for (const direction of ['forwards', 'backwards'] as const) {
          const byHand = walkByHand(rows, graph, view.start, direction)
          const edges = view[direction]?.edges ?? []
          const told = edges.map(({ from, to }) => direction === 'forwards' ? `${from} ${to}` : `${to} ${from}`).sort()
          expect(told).toEqual(byHand.edges)
          expect(new Set([view.start, ...edges.flatMap(({ from, to }) => [from, to])])).toEqual(byHand.nodes)
          expect(view[direction]?.isCut).toBe(false)
        }
      }
    }), { numRuns: 12 })
  })
})

describe('the trace of a lot', () => {
  it('goes back to the donor and its seller, and on to the units, of which one is sold, and to whom', async () => {
    const seller = await insertParty(database.db, 'The Hollis estate')
    const buyer = await insertParty(database.db, 'Mr Pell')
    const donor = await unit({ state: 'parted', sourcePartyId: seller })
    const pulled = await lot({ sourceKind: 'donor', donorUnitId: donor.id })
    const [first, second] = [await unit(), await unit()]
    await fit(first.id, pulled.id, { circuitReference: 'T3' })
    await fit(second.id, pulled.id)
    await insertSale(database.db, owner, second, buyer, '2026-05-01')
    const view = await traceLot(database.db, owner, { tag: pulled.tag, direction: 'both' })
    expect(titles(view, 'backwards')).toEqual(['The Hollis estate', donor.tag].sort())
    expect(titles(view, 'forwards')).toEqual(['Mr Pell', first.tag, second.tag].sort())
    expect(view.forwards?.edges.find(({ kind, to }) => kind === 'fitted' && to === `unit:${first.id}`)).toMatchObject({ detail: 'T3', isRemoved: false })
    expect(view.forwards?.edges.find(({ kind }) => kind === 'sold')).toMatchObject({ from: `unit:${second.id}`, to: `buyer:${buyer}`, on: '2026-05-01' })
    expect(view.nodes.find(({ key }) => key === `unit:${second.id}`)).toMatchObject({ standing: 'sold', href: `/units/${second.tag}` })
  })
  it('names nobody to those who may not read names', async () => {
    const seller = await insertParty(database.db, 'Distributor Q')
    const bought = await lot({ sourceKind: 'supplier', supplierId: seller, invoiceNumber: '77' })
    const view = await traceLot(database.db, floor, { tag: bought.tag, direction: 'backwards' })
    expect(JSON.stringify(view)).not.toMatch(/Distributor Q|77"/u)
    expect(view).toMatchObject({ forwards: null, nodes: [{ kind: 'lot' }, { kind: 'supplier', title: 'A supplier', href: null }] })
  })
  it('does not join everything that a supplier ever sold, unless it is the supplier who is asked after', async () => {
    const supplier = await insertParty(database.db, 'Distributor R')
    const one = await lot({ sourceKind: 'supplier', supplierId: supplier })
    const other = await lot({ sourceKind: 'supplier', supplierId: supplier })
    const piece = await unit()
    await fit(piece.id, other.id)
    expect(titles(await traceLot(database.db, owner, { tag: one.tag, direction: 'both' }), 'backwards')).toEqual(['Distributor R'])
    expect(titles(await traceSupplier(database.db, owner, { id: supplier, direction: 'forwards' }), 'forwards')).toEqual([one.tag, other.tag, piece.tag].sort())
    await expect(traceSupplier(database.db, owner, { id: piece.id, direction: 'both' })).rejects.toMatchObject({ statusCode: 404 })
  })
  it('leaves out a lot that was put back into its donor', async () => {
    const donor = await unit()
    await lot({ sourceKind: 'donor', donorUnitId: donor.id, quantity: 0 })
    expect(titles(await traceUnit(database.db, owner, { tag: donor.tag, direction: 'forwards' }), 'forwards')).toEqual([])
  })
})

describe('the trace as W3C PROV-O', () => {
  it('is expanded by the jsonld package and compacted back without loss, and nothing is derived from itself', async () => {
    const [donor, set] = [await unit({ state: 'parted' }), await unit()]
    const first = await lot({ sourceKind: 'donor', donorUnitId: donor.id })
    const fitting = await fit(set.id, first.id, { removedAt: new Date() })
    const second = await lot({ sourceKind: 'donor', donorUnitId: set.id, fromFittingId: fitting.id })
    await fit(donor.id, second.id)
    const document = traceToProv(await traceLot(database.db, owner, { tag: first.tag, direction: 'both' }), 'https://shop.invalid')
    // No loader: a context that is not in the document itself would be refused.
    const options = { documentLoader: () => Promise.reject(new Error('Nothing is fetched')) }
    const plain: jsonld.JsonLdDocument = JSON.parse(JSON.stringify(document))
    const quads = await jsonld.toRDF(plain, { ...options, format: 'application/n-quads' })
    const again = await jsonld.compact(await jsonld.expand(plain, options), document['@context'], options)
    expect(await jsonld.canonize(again, options)).toBe(await jsonld.canonize(plain, options))
    const terms = String(quads)
    const prov = (term: string) => `<http://www.w3.org/ns/prov#${term}>`
    expect(terms).toContain(`<https://shop.invalid/s/${first.tag}> ${prov('wasDerivedFrom')} <https://shop.invalid/s/${donor.tag}>`)
    expect(terms).toContain(`<urn:uuid:${fitting.id}> ${prov('used')} <https://shop.invalid/s/${first.tag}>`)
    expect(terms).toContain(`<https://shop.invalid/s/${second.tag}> ${prov('wasDerivedFrom')} <https://shop.invalid/s/${set.tag}#after-${fitting.id}>`)
    // Every statement of the document is a quad: no key was unknown to its context and dropped.
    const statements = document['@graph'].reduce((sum, { '@id': _id, ...rest }) => sum + Object.values(rest).flat().length, 0)
    expect(new Set(terms.trim().split('\n')).size).toBe(new Set(document['@graph'].flatMap(({ '@id': id, ...rest }) => Object.entries(rest).flatMap(([key, value]) => [value].flat().map(each => JSON.stringify([id, key, each]))))).size)
    expect(statements).toBeGreaterThan(10)
    expectNoCycle(document['@graph'])
  })
})

/** PROV-CONSTRAINTS: derivation has no cycle. */
function expectNoCycle(graph: ReturnType<typeof traceToProv>['@graph']) {
  const from = new Map(graph.flatMap(each => each['prov:wasDerivedFrom'] ? [[each['@id'], each['prov:wasDerivedFrom']['@id']] as const] : []))
  for (const start of from.keys()) {
    const seen = new Set<string>()
    for (let at: string | undefined = start; at !== undefined; at = from.get(at)) {
      expect(seen.has(at)).toBe(false)
      seen.add(at)
    }
  }
}
