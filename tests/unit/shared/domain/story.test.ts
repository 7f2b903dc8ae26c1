import { describe, expect, it } from 'vitest'
import type { LedgerDetails, LedgerEvent } from '../../../../shared/domain/ledger-events'
import { eventsHiddenFrom, tellEvent, TOLD_EVENTS } from '../../../../shared/domain/story'

/** One entry of every event, as the services write them, and what a person reads. */
const SAMPLES: { [E in LedgerEvent]: { details: LedgerDetails[E], sentence: string, lines?: string[] } } = {
  booked_in: {
    details: { model: 'Oxmarden 307-G', serial: '4417', ownership: 'bought', source: 'club_sale' },
    sentence: 'Booked in: Oxmarden 307-G',
    lines: ['Serial: 4417', 'Whose: Bought', 'From: Club sale or rally table'],
  },
  edited: {
    details: { changes: [{ field: 'serial', from: '4417', to: '4471' }, { field: 'supplyAsSet', from: null, to: '240 V' }] },
    sentence: 'Changed the serial number and supply as set of the record',
    lines: ['Serial number: was 4417, now 4471', 'Supply as set: now 240 V'],
  },
  cost_changed: { details: { changes: [{ field: 'cost', from: '£45.00', to: null }] }, sentence: 'Changed what it cost', lines: ['Cost: was £45.00, now empty'] },
  moved: { details: { from: 'Long store · 3', to: 'Bench room', why: 'For triage' }, sentence: 'Moved from Long store · 3 to Bench room', lines: ['Why: For triage'] },
  state_changed: { details: { from: 'intake', to: 'bench', why: 'Next in line' }, sentence: 'Went from “Intake” to “On the bench”', lines: ['Why: Next in line'] },
  triaged: {
    details: { verdict: 'hazard_hold', safetyClass: 'earthed', hazards: ['selenium', 'radium'], note: 'Dial glows' },
    sentence: 'Looked over before power: hazard hold',
    lines: ['Class: Earthed (Class I)', expect.stringMatching(/^Hazards: Selenium rectifier and /), 'Note: Dial glows'],
  },
  hazard_held: { details: { why: 'Asbestos pad' }, sentence: 'Put on hazard hold', lines: ['Why: Asbestos pad'] },
  hazard_lifted: { details: { why: 'Pad removed by a licensed firm' }, sentence: 'Hazard hold lifted', lines: ['Why: Pad removed by a licensed firm'] },
  not_energised_disclosed: { details: { text: 'Sold untested.' }, sentence: 'Disclosed as untested, not to be energised', lines: ['Sold untested.'] },
  modification_logged: {
    details: { modificationId: 'm', hand: 'done_by_us', before: 'Perished lead', after: 'Three-core lead, chassis earthed' },
    sentence: 'Logged work done: Three-core lead, chassis earthed',
    lines: ['What was there: Perished lead'],
  },
  modification_corrected: {
    details: { modificationId: 'm', changes: [{ field: 'reversibility', from: 're_solder', to: 'no_trace' }], why: 'Looked again' },
    sentence: 'Corrected an entry in the work log',
    lines: ['Whether it can be undone: was Re-solder, now No trace', 'Why: Looked again'],
  },
  modification_unaffecting: {
    details: { modificationId: 'm', summary: 'Knob: pointer missing → replica', why: 'A knob' },
    sentence: 'Judged that work changed nothing that was measured', lines: ['The work: Knob: pointer missing → replica', 'Why: A knob'],
  },
  modification_withdrawn: { details: { modificationId: 'm', summary: 'New lead', why: 'Wrong unit' }, sentence: 'Withdrew an entry from the work log', lines: ['It said: New lead', 'Why: Wrong unit'] },
  kept_with_added: { details: { tag: 'K0000019', description: 'Dummy aerial' }, sentence: 'Noted Dummy aerial (K 000001 9) as kept with it' },
  kept_with_changed: {
    details: { tag: 'K0000019', description: 'Dummy aerial', changes: [{ field: 'where it is', from: 'With the unit', to: 'Missing' }] },
    sentence: 'Changed what is noted of Dummy aerial (K 000001 9)',
    lines: ['Where it is: was With the unit, now Missing'],
  },
  kept_with_removed: { details: { tag: 'K0000019', description: 'Dummy aerial', why: 'Belongs to another' }, sentence: 'Took Dummy aerial (K 000001 9) off what is kept with it', lines: ['Why: Belongs to another'] },
  packed: { details: { tag: 'K0000019', description: 'Dummy aerial', packed: true }, sentence: 'Packed Dummy aerial (K 000001 9)' },
  photo_added: { details: { photoId: 'p', subject: 'rear', caption: 'Added socket' }, sentence: 'Added a photo: rear', lines: ['Added socket'] },
  photo_removed: { details: { photoId: 'p', subject: 'rear', why: 'Blurred' }, sentence: 'Removed a photo: rear', lines: ['Why: Blurred'] },
  document_added: { details: { documentId: 'd', title: 'Handbook' }, sentence: 'Added a document: Handbook' },
  document_removed: { details: { documentId: 'd', title: 'Handbook', why: 'Other model' }, sentence: 'Removed a document: Handbook', lines: ['Why: Other model'] },
  sheet_started: { details: { sheetNumber: 2 }, sentence: 'Started test sheet 2' },
  sheet_signed: { details: { sheetNumber: 2, verdict: 'fail', within: 14, outside: 1 }, sentence: 'Signed test sheet 2: fail', lines: ['14 of 15 points within tolerance, 1 outside'] },
  sheet_reopened: { details: { sheetNumber: 2, why: 'Typing error' }, sentence: 'Reopened test sheet 2', lines: ['Why: Typing error'] },
  safety_checked: { details: { verdict: 'pass', note: 'Earth bond 60 mΩ' }, sentence: 'Safety check: passed', lines: ['Note: Earth bond 60 mΩ'] },
  disclosed: { details: { key: 'cosmetic_rear', answer: 'not_looked', text: null }, sentence: 'The buyer is told about rear: not looked' },
  priced: { details: { fromMinor: 12_000, toMinor: 14_500, currency: 'GBP' }, sentence: 'Repriced at £145.00', lines: ['It was £120.00'] },
  held: { details: { heldFor: 'Mr Pell', until: '2026-11-09' }, sentence: 'Held for Mr Pell until 9 November 2026' },
  hold_released: { details: { heldFor: 'Mr Pell', why: 'The hold lapsed' }, sentence: 'The hold for Mr Pell ended', lines: ['Why: The hold lapsed'] },
  sold: { details: { buyer: 'Mr Pell', priceMinor: 14_500, currency: 'GBP', soldOn: '2026-11-09' }, sentence: 'Sold to Mr Pell on 9 November 2026', lines: ['For £145.00'] },
  sale_undone: { details: { why: 'Arrived broken' }, sentence: 'The sale was undone', lines: ['Why: Arrived broken'] },
  published: { details: { token: 'secret-token' }, sentence: 'Published its provenance sheet at a link of its own' },
  publication_revoked: { details: { why: 'Sold' }, sentence: 'Took the link to its provenance sheet back', lines: ['Why: Sold'] },
  label_printed: { details: { sheet: 'A4, 3 × 8' }, sentence: 'Printed its label', lines: ['Sheet: A4, 3 × 8'] },
  coverage_changed: { details: { from: '100 kHz to 1 MHz', to: '100 kHz to 32 MHz' }, sentence: 'What it covers was changed', lines: ['Was: 100 kHz to 1 MHz', 'Now: 100 kHz to 32 MHz'] },
  created: { details: { name: 'Long store' }, sentence: 'Added Long store' },
  changed: { details: { name: 'Long store', changes: [{ field: 'note', from: null, to: 'Damp' }] }, sentence: 'Changed the note of Long store', lines: ['Note: now Damp'] },
  procedure_saved: { details: { number: 2, checkpoints: 15, why: 'Table 5 was misread' }, sentence: 'Saved version 2 of the procedure', lines: ['Why: Table 5 was misread'] },
  recalled: { details: { name: 'Counter', number: 1, foundOn: '2026-11-01', why: '4 ppm high', sheets: 12 }, sentence: 'Recalled what Counter measured: it was found wrong on 2026-11-01', lines: ['Sheets: 12', 'Why: 4 ppm high'] },
  recall_closed: { details: { name: 'Counter', number: 1 }, sentence: 'Closed recall 1 of Counter' },
  instrument_recalled: { details: { sheetNumber: 2, instrument: 'Counter', why: '4 ppm high' }, sentence: 'Called test sheet 2 in question: Counter was found wrong', lines: ['Why: 4 ppm high'] },
  recall_decided: { details: { sheetNumber: 2, instrument: 'Counter', outcome: 'The sheet stands as it is', note: 'Far from its limits' }, sentence: 'Decided of test sheet 2: The sheet stands as it is', lines: ['Instrument: Counter', 'Note: Far from its limits'] },
  calibrated: { details: { name: 'Counter', calibratedOn: '2026-01-10', dueOn: '2027-01-10', certificateNumber: 'WCL 88' }, sentence: 'Entered the calibration of Counter of 2026-01-10', lines: ['Certificate: WCL 88', 'Due: 2027-01-10'] },
  calibration_withdrawn: { details: { name: 'Counter', calibratedOn: '2026-01-10', why: 'Of another counter' }, sentence: 'Took back the certificate of Counter of 2026-01-10', lines: ['Why: Of another counter'] },
  retired: { details: { name: 'Old shed', why: 'Sold' }, sentence: 'Retired Old shed', lines: ['Why: Sold'] },
  signed_in: { details: { from: 'A phone' }, sentence: 'Signed in', lines: ['From: A phone'] },
  fitted: { details: { fittingId: 'f', lot: 'P0000014', description: 'Suppression capacitor', quantity: '1', circuitReference: 'C14' }, sentence: 'Fitted 1 × Suppression capacitor (P 000001 4) at C14' },
  fitting_undone: { details: { fittingId: 'f', lot: null, description: 'Lamp', quantity: '2', circuitReference: '', why: 'Wrong set' }, sentence: 'Undid the fitting of 2 × Lamp (lot unknown)', lines: ['Why: Wrong set'] },
  part_pulled: { details: { lot: 'P0000014', description: 'Meter movement', quantity: '1' }, sentence: 'Pulled 1 × Meter movement (P 000001 4)' },
  part_put_back: { details: { lot: 'P0000014', description: 'Meter movement', quantity: '1', why: 'Not broken after all' }, sentence: 'Put back 1 × Meter movement (P 000001 4)', lines: ['Why: Not broken after all'] },
  ceiling_set: { details: { fromMinutes: null, toMinutes: 240 }, sentence: 'Set the ceiling of bench time: 4\u202Fh', lines: ['It was: none'] },
  examined_inside: { details: { on: '2026-11-01', note: 'Chassis out' }, sentence: 'Looked inside', lines: ['How far: Chassis out'] },
  part_recalled: { details: { recall: 3, parts: 'Suppression capacitor (P 000001 4)', why: 'Cracked' }, sentence: 'A part in it may be bad: recall of parts 3', lines: ['Parts: Suppression capacitor (P 000001 4)', 'Why: Cracked'] },
  part_recall_decided: { details: { recall: 3, outcome: 'replaced', note: 'X2 fitted' }, sentence: 'Under recall of parts 3: replaced', lines: ['Note: X2 fitted'] },
  lot_received: { details: { name: 'Fuse lamp', quantity: '40', source: 'Old shop stock' }, sentence: 'Fuse lamp came in: 40', lines: ['From: Old shop stock'] },
  lot_moved_out: { details: { name: 'Fuse lamp', how: 'scrapped', quantity: '2', note: 'Open' }, sentence: 'Fuse lamp: 2 scrapped', lines: ['Note: Open'] },
  lot_movement_undone: { details: { name: 'Fuse lamp', how: 'scrapped', quantity: '2', why: 'Sound after all' }, sentence: 'Fuse lamp: took back that 2 were scrapped', lines: ['Why: Sound after all'] },
  lot_split: { details: { name: 'Output valve', into: 'P0000014', quantity: '2', why: 'A matched pair' }, sentence: 'Output valve: 2 became the lot P 000001 4', lines: ['Why: A matched pair'] },
  lot_standing_changed: { details: { name: 'Output valve', from: 'good', to: 'quarantined', why: '3 of 8 gassy' }, sentence: 'Output valve went from “Good” to “In quarantine”', lines: ['Why: 3 of 8 gassy'] },
  lot_counted: { details: { name: 'Fuse lamp', counted: '37', book: '38', note: '' }, sentence: 'Fuse lamp: counted 37, the book said 38' },
  lot_count_settled: { details: { name: 'Fuse lamp', difference: '−1', how: 'lost', note: '' }, sentence: 'Fuse lamp: settled a difference of −1', lines: ['Lost: nobody knows where'] },
  part_recall_raised: { details: { number: 3, basis: 'lot', why: 'Cracked', units: 2 }, sentence: 'Raised recall of parts 3, by one lot', lines: ['Units with such a part: 2', 'Why: Cracked'] },
  part_recall_closed: { details: { number: 3 }, sentence: 'Closed recall of parts 3' },
  role_changed: { details: { name: 'Ada', from: 'floor', to: 'bench' }, sentence: 'Changed the role of Ada from Floor to Bench' },
}

