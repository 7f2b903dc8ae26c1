import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import PartRecallPrint from '~/components/parts/PartRecallPrint.vue'
import PartRecallUnit from '~/components/parts/PartRecallUnit.vue'
import ReachedLots from '~/components/parts/ReachedLots.vue'
import UnitPartRecalls from '~/components/parts/UnitPartRecalls.vue'
import type { LookAtLotView, PartRecallView, ReachedLotView, RecalledUnitView } from '#shared/types/part-recall'

const item = (said: Partial<RecalledUnitView> = {}): RecalledUnitView => ({
  tag: 'U0000016', title: 'Oxmarden 307-G', state: 'offered', how: 'fitted', reasons: ['C14: suppression capacitor, P 000004 B'], sale: null,
  outcome: null, note: '', decidedBy: null, decidedAt: null, isFittedSince: false, ...said,
})
const sale = { soldOn: '2026-04-01', buyer: 'Mr Aldous Pell', contact: '14 Quarry Lane' }
const lot = (said: Partial<ReachedLotView> = {}): ReachedLotView => ({
  tag: 'P000004B', title: 'Suppression capacitor (P 000004 B)', how: 'in_basis', maker: 'Dielmark', dateCode: '2308', standing: 'quarantined', quantity: 3, countedIn: 'piece', ...said,
})
const mountUnit = (said: Partial<RecalledUnitView> = {}, mayWrite = true) => mountSuspended(PartRecallUnit, { props: { item: item(said), address: '/api/part-recalls/3', mayWrite } })

describe('a unit on the list of a recall', () => {
  it('says which parts, and offers three outcomes of which none is chosen', async () => {
    const unit = await mountUnit()
    expect(unit.text()).toContain('In it')
    expect(unit.text()).toContain('C14: suppression capacitor, P 000004 B')
    const radios = unit.findAll<HTMLInputElement>('input[type="radio"]')
    expect(radios.map(radio => radio.element.closest('label')?.textContent?.trim())).toEqual(['Checked: sound', 'Replaced', 'Accepted as it is'])
    expect(radios.some(radio => radio.element.checked)).toBe(false)
  })
  it('asks why it is accepted as it is, before anything is sent', async () => {
    const unit = await mountUnit()
    await unit.get('input[value="accepted"]').setValue(true)
    await unit.get('form').trigger('submit')
    expect(unit.text()).toContain('Enter why it is accepted as it is')
  })
  it('says who has a sold one, and what was decided', async () => {
    const unit = await mountUnit({ state: 'sold', sale, outcome: 'replaced', note: 'Came back for it', decidedBy: 'Edith Marsh', decidedAt: '2026-04-20T10:00:00.000Z' })
    expect(unit.text()).toContain('Sold 1 Apr 2026 to Mr Aldous Pell, 14 Quarry Lane')
    expect(unit.get('[role="status"]').text()).toBe('Replaced, Edith Marsh 20 Apr 2026: Came back for it')
  })
  it('names no buyer where none was sent, and has no form for those who may not decide', async () => {
    const unit = await mountUnit({ state: 'sold', sale: { soldOn: '2026-04-01', buyer: null, contact: null } }, false)
    expect(unit.text()).toContain('Sold 1 Apr 2026')
    expect(unit.text()).not.toContain(' to ')
    expect(unit.find('form').exists()).toBe(false)
  })
  it('is to be decided again where such a part was fitted since', async () => {
    expect((await mountUnit({ outcome: 'checked', decidedAt: '2026-04-20T10:00:00.000Z', isFittedSince: true })).text()).toContain('fitted after it was decided: decide it again')
  })
})

describe('the lots of a recall', () => {
  it('say how each is reached and what is left; those of which too little is known are apart', async () => {
    const lookAt: LookAtLotView[] = [{ tag: 'P0000059', title: 'Capacitor (P 000005 9)', unknown: 'date', maker: '', dateCode: '', units: 2 }]
    const lots = await mountSuspended(ReachedLots, { props: { lots: [lot(), lot({ tag: 'P0000067', how: 'may_be', quantity: 0, standing: 'good', maker: '', dateCode: '' })], lookAt, lookAtTotal: 140 } })
    const words = lots.findAll('li').map(line => line.text())
    expect(words[0]).toContain('Marked Dielmark 2308')
    expect(words[0]).toContain('3 in the drawer, in quarantine')
    expect(words[1]).toMatch(/May be: look.*None left, good/u)
    expect(lots.get('summary').text()).toBe('140 lots of which too little is known')
    expect(words[2]).toContain('Date not known: look')
    expect(words[2]).toContain('In 2 units')
    expect(lots.text()).toContain('The first 1 are shown')
  })
})

describe('the list on paper', () => {
  it('has every unit, those sold with their buyers’ names and contacts', async () => {
    const recall: PartRecallView = {
      number: 3, basis: 'lot', title: 'Suppression capacitor (P 000004 B)', why: 'The case cracks', raisedBy: 'Edith Marsh', raisedAt: '2026-04-10T10:00:00.000Z', closedAt: null, closedBy: null,
      units: 2, decided: 0, lots: [lot()], lookAt: [], lookAtTotal: 0, items: [item(), item({ tag: 'U0000024', state: 'sold', sale })],
    }
    const list = await mountSuspended(PartRecallPrint, { props: { recall } })
    const rows = list.findAll('tbody tr').map(row => row.text())
    expect(rows).toHaveLength(2)
    expect(rows[0]).toContain('U 000001 6')
    expect(rows[0]).toContain('Offered')
    expect(rows[1]).toContain('Mr Aldous Pell')
    expect(rows[1]).toContain('14 Quarry Lane')
  })
})

describe('the page of a unit', () => {
  it('says each recall that is not decided, and nothing where there is none', async () => {
    const said = await mountSuspended(UnitPartRecalls, { props: { recalls: [{ number: 3, why: 'The case cracks', parts: 'C14: suppression capacitor, P 000004 B' }] } })
    expect(said.text()).toContain('A part in it may be bad: The case cracks')
    expect(said.text()).toContain('C14: suppression capacitor, P 000004 B')
    expect(said.get('a').attributes('href')).toBe('/parts/recalls/3')
    expect((await mountSuspended(UnitPartRecalls, { props: { recalls: [] } })).text()).toBe('')
  })
})
