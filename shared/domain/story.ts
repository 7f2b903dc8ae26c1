/** The ledger in words: one plain sentence for each thing that can happen, with the lines that fill it in. */
import type { LedgerEvent } from './ledger-events'
import { COST_EVENTS, PARTY_EVENTS, PRICE_EVENTS } from './ledger-events'
import { formatMoney, isCurrencyCode } from './money'
import type { Role } from './roles'
import { may } from './roles'
import type { EntryDetails, Telling } from './story-fields'
import { capital, changeInWords, changesIn, fieldWords, labelOf, lineOf, listed, listIn, numberIn, tell, why, wordsIn } from './story-fields'
import { PART_TELLERS } from './story-parts'
import { formatTag } from './tag'

export type { Telling }
type Teller = (details: EntryDetails) => Telling

const MONTHS = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December']

/** `2026-11-09` as "9 November 2026"; other text unchanged. */
function dayInWords(iso: string): string {
  const parts = /^(\d{4})-(\d{2})-(\d{2})$/.exec(iso)
  const month = MONTHS[Number(parts?.[2]) - 1]
  return parts && month ? `${Number(parts[3])} ${month} ${parts[1]}` : iso
}

function moneyInWords(minor: number | null, currency: string): string {
  return minor === null || !isCurrencyCode(currency) ? 'no price' : formatMoney({ minor, currency })
}

/** An item with its tag: "Terminated output lead (K 000228 P)". */
const item = (details: EntryDetails) => [wordsIn(details, 'description'), tagged(details)].filter(Boolean).join(' ')
const tagged = (details: EntryDetails) => wordsIn(details, 'tag') && `(${formatTag(wordsIn(details, 'tag'))})`
const quoted = (state: string) => `“${labelOf('state', state)}”`
const photoOf = (details: EntryDetails) => labelOf('subject', wordsIn(details, 'subject')).toLowerCase()
const changeLines = (details: EntryDetails) => changesIn(details).map(changeInWords)

function changed(what: string, details: EntryDetails): Telling {
  const fields = changesIn(details).map(change => fieldWords(change.field))
  return tell(fields.length > 0 && fields.length <= 3 ? `Changed the ${listed(fields)} of ${what}` : `Changed ${what}`, changeLines(details))
}

function moved(details: EntryDetails): Telling {
  const from = formatTag(wordsIn(details, 'from'))
  const to = formatTag(wordsIn(details, 'to'))
  if (to === '') return tell(from === '' ? 'Taken off the shelf' : `Taken from ${from}`, why(details))
  return tell(from === '' ? `Put in ${to}` : `Moved from ${from} to ${to}`, why(details))
}

function triaged(details: EntryDetails): Telling {
  const hazards = listIn(details, 'hazards').map(hazard => labelOf('hazard', hazard))
  return tell(
    `Looked over before power: ${labelOf('verdict', wordsIn(details, 'verdict')).toLowerCase()}`,
    lineOf('Class', labelOf('safetyClass', wordsIn(details, 'safetyClass'))),
    [hazards.length > 0 ? `Hazards: ${listed(hazards)}` : 'No hazard seen'],
    lineOf('Note', wordsIn(details, 'note')),
  )
}

function logged(details: EntryDetails): Telling {
  const before = wordsIn(details, 'before')
  const after = wordsIn(details, 'after')
  const opening: Record<string, string> = { found_like_this: 'Noted what an earlier hand had done', left_alone: 'Left alone on purpose' }
  return tell(`${opening[wordsIn(details, 'hand')] ?? 'Logged work done'}: ${after || before || 'no words given'}`, after === '' ? [] : lineOf('What was there', before))
}

function signed(details: EntryDetails): Telling {
  const within = numberIn(details, 'within') ?? 0
  const outside = numberIn(details, 'outside') ?? 0
  const verdict = wordsIn(details, 'verdict').replaceAll('_', ' ')
  const points = within + outside
  return tell(
    `Signed test sheet ${wordsIn(details, 'sheetNumber')}${verdict === '' ? '' : `: ${verdict}`}`,
    [points === 0 ? 'No points read' : `${within} of ${points} points within tolerance${outside > 0 ? `, ${outside} outside` : ''}`],
  )
}

