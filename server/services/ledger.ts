import { ledger } from '../../drizzle/schema'
import type { LedgerDetails, LedgerEvent, LedgerSubject } from '../../shared/domain/ledger-events'
import type { Database } from '../utils/db'

/** Whoever causes a write: a person, or the product itself (a hold that lapsed) as null. */
export interface Actor { id: string }

interface Subject { kind: LedgerSubject, id: string }

/** Appends what happened to anything, inside the transaction that did it. */
export async function appendLedger<E extends LedgerEvent>(
  tx: Database, actor: Actor | null, subject: Subject, event: E, details: LedgerDetails[E],
): Promise<void> {
  await tx.insert(ledger).values({
    subject: subject.kind, subjectId: subject.id, unitId: subject.kind === 'unit' ? subject.id : null,
    event, details: { ...details }, personId: actor?.id ?? null,
  })
}

/** Appends what happened to a unit. */
export async function appendUnitLedger<E extends LedgerEvent>(
  tx: Database, actor: Actor | null, unitId: string, event: E, details: LedgerDetails[E],
): Promise<void> {
  await appendLedger(tx, actor, { kind: 'unit', id: unitId }, event, details)
}
