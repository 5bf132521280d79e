import { buildApp } from './app.ts'
import { closePrinter, evidenceJobs, warmPrinter } from './features/evidence/index.ts'
import { exportJobs } from './features/exports/index.ts'
import { fileJobs } from './features/files/index.ts'
import { findLaboratory, laboratoryJobs, scheduleHeadChecks } from './features/laboratory/index.ts'
import { ConfigError, readConfig } from './platform/config.ts'
import { serve } from './platform/http/serve.ts'
import { openSessions } from './platform/identity/session.ts'
import { openLog } from './platform/logger.ts'
import { sendMailJob } from './platform/mail/send-mail.ts'
import { openServices } from './platform/open-services.ts'
import type { Job } from './platform/queue/job.ts'
import { runProcess } from './platform/run-process.ts'
import type { Services } from './platform/services.ts'

/** What runs beside the API, under the application's role. */
function systemJobs(services: Services): Job[] {
  return [
    sendMailJob(services),
    ...fileJobs(services),
    ...laboratoryJobs(services),
    ...evidenceJobs(services),
    ...exportJobs(services),
  ]
}

/** Demo people have a published passphrase: their database is never served with real services (ruling 23). */
async function refuseDemo(services: Services) {
  if (services.config.demo || !(await findLaboratory(services))?.demo) return
  throw new ConfigError([
    {
      variable: 'DATABASE_URL',
      detail: 'names a database that holds the demonstration; real services need one of their own',
    },
  ])
}

/** The printing browser starts when the rest has, so that nobody waits for it. */
const WARM_AFTER_MS = 8000

await runProcess(async () => {
  const config = readConfig(process.env, 'api')
  const log = openLog('api')
  const { services, close } = await openServices(config, config.database.app, log)
  await refuseDemo(services)
  await services.storage.ensureBucket()
  const sessions = openSessions(config)
  const http = await serve(buildApp(services, sessions), config.port)
  for (const job of systemJobs(services)) await services.queue.work(job)
  await scheduleHeadChecks(services)
  setTimeout(warmPrinter, WARM_AFTER_MS).unref()
  log.info({ origin: config.origin, port: config.port, demo: config.demo }, 'serving')
  return async () => {
    await http.close()
    await close()
    await closePrinter()
    await sessions.close()
  }
})