function disclosed(details: EntryDetails): Telling {
  const topic = labelOf('topic', wordsIn(details, 'key')).toLowerCase()
  const answer = wordsIn(details, 'answer')
  return answer === 'known'
    ? tell(`Wrote what the buyer is told about ${topic}`, [wordsIn(details, 'text')].filter(Boolean))
    : tell(`The buyer is told about ${topic}: ${labelOf('answer', answer)}`)
}

function priced(details: EntryDetails): Telling {
  const currency = wordsIn(details, 'currency')
  const from = numberIn(details, 'fromMinor')
  const to = numberIn(details, 'toMinor')
  if (to === null) return tell('Took the asking price off', from === null ? [] : [`It was ${moneyInWords(from, currency)}`])
  return tell(`${from === null ? 'Priced at' : 'Repriced at'} ${moneyInWords(to, currency)}`, from === null ? [] : [`It was ${moneyInWords(from, currency)}`])
}

function safetyChecked(details: EntryDetails): Telling {
  const verdict = wordsIn(details, 'verdict')
  const said: Record<string, string> = { pass: 'passed', passed: 'passed', fail: 'failed', failed: 'failed' }
  return tell(`Safety check: ${said[verdict] ?? (verdict || 'done')}`, lineOf('Note', wordsIn(details, 'note')))
}

