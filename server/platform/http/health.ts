import { Router } from 'express'
import type { Services } from '../services.ts'

const CLOCK_TOLERANCE_MS = 5000

/** `/healthz`: the process lives. `/readyz`: database, queue and store answer, and the clocks agree (threat B4). */
export function healthRoutes(services: Services): Router {
  const router = Router()
  router.get('/healthz', (_req, res) => {
    res.json({ alive: true })
  })
  router.get('/readyz', async (_req, res) => {
    const checks = await Promise.all(
      Object.entries(reachable(services)).map(async ([name, check]) => [name, await outcome(check)]),
    )
    const parts = Object.fromEntries(checks) as Record<string, string>
    const ready = Object.values(parts).every((found) => found === 'reachable')
    if (!ready) services.log.warn({ parts }, 'not ready')
    res.status(ready ? 200 : 503).json({ ready, ...parts })
  })
  return router
}

function reachable({ db, storage, clock }: Services) {
  return {
    database: async () => {
      const found = await db.row<{ now: Date }>('select clock_timestamp() as now')
      const apart = Math.abs((found?.now.getTime() ?? 0) - clock.now().getTime())
      if (apart > CLOCK_TOLERANCE_MS) throw new Error('clock differs from the database')
    },
    queue: () => db.row('select version from queue.version'),
    store: () => storage.check(),
  }
}

/** Says which part, never why: the reason is in the log, not for anyone who asks. */
async function outcome(check: () => Promise<unknown>): Promise<string> {
  try {
    await check()
    return 'reachable'
  } catch {
    return 'not reachable'
  }
}
