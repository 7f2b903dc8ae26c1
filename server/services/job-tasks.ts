import type { Task } from 'graphile-worker'
import { z } from 'zod'
import type { Database } from '../utils/db'
import type { FileStore } from '../utils/file-store'
import type { JobName } from '../utils/jobs'
import { releaseLapsedHolds } from './holds'
import { makeAvif } from './photos'
import { prune } from './prune'

const filePayload = z.object({ fileId: z.uuid() })

/** What each kind of background job does. A job that throws is tried again, later and later. */
export function jobTasks(db: Database, store: FileStore): Record<JobName, Task> {
  return {
    'make-avif': async (payload: unknown) => {
      await makeAvif(db, store, filePayload.parse(payload).fileId)
    },
    'release-lapsed-holds': async () => {
      await releaseLapsedHolds(db)
    },
    'prune': async () => {
      await prune(db)
    },
  }
}

/** When the recurring jobs run (in UTC): holds are looked at every quarter of an hour, pruning is for the night. */
export const JOB_TIMES = `
*/15 * * * * release-lapsed-holds
20 3 * * * prune
`
