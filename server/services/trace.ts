import type { SQL } from 'drizzle-orm'
import { eq, inArray, sql } from 'drizzle-orm'
import { parties } from '../../drizzle/schema'
import type { LotStanding } from '../../shared/domain/part-lots'
import { LOT_STANDING_LABELS } from '../../shared/domain/part-lots'
import type { CountedIn } from '../../shared/domain/part-quantity'
import { formatQuantity } from '../../shared/domain/part-quantity'
import { partTitle } from '../../shared/domain/part-words'
import type { Role } from '../../shared/domain/roles'
import { may } from '../../shared/domain/roles'
import type { UnitState } from '../../shared/domain/unit-state-names'
import { UNIT_STATE_LABELS } from '../../shared/domain/unit-state-names'
import type { TraceDirection, TraceEdge, TraceKey, TraceKind, TraceNode, TraceView, TraceWalk } from '../../shared/types/trace'
import type { Database } from '../utils/db'
import { notFound } from '../utils/errors'
import { getLotRow } from './lot-stock'
import type { LotReader } from './lot-view'
import { getUnitRow } from './unit-lock'

/** The most things told of in one direction; a shop's whole book hangs together through a few donors. */
export const MOST_NODES = 5000

/** A lot that was put back where it came from was never pulled. */
const wasPulled = sql.raw(`(select coalesce(sum(m.quantity), 0) from lot_movements m where m.lot_id = l.id and m.kind in ('received', 'put_back')) > 0`)

/** The edges out of the thing `at`, by its kind: each branch is one look into an index. A party is left only where the walk starts at it. */
const EDGES: Record<TraceDirection, SQL> = {
  forwards: sql`
    select 'unit' as kind, f.unit_id as id, 'fitted' as via, f.created_at::date as on_day, f.circuit_reference as reference, f.quantity, f.id as fitting_id, f.removed_at is not null as is_removed
      from fittings f where at.kind = 'lot' and f.lot_id = at.id and f.undone_at is null
    union all select 'lot', l.id, 'split', l.acquired_on, '', null, null, false from part_lots l where at.kind = 'lot' and l.parent_lot_id = at.id
    union all select 'lot', l.id, 'pulled', l.acquired_on, '', null, l.from_fitting_id, false from part_lots l where at.kind = 'unit' and l.donor_unit_id = at.id and ${wasPulled}
    union all select 'buyer', s.buyer_id, 'sold', s.sold_on, '', null, null, false from sales s where at.kind = 'unit' and s.unit_id = at.id and s.undone_at is null
    union all select 'lot', l.id, 'supplied', l.acquired_on, l.invoice_number, null, null, false from part_lots l where at.kind = 'supplier' and l.supplier_id = at.id
    union all select 'unit', u.id, 'supplied', u.acquired_on, '', null, null, false from units u where at.kind = 'supplier' and u.source_party_id = at.id`,
  backwards: sql`
    select 'lot' as kind, f.lot_id as id, 'fitted' as via, f.created_at::date as on_day, f.circuit_reference as reference, f.quantity, f.id as fitting_id, f.removed_at is not null as is_removed
      from fittings f where at.kind = 'unit' and f.unit_id = at.id and f.lot_id is not null and f.undone_at is null
    union all select 'lot', l.parent_lot_id, 'split', l.acquired_on, '', null, null, false from part_lots l where at.kind = 'lot' and l.id = at.id and l.parent_lot_id is not null
    union all select 'unit', l.donor_unit_id, 'pulled', l.acquired_on, '', null, l.from_fitting_id, false from part_lots l where at.kind = 'lot' and l.id = at.id and l.donor_unit_id is not null
    union all select 'supplier', l.supplier_id, 'supplied', l.acquired_on, l.invoice_number, null, null, false from part_lots l where at.kind = 'lot' and l.id = at.id and l.supplier_id is not null
    union all select 'supplier', u.source_party_id, 'supplied', u.acquired_on, '', null, null, false from units u where at.kind = 'unit' and u.id = at.id and u.source_party_id is not null
    union all select 'unit', s.unit_id, 'sold', s.sold_on, '', null, null, false from sales s where at.kind = 'buyer' and s.buyer_id = at.id and s.undone_at is null`,
}

/**
 * One statement: everything reached from the start, each thing expanded once (so that cycles end by themselves), then every edge
 * out of what was reached with what its far end is. The far ends are looked up one by one ("limit 1" keeps the planner to that):
 * joined, they would be read whole, and the answer would grow with the book.
 */
