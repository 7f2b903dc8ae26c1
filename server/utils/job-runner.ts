import { consola } from 'consola'
import type { Runner, TaskList } from 'graphile-worker'
import { Logger, run } from 'graphile-worker'
import type { Pool } from 'pg'

const RETRY_MS = 10_000

export interface JobRunner {
  /** Whether jobs are being taken from the queue at this moment. */
  isRunning: () => boolean
  /** Lets the job in hand finish, then takes no more. */
  stop: () => Promise<void>
}

const logger = new Logger(() => (level, message) => {
  if (level === 'error') consola.error(message)
  else if (level === 'warning') consola.warn(message)
})

/** Takes jobs from the queue, one at a time, and goes on trying to start while the database cannot be reached. */
export function startJobRunner(pgPool: Pool, taskList: TaskList, crontab: string): JobRunner {
  let runner: Runner | undefined
  let retry: NodeJS.Timeout | undefined
  let stopped = false

  async function start() {
    try {
      const started = await run({ pgPool, taskList, crontab, logger, concurrency: 1, noHandleSignals: true })
      runner = started
      if (stopped) return await started.stop()
      await started.promise
    } catch (error) {
      consola.warn(`Background jobs are not running: ${error instanceof Error ? error.message : 'the queue broke off'}`)
    }
    runner = undefined
    if (!stopped) retry = setTimeout(() => starting = start(), RETRY_MS)
  }

  let starting = start()
  return {
    isRunning: () => runner !== undefined,
    async stop() {
      stopped = true
      clearTimeout(retry)
      await runner?.stop()
      await starting
    },
  }
}

let current: JobRunner | undefined

/** The runner of this server, set by the `jobs` plugin; health asks it. */
export const useJobRunner = () => current
export const setJobRunner = (runner: JobRunner) => current = runner
