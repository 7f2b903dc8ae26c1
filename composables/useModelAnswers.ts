import { formatFrequency } from '#shared/domain/frequency'
import type { ModelAnswers } from '#shared/schemas/model'
import type { ModelView } from '#shared/types/model'

/** A frequency as it may be typed again: ordinary spaces for the narrow ones. */
export const typedAgain = (hz: number) => formatFrequency(hz).replaceAll('\u202F', ' ')

/** An empty form. */
export function emptyModelAnswers(): ModelAnswers {
  return {
    maker: '', designation: '', kind: '', technology: '', yearsFrom: '', yearsTo: '', supply: '', summary: '', typicalHazards: [],
    dialTolerancePercent: '', modulationHz: '', bands: [], kit: [],
  }
}

/** A model as its form shows it. */
export function modelAnswersOf(model: ModelView): ModelAnswers {
  return {
    maker: model.maker,
    designation: model.designation,
    kind: model.kind,
    technology: model.technology ?? '',
    yearsFrom: String(model.yearsFrom ?? ''),
    yearsTo: String(model.yearsTo ?? ''),
    supply: model.supply,
    summary: model.summary,
    typicalHazards: [...model.typicalHazards],
    dialTolerancePercent: String(model.dialTolerancePercent ?? ''),
    modulationHz: model.modulationHz === null ? '' : typedAgain(model.modulationHz),
    bands: model.bands.map(band => ({
      label: band.label, function: band.function, lower: typedAgain(band.lowerHz), upper: typedAgain(band.upperHz), tolerance: String(band.dialTolerancePercent ?? ''),
    })),
    kit: model.kit.map(line => ({ ...line, quantity: String(line.quantity) })),
  }
}
