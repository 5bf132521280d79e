import { z } from 'zod'
import { job, type Job } from '../../platform/queue/job.ts'
import type { Services } from '../../platform/services.ts'
import { renderEvidence } from './use-cases/render-evidence.ts'

/** The job that makes the evidence set after a seal. */
export function evidenceJobs(services: Services): Job[] {
  return [
    job('render-evidence', z.object({ entryId: z.uuid() }), ({ entryId }) =>
      renderEvidence(services, entryId),
    ),
  ]
}
