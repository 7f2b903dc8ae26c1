/** The years a model was made, as print writes them: "1951–59", "from 1946", "until 1952"; empty where neither is known. */
export function yearsMade(from: number | null, to: number | null): string {
  if (from !== null && to !== null) {
    if (from === to) return String(from)
    const sameCentury = Math.trunc(from / 100) === Math.trunc(to / 100)
    return `${from}–${sameCentury ? String(to).slice(2) : to}`
  }
  if (from !== null) return `from ${from}`
  return to === null ? '' : `until ${to}`
}
