import { beforeAll, describe, expect, it } from 'vitest'
import { noteExaminedInside } from '../../../../server/services/originality'
import { getLotView } from '../../../../server/services/lot-view'
import { logModification, withdrawModification } from '../../../../server/services/modifications'
import { buildProvenanceSheet } from '../../../../server/services/provenance'
import { getUnitView } from '../../../../server/services/unit-view'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { typedFitting, typedWork } from '../../../support/lots'
import { insertPartLot } from '../../../support/parts'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

describe('the originality of a unit', () => {
  const database = useTestDatabase()
  let bench: Person
  beforeAll(async () => {
    await makeShop(database.db)
    bench = await makePerson(database.db, 'bench')
  })
  const gradeOf = async (tag: string) => (await getUnitView(database.db, bench, tag)).originality

  it('follows the work log, and is told to the buyer in the same words', async () => {
    const unit = await makeUnit(database.db, bench, { state: 'bench' })
    expect(await gradeOf(unit.tag)).toMatchObject({ grade: 'not_examined' })
    const seen = await noteExaminedInside(database.db, bench, { tag: unit.tag, on: '2026-03-03', note: 'Chassis out', version: unit.version })
    expect(seen).toMatchObject({ grade: 'unaltered', examinedInsideOn: '2026-03-03', examinedInsideNote: 'Chassis out' })
    const entry = await logModification(database.db, bench, { tag: unit.tag, ...typedWork([], { nature: 'substitute', disposition: 'kept_with_unit' }) })
    expect(entry.nature).toBe('substitute')
    expect(await gradeOf(unit.tag)).toMatchObject({ grade: 'reversible_supplied', groups: [{ key: 'substituted', entries: [{ id: entry.id }] }, { key: 'can_be_put_back' }] })
    expect((await buildProvenanceSheet(database.db, unit.id)).originality).toMatchObject({ words: 'Reversible changes, parts supplied' })
    await withdrawModification(database.db, bench, { tag: unit.tag, id: entry.id, version: entry.version, why: 'Another set' })
    expect(await gradeOf(unit.tag)).toMatchObject({ grade: 'unaltered', groups: [] })
  })
  it('calls a piece with another’s panel a composite, and no more when the panel is taken back', async () => {
    const [donor, set] = [await makeUnit(database.db, bench, { state: 'parted' }), await makeUnit(database.db, bench, { state: 'bench' })]
    const panel = await insertPartLot(database.db, bench, { sourceKind: 'donor', donorUnitId: donor.id, quantity: 1 }, { kind: 'panel', description: 'Front panel', value: '' })
    const entry = await logModification(database.db, bench, { tag: set.tag, ...typedWork([typedFitting(panel.tag)], { nature: 'like_for_like' }) })
    expect(await gradeOf(set.tag)).toMatchObject({ grade: 'composite', cautions: ['From another piece: Front panel.'] })
    await withdrawModification(database.db, bench, { tag: set.tag, id: entry.id, version: entry.version, why: 'It did not fit' })
    expect(await gradeOf(set.tag)).toMatchObject({ grade: 'not_examined' })
    expect((await getLotView(database.db, bench, panel.tag)).quantity).toBe(1)
  })
  it('refuses a day to come, and a version that is not the newest', async () => {
    const unit = await makeUnit(database.db, bench)
    await expect(noteExaminedInside(database.db, bench, { tag: unit.tag, on: '2099-01-01', note: '', version: unit.version })).rejects.toMatchObject({ statusCode: 422 })
    await expect(noteExaminedInside(database.db, bench, { tag: unit.tag, on: '2026-01-01', note: '', version: unit.version + 1 })).rejects.toMatchObject({ data: { code: 'stale' } })
  })
})
