import { eq } from 'drizzle-orm'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { ledger, procedureVersions } from '../../../../drizzle/schema'
import { copyProcedure, getCurrentProcedure, getProcedureVersion, listProcedureVersions, saveProcedure } from '../../../../server/services/procedures'
import { getTestSheet, startTestSheet } from '../../../../server/services/test-sheets'
import { dialCheckpoint } from '../../../../shared/domain/dial-check'
import type { SavedProcedure } from '../../../../shared/schemas/procedure'
import type { Person } from '../../../../shared/types/person'
import { makeTriage } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makeModel, makePerson, makeShop, makeUnit } from '../../../support/records'

describe('procedures', () => {
  const database = useTestDatabase()
  let bench: Person
  let modelId: string

  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench', 'Edith Marsh')
  })
  beforeEach(async () => {
    modelId = (await makeModel(database.db)).id
  })

  const rail = { section: 'rail' as const, bandLabel: '', label: 'HT', quantity: 'voltage' as const, atHz: null, nominal: 250, span: null, limit: { kind: 'percent_of_setting' as const, amount: 5 } }
  const procedure = (over: Partial<SavedProcedure> = {}): SavedProcedure => ({
    seen: 0, origin: 'Handbook, table 5', why: '', warmUpMinutes: 30, supply: '240 V', decisionRule: 'guard_band', guardFactor: 1, checkpoints: [dialCheckpoint('A', 100_000, 2), rail], ...over,
  })
  const save = (over: Partial<SavedProcedure> = {}) => saveProcedure(database.db, bench, { ...procedure(over), modelId })

  it('are kept in versions that stand as they were', async () => {
    expect(await save()).toMatchObject({ number: 1, madeBy: 'Edith Marsh', checkpoints: [{ nominal: 100_000 }, { label: 'HT' }] })
    expect(await save({ seen: 1, why: 'Rail added', checkpoints: [rail] })).toMatchObject({ number: 2, checkpoints: [{ label: 'HT' }] })
    expect(await getProcedureVersion(database.db, modelId, 1)).toMatchObject({ checkpoints: [{ nominal: 100_000 }, { label: 'HT' }] })
    expect(await listProcedureVersions(database.db, modelId, { limit: 1 })).toMatchObject({ total: 2, items: [{ number: 2, why: 'Rail added' }], nextCursor: expect.any(String) })
    const events = await database.db.select({ details: ledger.details }).from(ledger).where(eq(ledger.event, 'procedure_saved'))
    expect(events).toHaveLength(2)
    await expect(getProcedureVersion(database.db, modelId, 3)).rejects.toMatchObject({ statusCode: 404, data: { code: 'no-procedure' } })
  })

  it('write nothing when nothing changed, and refuse a version that is no longer the newest', async () => {
    await save()
    expect(await save({ seen: 1, why: 'x' })).toMatchObject({ number: 1 })
    await save({ seen: 1, why: 'Tighter', guardFactor: 1.5 })
    await expect(save({ seen: 1, why: 'Mine' })).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: { number: 2 } } })
    await expect(saveProcedure(database.db, bench, { ...procedure({ seen: 4, why: 'x' }), modelId: (await makeModel(database.db)).id })).rejects.toMatchObject({ data: { code: 'no-procedure' } })
  })

  it('let one of two people who save at once through', async () => {
    const tries = await Promise.allSettled([save({ origin: 'One' }), save({ origin: 'Other' })])
    expect(tries.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
    expect(await database.db.$count(procedureVersions, eq(procedureVersions.modelId, modelId))).toBe(1)
  })

  it('give a sheet its checkpoints, and let an old sheet keep the version it was made with', async () => {
    await save()
    const unit = await makeUnit(database.db, bench, { modelId })
    await makeTriage(database.db, bench, unit.id)
    const sheet = await startTestSheet(database.db, bench, { tag: unit.tag, energised: true })
    expect(sheet).toMatchObject({ procedure: { number: 1, origin: 'Handbook, table 5' }, warmUpMinutes: 30, supply: '240 V', readings: [{ section: 'dial', nominal: 100_000 }, { section: 'rail', label: 'HT', nominal: 250 }] })
    await save({ seen: 1, why: 'No rail', checkpoints: [dialCheckpoint('A', 100_000, 1)] })
    expect(await getTestSheet(database.db, { tag: unit.tag, number: 1 })).toMatchObject({ procedure: { number: 1 }, readings: [{ limit: { amount: 2 } }, { label: 'HT' }] })
  })

  it('leave the dial of the bands to who asks for it', async () => {
    await save()
    const unit = await makeUnit(database.db, bench, { modelId })
    await makeTriage(database.db, bench, unit.id)
    expect(await startTestSheet(database.db, bench, { tag: unit.tag, energised: true, checkpoints: 'bands' })).toMatchObject({ procedure: null, readings: { length: 15 } })
  })

  it('are copied to another model as a draft, without what lies in none of its bands', async () => {
    await save({ checkpoints: [dialCheckpoint('A', 100_000, 2), dialCheckpoint('Z', 500e6, 2), rail] })
    const other = await makeModel(database.db)
    const copy = await copyProcedure(database.db, other.id, modelId)
    expect(copy).toMatchObject({ checkpoints: [{ bandLabel: 'A' }, { label: 'HT' }], leftOut: [expect.stringContaining('500')] })
    await expect(getCurrentProcedure(database.db, other.id)).rejects.toMatchObject({ statusCode: 404 })
    await expect(copyProcedure(database.db, modelId, other.id)).rejects.toMatchObject({ data: { code: 'no-procedure' } })
  })
})
