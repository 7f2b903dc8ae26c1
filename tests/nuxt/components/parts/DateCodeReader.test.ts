import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import DateCodeReader from '~/components/parts/DateCodeReader.vue'

describe('the reader of date codes', () => {
  it('decides the decade by the set and tells a newer part', async () => {
    const reader = await mountSuspended(DateCodeReader, { props: { made: { from: 1951, to: 1959 } } })
    await reader.get('#date-code-text').setValue('285642')
    expect(reader.get('[aria-live="polite"]').text()).toContain('week 42 of 1956')
    expect(reader.get('[aria-live="polite"]').text()).not.toContain('newer than the set')
    await reader.get('#date-code-text').setValue('190-7215')
    expect(reader.get('[aria-live="polite"]').text()).toContain('This part is newer than the set: it was made in 1972, 13 years after the last year the set was made (1959). It is a replacement.')
  })
  it('says what is wrong with the years', async () => {
    const reader = await mountSuspended(DateCodeReader)
    await reader.get('#date-code-from').setValue('1960')
    await reader.get('#date-code-to').setValue('1950')
    expect(reader.text()).toContain('The last year must not be before the first')
  })
})
