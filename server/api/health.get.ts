import { checkHealth } from '../services/health'
import { notReady } from '../utils/errors'
import { useFileStore } from '../utils/file-store'
import { useJobRunner } from '../utils/job-runner'
import { defineRoute } from '../utils/route'

export default defineRoute({ may: 'anyone', summary: 'Whether database, file store and job queue answer; 503 if one does not' }, async ({ db }) => {
  const health = await checkHealth({ db, store: useFileStore(), takesJobs: () => useJobRunner()?.isRunning() ?? false })
  if (health.ok) return health
  const silent = health.checks.filter(check => !check.ok).map(check => check.name)
  throw notReady(`Not answering: ${silent.join(', ')}.`, { checks: health.checks })
})
