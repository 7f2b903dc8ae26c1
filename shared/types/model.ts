import type { EquipmentKind, Technology } from '../domain/equipment-kinds'
import type { CoverageFunction } from '../domain/functions'
import type { KeptWithKind } from '../domain/kept-with'
import type { Hazard } from '../domain/triage'

export interface BandView {
  label: string
  function: CoverageFunction
  lowerHz: number
  upperHz: number
  /** ± per cent of the setting, where it differs from the model's. */
  dialTolerancePercent: number | null
}

export interface KitItemView { id: string, kind: KeptWithKind, description: string, quantity: number }

/** A model as a list names it. */
export interface ModelName { id: string, maker: string, designation: string, kind: EquipmentKind, yearsFrom: number | null, yearsTo: number | null }

/** A model as a list shows it. */
export interface ModelSummary extends ModelName {
  technology: Technology | null
  bands: BandView[]
  /** How many units of it the shop has ever handled, and has now. */
  unitCount: number
  inStockCount: number
}

export interface ModelView extends ModelSummary {
  supply: string
  summary: string
  typicalHazards: Hazard[]
  dialTolerancePercent: number | null
  modulationHz: number | null
  kit: KitItemView[]
  version: number
}
