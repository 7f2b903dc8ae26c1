import type { Disposition } from '#shared/domain/modifications'
import type { PartKind } from '#shared/domain/part-lots'

/** One part fitted, as the work log's form asks it. */
export interface FittingAnswers {
  /** Of this line of the form alone; never sent. */
  key: number
  isLotUnknown: boolean
  lotTag: string
  description: string
  quantity: string
  circuitReference: string
  replaced: string
  replacesFittingId: string
  disposition: Disposition
  oldPartKind: PartKind | ''
}

let last = 0
export const noFitting = (said: Partial<FittingAnswers> = {}): FittingAnswers => ({
  key: ++last, isLotUnknown: false, lotTag: '', description: '', quantity: '1', circuitReference: '', replaced: '', replacesFittingId: '', disposition: 'discarded', oldPartKind: '', ...said,
})

/** What is sent of the parts fitted: either a lot or words, and nothing of an old part that was not there. */
export const fittingsToSend = (fittings: readonly FittingAnswers[]) => fittings.map(({ key: _key, isLotUnknown, ...answers }) => ({
  ...answers,
  lotTag: isLotUnknown ? '' : answers.lotTag,
  description: isLotUnknown ? answers.description : '',
  oldPartKind: answers.disposition === 'returned_to_stock' && answers.replacesFittingId === '' ? answers.oldPartKind : '',
}))
