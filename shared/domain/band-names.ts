/**
 * Names of frequency bands, for the ruler and for searching.
 *
 * Source: ITU Radio Regulations No. 2.1 and Recommendation ITU-R V.431. Band number N runs from
 * 0.3 × 10^N Hz (exclusive) to 3 × 10^N Hz (inclusive). The Regulations give no symbol below 3 kHz
 * and none for band 12; others are not invented here.
 */
export interface ItuBand {
  number: number
  /** The symbol, or null where the Regulations give none. */
  symbol: string | null
  /** What the symbol abbreviates. */
  name: string
  /** By wavelength. */
  metricName: string
  /** Lower limit in Hz, itself not in the band. */
  aboveHz: number
  /** Upper limit in Hz, itself in the band. */
  toHz: number
}

/** The bands of ITU RR 2.1, from band 4 to band 12. */
export const ITU_BANDS: readonly ItuBand[] = [
  { number: 4, symbol: 'VLF', name: 'very low frequency', metricName: 'myriametric', aboveHz: 3e3, toHz: 3e4 },
  { number: 5, symbol: 'LF', name: 'low frequency', metricName: 'kilometric', aboveHz: 3e4, toHz: 3e5 },
  { number: 6, symbol: 'MF', name: 'medium frequency', metricName: 'hectometric', aboveHz: 3e5, toHz: 3e6 },
  { number: 7, symbol: 'HF', name: 'high frequency', metricName: 'decametric', aboveHz: 3e6, toHz: 3e7 },
  { number: 8, symbol: 'VHF', name: 'very high frequency', metricName: 'metric', aboveHz: 3e7, toHz: 3e8 },
  { number: 9, symbol: 'UHF', name: 'ultra high frequency', metricName: 'decimetric', aboveHz: 3e8, toHz: 3e9 },
  { number: 10, symbol: 'SHF', name: 'super high frequency', metricName: 'centimetric', aboveHz: 3e9, toHz: 3e10 },
  { number: 11, symbol: 'EHF', name: 'extremely high frequency', metricName: 'millimetric', aboveHz: 3e10, toHz: 3e11 },
  { number: 12, symbol: null, name: 'band 12', metricName: 'decimillimetric', aboveHz: 3e11, toHz: 3e12 },
]

/** A named stretch of spectrum. `lowerHz` and `upperHz` are inclusive whole hertz. */
export interface NamedBand {
  name: string
  lowerHz: number
  upperHz: number
}

/** Audio, 20 Hz to 20 kHz. Common practice, no source: neither limit is laid down by the ITU. */
export const AUDIO_BAND: NamedBand = { name: 'AUDIO', lowerHz: 20, upperHz: 20_000 }

/** Every band with a short name, as inclusive whole hertz, in rising order: AUDIO, VLF … EHF. */
export const NAMED_BANDS: readonly NamedBand[] = [
  AUDIO_BAND,
  ...ITU_BANDS.flatMap(band => band.symbol === null
    ? []
    : [{ name: band.symbol, lowerHz: band.aboveHz + 1, upperHz: band.toHz }]),
]

/** The ITU band a frequency in Hz lies in, or null below 3 kHz (inclusive) and above 3 THz. */
export function ituBandOf(hz: number): ItuBand | null {
  return ITU_BANDS.find(band => hz > band.aboveHz && hz <= band.toHz) ?? null
}

/** The band of that name or spelt-out name, in any case ("vhf", "Very high frequency", "audio"), or null. */
export function bandNamed(text: string): NamedBand | null {
  const wanted = text.trim().toLowerCase()
  const spelt = ITU_BANDS.find(band => band.symbol !== null && band.name === wanted)
  return NAMED_BANDS.find(band => band.name.toLowerCase() === wanted || band.name === spelt?.symbol) ?? null
}
