import { execFileSync } from 'node:child_process'
import { beforeAll, describe, expect, it } from 'vitest'
import { bookInUnit } from '../../../../server/services/intake'
import { addModel } from '../../../../server/services/models'
import { gatherReceipt, makeReceiptPdf } from '../../../../server/services/receipt'
import { newModel } from '../../../../shared/schemas/model'
import { newUnit } from '../../../../shared/schemas/unit'
import type { Person } from '../../../../shared/types/person'
import type { UnitView } from '../../../../shared/types/unit'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop } from '../../../support/records'

const site = useTestDatabase()
let owner: Person
let floor: Person
let other: Person
let unit: UnitView

beforeAll(async () => {
  await makeShop(site.db)
  owner = await makePerson(site.db, 'owner')
  floor = await makePerson(site.db, 'floor')
  other = await makePerson(site.db, 'floor')
  const model = await addModel(site.db, owner, newModel.parse({
    maker: 'Oxmarden', designation: '307-G', kind: 'rf_generator',
    kit: [{ kind: 'lead', description: 'Terminated 50 Ω lead' }, { kind: 'manual', description: 'Handbook' }, { kind: 'other', description: 'Dummy aerial' }],
  }))
  const [lead, book] = model.kit
  unit = await bookInUnit(site.db, floor, newUnit.parse({
    modelId: model.id, serialAnswer: 'could_not_tell', ownership: 'consigned', sourceKind: 'consignor', sourceName: 'Winifred Aldous', acquiredOn: '2026-03-02',
    conditionNotes: 'Case scratched → left side, ≥ 3 knobs loose',
    kit: [{ kitItemId: lead?.id ?? '', found: 'here' }, { kitItemId: book?.id ?? '', found: 'missing' }],
  }))
})

describe('the entry receipt', () => {
  it('says what came, what did not, and what nobody looked for, and no money', async () => {
    const text = execFileSync('pdftotext', ['-layout', '-', '-'], { input: await makeReceiptPdf(site.db, owner, unit.tag), encoding: 'utf8' })
    for (const words of ['Fenwold Instruments', 'Oxmarden 307-G', 'looked, couldn’t tell', '2 March 2026', 'Winifred Aldous', 'Handbook', 'Missing', 'Dummy aerial', 'Not looked for', 'on consignment', 'Page 1 of 1']) {
      expect(text.replace(/\s+/gu, ' ')).toContain(words)
    }
    expect(text).toMatch(/50\s*Ω/u)
    expect(text).not.toMatch(/£|GBP|cost/iu)
  })

  it('names who brought it only to those who may know', async () => {
    expect((await gatherReceipt(site.db, floor, unit.tag)).sourceName).toBe('Winifred Aldous')
    expect((await gatherReceipt(site.db, other, unit.tag)).sourceName).toBeNull()
  })
})
