import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import CoverageRuler from '~/components/stock/CoverageRuler.vue'
import CoverageStrip from '~/components/stock/CoverageStrip.vue'
import type { BandView } from '#shared/types/model'

const band = (label: string, lowerHz: number, upperHz: number, of: BandView['function'] = 'generates'): BandView =>
  ({ label, function: of, lowerHz, upperHz, dialTolerancePercent: null })
const BANDS = [band('A', 100_000, 320_000), band('B', 320_000, 1_000_000), band('C', 1_000_000, 3_200_000)]

describe('the coverage ruler', () => {
  it('is a picture with every band in its text alternative, and the coverage in words beneath', async () => {
    const ruler = await mountSuspended(CoverageRuler, { props: { bands: BANDS } })
    const picture = ruler.get('[role="img"]')
    expect(picture.attributes('aria-label')).toBe('Generates: A 100–320\u202FkHz, B 320–1\u202F000\u202FkHz, C 1–3.2\u202FMHz.')
    expect(ruler.text()).toContain('Generates 100\u202FkHz to 3.2\u202FMHz in three bands, no gaps.')
  })

  it('names ITU-R V.431 bands and decades', async () => {
    const ruler = await mountSuspended(CoverageRuler, { props: { bands: BANDS } })
    const words = ruler.findAll('text').map(text => text.text())
    expect(words).toEqual(expect.arrayContaining(['AUDIO', 'LF', 'MF', 'HF', 'VHF', 'UHF', '10', '1\u202FM', '1\u202FG']))
  })

  it('heads each function when there is more than one, and marks DC', async () => {
    const ruler = await mountSuspended(CoverageRuler, { props: { bands: [...BANDS, band('Y', 0, 50_000_000, 'measures')] } })
    expect(ruler.findAll('p.engraved').map(heading => heading.text())).toEqual(['Generates', 'Measures'])
    expect(ruler.get('text.dc').text()).toBe('DC')
  })

  it('says so when a model has no bands', async () => {
    const ruler = await mountSuspended(CoverageRuler, { props: { bands: [] } })
    expect(ruler.text()).toBe('No bands are recorded for this model.')
    expect(ruler.find('[role="img"]').exists()).toBe(false)
  })
})

describe('the coverage strip', () => {
  it('says the coverage in words', async () => {
    const strip = await mountSuspended(CoverageStrip, { props: { bands: BANDS } })
    expect(strip.get('[role="img"]').attributes('aria-label')).toBe('100\u202FkHz to 3.2\u202FMHz in three bands, no gaps')
  })
})
