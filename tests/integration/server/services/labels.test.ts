import { eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { instruments, units } from '../../../../drizzle/schema'
import { addKeptWith } from '../../../../server/services/kept-with'
import { makeLabelPdf, noteLabelsPrinted, viewLabelSheet } from '../../../../server/services/labels'
import { listStory } from '../../../../server/services/story'
import { getTagged } from '../../../../server/services/tagged-things'
import { takeTag } from '../../../../server/services/tags'
import { findSheet, labelPosition, LABEL_SHEETS } from '../../../../shared/domain/label-stock'
import { formatTag, makeTag } from '../../../../shared/domain/tag'
import { labelQuery } from '../../../../shared/schemas/labels'
import type { Person } from '../../../../shared/types/person'
import { useTestDatabase } from '../../../support/database'
import { crop, decode, rasterise } from '../../../support/raster'
import { makeModel, makePerson, makePlace, makeShop, makeUnit } from '../../../support/records'

const DPI = 300
const BASE = 'https://knurl.example.org'
const PX = DPI / 25.4
/** The sheets on which every label is read; on the others, which differ little from these, a few. */
const READ_WHOLE = ['a4-3x8-63.5x33.9', 'a4-2x5-99.1x57', 'a4-4x10-48.5x25.4', 'a4-5x13-38.1x21.2', 'a4-5x16-35.6x16.9', 'letter-3x10-66.675x25.4', 'letter-4x15-44.45x16.92']
const NAMES: [string, string][] = [
  ['Oxmarden', '307-G'], ['Haldraven', 'Standard signal generator 6120-B, second version in the long case'], ['Гельлершоу', 'АО-12'],
  ['Ohmbarrow', 'LD-2 µΩ √2 ≥ 100'], ['Elettravenastrumentazioneelettronica', 'A60S'], ['Kuremori 久留森', 'FSG-711'], ['Zelwicz', 'PG-19 “Łódź”'],
]

describe('labels', () => {
  const database = useTestDatabase()
  let owner: Person
  const tags: string[] = []

  beforeAll(async () => {
    await makeShop(database.db)
    owner = await makePerson(database.db, 'owner')
    for (let round = 0; round < 3; round++) {
      for (const [maker, designation] of NAMES) {
        const model = await makeModel(database.db, { maker, designation: `${designation} ${round}` })
        const unit = await makeUnit(database.db, owner, { modelId: model.id, hazardHold: round === 1 ? 'Asbestos lead' : null })
        tags.push(unit.tag)
      }
    }
    const [first = ''] = tags
    const item = await addKeptWith(database.db, owner, {
      tag: first, kind: 'lead', description: 'Terminated output lead', originality: 'original', condition: '', whereabouts: 'with_unit', placeTag: null, absenceDisclosed: '',
    })
    const place = await makePlace(database.db, 'Long store')
    const counter = await database.db.transaction(async (tx) => {
      const tag = await takeTag(tx, 'B')
      await tx.insert(instruments).values({ tag, name: 'Counter', serial: '88' })
      return tag
    })
    tags.push(item.tag, place.tag, counter)
  })

  const query = (values: Record<string, string> = {}) => labelQuery.parse({ tags: tags.join(','), ...values })

  it.each(LABEL_SHEETS.map(({ key }) => key))('prints on %s what another decoder reads, every code of every label, where it should be', async (key) => {
    const sheet = findSheet(key)
    if (!sheet) throw new Error('No such sheet')
    const start = 3
    const read = READ_WHOLE.includes(key) ? tags : [...tags.slice(0, 3), ...tags.slice(-3)]
    const pages = await rasterise(await makeLabelPdf(database.db, query({ sheet: key, start: String(start), tags: read.join(',') }), BASE), DPI)
    const view = await viewLabelSheet(database.db, query({ sheet: key, tags: read.join(',') }), BASE)
    expect(pages).toHaveLength(Math.ceil((start - 1 + read.length) / (sheet.columns * sheet.rows)))
    expect(pages[0]?.width).toBeCloseTo(sheet.paperWidth * PX, -1)
    for (const [index, tag] of read.entries()) {
      const { page, x, y } = labelPosition(sheet, start - 1 + index)
      const image = pages[page]
      if (!image) throw new Error(`There is no page ${page}`)
      const [left, top] = [Math.round(x * PX), Math.round(y * PX)]
      const found = await decode(crop(image, left, top, Math.round(sheet.width * PX), Math.round(sheet.height * PX)))
      const hasBars = key !== 'a4-5x16-35.6x16.9'
      expect(found.map(({ format, text }) => `${format} ${text}`).sort(), tag)
        .toEqual([...hasBars ? [`Code128 ${tag}`] : [], `QRCode HTTPS://KNURL.EXAMPLE.ORG/S/${tag}`])
      // The upper left corner of the code, in millimetres from the label's, against the layout.
      const qr = found.find(({ format }) => format === 'QRCode')
      const zone = view.labels.find(label => label.tag === tag)?.drawing.qr
      if (qr && zone) {
        const quiet = 4 * zone.module
        expect(Math.abs((qr.position.topLeft.x + left) / PX - x - zone.zone[0] - quiet), `${tag} across`).toBeLessThan(0.2)
        expect(Math.abs((qr.position.topLeft.y + top) / PX - y - zone.zone[1] - quiet), `${tag} down`).toBeLessThan(0.2)
      }
    }
  }, 120_000)

  it('names the tag that stands for nothing, and the size that labels too small would need', async () => {
    const unknown = makeTag('U', 999_999)
    await expect(makeLabelPdf(database.db, labelQuery.parse({ tags: `${tags[0]},${unknown}` }), BASE))
      .rejects.toMatchObject({ statusCode: 404, message: expect.stringContaining(formatTag(unknown)) })
    await expect(makeLabelPdf(database.db, query({ sheet: 'a4-5x16-35.6x16.9' }), `https://${'long-name.'.repeat(12)}example.org`))
      .rejects.toMatchObject({ statusCode: 400, data: { code: 'label-too-small', detail: expect.stringMatching(/would need [\d.]+ × [\d.]+ mm/) } })
  })

  it('refuses a query it cannot print, saying what to put right', () => {
    const refusal = (values: Record<string, string>) => labelQuery.safeParse({ tags: tags[0], ...values }).error?.issues[0]?.message
    expect(refusal({ tags: `${tags[0]},U0000017` })).toContain('U0000017: One character is off')
    expect(refusal({ tags: ' , ' })).toBe('Choose at least one thing to label')
    expect(refusal({ start: '25' })).toBe('This sheet has 24 labels: start at one of them')
    expect(refusal({ start: '0' })).toBe('The start position must be 1 or more')
    expect(refusal({ sheet: 'banana' })).toContain('no such sheet')
    expect(refusal({ tags: Array.from({ length: 501 }, () => tags[0]).join(',') })).toContain('At most 500 tags')
    expect(refusal({ tags: Array.from({ length: 200 }, () => tags[0]).join(','), copies: '20' })).toContain('at most 2000')
  })

  it('shows on the screen the first sheet as it will print, and says what a small one leaves off', async () => {
    const view = await viewLabelSheet(database.db, query({ start: '5', copies: '2' }), BASE)
    expect(view).toMatchObject({ labelCount: tags.length * 2, pageCount: Math.ceil((4 + tags.length * 2) / 24), leftOut: null, pointsTo: 'knurl.example.org' })
    expect(view.labels.slice(0, 3).map(({ tag, place }) => [tag, place])).toEqual([[tags[0], 4], [tags[0], 5], [tags[1], 6]])
    expect(view.labels.at(-1)?.place).toBe(23)
    const small = await viewLabelSheet(database.db, query({ sheet: 'a4-5x16-35.6x16.9' }), BASE)
    expect(small.leftOut).toContain('no room for')
  })

  it('writes the printing into the story of each unit, and only there', async () => {
    const unit = await makeUnit(database.db, owner)
    const place = tags.find(tag => tag.startsWith('L')) ?? ''
    expect(await noteLabelsPrinted(database.db, owner, { tags: [unit.tag, place], sheet: 'a4-3x8-63.5x33.9' })).toEqual({ noted: 1 })
    const { items } = await listStory(database.db, owner, { tag: unit.tag, limit: 5 })
    expect(items[0]).toMatchObject({ event: 'label_printed', sentence: 'Printed its label', details: ['Sheet: A4, 3 × 8, 63.5 × 33.9 mm'] })
    const [row] = await database.db.select({ version: units.version }).from(units).where(eq(units.tag, unit.tag))
    expect(row?.version).toBe(1)
  })

  it('finds what any tag stands for, with the page to open', async () => {
    const [unit = ''] = tags
    const [item = '', place = '', counter = ''] = tags.slice(-3)
    expect(await getTagged(database.db, unit)).toMatchObject({ kind: 'U', title: 'Oxmarden 307-G 0', href: `/units/${unit}` })
    expect(await getTagged(database.db, item)).toMatchObject({ kind: 'K', title: 'Terminated output lead', href: `/units/${unit}`, subtitle: `with ${formatTag(unit)}` })
    expect(await getTagged(database.db, place)).toMatchObject({ kind: 'L', title: 'Long store', href: `/locations/${place}` })
    expect(await getTagged(database.db, counter)).toMatchObject({ kind: 'B', title: 'Counter', subtitle: 'serial 88', href: `/instruments/${counter}` })
    await expect(getTagged(database.db, makeTag('P', 1))).rejects.toMatchObject({ statusCode: 404, message: expect.stringContaining('part lot') })
  })
})
