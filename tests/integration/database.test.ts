import { sql } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { makeTestDatabase, useTestDatabase } from '../support/database'

describe('the database that the tests stand on', () => {
  const database = useTestDatabase()

  it('is migrated and empty', async () => {
    const { rows } = await database.pool.query('select count(*)::int as people from people')
    expect(rows).toEqual([{ people: 0 }])
  })

  it('answers through Drizzle as it does to the driver', async () => {
    const { rows } = await database.db.execute(sql`select '{[1,3)}'::int8multirange @> 2::int8 as covered`)
    expect(rows).toEqual([{ covered: true }])
  })

  it('is not shared: what one copy holds, another does not', async () => {
    const other = await makeTestDatabase()
    try {
      await database.pool.query('create table only_here ()')
      const { rows } = await other.pool.query('select to_regclass(\'only_here\') as name')
      expect(rows).toEqual([{ name: null }])
    } finally {
      await other.drop()
    }
  })
})
