import type { NewFitting } from '../../shared/schemas/fitting'
import type { NewPartLot } from '../../shared/schemas/part-lot'
import type { NewModification } from '../../shared/schemas/modification'
import { newModification } from '../../shared/schemas/modification'
import { newPartLot } from '../../shared/schemas/part-lot'
import type { BreakUp } from '../../shared/schemas/break-up'
import { breakUp } from '../../shared/schemas/break-up'
import type { PartLotView } from '../../shared/types/part'
import type { Person } from '../../shared/types/person'
import { enterLot } from '../../server/services/part-lots'
import type { Database } from '../../server/utils/db'

type Typed = Record<string, unknown>

/** A lot as its form sends it: ten X2 capacitors of a supplier's invoice for £12.50, unless said otherwise. */
export const typedLot = (said: Typed = {}): NewPartLot => newPartLot.parse({
  type: { kind: 'capacitor', description: 'Suppression capacitor X2', value: '0.1 µF', rating: '275 V AC' },
  maker: 'Dielmark', dateCode: '2308', condition: 'new', sourceKind: 'supplier', supplierName: 'Distributor A', invoiceNumber: '88/114', acquiredOn: '2026-02-01',
  quantity: '10', cost: '12.50', ...said,
})

/** The same, entered in the book. */
export const makeLot = (db: Database, actor: Person, said: Typed = {}): Promise<PartLotView> => enterLot(db, actor, typedLot(said))

/** A part fitted, as the work log's form sends it. */
export const typedFitting = (lotTag: string | null, said: Typed = {}): Typed => ({ lotTag, circuitReference: 'C14', ...said })

/** Work of ours with the parts it took. */
export const typedWork = (fittings: Typed[] | NewFitting[], said: Typed = {}): NewModification => newModification.parse({
  hand: 'done_by_us', before: '0.1 µF wax-paper, cracked', after: '0.1 µF X2', reversibility: 're_solder', disposition: 'discarded', reason: 'safety', place: 'C14', fittings, ...said,
})

/** A unit broken for these parts. */
export const typedBreak = (version: number, parts: Typed[], said: Typed = {}): BreakUp => breakUp.parse({ version, why: 'Beyond economic repair', parts, ...said })