export function traceStatement(direction: TraceDirection, start: { kind: TraceKind, id: string }): SQL {
  const edges = EDGES[direction]
  return sql`
    with recursive reached(kind, id) as (
      select ${start.kind}::text, ${start.id}::uuid
      union
      select next.kind, next.id from reached at cross join lateral (${edges}) next where next.kind in ('lot', 'unit')
    ), at as materialized (select kind, id from reached limit ${MOST_NODES + 1})
    select at.kind as behind_kind, at.id as behind_id, edge.kind, edge.id, edge.via, edge.on_day::text as on_day, edge.reference, edge.quantity, edge.fitting_id, edge.is_removed,
      l.tag as lot_tag, l.standing, l.quantity as left_quantity, t.description, t.value, t.tolerance, t.rating, coalesce(t.counted_in, bt.counted_in) as counted_in,
      u.tag as unit_tag, u.state, o.maker, o.designation, (select count(*)::int from at) as reached
    from at cross join lateral (${edges}) edge
    left join lateral (select tag, standing, quantity, type_id from part_lots where edge.kind = 'lot' and id = edge.id limit 1) l on true
    left join lateral (select description, value, tolerance, rating, counted_in from part_types where id = l.type_id limit 1) t on true
    left join lateral (select bt.counted_in from part_lots bl join part_types bt on bt.id = bl.type_id where at.kind = 'lot' and edge.via = 'fitted' and bl.id = at.id limit 1) bt on true
    left join lateral (select tag, state, model_id from units where edge.kind = 'unit' and id = edge.id limit 1) u on true
    left join lateral (select maker, designation from models where id = u.model_id limit 1) o on true`
}

/** A row of it, as the driver gives it. */
interface TraceRow extends Record<string, unknown> {
  behind_kind: TraceKind
  behind_id: string
  kind: TraceKind
  id: string
  via: TraceEdge['kind']
  on_day: string
  reference: string
  quantity: number | null
  fitting_id: string | null
  is_removed: boolean
  lot_tag: string | null
  standing: LotStanding | null
  left_quantity: number | null
  description: string | null
  value: string | null
  tolerance: string | null
  rating: string | null
  counted_in: CountedIn | null
  unit_tag: string | null
  state: UnitState | null
  maker: string | null
  designation: string | null
  /** How many things were reached, at most one more than are told. */
  reached: number
}

interface Start { kind: TraceKind, id: string, node: TraceNode }
export type AskedDirection = TraceDirection | 'both'

/** Where every part of a lot came from and went, at any remove. Suppliers and buyers are named only to those who may read names. */
export async function traceLot(db: Database, reader: LotReader, { tag, direction }: { tag: string, direction: AskedDirection }): Promise<TraceView> {
  const { lot, type } = await getLotRow(db, tag)
  return trace(db, reader, { kind: 'lot', id: lot.id, node: lotNode(lot.id, { tag, ...type, quantity: lot.quantity, standing: lot.standing }) }, direction)
}

/** What went into a unit and where that came from, and what was pulled from it. */
export async function traceUnit(db: Database, reader: LotReader, { tag, direction }: { tag: string, direction: AskedDirection }): Promise<TraceView> {
  const unit = await getUnitRow(db, tag)
  const { rows } = await db.execute<{ maker: string, designation: string }>(sql`select maker, designation from models where id = ${unit.modelId}`)
  return trace(db, reader, { kind: 'unit', id: unit.id, node: unitNode(unit.id, { tag, state: unit.state, maker: rows[0]?.maker ?? '', designation: rows[0]?.designation ?? '' }) }, direction)
}

/** All that somebody supplied, and where it went. Only for those who may read names; 404 for nobody. */
export async function traceSupplier(db: Database, reader: LotReader, { id, direction }: { id: string, direction: AskedDirection }): Promise<TraceView> {
  const [party] = await db.select({ name: parties.name }).from(parties).where(eq(parties.id, id))
  if (!party) throw notFound('There is no such supplier.', 'no-such-supplier')
  return trace(db, reader, { kind: 'supplier', id, node: partyNode({ kind: 'supplier', id }, party.name) }, direction)
}

async function trace(db: Database, { role }: LotReader, start: Start, direction: AskedDirection): Promise<TraceView> {
  return db.transaction(async (tx) => {
    // Compiling the statement takes longer than answering it.
    await tx.execute(sql`set local jit = off`)
    return traceIn(tx, role, start, direction)
  }, { accessMode: 'read only' })
}

