import type { CheckResult } from '../domain/sheet-checks'
import type { FittingCondition, Hazard, SafetyClass, TriageVerdict } from '../domain/triage'

export interface TriageView {
  safetyClass: SafetyClass
  lead: FittingCondition
  plug: FittingCondition
  fuse: FittingCondition
  fuseRating: string
  voltageSetting: string
  hazards: Hazard[]
  note: string
  verdict: TriageVerdict
  doneBy: string
  doneAt: string
}

export interface InstrumentView {
  id: string
  tag: string
  name: string
  serial: string
  accuracy: string
  calibratedOn: string | null
  calibrationDue: string | null
  calibrationNote: string
  retired: boolean
  version: number
}

export interface ReadingView {
  position: number
  bandLabel: string
  settingHz: number
  tolerancePercent: number
  readingText: string | null
  readingHz: number | null
  /** Per cent of the setting; null while not read. */
  errorPercent: number | null
  within: boolean | null
  instrumentId: string | null
  note: string
}

export interface SheetCheckView { name: string, result: CheckResult, note: string }

/** A sheet as the unit's page lists it. */
export interface TestSheetSummary {
  number: number
  testedOn: string
  testedBy: string
  signedAt: string | null
  /** Later work could have changed what it measured: why; null if it still holds. */
  staleBecause: string | null
  readCount: number
  withinCount: number
  outsideCount: number
  checksFailed: number
  /** `B 000003 T Counter`, as the sheet says. */
  instruments: string[]
}

export interface TestSheetView extends TestSheetSummary {
  unitTag: string
  warmUpMinutes: number | null
  supply: string
  ambientCelsius: number | null
  note: string
  instrumentList: InstrumentView[]
  readings: ReadingView[]
  checks: SheetCheckView[]
  safety: SafetyCheckView | null
  version: number
}

export interface SafetyCheckView {
  id: string
  safetyClass: SafetyClass
  earthBondMilliohm: number | null
  insulationKilohm: number | null
  insulationTestVolts: number | null
  leakageMicroamp: number | null
  leadAndPlug: CheckResult
  fuse: CheckResult
  polarity: CheckResult
  visual: CheckResult
  earthBondLimitMilliohm: number
  insulationLimitKilohm: number
  leakageLimitMicroamp: number
  limitsOrigin: string
  passed: boolean
  note: string
  instrument: string | null
  doneBy: string
  doneAt: string
  /** False once later work or a later check has overtaken it. */
  current: boolean
}
