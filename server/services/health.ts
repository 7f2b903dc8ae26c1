import { sql } from 'drizzle-orm'
import type { Health, HealthCheck } from '../../shared/types/health'
import type { Database } from '../utils/db'
import type { FileStore } from '../utils/file-store'

const PATIENCE_MS = 3000
const PROBE_KEY = 'health/probe'

/** What the server stands on. */
export interface Footing {
  db: Database
  store: FileStore
  /** Whether this server is taking jobs from the queue. */
  takesJobs: () => boolean
}

/** Asks database, file store and job queue at once. Says only whether each answers: nothing of what it answered. */
export async function checkHealth({ db, store, takesJobs }: Footing): Promise<Health> {
  const checks = await Promise.all([
    time('database', async () => {
      await db.execute(sql`select 1`)
      return true
    }),
    time('file store', async () => {
      const sent = Buffer.from(String(Date.now()))
      await store.put(PROBE_KEY, sent)
      return await store.get(PROBE_KEY) !== null
    }),
    time('job queue', async () => {
      await db.execute(sql`select 1 from graphile_worker.jobs limit 1`)
      return takesJobs()
    }),
  ])
  return { ok: checks.every(check => check.ok), checks }
}

async function time(name: HealthCheck['name'], ask: () => Promise<boolean>): Promise<HealthCheck> {
  const started = performance.now()
  let patience: NodeJS.Timeout | undefined
  const tooLate = new Promise<boolean>((resolve) => {
    patience = setTimeout(() => resolve(false), PATIENCE_MS)
  })
  const ok = await Promise.race([ask().catch(() => false), tooLate])
  clearTimeout(patience)
  return { name, ok, ms: Math.round(performance.now() - started) }
}