async function traceIn(db: Database, role: Role, start: Start, direction: AskedDirection): Promise<TraceView> {
  const nodes = new Map<TraceKey, TraceNode>([[start.node.key, start.node]])
  const walk = async (way: TraceDirection): Promise<TraceWalk> => {
    const { rows } = await db.execute<TraceRow>(traceStatement(way, start))
    for (const row of rows) {
      const node = toNode(row)
      if (!nodes.has(node.key)) nodes.set(node.key, node)
    }
    return { edges: rows.map(row => toEdge(row, way)), isCut: (rows[0]?.reached ?? 0) > MOST_NODES }
  }
  const forwards = direction === 'backwards' ? null : await walk('forwards')
  const backwards = direction === 'forwards' ? null : await walk('backwards')
  if (may(role, 'parties.read')) await nameParties(db, nodes)
  return { start: start.node.key, nodes: [...nodes.values()], forwards, backwards }
}

function toEdge(row: TraceRow, direction: TraceDirection): TraceEdge {
  const [behind, ahead]: [TraceKey, TraceKey] = [`${row.behind_kind}:${row.behind_id}`, `${row.kind}:${row.id}`]
  const many = row.quantity === null ? '' : formatQuantity(row.quantity, row.counted_in ?? 'piece')
  return {
    from: direction === 'forwards' ? behind : ahead,
    to: direction === 'forwards' ? ahead : behind,
    kind: row.via,
    on: row.on_day,
    detail: [row.via === 'supplied' && row.reference ? '' : row.reference, many === '1' ? '' : many && `${many} ×`].filter(Boolean).join(', '),
    fittingId: row.fitting_id,
    isRemoved: row.is_removed,
  }
}

function toNode(row: TraceRow): TraceNode {
  if (row.kind === 'lot') {
    return lotNode(row.id, {
      tag: row.lot_tag ?? '', description: row.description ?? '', value: row.value ?? '', tolerance: row.tolerance ?? '', rating: row.rating ?? '',
      quantity: row.left_quantity ?? 0, standing: row.standing ?? 'good', countedIn: row.counted_in ?? 'piece',
    })
  }
  if (row.kind === 'unit') return unitNode(row.id, { tag: row.unit_tag ?? '', state: row.state ?? 'intake', maker: row.maker ?? '', designation: row.designation ?? '' })
  return partyNode(row, null)
}

interface LotWords { tag: string, description: string, value: string, tolerance: string, rating: string, quantity: number, standing: LotStanding, countedIn: CountedIn }
function lotNode(id: string, lot: LotWords): TraceNode {
  const left = lot.quantity === 0 ? 'none left' : `${formatQuantity(lot.quantity, lot.countedIn)} left`
  return { key: `lot:${id}`, kind: 'lot', tag: lot.tag, title: partTitle(lot), standing: lot.standing === 'good' ? left : `${LOT_STANDING_LABELS[lot.standing].toLowerCase()}, ${left}`, href: `/parts/${lot.tag}` }
}

function unitNode(id: string, unit: { tag: string, state: UnitState, maker: string, designation: string }): TraceNode {
  return { key: `unit:${id}`, kind: 'unit', tag: unit.tag, title: `${unit.maker} ${unit.designation}`, standing: UNIT_STATE_LABELS[unit.state].toLowerCase(), href: `/units/${unit.tag}` }
}

function partyNode({ kind, id }: { kind: TraceKind, id: string }, name: string | null): TraceNode {
  const isSupplier = kind === 'supplier'
  return { key: `${kind}:${id}`, kind, tag: null, title: name ?? (isSupplier ? 'A supplier' : 'A buyer'), standing: '', href: name !== null && isSupplier ? `/suppliers/${id}` : null }
}

async function nameParties(db: Database, nodes: Map<TraceKey, TraceNode>): Promise<void> {
  const nameless = [...nodes.values()].filter(({ kind }) => kind === 'supplier' || kind === 'buyer')
  if (nameless.length === 0) return
  const idOf = (key: TraceKey) => key.slice(key.indexOf(':') + 1)
  const rows = await db.select({ id: parties.id, name: parties.name }).from(parties).where(inArray(parties.id, nameless.map(({ key }) => idOf(key))))
  const names = new Map(rows.map(({ id, name }) => [id, name]))
  for (const { key, kind } of nameless) nodes.set(key, partyNode({ kind, id: idOf(key) }, names.get(idOf(key)) ?? null))
}
