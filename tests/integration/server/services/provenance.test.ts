import { and, eq } from 'drizzle-orm'
import sharp from 'sharp'
import { createStorage } from 'unstorage'
import { beforeAll, describe, expect, it } from 'vitest'
import { ledger, publications, unitDisclosures } from '../../../../drizzle/schema'
import { answerDisclosures, missingDisclosures } from '../../../../server/services/disclosures'
import { addPhoto, readFrozenPhoto, removePhoto } from '../../../../server/services/photos'
import { buildProvenanceSheet, describeForBuyer, getPublicSheet } from '../../../../server/services/provenance'
import { makeProvenancePdf } from '../../../../server/services/provenance-pdf'
import { findPublication, publishUnit, revokePublication } from '../../../../server/services/publications'
import { fileStoreOn } from '../../../../server/utils/file-store'
import { DISCLOSURE_KEYS } from '../../../../shared/domain/disclosures'
import type { DisclosureAnswers } from '../../../../shared/schemas/disclosure'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { makePerson, makeShop, makeUnit } from '../../../support/records'

const test = useTestDatabase()
let owner: Person
beforeAll(async () => {
  await makeShop(test.db)
  owner = await makePerson(test.db, 'owner', 'Odile')
})

const allUnknown = (version = 0): DisclosureAnswers => ({ answers: DISCLOSURE_KEYS.map(key => ({ key, answer: 'not_known' as const, text: '', version })) })

describe('answerDisclosures', () => {
  it('keeps "not known" as an answer and leaves nothing missing', async () => {
    const unit = await makeUnit(test.db, owner)
    expect(await missingDisclosures(test.db, unit.id)).toHaveLength(DISCLOSURE_KEYS.length)
    await answerDisclosures(test.db, owner, unit.tag, allUnknown())
    expect(await missingDisclosures(test.db, unit.id)).toEqual([])
  })

  it('refuses the second of two people who opened the form together, and writes none of theirs', async () => {
    const unit = await makeUnit(test.db, owner)
    const first = { answers: [{ key: 'terms' as const, answer: 'known' as const, text: 'As seen', version: 0 }] }
    await answerDisclosures(test.db, owner, unit.tag, first)
    const second = { answers: [{ key: 'behaviour' as const, answer: 'not_looked' as const, text: '', version: 0 }, { ...first.answers[0], key: 'terms' as const, answer: 'known' as const, text: 'Ninety days', version: 0 }] }
    await expect(answerDisclosures(test.db, owner, unit.tag, second)).rejects.toMatchObject({ statusCode: 409, data: { code: 'stale' } })
    const rows = await test.db.select().from(unitDisclosures).where(eq(unitDisclosures.unitId, unit.id))
    expect(rows.map(row => [row.key, row.text])).toEqual([['terms', 'As seen']])
  })

  it('puts each changed answer in the ledger, and an unchanged one not', async () => {
    const unit = await makeUnit(test.db, owner)
    await answerDisclosures(test.db, owner, unit.tag, allUnknown())
    await answerDisclosures(test.db, owner, unit.tag, allUnknown(1))
    const entries = await test.db.select().from(ledger).where(and(eq(ledger.unitId, unit.id), eq(ledger.event, 'disclosed')))
    expect(entries).toHaveLength(DISCLOSURE_KEYS.length)
  })
})

describe('publishUnit', () => {
  it('refuses while something a buyer must be told is unanswered, naming it', async () => {
    const unit = await makeUnit(test.db, owner)
    const { answers } = allUnknown()
    await answerDisclosures(test.db, owner, unit.tag, { answers: answers.filter(entry => entry.key !== 'supply') })
    await expect(publishUnit(test.db, owner, unit.tag)).rejects.toMatchObject({
      statusCode: 409, data: { code: 'disclosures-missing', detail: 'A buyer must still be told: Supply.' },
    })
    expect(await findPublication(test.db, unit.id)).toBeNull()
  })

  it('gives one link however many publish at once, and none once it is taken back', async () => {
    const unit = await makeUnit(test.db, owner)
    await answerDisclosures(test.db, owner, unit.tag, allUnknown())
    const made = await Promise.all(Array.from({ length: 5 }, () => publishUnit(test.db, owner, unit.tag)))
    const [token = ''] = new Set(made.map(each => each.token))
    expect(new Set(made.map(each => each.token)).size).toBe(1)
    // 192 bits in base64url: ASVS 5.0.0 11.5.1 asks for at least 128 from a secure source.
    expect(token).toMatch(/^[\w-]{32}$/)
    expect((await getPublicSheet(test.db, token)).tag).toBe(unit.tag)
    await revokePublication(test.db, owner, unit.tag, 'sent to the wrong person')
    await expect(getPublicSheet(test.db, token)).rejects.toMatchObject({ statusCode: 404 })
    const again = await publishUnit(test.db, owner, unit.tag)
    expect(again.token).not.toBe(token)
    expect(await test.db.$count(publications, eq(publications.unitId, unit.id))).toBe(2)
  })

  it('tells the buyer no cost, no shelf and nobody’s name', async () => {
    const unit = await makeUnit(test.db, owner, { costMinor: 123_45, costCurrency: 'GBP', conditionNotes: 'bought from Odile' })
    await answerDisclosures(test.db, owner, unit.tag, allUnknown())
    const { token } = await publishUnit(test.db, owner, unit.tag)
    const text = JSON.stringify(await getPublicSheet(test.db, token))
    for (const secret of ['12345', '123.45', 'Odile', 'bought from']) expect(text).not.toContain(secret)
  })
})

describe('a frozen sheet', () => {
  it('still shows and prints a photo that was taken off after the sale', async () => {
    const store = fileStoreOn(createStorage())
    const unit = await makeUnit(test.db, owner)
    const bytes = await sharp({ create: { width: 400, height: 300, channels: 3, background: '#2f5d50' } }).jpeg().toBuffer()
    const photo = await addPhoto(test.db, store, owner, { tag: unit.tag, name: 'front.jpg', bytes, subject: 'front', caption: '' })
    const sheet = await buildProvenanceSheet(test.db, unit.id)
    await removePhoto(test.db, owner, { id: photo.id, why: 'glare' })
    expect((await buildProvenanceSheet(test.db, unit.id)).photos).toEqual([])
    expect(sheet.photos.map(each => each.id)).toEqual([photo.id])
    expect((await readFrozenPhoto(test.db, store, photo.id, 320, 'webp')).byteLength).toBeGreaterThan(100)
    expect((await makeProvenancePdf(test.db, store, sheet, null)).subarray(0, 5).toString()).toBe('%PDF-')
  })
})

describe('describeForBuyer', () => {
  it('offers what the record says beside each topic', async () => {
    const unit = await makeUnit(test.db, owner)
    const topics = await describeForBuyer(test.db, unit.id)
    expect(topics.map(topic => topic.key)).toEqual([...DISCLOSURE_KEYS])
    expect(topics.find(topic => topic.key === 'changes')?.fromRecord).toBe('No changes seen or made; the work log is empty.')
    expect(topics.find(topic => topic.key === 'tests')?.fromRecord).toBe('')
  })
})
