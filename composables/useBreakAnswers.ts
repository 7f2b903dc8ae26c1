import type { LotStanding } from '#shared/domain/part-lots'

/** One line of parts pulled from a donor, as typed. */
export interface PulledAnswers {
  /** Of this line of the form alone; never sent. */
  key: number
  type: TypeAnswers
  quantity: string
  maker: string
  dateCode: string
  tested: string
  standing: LotStanding
  standingBecause: string
  fromFittingId: string
  placeTag: string
  worth: string
  share: string
}

let last = 0
export const noPulled = (): PulledAnswers => ({
  key: ++last, type: noTypeAnswers(), quantity: '1', maker: '', dateCode: '', tested: '', standing: 'good', standingBecause: '', fromFittingId: '', placeTag: '', worth: '', share: '',
})
