import type { Disposition, Hand, Nature, Reason, Reversibility } from '#shared/domain/modifications'
import type { Path } from '#shared/domain/paths'
import type { ModificationView } from '#shared/types/modification'
import type { FittingAnswers } from './useFittingAnswers'
import { fittingsToSend } from './useFittingAnswers'

/** The answers of the work log's form, as typed. */
export interface ModificationAnswers {
  hand: Hand | ''
  before: string
  after: string
  reversibility: Reversibility | ''
  nature: Nature | ''
  disposition: Disposition | ''
  dispositionNote: string
  removedPartsBag: string
  reason: Reason
  place: string
  parts: string
  testedAfter: string
  minutes: string
  doneOn: string
  ownerConsent: string
  /** Whether it could have changed what was measured; only "no" asks for a reason. */
  couldAffect: 'yes' | 'no'
  touches: Path[]
  affectsNothingBecause: string
  /** Parts that a new entry takes out of the drawers. */
  fittings: FittingAnswers[]
}

export const noAnswers = (): ModificationAnswers => ({
  hand: '', before: '', after: '', reversibility: '', nature: '', disposition: '', dispositionNote: '', removedPartsBag: '', reason: 'not_known', place: '', parts: '',
  testedAfter: '', minutes: '', doneOn: '', ownerConsent: '', couldAffect: 'yes', touches: [], affectsNothingBecause: '', fittings: [],
})

/** An entry as the form shows it, to be corrected. */
export const answersOf = (entry: ModificationView): ModificationAnswers => ({
  ...noAnswers(), hand: entry.hand, before: entry.before, after: entry.after, reversibility: entry.reversibility ?? '', nature: entry.nature ?? '', disposition: entry.disposition,
  dispositionNote: entry.dispositionNote, reason: entry.reason, place: entry.place, parts: entry.parts, testedAfter: entry.testedAfter,
  minutes: entry.minutes === null ? '' : String(entry.minutes), doneOn: entry.doneOn ?? '', ownerConsent: entry.ownerConsent,
  couldAffect: entry.affectsNothingBecause === null ? 'yes' : 'no', touches: entry.touches ?? [], affectsNothingBecause: entry.affectsNothingBecause ?? '',
})

/** What is sent: questions that do not arise for this hand are left unanswered, whatever was chosen before. */
export function toSend({ couldAffect, ...answers }: ModificationAnswers) {
  const isLeft = answers.hand === 'left_alone'
  const isOurs = answers.hand === 'done_by_us'
  return {
    ...answers,
    touches: isOurs && couldAffect === 'yes' ? answers.touches : null,
    affectsNothingBecause: isOurs && couldAffect === 'no' ? answers.affectsNothingBecause : null,
    after: isLeft ? '' : answers.after,
    reversibility: isLeft ? '' : answers.reversibility,
    nature: isLeft ? '' : answers.nature,
    disposition: isLeft ? 'nothing_removed' : answers.disposition,
    fittings: isOurs ? fittingsToSend(answers.fittings) : [],
    removedPartsBag: answers.disposition === 'kept_with_unit' && !isLeft ? answers.removedPartsBag : '',
    reason: isLeft ? 'decision' : answers.reason,
    doneOn: answers.hand === 'found_like_this' ? '' : answers.doneOn,
  }
}

/**
 * The answers for one unit, kept on this device until they are saved: a closed lid or a lost connection loses nothing.
 */
export function useModificationDraft(tag: string) {
  const answers = ref(noAnswers())
  const restored = ref(false)
  const key = `knurl.log.${tag}`
  onMounted(() => {
    try {
      const kept: unknown = JSON.parse(localStorage.getItem(key) ?? 'null')
      if (kept && typeof kept === 'object') {
        answers.value = { ...noAnswers(), ...kept }
        restored.value = true
      }
    } catch {
      // Damaged, or storage is closed to us: the form begins empty.
    }
    watchDebounced(answers, () => {
      try {
        localStorage.setItem(key, JSON.stringify(answers.value))
      } catch {
        // Full, or closed to us: the page itself still holds the answers.
      }
    }, { deep: true, debounce: 250, maxWait: 1000 })
  })
  async function forget() {
    // After the pending write, which would bring it back.
    await new Promise(resolve => setTimeout(resolve, 300))
    localStorage.removeItem(key)
  }
  return { answers, restored, forget }
}
