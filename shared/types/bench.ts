import type { CalibrationState } from '../domain/calibration'
import type { SafetyReason } from '../domain/safety-check'
import type { CheckResult } from '../domain/sheet-checks'
import type { UnitState } from '../domain/unit-state-names'
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
  /** As it stands today; on a sheet, as it stood on the day of the sitting. */
  calibration: CalibrationState
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
  /** `B 000003 T Counter`, as the sheet says; with "calibration overdue" where it was on the day. */
  instruments: string[]
}

export interface TestSheetView extends TestSheetSummary {
  unitTag: string
  /** "Oxmarden 307-G". */
  unitName: string
  hazardHold: string | null
  /** Why nothing may be measured under power just now; null when it may. */
  powerRefusal: string | null
  warmUpMinutes: number | null
  supply: string
  ambientCelsius: number | null
  note: string
  instrumentList: InstrumentView[]
  readings: ReadingView[]
  checks: SheetCheckView[]
  safety: SafetyCheckView | null
  /** The signed sheet before this one that read the dial, to compare with. */
  earlier: EarlierSheet | null
  version: number
}

export interface EarlierSheet { number: number, testedOn: string, readings: ReadingView[] }

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
  /** What was checked against which limit, line by line. */
  reasons: SafetyReason[]
  note: string
  instrument: string | null
  /** The sheet of whose sitting it was a part. */
  sheetNumber: number | null
  doneBy: string
  doneAt: string
  /** False once later work or a later check has overtaken it. */
  current: boolean
}

/** What the form of a safety check starts from. */
export interface SafetyFormView {
  unitName: string
  safetyClass: SafetyClass | null
  /** Why nothing may be measured under power just now; null when it may. */
  powerRefusal: string | null
  limits: { earthBondMilliohm: number, insulationKilohm: number, leakageMicroamp: number }
  limitsOrigin: string
  latest: SafetyCheckView | null
}

/** A unit as the bench's queue names it. */
export interface BenchUnit {
  tag: string
  name: string
  serial: string | null
  state: UnitState
  hazardHold: string | null
  place: string | null
  /** Since when it waits, as the list it stands in means it. */
  since: string
  openSheets: number[]
}
export interface BenchSheet { unitTag: string, unitName: string, number: number, testedOn: string, testedBy: string, staleBecause: string | null }

/** A part of the queue: its first rows, and how many there are in all. */
export interface BenchList<Row> { items: Row[], total: number }
export interface BenchQueueView {
  awaitingTriage: BenchList<BenchUnit>
  hazardHolds: BenchList<BenchUnit>
  onBench: BenchList<BenchUnit>
  unsigned: BenchList<BenchSheet>
  stale: BenchList<BenchSheet>
  overdue: BenchList<InstrumentView>
}
