import { z } from 'zod'
import { DECISION_RULES } from '../domain/decision'
import { QUANTITIES } from '../domain/reading'
import { CHECK_RESULTS } from '../domain/sheet-checks'
import type { SheetDraft } from '../domain/sheet-draft'

const reading = z.object({ found: z.string(), left: z.string(), instrumentId: z.string(), note: z.string() })

const keptDraft = z.object({
  testedOn: z.string(), warmUpMinutes: z.string(), supply: z.string(), ambientCelsius: z.string(), note: z.string(), deviations: z.string(),
  decisionRule: z.enum(DECISION_RULES), guardFactor: z.string(),
  instrumentIds: z.array(z.string()),
  readings: z.record(z.string(), reading),
  checks: z.array(z.object({ name: z.string(), result: z.enum(CHECK_RESULTS), note: z.string() })),
  drift: z.object({ label: z.string(), quantity: z.enum(QUANTITIES), readings: z.array(z.object({ minutes: z.string(), text: z.string() })) }),
})

/** A draft kept by a browser, read back: null unless it is whole. Points that the sheet no longer has are left out. */
export function readKeptDraft(kept: unknown, like: SheetDraft): SheetDraft | null {
  const read = keptDraft.safeParse(kept)
  if (!read.success) return null
  const readings = Object.fromEntries(Object.entries(like.readings).map(([position, fresh]) => [position, read.data.readings[position] ?? fresh]))
  return { ...read.data, readings }
}
