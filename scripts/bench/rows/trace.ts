import { env } from 'node:process'
import pg from 'pg'
import { makeTag } from '../../../shared/domain/tag'
import { get } from '../context'
import type { BenchRow, BenchRows } from '../context'

/** How many fittings the whole book holds when the trace is measured. */
const SIZES = [1000, 10_000, 100_000]
/** Things per step of the traced part of the graph: lots and units in turn, 2,000 in all, twelve steps deep. */
const LEVELS = [1, 9, 20, 40, 80, 120, 170, 200, 230, 260, 290, 290, 290]
/** Above any tag that the demo shop has given out. */
const FIRST_NUMBER = 500_000

/**
 * The trace of one lot through 2,000 things in a book that grows from 1,000 to 100,000 fittings, beside a bare route that sends
 * the very same SQL. The rest of the book is as real: lots of a supplier, fitted here and there, some pulled again.
 */
export const rows: BenchRows = async ({ app, bare, script, replaySql, onStop }) => {
  const database = new URL(env.BENCH_ADMIN_URL ?? '')
  database.pathname = '/knurl_bench'
  const client = new pg.Client({ connectionString: database.href })
  await client.connect()
  onStop(() => client.end())
  const start = await writeTraced(client)
  const traced = LEVELS.filter((_, level) => level % 2 === 1).reduce((sum, size) => sum + size, 0)
  let written = traced
  return SIZES.map((size): BenchRow => {
    const name = `trace-${size}`
    const subject = () => get(`${app}/api/parts/${start}/trace?direction=forwards`, script)
    let ready: Promise<void> | null = null
    const prepare = () => ready ??= (async () => {
      await writeOthers(client, size - written)
      written = size
      await client.query('analyze')
      await replaySql(name, subject)
    })()
    const after = (work: () => Promise<void>) => async () => {
      await prepare()
      await work()
    }
    return {
      name: `Trace of 2,000 among ${size.toLocaleString('en-GB')} fittings`, against: 'bare h3 and pg, same SQL',
      subject: after(subject), baseline: after(() => get(`${bare}/sql?name=${name}`)),
    }
  })
}

const range = (from: number, size: number) => Array.from({ length: size }, (_, index) => from + index)
let nextNumber = FIRST_NUMBER
const take = (size: number) => {
  nextNumber += size
  return nextNumber - size
}

const insertUnits = `insert into units (tag, model_id, serial_answer, serial, ownership, source_kind, acquired_on, booked_in_by)
  select tag, (select id from models limit 1), 'known', tag, 'bought', 'auction', '2026-01-01', (select id from people limit 1) from unnest($1::text[]) tag`
const insertEntries = `insert into modifications (unit_id, hand, reason, reversibility, disposition, done_on, logged_by)
  select id, 'done_by_us', 'fault', 're_solder', 'discarded', '2026-02-01', booked_in_by from units where tag = any($1)`
/** `$2`: the donor of each, null for those that were bought. */
const insertLots = `with made as (
    insert into part_lots (tag, type_id, condition, source_kind, donor_unit_id, acquired_on, quantity, entered_by)
    select s.tag, (select id from part_types limit 1), 'pulled', case when u.id is null then 'old_stock' else 'donor' end::lot_source, u.id, '2026-01-05', 1000, (select id from people limit 1)
    from unnest($1::text[], $2::text[]) s(tag, donor) left join units u on u.tag = s.donor returning id, entered_by)
  insert into lot_movements (lot_id, kind, quantity, person_id) select id, 'received', 1000, entered_by from made`
const insertFittings = `insert into fittings (modification_id, unit_id, lot_id, quantity, circuit_reference, disposition, fitted_by)
  select m.id, m.unit_id, l.id, 1, 'C' || (row_number() over ()), 'discarded', m.logged_by
  from unnest($1::text[], $2::text[]) s(lot, unit) join part_lots l on l.tag = s.lot join units u on u.tag = s.unit join modifications m on m.unit_id = u.id`

/** The part of the graph that is traced; answers with the tag of the lot it starts at. */
async function writeTraced(client: pg.Client): Promise<string> {
  await client.query('insert into part_types (kind, description) select \'capacitor\', \'Measured capacitor\' where not exists (select from part_types)')
  const levels = LEVELS.map((size, level) => range(take(size), size).map(number => makeTag(level % 2 === 0 ? 'P' : 'U', number)))
  for (const [level, tags] of levels.entries()) {
    const behind = levels[level - 1] ?? []
    // Each hangs on one of the step before.
    const from = tags.map((_, index) => behind[index % behind.length] ?? null)
    if (level % 2 === 0) await client.query(insertLots, [tags, from])
    else {
      await client.query(insertUnits, [tags])
      await client.query(insertEntries, [tags])
      await client.query(insertFittings, [from, tags])
    }
  }
  return levels[0]?.[0] ?? ''
}

/** The rest of the book: `size` fittings, of a fifth as many lots in a tenth as many units, every tenth lot pulled from one of them. */
async function writeOthers(client: pg.Client, size: number): Promise<void> {
  if (size <= 0) return
  const units = range(take(Math.ceil(size / 10)), Math.ceil(size / 10)).map(number => makeTag('U', number))
  const lots = range(take(Math.ceil(size / 5)), Math.ceil(size / 5)).map(number => makeTag('P', number))
  await client.query(insertUnits, [units])
  await client.query(insertEntries, [units])
  await client.query(insertLots, [lots, lots.map((_, index) => index % 10 === 0 ? units[index % units.length] ?? null : null)])
  const pairs = range(0, size)
  await client.query(insertFittings, [pairs.map(index => lots[index % lots.length]), pairs.map(index => units[(index * 7) % units.length])])
}
