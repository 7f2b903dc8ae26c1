import { describe, expect, it } from 'vitest'
import { toFieldErrors } from '../../../../shared/schemas/field-errors'
import { newModification } from '../../../../shared/schemas/modification'

const minimum = { hand: 'done_by_us', before: 'Glass fuse, unknown', after: 'T500 mA fuse', reversibility: 'no_trace', disposition: 'discarded' }
const messages = (answers: Record<string, unknown>) => {
  const { error } = newModification.safeParse(answers)
  return error ? toFieldErrors(error) : []
}

describe('the questions of the work log', () => {
  it('takes the few answers that a phone is asked for', () => {
    expect(newModification.parse(minimum)).toMatchObject({ reason: 'not_known', minutes: null, doneOn: null, parts: '', removedPartsBag: '' })
  })

  it.each([['45', 45], ['45 min', 45], ['1 h 30', 90], ['2h', 120], ['1:05', 65], ['', null], [20, 20], [null, null]])('reads %s as minutes', (typed, minutes) => {
    expect(newModification.parse({ ...minimum, minutes: typed }).minutes).toBe(minutes)
  })

  it.each(['half an hour', '-3', '1.5', '1000000', 4.2, {}])('does not read %s as minutes', (typed) => {
    expect(messages({ ...minimum, minutes: typed })).toMatchObject([{ path: 'minutes' }])
  })

  it('names what is missing, in the words of the form', () => {
    expect(messages({})).toEqual([
      { path: 'hand', message: 'Choose who did it' },
      { path: 'disposition', message: 'Choose what became of the original parts' },
    ])
    expect(messages({ hand: 'done_by_us', disposition: 'discarded' }).map(error => error.message)).toEqual([
      'Enter what was there before', 'Enter what is there now', 'Choose whether it can be undone',
    ])
  })

  it('asks of what an earlier hand did only what can be seen', () => {
    expect(messages({ hand: 'found_like_this', after: 'Rear apron drilled', reversibility: 'not_reversible', disposition: 'not_known' })).toEqual([])
  })

  it('has nothing to undo in what was left alone', () => {
    expect(messages({ hand: 'left_alone', before: 'Original wax capacitors in the IF cans', disposition: 'nothing_removed' })).toEqual([])
    expect(messages({ hand: 'left_alone', before: '', reversibility: 're_solder', disposition: 'nothing_removed' }).map(error => error.path)).toEqual(['before', 'reversibility'])
  })

  it('takes work as able to change anything until somebody says what it touched, or why nothing', () => {
    expect(newModification.parse(minimum)).toMatchObject({ touches: null, affectsNothingBecause: null })
    expect(newModification.parse({ ...minimum, touches: [] })).toMatchObject({ touches: null })
    expect(newModification.parse({ ...minimum, touches: ['output', 'supply', 'output'] })).toMatchObject({ touches: ['supply', 'output'] })
    expect(newModification.parse({ ...minimum, affectsNothingBecause: ' A dial lamp ' })).toMatchObject({ affectsNothingBecause: 'A dial lamp' })
    expect(messages({ ...minimum, affectsNothingBecause: '  ' })).toEqual([{ path: 'affectsNothingBecause', message: 'Enter why it could not have changed what was measured' }])
    expect(messages({ ...minimum, touches: ['supply'], affectsNothingBecause: 'x' })).toMatchObject([{ path: 'touches' }])
    expect(messages({ ...minimum, touches: ['supply', 'nothing_measured'] })).toMatchObject([{ path: 'touches' }])
    expect(messages({ ...minimum, touches: ['gearbox'] })).toMatchObject([{ path: 'touches.0', message: 'Choose the parts from the list' }])
  })

  it('asks what work changed of ours alone, and reads its own answer again as the same', () => {
    const found = { hand: 'found_like_this', after: 'Rear apron drilled', reversibility: 'not_reversible', disposition: 'not_known' }
    expect(messages({ ...found, touches: ['supply'], affectsNothingBecause: 'x' }).map(error => error.path)).toEqual(['touches', 'affectsNothingBecause'])
    const said = newModification.parse({ ...minimum, touches: ['meter'] })
    expect(newModification.parse(said)).toEqual(said)
  })

  it('keeps a bag of removed parts only with the unit', () => {
    expect(messages({ ...minimum, removedPartsBag: 'Old fuse' })).toMatchObject([{ path: 'removedPartsBag' }])
  })

  it('takes emoji and right-to-left words, and refuses ten million of them', () => {
    expect(newModification.parse({ ...minimum, place: '  🔧 מקלט  ' }).place).toBe('🔧 מקלט')
    expect(messages({ ...minimum, after: 'x'.repeat(10_000_000) })).toMatchObject([{ path: 'after' }])
  })
})
