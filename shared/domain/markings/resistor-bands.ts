/** The colours that mark a value: the colour code of `resistor-colours.ts` the other way round. */
import { formatAmount } from '../amount'
import { NARROW_SPACE } from '../frequency'
import type { Colour } from './resistor-colours'
import { COLOUR_MEANINGS, COLOURS, TOLERANCE_WITHOUT_BAND } from './resistor-colours'

export type BandsWritten = { ok: true, bands: readonly Colour[] } | { ok: false, sentence: string }

const refuse = (sentence: string): BandsWritten => ({ ok: false, sentence })
const figureColours = (digits: string): Colour[] => [...digits].flatMap(digit => COLOURS[Number(digit)] ?? [])
const multiplierColour = (power: number): Colour | undefined => COLOURS.find(colour => COLOUR_MEANINGS[colour].power === power)
const toleranceColour = (percent: number): Colour | undefined => COLOURS.find(colour => COLOUR_MEANINGS[colour].tolerance === percent && !COLOUR_MEANINGS[colour].doubt)
const coefficientColour = (ppm: number): Colour | undefined => COLOURS.find(colour => COLOUR_MEANINGS[colour].ppm === ppm)

/** The value as so many figures and a power of ten; null where it has more figures. */
function inFigures(ohms: number, figures: number): { digits: string, power: number } | null {
  const [mantissa = '', exponent = '0'] = ohms.toExponential(figures - 1).split('e')
  const digits = mantissa.replace('.', '')
  const power = Number(exponent) - figures + 1
  return Math.abs(Number(`${digits}e${power}`) - ohms) <= ohms * 1e-9 ? { digits, power } : null
}

/** The colours of the value, with as many figures as it needs: three for close parts, where the multiplier allows. */
function valueColours(ohms: number, wanted: readonly number[]): Colour[] | null {
  for (const figures of wanted) {
    const value = inFigures(ohms, figures)
    const multiplier = value && multiplierColour(value.power)
    if (value && multiplier) return [...figureColours(value.digits), multiplier]
  }
  return null
}

/**
 * The bands of a value in ohms and its tolerance in ± per cent: three bands for 20 %, four as far as 5 %, five for closer parts and
 * for three figures, six with a temperature coefficient in ppm/K. Refused with a sentence: what the code has no colours for,
 * and ±0.05, ±0.02 and ±0.01 %, on which the editions of IEC 60062 differ.
 */
export function writeBands(ohms: number, tolerancePercent: number, ppmPerKelvin: number | null = null): BandsWritten {
  if (ohms === 0) return refuse(`A bridge of 0${NARROW_SPACE}Ω has one black band and no tolerance.`)
  if (!(ohms > 0 && Number.isFinite(ohms))) return refuse('A resistance must be above 0.')
  const close = tolerancePercent <= 2
  const tolerance = toleranceColour(tolerancePercent)
  if (!tolerance && tolerancePercent !== TOLERANCE_WITHOUT_BAND) return refuse(`No colour that all charts agree on stands for ±${tolerancePercent}${NARROW_SPACE}%.`)
  const coefficient = ppmPerKelvin === null ? null : coefficientColour(ppmPerKelvin)
  if (coefficient === undefined) return refuse(`No colour stands for ${ppmPerKelvin}${NARROW_SPACE}ppm/K.`)
  if (coefficient && !tolerance) return refuse(`±20${NARROW_SPACE}% has no band of its own, so that a band for the temperature coefficient can’t follow it.`)
  // A band left out can only be the last: without a tolerance band there are two figures, with a coefficient three.
  const wanted = coefficient ? [3] : !tolerance ? [2] : close ? [3, 2] : [2, 3]
  const value = valueColours(ohms, wanted)
  if (!value) return refuse(`${formatAmount(ohms, 'resistance')} can’t be written in ${wanted.includes(3) ? 'three' : 'two'} figures and a multiplier between 0.01 and 1${NARROW_SPACE}000${NARROW_SPACE}000${NARROW_SPACE}000.`)
  return { ok: true, bands: [...value, ...(tolerance ? [tolerance] : []), ...(coefficient ? [coefficient] : [])] }
}
