import { JOB_TIMES, jobTasks } from '../services/job-tasks'
import { closeDatabase, useDb, usePool } from '../utils/db'
import { useFileStore } from '../utils/file-store'
import { setJobRunner, startJobRunner } from '../utils/job-runner'

/** Runs background jobs inside the server, and lets the one in hand finish when the server closes. */
export default defineNitroPlugin((nitro) => {
  const runner = startJobRunner(usePool(), jobTasks(useDb(), useFileStore()), JOB_TIMES)
  setJobRunner(runner)
  nitro.hooks.hook('close', async () => {
    await runner.stop()
    await closeDatabase()
  })
})
