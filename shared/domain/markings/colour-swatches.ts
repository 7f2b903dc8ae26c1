import type { Colour } from './resistor-colours'

/** How the colours of bands and dots are drawn, sRGB: near what ageing paint looks like, and apart from each other. */
export const COLOUR_SWATCHES: Readonly<Record<Colour, string>> = {
  black: '#161616', brown: '#6b3d1e', red: '#c1271d', orange: '#e8741a', yellow: '#f2cf1d', green: '#2f7d3b', blue: '#1f4fa3', violet: '#7a3f98', grey: '#8a8d8f', white: '#f7f5ee', gold: '#b8912f', silver: '#bfc3c6',
}
