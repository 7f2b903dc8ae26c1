/**
 * Resistances in figures only, as on networks, trimmers and chips: two or three figures, then a power of ten, in ohms: 103 is 10 kΩ,
 * 1002 too. Common practice, no source (that IEC 60062 has such codes is in the catalogue page of its 2004 edition).
 */

/** The resistance in ohms; null where the text is no such code, or begins with 0. */
export function readResistorDigits(text: string): number | null {
  const [, figures, power] = /^([1-9]\d{1,2})([0-7])$/.exec(text.trim()) ?? []
  return figures === undefined ? null : Number(`${figures}e${power}`)
}
