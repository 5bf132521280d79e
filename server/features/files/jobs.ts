import { z } from 'zod'
import { job, type Job } from '../../platform/queue/job.ts'
import type { Services } from '../../platform/services.ts'
import type { ReadingPool } from './reading-pool.ts'
import { readFile } from './use-cases/read-file.ts'
import { verifyFile } from './use-cases/verify-file.ts'

const file = z.object({ fileId: z.uuid() })

/** What a worker process serves of this feature. */
export function readingJobs(services: Services, pool: ReadingPool): Job[] {
  return [job('read-file', file, ({ fileId }) => readFile(services, pool, fileId), { concurrency: 2 })]
}

/** What runs beside the API. */
export function fileJobs(services: Services): Job[] {
  return [job('verify-file', file, ({ fileId }) => verifyFile(services, fileId))]
}
