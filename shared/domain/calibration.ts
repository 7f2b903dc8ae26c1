/** How the calibration of a bench instrument stands on a day. Days are `2026-11-30`, in the shop's zone. */
export const CALIBRATION_STATES = ['not_recorded', 'in_date', 'overdue'] as const
export type CalibrationState = (typeof CALIBRATION_STATES)[number]

export const CALIBRATION_STATE_LABELS: Record<CalibrationState, string> = {
  not_recorded: 'No calibration recorded',
  in_date: 'Calibration in date',
  overdue: 'Calibration overdue',
}

/** In date up to and including the day it is due. Calibrated without a due day counts as in date; no day at all as not recorded. */
export function calibrationState({ calibratedOn, calibrationDue }: { calibratedOn: string | null, calibrationDue: string | null }, day: string): CalibrationState {
  if (calibrationDue !== null && calibrationDue < day) return 'overdue'
  return calibratedOn === null ? 'not_recorded' : 'in_date'
}
