import { and, desc, eq, lt, or } from 'drizzle-orm'
import { z } from 'zod'
import { calibrations, files, models, readings, testSheetInstruments, testSheets, units } from '../../drizzle/schema'
import type { NewCalibration } from '../../shared/schemas/instrument'
import type { InstrumentPageView, InstrumentSheet } from '../../shared/types/bench'
import type { Page } from '../../shared/types/page'
import { readCursor, writeCursor } from '../utils/cursor'
import type { Database } from '../utils/db'
import { conflict, notFound } from '../utils/errors'
import type { FileStore } from '../utils/file-store'
import { inspectPdf } from '../utils/pdf-file'
import { hashBytes, storeThenWrite } from './files'
import { getInstrumentRecord, insertCalibration, lockInstrument, toInstrumentView } from './instruments'
import type { Actor } from './ledger'
import { appendLedger } from './ledger'
import { todayInShop } from './shop-day'

const certificateKey = (fileId: string) => `certificates/${fileId}.pdf`
const noSuchCertificate = () => notFound('There is no such certificate.', 'no-such-certificate')

/** An instrument with every certificate, the newest first; 404 if there is none such. */
export async function getInstrumentPage(db: Database, tag: string): Promise<InstrumentPageView> {
  const record = await getInstrumentRecord(db, tag)
  return { ...toInstrumentView(record, await todayInShop(db)), certificates: [...record.certificates].reverse() }
}

/** Enters a certificate; the instrument's calibration follows from its newest. 409 if it is retired, 422 for a day to come. */
export async function addCalibration(db: Database, actor: Actor, { tag, ...input }: NewCalibration & { tag: string }): Promise<InstrumentPageView & { addedId: string }> {
  return db.transaction(async (tx) => {
    const { row } = await lockInstrument(tx, tag, null)
    const addedId = await insertCalibration(tx, actor, row.id, input, null)
    await appendLedger(tx, actor, { kind: 'instrument', id: row.id }, 'calibrated', {
      name: row.name, calibratedOn: input.calibratedOn, dueOn: input.dueOn, certificateNumber: input.certificateNumber,
    })
    return { ...await getInstrumentPage(tx, tag), addedId }
  })
}

interface CertificateAddress { tag: string, id: string }

async function lockCertificate(tx: Database, { tag, id }: CertificateAddress) {
  const { row } = await lockInstrument(tx, tag, null)
  const [certificate] = await tx.select().from(calibrations).where(and(eq(calibrations.id, id), eq(calibrations.instrumentId, row.id)))
  if (!certificate) throw noSuchCertificate()
  return { instrument: row, certificate }
}

/** Takes a certificate back and says why; what was judged by it while it stood stays as it was signed. 409 if it is withdrawn already. */
export async function withdrawCalibration(db: Database, actor: Actor, { why, ...address }: CertificateAddress & { why: string }): Promise<InstrumentPageView> {
  return db.transaction(async (tx) => {
    const { instrument, certificate } = await lockCertificate(tx, address)
    if (certificate.withdrawnAt) throw conflict('withdrawn', 'This certificate was withdrawn already.')
    await tx.update(calibrations).set({ withdrawnAt: new Date(), withdrawnBecause: why }).where(eq(calibrations.id, certificate.id))
    await appendLedger(tx, actor, { kind: 'instrument', id: instrument.id }, 'calibration_withdrawn', { name: instrument.name, calibratedOn: certificate.calibratedOn, why })
    return getInstrumentPage(tx, address.tag)
  })
}

/**
 * Keeps the certificate itself, as a PDF judged by its content. Throws 413 when it is too large, 415 when it is no PDF, 422
 * when it is damaged; 409 if the certificate has its PDF already.
 */
export async function attachCertificate(db: Database, store: FileStore, actor: Actor, { name, bytes, ...address }: CertificateAddress & { name: string, bytes: Uint8Array }): Promise<InstrumentPageView> {
  await inspectPdf(bytes)
  return storeThenWrite(store, fileId => [{ key: certificateKey(fileId), bytes }], fileId => db.transaction(async (tx) => {
    const { certificate } = await lockCertificate(tx, address)
    if (certificate.fileId) throw conflict('has-file', 'This certificate has its PDF already.')
    await tx.insert(files).values({ id: fileId, kind: 'document', name, mediaType: 'application/pdf', byteSize: bytes.byteLength, sha256: hashBytes(bytes), addedBy: actor.id })
    await tx.update(calibrations).set({ fileId }).where(eq(calibrations.id, certificate.id))
    return { keep: true, result: await getInstrumentPage(tx, address.tag) }
  }))
}

/** The bytes of a certificate and what it is called; 404 if there is none. */
export async function readCertificate(db: Database, store: FileStore, { tag, id }: CertificateAddress): Promise<{ name: string, bytes: Buffer }> {
  const { row } = await getInstrumentRecord(db, tag)
  const [found] = await db.select({ id: files.id, name: files.name }).from(calibrations).innerJoin(files, eq(files.id, calibrations.fileId))
    .where(and(eq(calibrations.id, id), eq(calibrations.instrumentId, row.id)))
  const bytes = found && await store.get(certificateKey(found.id))
  if (!found || !bytes) throw noSuchCertificate()
  return { name: found.name, bytes }
}

const cursorShape = z.tuple([z.string(), z.string()])

/** The sheets that an instrument was used for, in stock and sold, the newest first. */
export async function listSheetsMadeWith(db: Database, tag: string, { limit, cursor }: { limit: number, cursor?: string }): Promise<Page<InstrumentSheet>> {
  const { row } = await getInstrumentRecord(db, tag)
  const [day, id] = cursor === undefined ? [undefined, undefined] : readCursor(cursor, cursorShape)
  const before = day === undefined || id === undefined ? undefined : or(lt(testSheets.testedOn, day), and(eq(testSheets.testedOn, day), lt(testSheets.id, id)))
  const rows = await db.select({
    id: testSheets.id, unitTag: units.tag, maker: models.maker, designation: models.designation, state: units.state, number: testSheets.number, testedOn: testSheets.testedOn,
    signedAt: testSheets.signedAt, readings: db.$count(readings, and(eq(readings.sheetId, testSheets.id), eq(readings.instrumentId, row.id))),
  }).from(testSheetInstruments)
    .innerJoin(testSheets, eq(testSheets.id, testSheetInstruments.sheetId)).innerJoin(units, eq(units.id, testSheets.unitId)).innerJoin(models, eq(models.id, units.modelId))
    .where(and(eq(testSheetInstruments.instrumentId, row.id), before)).orderBy(desc(testSheets.testedOn), desc(testSheets.id)).limit(limit + 1)
  const last = rows.length > limit ? rows[limit - 1] : undefined
  return {
    items: rows.slice(0, limit).map(({ unitTag, maker, designation, state, number, testedOn, signedAt, readings: readCount }) =>
      ({ unitTag, unitName: `${maker} ${designation}`, state, number, testedOn, isSigned: signedAt !== null, readings: readCount })),
    nextCursor: last ? writeCursor([last.testedOn, last.id]) : null,
  }
}
