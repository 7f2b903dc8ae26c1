import type { Capability } from '../domain/accuracy'
import type { CalibrationState } from '../domain/calibration'
import type { Checkpoint, Section } from '../domain/checkpoint'
import type { DecisionRule } from '../domain/decision'
import type { Result } from '../domain/evaluation'
import type { Quantity } from '../domain/reading'
import type { SafetyReason } from '../domain/safety-check'
import type { CheckResult } from '../domain/sheet-checks'
import type { SheetTally } from '../domain/sheet-tally'
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

/** A certificate of an instrument's calibration. Days in the shop's zone. */
export interface CalibrationView {
  id: string
  calibratedOn: string | null
  dueOn: string | null
  certificateNumber: string
  laboratory: string
  /** Empty: it was checked against something, not calibrated. */
  traceableTo: string
  note: string
  /** Whether the certificate itself is kept as a PDF. */
  hasFile: boolean
  enteredBy: string | null
  withdrawnBecause: string | null
}

export interface InstrumentView {
  id: string
  tag: string
  name: string
  serial: string
  accuracy: string
  capabilities: Capability[]
  /** Of the certificate in force on the day; null where there is none. */
  calibratedOn: string | null
  calibrationDue: string | null
  certificate: CalibrationView | null
  /** As it stands today; on a sheet, as it stood on the day of the sitting. */
  calibration: CalibrationState
  retired: boolean
  version: number
}

/** One reading as typed and what follows from it. */
export interface TakenView { text: string, result: Result }

export interface ReadingView extends Checkpoint {
  id: string
  position: number
  /** Before anything was touched. */
  found: TakenView | null
  /** After adjustment; null where nothing was adjusted. */
  left: TakenView | null
  /** The instrument named for this reading; null: the best of the sheet's. */
  instrumentId: string | null
  note: string
  /** Photographs of the waveform. */
  photoIds: string[]
}

export interface DriftReadingView { minutes: number, text: string, value: number }
export interface DriftView { label: string, quantity: Quantity, readings: DriftReadingView[] }

/** The version of the model's procedure that a sheet was made with. */
export interface ProcedureName { number: number, origin: string }

export interface SheetCheckView { name: string, result: CheckResult, note: string }

/** Whether later work has overtaken a sheet. */
export interface StaleView {
  /** Later work could have changed what it measured: why; null if it still holds. */
  staleBecause: string | null
  /** That work, and the version under which it may be marked as affecting nothing; null if the sheet still holds. */
  staleWork: { id: string, version: number } | null
}

/** A sheet as the unit's page lists it. */
export interface TestSheetSummary extends StaleView {
  number: number
  testedOn: string
  testedBy: string
  signedAt: string | null
  /** Of the readings that stand (as left, else as found). */
  tally: SheetTally
  checksFailed: number
  /** `B 000003 T Counter`, as the sheet says; with "calibration overdue" where it was on the day. */
  instruments: string[]
  /** What is to be said wherever the sheet is shown of instruments overdue on the day or since, or found wrong. */
  instrumentWarnings: string[]
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
  procedure: ProcedureName | null
  deviations: string
  decisionRule: DecisionRule
  signedBy: string | null
  drift: DriftView
  instrumentList: InstrumentView[]
  readings: ReadingView[]
  checks: SheetCheckView[]
  safety: SafetyCheckView | null
  /** The signed sheets before this one, the newest first, to compare with. */
  earlier: EarlierSheet[]
  version: number
}

/** What an earlier sheet left behind at one checkpoint. */
export interface EarlierReading { section: Section, bandLabel: string, label: string, atHz: number | null, value: number, nominal: number | null, within: boolean | null }
export interface EarlierSheet { number: number, testedOn: string, readings: EarlierReading[] }

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
  /** The fuse that is fitted: "T 500 mA"; empty: not said. */
  fuseRating: string
  /** The reservoir capacitor, what stands on it and its bleeder; null: not looked at, or not there. */
  reservoirMicrofarad: number | null
  bleederKilohm: number | null
  reservoirVolts: number | null
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
  /** The fuse as the last triage found it; empty: not said. */
  fuseRating: string
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

/** An instrument as its own page shows it. */
export interface InstrumentPageView extends InstrumentView {
  /** The newest first; those withdrawn among them. */
  certificates: CalibrationView[]
}

/** A sheet that an instrument was used for. */
export interface InstrumentSheet { unitTag: string, unitName: string, state: UnitState, number: number, testedOn: string, isSigned: boolean, /** Readings put down to it. */ readings: number }
