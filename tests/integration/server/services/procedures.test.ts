import { and, eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { ledger, procedureCheckpoints, procedureVersions } from '../../../../drizzle/schema'
import { copyProcedure, findCurrentProcedure, getCurrentProcedure, getProcedureVersion, listProcedureVersions, saveProcedure } from '../../../../server/services/procedures'
import { getTestSheet, startTestSheet } from '../../../../server/services/test-sheets'
import { checkpointTitle } from '../../../../shared/domain/result-words'
import { newTestSheet } from '../../../../shared/schemas/test-sheet'
import { savedProcedure } from '../../../../shared/schemas/procedure'
import type { Person } from '../../../../shared/types/person'
import { makeTriage } from '../../../support/bench'
import { useTestDatabase } from '../../../support/database'
import { makeModel, makePerson, makeShop, makeUnit } from '../../../support/records'

const dial = (bandLabel: string, nominal: string) => ({ section: 'dial', bandLabel, quantity: 'frequency', nominal, limit: { kind: 'percent_of_setting', amount: '2' } })
const rail = { section: 'rail', label: 'HT', quantity: 'voltage', nominal: '250 V', limit: { kind: 'larger_of', amount: '5', second: '10 V', secondKind: 'absolute' } }
const input = (seen: number, checkpoints: unknown[] = [dial('A', '320 kc'), rail], said = {}) =>
  savedProcedure.parse({ seen, origin: 'Handbook, table 5', why: seen > 0 ? 'Table 5 was misread' : '', warmUpMinutes: '30', supply: '240 V', decisionRule: 'guard_band', guardFactor: '1', checkpoints, ...said })
const refusal = (code: string) => expect.objectContaining({ data: expect.objectContaining({ code }) })

describe('procedures', () => {
  const test = useTestDatabase()
  let bench: Person
  beforeAll(async () => {
    await makeShop(test.db)
    bench = await makePerson(test.db, 'bench', 'Edith Marsh')
  })
  const fresh = async (...given: Parameters<typeof makeModel> extends [unknown, ...infer Rest] ? Rest : never) => (await makeModel(test.db, ...given)).id
  const save = (modelId: string, ...said: Parameters<typeof input>) => saveProcedure(test.db, bench, { ...input(...said), modelId })
  const versionCount = (modelId: string) => test.db.$count(procedureVersions, eq(procedureVersions.modelId, modelId))

  it('keeps what was saved, in its order, with who and when', async () => {
    const modelId = await fresh()
    expect(await findCurrentProcedure(test.db, modelId)).toBeNull()
    await expect(getCurrentProcedure(test.db, modelId)).rejects.toEqual(refusal('no-procedure'))
    const saved = await save(modelId, 0)
    expect(saved).toMatchObject({ number: 1, origin: 'Handbook, table 5', why: '', warmUpMinutes: 30, supply: '240 V', decisionRule: { rule: 'guard_band', factor: 1 }, madeBy: 'Edith Marsh' })
    expect(saved.checkpoints).toEqual(input(0).checkpoints)
    expect(await getCurrentProcedure(test.db, modelId)).toEqual(saved)
  })

  it('appends a version at each save; the one before stands as it was', async () => {
    const modelId = await fresh()
    const first = await save(modelId, 0)
    const second = await save(modelId, 1, [dial('A', '100 kc')])
    expect(second).toMatchObject({ number: 2, why: 'Table 5 was misread' })
    expect(await getProcedureVersion(test.db, modelId, 1)).toEqual(first)
    expect(await findCurrentProcedure(test.db, modelId)).toEqual(second)
    await expect(getProcedureVersion(test.db, modelId, 3)).rejects.toEqual(refusal('no-procedure'))
    const told = await test.db.select().from(ledger).where(and(eq(ledger.subjectId, modelId), eq(ledger.event, 'procedure_saved'))).orderBy(ledger.id)
    expect(told.map(({ subject, personId, details }) => [subject, personId, details])).toEqual([
      ['model', bench.id, { number: 1, checkpoints: 2, why: '' }], ['model', bench.id, { number: 2, checkpoints: 1, why: 'Table 5 was misread' }],
    ])
  })

  it('writes nothing where nothing changed, whatever order the database keeps a limit in', async () => {
    const modelId = await fresh()
    const first = await save(modelId, 0)
    expect(await save(modelId, 1)).toEqual(first)
    expect(await versionCount(modelId)).toBe(1)
    expect(await test.db.$count(ledger, and(eq(ledger.subjectId, modelId), eq(ledger.event, 'procedure_saved')))).toBe(1)
  })

  it.each<[string, Parameters<typeof input>[1], object]>([
    ['a limit', [dial('A', '320 kc'), { ...rail, limit: { ...rail.limit, amount: '6' } }], {}],
    ['the order', [rail, dial('A', '320 kc')], {}],
    ['the warm-up', undefined, { warmUpMinutes: '20' }],
    ['the guard factor', undefined, { guardFactor: '0.83' }],
    ['the rule', undefined, { decisionRule: 'simple' }],
  ])('takes a change of %s for a change', async (_, points, said) => {
    const modelId = await fresh()
    await save(modelId, 0)
    expect(await save(modelId, 1, points, said)).toMatchObject({ number: 2 })
  })

  it('refuses a save from an old version and gives the newest', async () => {
    const modelId = await fresh()
    await save(modelId, 0)
    const second = await save(modelId, 1, [dial('A', '100 kc')])
    for (const seen of [0, 1, 3]) {
      const refused = save(modelId, seen, [rail])
      await expect(refused).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale', current: second } })
    }
    expect(await versionCount(modelId)).toBe(2)
    await expect(save(await fresh(), 1)).rejects.toEqual(refusal('no-procedure'))
    await expect(save('00000000-0000-4000-8000-000000000000', 0)).rejects.toEqual(refusal('no-such-model'))
  })

  it('lets one of two people through who save at once, and nothing of the other', async () => {
    const modelId = await fresh()
    for (const seen of [0, 1]) {
      const both = await Promise.allSettled([save(modelId, seen, [dial('A', `${200 + seen} kc`)]), save(modelId, seen, [dial('A', `${300 + seen} kc`), rail])])
      expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected'])
      expect(both.find(({ status }) => status === 'rejected')).toEqual({ status: 'rejected', reason: refusal('stale') })
      const won = both.flatMap(each => each.status === 'fulfilled' ? [each.value] : [])[0]
      expect(await findCurrentProcedure(test.db, modelId)).toEqual(won)
      expect(await versionCount(modelId)).toBe(seen + 1)
      expect(await test.db.$count(procedureCheckpoints, eq(procedureCheckpoints.versionId, won?.id ?? ''))).toBe(won?.checkpoints.length)
    }
  })

  it('lists the versions, the newest first, page by page', async () => {
    const modelId = await fresh()
    for (const seen of [0, 1, 2]) await save(modelId, seen, [dial('A', '100 kc'), ...Array.from({ length: seen }, () => rail)])
    const first = await listProcedureVersions(test.db, modelId, { limit: 2 })
    expect(first).toMatchObject({ total: 3, items: [{ number: 3, checkpointCount: 3 }, { number: 2, checkpointCount: 2, why: 'Table 5 was misread', madeBy: 'Edith Marsh' }] })
    const rest = await listProcedureVersions(test.db, modelId, { limit: 2, cursor: first.nextCursor ?? '' })
    expect(rest).toMatchObject({ items: [{ number: 1, checkpointCount: 1 }], nextCursor: null })
    expect(await listProcedureVersions(test.db, await fresh(), { limit: 2 })).toEqual({ items: [], nextCursor: null, total: 0 })
  })

  it('leaves a sheet the version it was made with', async () => {
    const unit = await makeUnit(test.db, bench, { state: 'bench' })
    await makeTriage(test.db, bench, unit.id)
    const first = await save(unit.modelId, 0)
    const { number } = await startTestSheet(test.db, bench, { ...newTestSheet.parse({}), tag: unit.tag })
    await save(unit.modelId, 1, [dial('B', '500 kc')], { warmUpMinutes: '5' })
    const sheet = await getTestSheet(test.db, { tag: unit.tag, number })
    expect(sheet.procedure).toMatchObject({ number: 1 })
    expect(sheet.warmUpMinutes).toBe(30)
    expect(sheet.readings.map(checkpointTitle)).toEqual(first.checkpoints.map(checkpointTitle))
  })

  it('leaves the dial of the bands to who asks for it', async () => {
    const unit = await makeUnit(test.db, bench, { state: 'bench' })
    await makeTriage(test.db, bench, unit.id)
    await save(unit.modelId, 0)
    expect(await startTestSheet(test.db, bench, { ...newTestSheet.parse({ checkpoints: 'bands' }), tag: unit.tag })).toMatchObject({ procedure: null, readings: { length: 15 } })
  })

  describe('copied from another model', () => {
    const level = (bandLabel: string, at: string) => ({ section: 'output_level', bandLabel, label: 'Level', quantity: 'level', at, nominal: '0 dB' })
    const scale = { section: 'meter', bandLabel: '30 V', label: 'Full scale', quantity: 'voltage', nominal: '30 V' }

    it('puts its points under the bands they lie in, and names what lies in none', async () => {
      const from = await fresh({}, [{ label: 'A', lowerHz: 100_000, upperHz: 1_000_000 }, { label: 'F', lowerHz: 1_000_000, upperHz: 50_000_000 }])
      const source = await save(from, 0, [dial('A', '150 kc'), dial('A', '500 kc'), dial('F', '40 Mc'), level('A', '500 kc'), level('F', '40 Mc'), { ...level('F', ''), label: 'Hum' }, scale, rail])
      const to = await fresh({}, [{ label: 'A', lowerHz: 100_000, upperHz: 200_000 }, { label: 'B', lowerHz: 200_000, upperHz: 2_000_000 }])
      const copy = await copyProcedure(test.db, to, from)
      expect(copy.checkpoints.map(({ section, bandLabel }) => `${section} ${bandLabel}`.trim())).toEqual(['dial A', 'dial B', 'output_level B', 'output_level F', 'output_level F', 'meter 30 V', 'rail'])
      expect(copy.leftOut).toEqual(source.checkpoints.slice(2, 3).map(checkpointTitle))
      expect(copy.strangers).toEqual(source.checkpoints.slice(4, 6).map(point => `Output level: ${checkpointTitle(point)}`))
      expect(copy).toMatchObject({ origin: 'Handbook, table 5', warmUpMinutes: 30, supply: '240 V', decisionRule: { rule: 'guard_band', factor: 1 } })
      expect(await versionCount(to)).toBe(0)
    })

    it('keeps its own label where two bands hold a point', async () => {
      const edges = [{ label: 'A', lowerHz: 100_000, upperHz: 320_000 }, { label: 'B', lowerHz: 320_000, upperHz: 1_000_000 }]
      const from = await fresh({}, edges)
      await save(from, 0, [dial('A', '320 kc'), dial('B', '320 kc')])
      expect((await copyProcedure(test.db, await fresh({}, edges), from)).checkpoints.map(({ bandLabel }) => bandLabel)).toEqual(['A', 'B'])
    })

    it('reads the edge of two bands once where they meet within one', async () => {
      const from = await fresh({}, [{ label: 'A', lowerHz: 100_000, upperHz: 320_000 }, { label: 'B', lowerHz: 320_000, upperHz: 1_000_000 }])
      await save(from, 0, [dial('A', '100 kc'), dial('A', '320 kc'), dial('B', '320 kc'), dial('B', '1 Mc')])
      const copy = await copyProcedure(test.db, await fresh({}, [{ label: '1', lowerHz: 100_000, upperHz: 1_000_000 }]), from)
      expect(copy.checkpoints.map(({ bandLabel, nominal }) => [bandLabel, nominal])).toEqual([['1', 100_000], ['1', 320_000], ['1', 1_000_000]])
    })

    it('says what is missing', async () => {
      const [from, to] = [await fresh(), await fresh()]
      await expect(copyProcedure(test.db, to, from)).rejects.toEqual(refusal('no-procedure'))
      await save(from, 0)
      await expect(copyProcedure(test.db, '00000000-0000-4000-8000-000000000000', from)).rejects.toEqual(refusal('no-such-model'))
    })
  })
})
