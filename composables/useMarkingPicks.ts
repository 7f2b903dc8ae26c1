import type { Heard } from '#shared/domain/markings/marking-readers'
import { hearBands, hearBodyEndDot, hearDots } from '#shared/domain/markings/marking-readers'
import type { BandCount, Colour, Place } from '#shared/domain/markings/resistor-colours'
import { BAND_PLACES } from '#shared/domain/markings/resistor-colours'

export type PickLook = 'bands' | 'body-end-dot' | 'dots'
export interface PickPlace { label: string, none?: string }

const PLACE_WORDS: Record<Place, string> = { figure: 'figure', multiplier: 'multiplier', tolerance: 'tolerance', coefficient: 'temperature' }
const BODY_END_DOT: readonly PickPlace[] = [{ label: 'Body' }, { label: 'End' }, { label: 'Dot' }, { label: 'Other end', none: 'As the body' }]
const SIX_DOTS: readonly PickPlace[] = ['Top left', 'Top middle', 'Top right', 'Bottom right', 'Bottom middle', 'Bottom left'].map(label => ({ label }))

const isBandCount = (count: number): count is BandCount => count in BAND_PLACES

function placesOf(look: PickLook, count: number): readonly PickPlace[] {
  if (look === 'body-end-dot') return BODY_END_DOT
  if (look === 'dots') return count === 6 ? SIX_DOTS : Array.from({ length: count }, (_, index) => ({ label: `Dot ${index + 1}` }))
  return isBandCount(count) ? BAND_PLACES[count].map((place, index) => ({ label: `Band ${index + 1}: ${PLACE_WORDS[place]}` })) : []
}

/** Colours picked place by place, and what they say once every place that needs one has its colour. */
export function useMarkingPicks(look: Ref<PickLook>, count: Ref<number>) {
  /** Each look keeps its own: a body's colours say nothing about bands. */
  const picked = reactive<Record<PickLook, readonly (Colour | '')[]>>({ 'bands': [], 'body-end-dot': [], 'dots': [] })
  const places = computed(() => placesOf(look.value, count.value))
  const colours = computed({
    get: (): readonly (Colour | '')[] => places.value.map((_, index) => picked[look.value][index] ?? ''),
    set: (chosen) => { picked[look.value] = chosen },
  })
  const heard = computed<Heard | null>(() => {
    const isMissing = places.value.some(({ none }, index) => none === undefined && !colours.value[index])
    if (isMissing) return null
    const given = colours.value.filter(colour => colour !== '')
    return { 'bands': hearBands, 'body-end-dot': hearBodyEndDot, 'dots': hearDots }[look.value](given)
  })
  /** The same part, turned round on the bench. */
  function turnRound() {
    colours.value = [...colours.value].reverse()
  }
  return { places, colours, heard, turnRound }
}