describe('the story of a unit', () => {
  it.each(Object.entries(SAMPLES))('tells %s in plain words', (event, { details, sentence, lines = [] }) => {
    expect(tellEvent(event, { ...details })).toEqual({ sentence, details: lines })
  })

  it('has words for every event, and a sample of each is told here', () => {
    expect([...TOLD_EVENTS].sort()).toEqual(Object.keys(SAMPLES).sort())
  })

  it.each(TOLD_EVENTS)('tells %s even when the entry remembers nothing, as an older one may', (event) => {
    const { sentence, details } = tellEvent(event, {})
    expect([sentence, ...details].join(' ')).not.toMatch(/undefined|null|NaN|\[object/)
    expect(sentence).toMatch(/^\p{Lu}/u)
  })

  it('never tells the secret of a link', () => {
    expect(JSON.stringify(tellEvent('published', { token: 'secret-token' }))).not.toContain('secret-token')
  })

  it.each([
    [{ from: null, to: 'Bench room' }, 'Put in Bench room'],
    [{ from: 'Bench room', to: null }, 'Taken from Bench room'],
    [{ from: 'L0000010', to: 'L0000028' }, 'Moved from L 000001 0 to L 000002 8'],
  ])('tells where it was put: %j', (details, sentence) => {
    expect(tellEvent('moved', details).sentence).toBe(sentence)
  })

  it.each([
    ['found_like_this', 'Noted what an earlier hand had done: Hole drilled'],
    ['left_alone', 'Left alone on purpose: Hole drilled'],
  ])('keeps an earlier hand and a decision apart from our work: %s', (hand, sentence) => {
    expect(tellEvent('modification_logged', { hand, before: 'Hole drilled', after: '' }).sentence).toBe(sentence)
  })

  it('names an event it does not know rather than leaving it out', () => {
    expect(tellEvent('polished_by_hand', {})).toEqual({ sentence: 'Polished by hand', details: [] })
  })

  it('says how many things changed without listing them in the sentence when there are many', () => {
    const changes = ['a', 'b', 'c', 'd'].map(field => ({ field, from: null, to: 'x' }))
    expect(tellEvent('edited', { changes }).sentence).toBe('Changed the record')
  })
})

describe('what the story leaves out for a role', () => {
  it.each([
    ['owner', []],
    ['bench', []],
    ['floor', ['cost_changed', 'sold', 'held', 'hold_released']],
    ['reader', ['cost_changed', 'priced', 'sold', 'held', 'hold_released']],
  ] as const)('%s', (role, hidden) => {
    expect(eventsHiddenFrom(role)).toEqual(hidden)
  })
})
