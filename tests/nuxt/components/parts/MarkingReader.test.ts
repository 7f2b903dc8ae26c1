import { mountSuspended } from '@nuxt/test-utils/runtime'
import type { VueWrapper } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import MarkingReader from '~/components/parts/MarkingReader.vue'

const plain = (text: string) => text.replaceAll('\u202F', ' ')
const answer = (reader: VueWrapper) => plain(reader.get('[aria-live="polite"]').text())

async function pick(reader: VueWrapper, ...colours: string[]) {
  for (const [index, colour] of colours.entries()) await reader.get(`#marking-bands-colour-${index + 1}`).setValue(colour)
}
const withBands = async (usable = false) => {
  const reader = await mountSuspended(MarkingReader, { props: { usable } })
  await reader.get('input[value="bands"]').setValue(true)
  return reader
}

describe('the reader of markings', () => {
  it('reads picked colours once all are there, draws them and names them', async () => {
    const reader = await withBands()
    await pick(reader, 'yellow', 'violet', 'red')
    expect(answer(reader)).toBe('Choose every colour; they are read at once.')
    await pick(reader, 'yellow', 'violet', 'red', 'gold')
    expect(answer(reader)).toContain('4.7 kΩ ±5 %')
    expect(answer(reader)).toContain('4.7 kΩ is a preferred value of E24, the series of ±5 %.')
    expect(reader.get('svg[role="img"]').attributes('aria-label')).toBe('Resistor: yellow, violet, red, gold')
  })

  it('says which band can’t be, and reads it from the other end', async () => {
    const reader = await withBands()
    await pick(reader, 'gold', 'red', 'violet', 'yellow')
    expect(answer(reader)).toContain('Band 1 can’t be gold: it is a figure of the value, and gold stands for none. Read from the other end it is 4.7 kΩ ±5 %.')
    const turn = reader.findAll('button').find(button => button.text() === 'Turn it round')
    await turn?.trigger('click')
    expect(answer(reader)).not.toContain('can’t be')
    expect(answer(reader)).toContain('yellow, violet, red, gold: the bands in the order given.')
  })

  it('reads five bands and both ends', async () => {
    const reader = await withBands()
    await reader.get('input[name="marking-bands"][value="5"]').setValue(true)
    await pick(reader, 'red', 'red', 'black', 'brown', 'brown')
    expect(reader.findAll('li').map(item => plain(item.get('p').text()))).toEqual(['2.2 kΩ ±1 %', '11 kΩ ±2 %'])
  })

  it('reads body, end and dot without the other end', async () => {
    const reader = await mountSuspended(MarkingReader)
    await reader.get('input[value="body-end-dot"]').setValue(true)
    for (const [index, colour] of ['green', 'grey', 'red'].entries()) await reader.get(`#marking-body-end-dot-colour-${index + 1}`).setValue(colour)
    expect(answer(reader)).toContain('5.8 kΩ ±20 %')
  })

  it('reads what is typed, the known kind first, and says when it can’t', async () => {
    const reader = await mountSuspended(MarkingReader)
    await reader.get('#marking-text').setValue('4R7')
    expect(reader.findAll('li').map(item => plain(item.get('p').text()))).toEqual(['4.7 Ω', '4.7 pF'])
    await reader.get('#marking-kind').setValue('capacitor')
    expect(reader.findAll('li').map(item => plain(item.get('p').text()))).toEqual(['4.7 pF', '4.7 Ω'])
    await reader.get('#marking-text').setValue('hello')
    expect(answer(reader)).toContain('in none of the codes')
  })

  it('hands a value over to a form only where one takes it', async () => {
    const reader = await withBands(true)
    await pick(reader, 'yellow', 'violet', 'red', 'gold')
    const use = reader.findAll('button').find(button => button.text().startsWith('Use this'))
    await use?.trigger('click')
    expect(reader.emitted('use')).toEqual([[{ valueText: '4.7\u202FkΩ', tolerancePercent: 5, kind: 'resistor' }]])
    const alone = await withBands()
    await pick(alone, 'yellow', 'violet', 'red', 'gold')
    expect(alone.text()).not.toContain('Use this')
  })
})
