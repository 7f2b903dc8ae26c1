import { SECTION_LABELS, SECTIONS, checkpointInWords } from '../../../shared/domain/checkpoint'
import type { Verdict } from '../../../shared/domain/decision'
import { VERDICT_LABELS } from '../../../shared/domain/decision'
import { errorInWords, limitInWords, nominalInWords, uncertaintyInWords } from '../../../shared/domain/result-words'
import { standing } from '../../../shared/domain/sheet-tally'
import type { ReadingView } from '../../../shared/types/bench'
import type { Cell, Column, Flow } from './flow'
import { PALETTE } from './palette'

export const VERDICT_COLOURS: Record<Verdict, string> = { pass: PALETTE.ink, conditional_pass: PALETTE.amber, conditional_fail: PALETTE.fault, fail: PALETTE.fault }

function verdictCell(verdict: Verdict | null, isRead: boolean): Cell {
  if (verdict === null) return isRead ? 'no limit' : 'not read'
  return { text: VERDICT_LABELS[verdict].toLowerCase(), weight: verdict === 'pass' ? undefined : 600, colour: VERDICT_COLOURS[verdict] }
}

function rowOf(reading: ReadingView, hasLeft: boolean): Cell[] {
  const result = standing(reading)?.result ?? null
  return [
    [reading.bandLabel, checkpointInWords(reading), nominalInWords(reading)].filter(Boolean).join(', '),
    limitInWords(reading.limit, reading.quantity),
    reading.found?.text ?? '–',
    ...hasLeft ? [reading.left?.text ?? ''] : [],
    result ? errorInWords(result, reading) : '',
    result?.uncertainty ? uncertaintyInWords(result, reading.quantity) : '',
    verdictCell(result?.judgement?.verdict ?? null, result !== null),
  ]
}

/** The readings of a sheet, a table for each part: limit, as found, as left, error, expanded uncertainty and verdict. */
export function drawReadings(flow: Flow, readings: readonly ReadingView[]): void {
  for (const section of SECTIONS) {
    const own = readings.filter(reading => reading.section === section)
    if (own.length === 0) continue
    const hasLeft = own.some(reading => reading.left !== null)
    const columns: Column[] = [
      { heading: section === 'dial' ? 'Dial set to' : SECTION_LABELS[section], share: 24 }, { heading: 'Limit', share: 15, align: 'right' },
      { heading: hasLeft ? 'As found' : 'Read', share: 15, align: 'right' }, ...hasLeft ? [{ heading: 'As left', share: 15, align: 'right' } as const] : [],
      { heading: 'Error', share: 13, align: 'right' }, { heading: 'U', share: 12, align: 'right' }, { heading: 'Verdict', share: 16 },
    ]
    flow.space(4)
    flow.table(columns, own.map(reading => rowOf(reading, hasLeft)))
  }
}
