import type { Disposition, Hand, Reversibility } from './modifications'
import { DISPOSITION_LABELS, HAND_SAID, REVERSIBILITY_SAID } from './modifications'

/** What the words of an entry are made from. */
export interface ModificationFacts {
  hand: Hand
  place: string
  before: string
  after: string
  reversibility: Reversibility | null
  disposition: Disposition
  dispositionNote: string
  testedAfter: string
}

/** An entry in one line: "C14: wax-paper capacitor → X2 film capacitor", "V1: original valve, left alone". */
export function modificationHeading({ hand, place, before, after }: Pick<ModificationFacts, 'hand' | 'place' | 'before' | 'after'>): string {
  const change = hand === 'left_alone' ? `${before}, left alone` : before ? `${before} → ${after}` : after
  return place ? `${place}: ${change}` : change
}

const OLD_PARTS: Record<Disposition, string> = {
  kept_with_unit: 'old parts kept with the unit',
  left_in_place: 'old parts left in place, out of circuit',
  returned_to_stock: 'old parts returned to stock',
  discarded: 'old parts discarded',
  not_known: 'old parts: not known',
  nothing_removed: '',
}

/** The rest of an entry, piece by piece: who, whether it can be undone, what became of the old parts, what was tested. */
export function modificationDetails(entry: ModificationFacts): string[] {
  const oldParts = OLD_PARTS[entry.disposition]
  return [
    HAND_SAID[entry.hand],
    entry.reversibility === null ? '' : REVERSIBILITY_SAID[entry.reversibility],
    entry.hand === 'left_alone' ? '' : entry.dispositionNote ? `${oldParts || DISPOSITION_LABELS[entry.disposition]} (${entry.dispositionNote})` : oldParts,
    entry.testedAfter ? `after: ${entry.testedAfter}` : '',
  ].filter(Boolean)
}
