import { get } from '../context'
import type { BenchRow, BenchRows } from '../context'

const lists = [
  { name: 'GET /api/units, first 50', query: 'limit=50' },
  { name: 'GET /api/units, covering 455 kHz', query: 'limit=50&covers=455%20kHz' },
]

/** The list of units beside a bare route that sends the very same SQL, token check included, and answers with the rows. */
export const rows: BenchRows = async ({ app, bare, script, replaySql }) => {
  const measured: BenchRow[] = []
  for (const { name, query } of lists) {
    const subject = () => get(`${app}/api/units?${query}`, script)
    await replaySql(query, subject)
    measured.push({ name, against: 'bare h3 and pg, same SQL', subject, baseline: () => get(`${bare}/sql?name=${encodeURIComponent(query)}`) })
  }
  return measured
}
