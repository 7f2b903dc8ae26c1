import { flushPromises } from '@vue/test-utils'
import { mountSuspended, registerEndpoint } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import UnitCost from '~/components/unit/UnitCost.vue'
import { benchTime, unitCost } from '#shared/domain/unit-cost'
import type { UnitCostFacts } from '#shared/domain/unit-cost'
import type { UnitCostView } from '#shared/types/unit-cost'

const gbp = (minor: number) => ({ minor, currency: 'GBP' })
function view(said: Partial<UnitCostFacts> = {}, ceilingMinutes: number | null = null): UnitCostView {
  const facts = { currency: 'GBP', isConsigned: false, purchase: gbp(15_000), shares: [], fittings: [gbp(3800)], minutes: 300, entriesWithoutMinutes: 0, benchRateMinor: 2800, price: gbp(42_000), isSold: false, ...said }
  return { ...unitCost(facts), benchRateMinor: facts.benchRateMinor, minutesSpent: facts.minutes, ceilingMinutes, benchTime: benchTime(facts.minutes, ceilingMinutes), version: 1 }
}

/** Each case has a unit of its own, so that no answer is kept from the one before. */
let number = 0
async function show(cost: UnitCostView) {
  const tag = `U00000${number++}`
  registerEndpoint(`/api/units/${tag}/cost`, () => ({ ...cost }))
  const wrapper = await mountSuspended(UnitCost, { props: { tag, version: 1 } })
  await flushPromises()
  await expect.poll(() => wrapper.find('table').exists()).toBe(true)
  const rows = wrapper.findAll('tr').map(row => [row.get('th').text(), row.get('td').text()])
  return { wrapper, rows, text: wrapper.text().replaceAll('\u202F', ' ') }
}

describe('what a piece has cost, on its page', () => {
  it('is a table of lines that ends in both margins', async () => {
    const { wrapper, rows } = await show(view({ shares: [gbp(7555)] }))
    expect(wrapper.get('summary').text()).toBe('Has cost £252.45; margin £167.55 after bench time, £307.55 before')
    expect(rows).toEqual([
      ['Bought for', '£150.00'], ['Less the share of one lot pulled from it', '−£75.55'], ['One part fitted', '£38.00'],
      ['5\u202Fh on the bench at £28.00 an hour', '£140.00'], ['Total', '£252.45'], ['Asking price', '£420.00'],
      ['Margin before bench time', '£307.55'], ['Margin after bench time', '£167.55'],
    ])
  })

  it('has one margin where no bench time is counted, and says what is not', async () => {
    const { wrapper, rows, text } = await show(view({ benchRateMinor: null, fittings: [null, null], isSold: true }))
    expect(rows.slice(-3)).toEqual([['Total, as far as known', '£150.00'], ['Sold for', '£420.00'], ['Margin, as far as known', '£270.00']])
    expect(wrapper.get('summary').text()).toBe('Has cost £150.00, as far as known; margin £270.00')
    expect(text).toContain('2 parts of unknown cost.')
    expect(text).toContain('5 h on the bench: no rate an hour is set.')
  })

  it('lists what is in another currency beneath, and has no margin without a price', async () => {
    const { rows, text } = await show(view({ fittings: [{ minor: 1000, currency: 'EUR' }], price: null }))
    expect(rows.map(([term]) => term)).toEqual(['Bought for', '5\u202Fh on the bench at £28.00 an hour', 'Total'])
    expect(text).toContain('One part fitted: €10.00, in another currency, so not added.')
  })

  it('warns where the ceiling is passed, and leads to it', async () => {
    const { wrapper, text } = await show(view({}, 240))
    expect(text).toContain('The ceiling of bench time is passed')
    expect(text).toContain('5 h of 4 h spent: 1 h over the ceiling. Stop and think.')
    expect(wrapper.get('a').text()).toBe('Change the ceiling')
    expect((await show(view())).wrapper.get('a').text()).toBe('Set a ceiling')
  })
})
