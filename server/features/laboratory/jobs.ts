import { z } from 'zod'
import { job, type Job } from '../../platform/queue/job.ts'
import type { Services } from '../../platform/services.ts'
import { findLaboratory } from './laboratory.ts'
import { makeHead } from './heads.ts'
import { registerTimeStampRoots, stampAllMissing, stampJobs } from './stamps.ts'

const DAY_S = 86_400
const HOUR_S = 3600
const HOUR_MS = HOUR_S * 1000

/**
 * The jobs of the laboratory: stamps, and once an hour a look at whether the day's head was made and every stamp has come.
 * The look sends its own successor.
 */
export function laboratoryJobs(services: Services): Job[] {
  return [
    ...stampJobs(services),
    job('check-heads', z.object({}), async () => {
      await scheduleNext(services)
      await registerTimeStampRoots(services)
      await makeDailyHead(services)
      await stampAllMissing(services)
    }),
  ]
}

/** Starts the hourly look. */
export async function scheduleHeadChecks(services: Services): Promise<void> {
  if (await findLaboratory(services)) await services.queue.send('check-heads', {})
}

/** The next look at the full hour; several processes that ask for it get one. */
async function scheduleNext(services: Services): Promise<void> {
  const startAfter = new Date((Math.floor(Date.now() / HOUR_MS) + 1) * HOUR_MS)
  const singletonKey = startAfter.toISOString()
  await services.queue.send('check-heads', {}, { startAfter, singletonKey, singletonSeconds: 2 * HOUR_S })
}

async function makeDailyHead(services: Services): Promise<void> {
  const newest = await services.db.row<{ at: Date }>('select max(made_at) as at from record.heads')
  const age = newest?.at ? services.clock.now().getTime() - newest.at.getTime() : Infinity
  if (age >= DAY_S * 1000) await services.db.transaction((t) => makeHead(services, t))
}
