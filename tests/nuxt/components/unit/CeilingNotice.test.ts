import { flushPromises } from '@vue/test-utils'
import { mountSuspended, registerEndpoint } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import CeilingNotice from '~/components/unit/CeilingNotice.vue'
import { minutesSpent } from '~/composables/minutesSpent'
import { useSessionStore } from '~/stores/session'
import type { Role } from '#shared/domain/roles'
import type { ModificationView } from '#shared/types/modification'

const entry = (said: Partial<ModificationView>): ModificationView => ({
  id: 'a', hand: 'done_by_us', place: '', before: 'x', after: 'y', reason: 'fault', reversibility: 're_solder', nature: null, disposition: 'discarded', dispositionNote: '', parts: '', fitted: [],
  testedAfter: '', minutes: 100, doneOn: '2026-01-05', ownerConsent: '', touches: null, affectsNothingBecause: null, loggedBy: 'A', loggedAt: '2026-01-05T10:00:00Z',
  corrected: false, withdrawnBecause: null, photos: [], version: 1, ...said,
})

/** Each case has a unit of its own, so that no answer is kept from the one before. */
let number = 0
async function show(role: Role, props: { typed: string, ceilingMinutes: number | null, exceptId?: string, modifications?: ModificationView[] }) {
  const { typed, ceilingMinutes, exceptId, modifications = [entry({})] } = props
  const tag = `U00100${number++}`
  let asked = 0
  registerEndpoint(`/api/units/${tag}/cost`, () => {
    asked++
    return { benchRateMinor: 2800, currency: 'GBP' }
  })
  useSessionStore().me = { person: { id: 'p', name: 'A', email: 'a@shop.invalid', role, mustChangePassword: false }, firstRun: false, shop: null }
  const wrapper = await mountSuspended(CeilingNotice, { props: { unit: { tag, ceilingMinutes, modifications }, typed, exceptId } })
  await flushPromises()
  return { wrapper, text: () => wrapper.text().replaceAll('\u202F', ' '), asked: () => asked }
}

describe('the ceiling beside the minutes', () => {
  it('says live when what is typed passes it', async () => {
    const { wrapper, text } = await show('floor', { typed: '', ceilingMinutes: 240 })
    expect(text()).toBe('1 h 40 of 4 h spent.')
    await wrapper.setProps({ typed: '1 h 45' })
    expect(text()).toBe('1 h 40 of 4 h spent; this entry makes it 3 h 25: 35 min left.')
    await wrapper.setProps({ typed: '2 h 30' })
    expect(text()).toBe('Over the ceiling of bench time1 h 40 of 4 h spent; this entry makes it 4 h 10: over the ceiling. Stop and think.')
    expect(wrapper.attributes('role')).toBe('status')
  })

  it('says what the minutes cost to those who may see costs', async () => {
    const { text } = await show('bench', { typed: '90', ceilingMinutes: null })
    await expect.poll(text).toBe('1 h 40 spent; this entry makes it 3 h 10. No ceiling is set. This entry comes to £42.00 at £28.00 an hour.')
  })

  it('neither says nor asks for money where the floor reads it', async () => {
    const { text, asked } = await show('floor', { typed: '90', ceilingMinutes: null })
    expect(text()).toBe('1 h 40 spent; this entry makes it 3 h 10. No ceiling is set.')
    expect(asked()).toBe(0)
  })

  it('does not count an entry twice while it is corrected', async () => {
    const { text } = await show('floor', { typed: '100', ceilingMinutes: 240, exceptId: 'a', modifications: [entry({}), entry({ id: 'b', minutes: 20 })] })
    expect(text()).toBe('20 min of 4 h spent; this entry makes it 2 h.')
  })
})

describe('minutes spent', () => {
  it('are those of work of ours that stands, as the server counts them', () => {
    expect(minutesSpent([entry({}), entry({ minutes: null }), entry({ hand: 'found_like_this' }), entry({ withdrawnBecause: 'The wrong unit' }), entry({ minutes: 5 })])).toBe(105)
  })
})
