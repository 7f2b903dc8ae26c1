import type { LotCondition, LotSource, PartKind } from '#shared/domain/part-lots'
import type { CountedIn } from '#shared/domain/part-quantity'
import type { PartLotView } from '#shared/types/part'

/** What a part is, as typed. */
export interface TypeAnswers { kind: PartKind | '', description: string, value: string, tolerance: string, rating: string, package: string, countedIn: CountedIn }
export const noTypeAnswers = (): TypeAnswers => ({ kind: '', description: '', value: '', tolerance: '', rating: '', package: '', countedIn: 'piece' })

/** The answers of a lot's form, as typed. */
export interface LotAnswers {
  type: TypeAnswers
  maker: string
  dateCode: string
  madeFrom: string
  madeTo: string
  condition: LotCondition | ''
  tested: string
  note: string
  placeTag: string
  sourceKind: LotSource | ''
  supplierName: string
  invoiceNumber: string
  acquiredOn: string
  parentTag: string
  quantity: string
  cost: string
}

export const noLotAnswers = (today: string): LotAnswers => ({
  type: noTypeAnswers(), maker: '', dateCode: '', madeFrom: '', madeTo: '', condition: '', tested: '', note: '', placeTag: '',
  sourceKind: '', supplierName: '', invoiceNumber: '', acquiredOn: today, parentTag: '', quantity: '', cost: '',
})

/** A lot as its form shows it, to be changed. What came in, and its cost, are corrected apart. */
export const lotAnswersOf = (lot: PartLotView): LotAnswers => ({
  ...noLotAnswers(lot.acquiredOn),
  type: { kind: lot.type.kind, description: lot.type.description, value: lot.type.value, tolerance: lot.type.tolerance, rating: lot.type.rating, package: lot.type.package, countedIn: lot.type.countedIn },
  maker: lot.maker, dateCode: lot.dateCode, madeFrom: lot.madeFrom ?? '', madeTo: lot.madeTo ?? '', condition: lot.condition, tested: lot.tested, note: lot.note,
  placeTag: lot.place?.tag ?? '', sourceKind: lot.sourceKind, supplierName: lot.supplier ?? '', invoiceNumber: lot.invoiceNumber ?? '', parentTag: lot.parent?.tag ?? '',
})
