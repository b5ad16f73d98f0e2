import { jobHandlers } from '#server/jobs/handlers'
import { type JobQueue, startJobs } from '#server/jobs/queue'
import { beforeDatabaseCloses, databaseReady } from '#server/utils/database'
import { log } from '#server/utils/log'

/** Starts the durable queue once the database is open, and stops it before the database closes. */
export default defineNitroPlugin(() => {
  if (import.meta.prerender) return
  const starting: Promise<JobQueue | null> = databaseReady().then(open => startJobs(open, jobHandlers)).catch((error: Error) => {
    log.fatal({ err: error }, 'the job queue did not start')
    return null
  })
  beforeDatabaseCloses(async () => (await starting)?.stop())
})
