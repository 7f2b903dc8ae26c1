/** What a piece does at a frequency. The five are never mixed: a scope good to 50 MHz does not tune 50 MHz. */
export const FUNCTIONS = ['generates', 'tunes', 'measures', 'passes', 'transmits'] as const
export type CoverageFunction = (typeof FUNCTIONS)[number]

export const FUNCTION_LABELS: Record<CoverageFunction, string> = {
  generates: 'Generates', tunes: 'Tunes', measures: 'Measures', passes: 'Passes', transmits: 'Transmits',
}
