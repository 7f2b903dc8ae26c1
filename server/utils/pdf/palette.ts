/** The product's light palette for print on white. Each of the inks is at least 4.5:1 against white; `line` and `brass` are for rules only. */
export const PALETTE = {
  ink: '#1E211F',
  inkSoft: '#585C57',
  line: '#DBD4C2',
  lineStrong: '#7A7260',
  enamel: '#2F5D50',
  enamelTint: '#E3ECE7',
  amber: '#8F5600',
  amberTint: '#F8E9D2',
  fault: '#A3271F',
  brass: '#8A6D3B',
  white: '#FFFFFF',
} as const

/** Millimetres as PDF points (1 pt = 1/72 in, 1 in = 25.4 mm). */
export const mm = (millimetres: number) => millimetres * 72 / 25.4
