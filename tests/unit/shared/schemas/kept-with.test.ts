import { describe, expect, it } from 'vitest'
import { makeTag } from '../../../../shared/domain/tag'
import { toFieldErrors } from '../../../../shared/schemas/field-errors'
import { changedKeptWith, newKeptWith } from '../../../../shared/schemas/kept-with'

const place = makeTag('L', 7)
const item = { kind: 'lead', description: 'Output lead', originality: 'original', condition: '', whereabouts: 'with_unit', placeTag: '', absenceDisclosed: '' }

describe('what is asked of a kept-with item', () => {
  it('reads a place’s tag as it is typed', () => {
    expect(newKeptWith.parse({ ...item, whereabouts: 'elsewhere', placeTag: place.toLowerCase().split('').join(' ') }).placeTag).toBe(place)
  })

  it('asks where an item is that is elsewhere', () => {
    const parsed = newKeptWith.safeParse({ ...item, whereabouts: 'elsewhere' })
    expect(parsed.success ? [] : toFieldErrors(parsed.error)).toEqual([{ path: 'placeTag', message: 'Choose the place where it is' }])
  })

  it('drops what no longer applies', () => {
    expect(newKeptWith.parse({ ...item, placeTag: place, absenceDisclosed: 'Not with it' })).toMatchObject({ placeTag: null, absenceDisclosed: '' })
    expect(newKeptWith.parse({ ...item, whereabouts: 'missing', placeTag: place, absenceDisclosed: 'Not with it' })).toMatchObject({ placeTag: null, absenceDisclosed: 'Not with it' })
  })

  it('says each thing that is wrong, in the order of the form', () => {
    const parsed = newKeptWith.safeParse({})
    expect(parsed.success ? [] : toFieldErrors(parsed.error).map(({ message }) => message)).toEqual([
      'Choose what kind of thing it is', 'Enter what it is', 'Choose whether it is the original', 'Choose where it is now',
    ])
  })

  it.each([
    ['L000007X', /One character is off/],
    [makeTag('U', 7), /is the tag of a unit/],
    ['a'.repeat(10_000_000), /This is not a tag/],
    [{ toString: 1 }, /./],
  ])('refuses a place that is none', (placeTag, message) => {
    const parsed = newKeptWith.safeParse({ ...item, whereabouts: 'elsewhere', placeTag })
    expect(parsed.success ? '' : parsed.error.issues[0]?.message).toMatch(message)
  })

  it('takes a change only with the version it was made from', () => {
    expect(changedKeptWith.safeParse(item).success).toBe(false)
    expect(changedKeptWith.parse({ ...item, version: 3 })).toMatchObject({ version: 3, placeTag: null })
  })
})
