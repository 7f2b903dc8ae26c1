import { EQUIPMENT_KIND_LABELS, TECHNOLOGY_LABELS } from '../../shared/domain/equipment-kinds'
import { formatFrequency, formatFrequencyRange } from '../../shared/domain/frequency'
import { FUNCTION_LABELS } from '../../shared/domain/functions'
import { KEPT_WITH_KIND_LABELS } from '../../shared/domain/kept-with'
import { HAZARD_LABELS } from '../../shared/domain/triage'
import type { BandView, KitItemView, ModelView } from '../../shared/types/model'

type Described = Pick<ModelView, 'maker' | 'designation' | 'kind' | 'technology' | 'yearsFrom' | 'yearsTo' | 'supply' | 'summary' | 'typicalHazards' | 'dialTolerancePercent' | 'modulationHz'>
  & { bands: BandView[], kit: Omit<KitItemView, 'id'>[] }

const percent = (value: number | null) => value === null ? '' : `±${value} %`

const bandInWords = (band: BandView) =>
  [`${band.label} ${FUNCTION_LABELS[band.function].toLowerCase()} ${formatFrequencyRange(band.lowerHz, band.upperHz)}`, percent(band.dialTolerancePercent)].filter(Boolean).join(' ')

const kitInWords = ({ kind, description, quantity }: Omit<KitItemView, 'id'>) =>
  `${quantity > 1 ? `${quantity} × ` : ''}${description} (${KEPT_WITH_KIND_LABELS[kind].toLowerCase()})`

/** A model's specification as the ledger tells its changes: the field as people say it, and what it says. */
export function describeModel(model: Described): Record<string, string> {
  return {
    'maker': model.maker,
    'type': model.designation,
    'kind of equipment': EQUIPMENT_KIND_LABELS[model.kind],
    'technology': model.technology ? TECHNOLOGY_LABELS[model.technology] : '',
    'first year made': String(model.yearsFrom ?? ''),
    'last year made': String(model.yearsTo ?? ''),
    'supply': model.supply,
    'summary': model.summary,
    'typical hazards': model.typicalHazards.map(hazard => HAZARD_LABELS[hazard]).join(', '),
    'dial tolerance': percent(model.dialTolerancePercent),
    'modulation tone': model.modulationHz === null ? '' : formatFrequency(model.modulationHz),
    'bands': model.bands.map(bandInWords).join('; '),
    'kit': model.kit.map(kitInWords).join('; '),
  }
}
