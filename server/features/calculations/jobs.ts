import { z } from 'zod'
import { job, type Job } from '../../platform/queue/job.ts'
import type { Services } from '../../platform/services.ts'
import type { ComputePool } from './compute-pool.ts'
import { runCalculation } from './use-cases/run-calculation.ts'

const CONCURRENCY = 2

/** What a worker process serves of this feature. */
export function calculationJobs(services: Services, pool: ComputePool): Job[] {
  return [
    job(
      'calculate',
      z.object({ calculationId: z.uuid() }),
      ({ calculationId }) => runCalculation(services, pool, calculationId),
      { concurrency: CONCURRENCY },
    ),
  ]
}
