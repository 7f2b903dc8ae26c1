import { readBody } from 'h3'
import { flushPromises } from '@vue/test-utils'
import { mountSuspended, registerEndpoint } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import PartMinimum from '~/components/parts/PartMinimum.vue'
import ReorderTable from '~/components/parts/ReorderTable.vue'
import { useSessionStore } from '~/stores/session'
import type { Role } from '#shared/domain/roles'
import type { PartTypeView } from '#shared/types/part'
import type { ReorderLine } from '#shared/types/reorder'

const type: PartTypeView = { id: '00000000-0000-4000-8000-000000000001', kind: 'capacitor', description: 'Suppression capacitor X2', value: '0.1 µF', tolerance: '', rating: '', package: '', countedIn: 'piece', minimum: 20, version: 3 }
const line: ReorderLine = { type, inStock: 9, minimum: 20, short: 11, lastSupplier: 'Distributor A', lastBought: { quantity: 10, costMinor: 1250, currency: 'GBP' } }
function signIn(role: Role) {
  useSessionStore().me = { person: { id: 'p', name: 'A', email: 'a@shop.invalid', role, mustChangePassword: false }, firstRun: false, shop: null }
}

describe('the reorder list', () => {
  it('says how many are short, and who sold them at what price to those who may see it', async () => {
    signIn('owner')
    const list = await mountSuspended(ReorderTable, { props: { lines: [line] } })
    expect(list.findAll('thead th').map(head => head.text())).toEqual(['Part', 'Short', 'In the drawers', 'Minimum', 'Last supplier', 'Last cost'])
    expect(list.findAll('tbody td').map(cell => cell.text()).slice(0, 2)).toEqual(['11', '9'])
    expect(list.get('tbody').text()).toContain('Distributor A£1.25 each')
    expect(list.get('ul').text()).toContain('11 short')
  })

  it('has no column of names or costs for the floor, and no deed for a reader', async () => {
    signIn('floor')
    const floor = await mountSuspended(ReorderTable, { props: { lines: [{ ...line, lastSupplier: null, lastBought: null }] } })
    expect(floor.findAll('thead th').map(head => head.text())).toEqual(['Part', 'Short', 'In the drawers', 'Minimum'])
    expect(floor.text()).not.toContain('not known')
    signIn('reader')
    const reader = await mountSuspended(ReorderTable, { props: { lines: [line] } })
    expect(reader.find('button').exists()).toBe(false)
  })
})

describe('a minimum in its line', () => {
  const sent: unknown[] = []
  registerEndpoint(`/api/part-types/${type.id}/minimum`, {
    method: 'POST',
    handler: async (event) => {
      sent.push(await readBody(event))
      return { type: { ...type, minimum: 12, version: 4 }, inStock: 9 }
    },
  })

  it('is changed there, and taken off', async () => {
    signIn('floor')
    const minimum = await mountSuspended(PartMinimum, { props: { type, label: 'at least' } })
    expect(minimum.text()).toContain('at least20')
    await minimum.get('button').trigger('click')
    await flushPromises()
    const field = minimum.get<HTMLInputElement>('input')
    expect(field.element.value).toBe('20')
    await field.setValue('12')
    await minimum.get('form').trigger('submit')
    await expect.poll(() => minimum.emitted('saved')).toHaveLength(1)
    expect(minimum.find('form').exists()).toBe(false)
    await minimum.get('button').trigger('click')
    await flushPromises()
    await minimum.findAll('button').find(button => button.text() === 'Don’t watch')?.trigger('click')
    await expect.poll(() => minimum.emitted('saved')).toHaveLength(2)
    expect(sent).toEqual([{ minimum: '12', version: 3 }, { minimum: '', version: 3 }])
  })

  it('is left as it was by Escape, and set where there is none', async () => {
    signIn('bench')
    const minimum = await mountSuspended(PartMinimum, { props: { type: { ...type, minimum: null } } })
    expect(minimum.get('button').text()).toBe('Set a minimum of Suppression capacitor X2 · 0.1 µF')
    await minimum.get('button').trigger('click')
    await flushPromises()
    await minimum.get('input').trigger('keydown', { key: 'Escape' })
    await flushPromises()
    expect(minimum.find('form').exists()).toBe(false)
    expect(minimum.emitted('saved')).toBeUndefined()
  })
})
