import type { LedgerEvent } from './ledger-events'
import { formatMinutes } from './minutes'
import { COUNT_SETTLEMENT_LABELS, LOT_STANDING_LABELS, MOVEMENT_LABELS, PART_RECALL_BASIS_LABELS, PART_RECALL_OUTCOME_LABELS } from './part-lots'
import type { EntryDetails, Telling } from './story-fields'
import { lineOf, numberIn, tell, why, wordsIn } from './story-fields'
import { formatTag } from './tag'

/** The parts of the story that are about parts: lots, fittings, donors, recalls. */
type PartEvent = Extract<LedgerEvent, 'fitted' | 'fitting_undone' | `part_${string}` | `lot_${string}` | 'ceiling_set' | 'examined_inside'>

const labelled = (labels: Record<string, string>, value: string) => labels[value] ?? value
/** "3 × suppression capacitor (P 000004 X)" or, without a lot, "… (lot unknown)". */
function part(details: EntryDetails): string {
  const lot = wordsIn(details, 'lot')
  return `${wordsIn(details, 'quantity')} × ${wordsIn(details, 'description')} (${lot === '' ? 'lot unknown' : formatTag(lot)})`
}
const name = (details: EntryDetails) => wordsIn(details, 'name') || 'Part lot'
const at = (details: EntryDetails) => wordsIn(details, 'circuitReference') && ` at ${wordsIn(details, 'circuitReference')}`
const recall = (details: EntryDetails) => `recall of parts ${numberIn(details, 'recall') ?? numberIn(details, 'number') ?? ''}`
function minutes(details: EntryDetails, key: string): string {
  const number = numberIn(details, key)
  return number === null ? 'none' : formatMinutes(number)
}

/** How each is told. */
export const PART_TELLERS: Record<PartEvent, (details: EntryDetails) => Telling> = {
  fitted: details => tell(`Fitted ${part(details)}${at(details)}`),
  fitting_undone: details => tell(`Undid the fitting of ${part(details)}${at(details)}`, why(details)),
  part_pulled: details => tell(`Pulled ${part(details)}`),
  part_put_back: details => tell(`Put back ${part(details)}`, why(details)),
  ceiling_set: details => tell(`Set the ceiling of bench time: ${minutes(details, 'toMinutes')}`, lineOf('It was', minutes(details, 'fromMinutes'))),
  examined_inside: details => tell(wordsIn(details, 'on') === '' ? 'Noted that nobody has looked inside' : 'Looked inside', lineOf('How far', wordsIn(details, 'note'))),
  part_recalled: details => tell(`A part in it may be bad: ${recall(details)}`, lineOf('Parts', wordsIn(details, 'parts')), why(details)),
  part_recall_decided: details => tell(
    `Under ${recall(details)}: ${labelled(PART_RECALL_OUTCOME_LABELS, wordsIn(details, 'outcome')).toLowerCase()}`, lineOf('Note', wordsIn(details, 'note')),
  ),
  lot_received: details => tell(`${name(details)} came in: ${wordsIn(details, 'quantity')}`, lineOf('From', wordsIn(details, 'source'))),
  lot_moved_out: details => tell(
    `${name(details)}: ${wordsIn(details, 'quantity')} ${labelled(MOVEMENT_LABELS, wordsIn(details, 'how')).toLowerCase()}`, lineOf('Note', wordsIn(details, 'note')),
  ),
  lot_movement_undone: details => tell(
    `${name(details)}: took back that ${wordsIn(details, 'quantity')} were ${labelled(MOVEMENT_LABELS, wordsIn(details, 'how')).toLowerCase()}`, why(details),
  ),
  lot_split: details => tell(`${name(details)}: ${wordsIn(details, 'quantity')} became the lot ${formatTag(wordsIn(details, 'into'))}`, why(details)),
  lot_standing_changed: details => tell(
    `${name(details)} went from “${labelled(LOT_STANDING_LABELS, wordsIn(details, 'from'))}” to “${labelled(LOT_STANDING_LABELS, wordsIn(details, 'to'))}”`, why(details),
  ),
  lot_counted: details => tell(`${name(details)}: counted ${wordsIn(details, 'counted')}, the book said ${wordsIn(details, 'book')}`, lineOf('Note', wordsIn(details, 'note'))),
  lot_count_settled: details => tell(
    `${name(details)}: settled a difference of ${wordsIn(details, 'difference')}`,
    [labelled(COUNT_SETTLEMENT_LABELS, wordsIn(details, 'how'))], lineOf('Note', wordsIn(details, 'note')),
  ),
  part_recall_raised: details => tell(
    `Raised ${recall(details)}, by ${labelled(PART_RECALL_BASIS_LABELS, wordsIn(details, 'basis')).toLowerCase()}`, [`Units with such a part: ${numberIn(details, 'units') ?? 0}`], why(details),
  ),
  part_recall_closed: details => tell(`Closed ${recall(details)}`),
}
