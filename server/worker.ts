import { calculationJobs, openComputePool } from './features/calculations/index.ts'
import { openReadingPool, readingJobs } from './features/files/index.ts'
import { readConfig } from './platform/config.ts'
import { openLog } from './platform/logger.ts'
import { openServices } from './platform/open-services.ts'
import { runProcess } from './platform/run-process.ts'

/** Threads start when the processes beside this one have started too, so that nobody waits for them. */
const WARM_AFTER_MS = 2500

/** Reads files and computes, under a role that may do nothing else. Any number of these can run. */
await runProcess(async () => {
  const config = readConfig(process.env, 'worker')
  const log = openLog('worker')
  const { services, close } = await openServices(config, config.database.worker ?? '', log)
  const pools = { compute: openComputePool(), reading: openReadingPool() }
  const jobs = [...readingJobs(services, pools.reading), ...calculationJobs(services, pools.compute)]
  for (const job of jobs) await services.queue.work(job)
  setTimeout(() => Object.values(pools).forEach((pool) => pool.warm()), WARM_AFTER_MS).unref()
  log.info({ queues: jobs.map(({ queue }) => queue) }, 'working')
  return async () => {
    await close()
    await pools.compute.close()
    await pools.reading.close()
  }
})
