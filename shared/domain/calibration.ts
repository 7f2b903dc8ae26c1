/** How the calibration of a bench instrument stands on a day. Days are `2026-11-30`, in the shop's zone. */
export const CALIBRATION_STATES = ['not_recorded', 'in_date', 'overdue'] as const
export type CalibrationState = (typeof CALIBRATION_STATES)[number]

export const CALIBRATION_STATE_LABELS: Record<CalibrationState, string> = {
  not_recorded: 'No calibration recorded',
  in_date: 'Calibration in date',
  overdue: 'Calibration overdue',
}

/** A certificate, as far as its days go. No day of calibration: it has been in force as long as is known. */
export interface CalibrationDays { calibratedOn: string | null, dueOn: string | null }

/** The certificate in force on a day: the newest given on or before it; null if there was none. */
export function calibrationOn<Certificate extends CalibrationDays>(certificates: readonly Certificate[], day: string): Certificate | null {
  return certificates.reduce<Certificate | null>((newest, each) =>
    (each.calibratedOn ?? '') <= day && (newest === null || (each.calibratedOn ?? '') >= (newest.calibratedOn ?? '')) ? each : newest, null)
}

/** In date up to and including the day it is due. Calibrated without a due day counts as in date; no certificate at all as not recorded. */
export function calibrationState(certificate: CalibrationDays | null, day: string): CalibrationState {
  if (certificate === null) return 'not_recorded'
  if (certificate.dueOn !== null && certificate.dueOn < day) return 'overdue'
  return certificate.calibratedOn === null ? 'not_recorded' : 'in_date'
}