const TELLERS: Record<LedgerEvent, Teller> = {
  ...PART_TELLERS,
  booked_in: details => tell(
    `Booked in: ${wordsIn(details, 'model')}`,
    lineOf('Serial', wordsIn(details, 'serial')),
    lineOf('Whose', labelOf('ownership', wordsIn(details, 'ownership'))),
    lineOf('From', labelOf('source', wordsIn(details, 'source'))),
    lineOf('Of its kit nobody looked for', listed(listIn(details, 'notLooked'))),
  ),
  edited: details => changed('the record', details),
  cost_changed: details => tell('Changed what it cost', changeLines(details)),
  moved,
  state_changed: details => tell(`Went from ${quoted(wordsIn(details, 'from'))} to ${quoted(wordsIn(details, 'to'))}`, why(details)),
  triaged,
  hazard_held: details => tell('Put on hazard hold', why(details)),
  hazard_lifted: details => tell('Hazard hold lifted', why(details)),
  not_energised_disclosed: (details) => {
    const text = wordsIn(details, 'text')
    return text === '' ? tell('No longer sold as untested, not to be energised') : tell('Disclosed as untested, not to be energised', [text])
  },
  modification_logged: logged,
  modification_corrected: details => tell('Corrected an entry in the work log', changeLines(details), why(details)),
  modification_withdrawn: details => tell('Withdrew an entry from the work log', lineOf('It said', wordsIn(details, 'summary')), why(details)),
  modification_unaffecting: details => tell('Judged that work changed nothing that was measured', lineOf('The work', wordsIn(details, 'summary')), why(details)),
  kept_with_added: details => tell(`Noted ${item(details)} as kept with it`),
  kept_with_changed: details => tell(`Changed what is noted of ${item(details)}`, changeLines(details)),
  kept_with_removed: details => tell(`Took ${item(details)} off what is kept with it`, why(details)),
  packed: details => tell(details.packed === false ? `Unpacked ${item(details)}` : `Packed ${item(details)}`),
  photo_added: details => tell(`Added a photo: ${photoOf(details)}`, [wordsIn(details, 'caption')].filter(Boolean)),
  photo_removed: details => tell(`Removed a photo: ${photoOf(details)}`, why(details)),
  document_added: details => tell(`Added a document: ${wordsIn(details, 'title')}`),
  document_removed: details => tell(`Removed a document: ${wordsIn(details, 'title')}`, why(details)),
  sheet_started: details => tell(`Started test sheet ${wordsIn(details, 'sheetNumber')}`),
  sheet_signed: signed,
  sheet_reopened: details => tell(`Reopened test sheet ${wordsIn(details, 'sheetNumber')}`, why(details), listIn(details, 'said')),
  safety_checked: safetyChecked,
  disclosed,
  priced,
  held: details => tell(`Held for ${wordsIn(details, 'heldFor')} until ${dayInWords(wordsIn(details, 'until'))}`),
  hold_released: details => tell(`The hold for ${wordsIn(details, 'heldFor')} ended`, why(details)),
  sold: details => tell(
    `Sold to ${wordsIn(details, 'buyer')} on ${dayInWords(wordsIn(details, 'soldOn'))}`,
    [`For ${moneyInWords(numberIn(details, 'priceMinor'), wordsIn(details, 'currency'))}`],
  ),
  sale_undone: details => tell('The sale was undone', why(details)),
  published: () => tell('Published its provenance sheet at a link of its own'),
  publication_revoked: details => tell('Took the link to its provenance sheet back', why(details)),
  label_printed: details => tell('Printed its label', lineOf('Sheet', wordsIn(details, 'sheet'))),
  coverage_changed: details => tell('What it covers was changed', lineOf('Was', wordsIn(details, 'from')), lineOf('Now', wordsIn(details, 'to'))),
  created: details => tell(`Added ${wordsIn(details, 'name')}`),
  changed: details => changed(wordsIn(details, 'name'), details),
  recalled: details => tell(`Recalled what ${wordsIn(details, 'name')} measured: it was found wrong on ${wordsIn(details, 'foundOn')}`, lineOf('Sheets', wordsIn(details, 'sheets')), why(details)),
  recall_closed: details => tell(`Closed recall ${wordsIn(details, 'number')} of ${wordsIn(details, 'name')}`),
  instrument_recalled: details => tell(`Called test sheet ${wordsIn(details, 'sheetNumber')} in question: ${wordsIn(details, 'instrument')} was found wrong`, why(details)),
  recall_decided: details => tell(`Decided of test sheet ${wordsIn(details, 'sheetNumber')}: ${wordsIn(details, 'outcome')}`, lineOf('Instrument', wordsIn(details, 'instrument')), lineOf('Note', wordsIn(details, 'note'))),
  calibrated: details => tell(
    `Entered the calibration of ${wordsIn(details, 'name')} of ${wordsIn(details, 'calibratedOn')}`,
    lineOf('Certificate', wordsIn(details, 'certificateNumber')), lineOf('Due', wordsIn(details, 'dueOn')),
  ),
  calibration_withdrawn: details => tell(`Took back the certificate of ${wordsIn(details, 'name')} of ${wordsIn(details, 'calibratedOn')}`, why(details)),
  procedure_saved: details => tell(`Saved version ${wordsIn(details, 'number')} of the procedure`, why(details)),
  retired: details => tell(`Retired ${wordsIn(details, 'name')}`, why(details)),
  signed_in: details => tell('Signed in', lineOf('From', wordsIn(details, 'from'))),
  role_changed: details => tell(
    `Changed the role of ${wordsIn(details, 'name')} from ${labelOf('role', wordsIn(details, 'from'))} to ${labelOf('role', wordsIn(details, 'to'))}`,
  ),
}

/** Every event the story can tell. */
export const TOLD_EVENTS: readonly string[] = Object.keys(TELLERS)
const isTold = (event: string): event is LedgerEvent => TOLD_EVENTS.includes(event)

/** One entry of the ledger in words. An event from a newer release is named rather than left out. */
export function tellEvent(event: string, details: EntryDetails): Telling {
  return isTold(event) ? TELLERS[event](details) : tell(capital(fieldWords(event)))
}

/** The events left out of the story for a role: those that hold money or names it may not see. */
export function eventsHiddenFrom(role: Role): LedgerEvent[] {
  return [
    ...may(role, 'cost.read') ? [] : COST_EVENTS,
    ...may(role, 'price.read') ? [] : PRICE_EVENTS,
    ...may(role, 'parties.read') ? [] : PARTY_EVENTS,
  ]
}
