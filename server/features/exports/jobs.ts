import { z } from 'zod'
import { job, type Job } from '../../platform/queue/job.ts'
import type { Services } from '../../platform/services.ts'
import { buildExport } from './use-cases/build-export.ts'

/** The job that builds bundles; two at once, since one may wait for its renditions. */
export function exportJobs(services: Services): Job[] {
  return [
    job('build-export', z.object({ exportId: z.uuid() }), ({ exportId }) => buildExport(services, exportId), {
      concurrency: 2,
    }),
  ]
}
