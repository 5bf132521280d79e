import type { Request } from 'express'
import { endpoints } from '../../contract/endpoints.ts'
import type { Endpoint } from '../../contract/endpoint.ts'
import { Problem } from '../../contract/problems.ts'
import type { Services } from '../services.ts'
import type { Actor } from './actor.ts'
import type { Settled } from './mount.ts'

interface KeptAnswer {
  method: string
  path: string
  status: number | null
  body: unknown
}

/** Answers that hold a secret are not kept. */
const neverKept: Endpoint[] = [endpoints.createToken, endpoints.unlockSigningKey]
const KEPT_HOURS = 24

/**
 * A POST with an Idempotency-Key runs once: the same person's same key gets the first answer again, for 24 hours. An
 * attempt that failed is forgotten, so that it can be repeated.
 */
export async function answerOnce(
  services: Services,
  endpoint: Endpoint,
  req: Request,
  visitor: Actor | null,
  run: () => Promise<Settled>,
): Promise<Settled> {
  const key = req.get('idempotency-key')
  if (endpoint.method !== 'POST' || !visitor || key === undefined || neverKept.includes(endpoint))
    return run()
  if (!/^[\x21-\x7e]{1,200}$/.test(key))
    throw new Problem(
      'invalid-values',
      'The Idempotency-Key must be 1 to 200 printable characters without spaces.',
    )
  const { db, clock } = services
  const call = {
    key,
    personId: visitor.personId,
    method: req.method,
    path: req.originalUrl,
    now: clock.now(),
  }
  const earlier = await claim(services, call)
  if (earlier) return replayed(earlier, call)
  const own = 'key = :key and person_id = :personId'
  try {
    const answered = await run()
    const kept = { ...call, status: answered.status, body: JSON.stringify(answered.body ?? null) }
    await db.run(`update work.idempotency set status = :status, body = :body where ${own}`, kept)
    return answered
  } catch (error) {
    await db.run(`delete from work.idempotency where ${own}`, call)
    throw error
  }
}

type Call = { key: string; personId: string; method: string; path: string; now: Date }

/** Takes the key for this call, or answers the call that has it. */
async function claim({ db }: Services, call: Call): Promise<KeptAnswer | null> {
  const oldest = new Date(call.now.getTime() - KEPT_HOURS * 3_600_000)
  await db.run('delete from work.idempotency where person_id = :personId and created_at < :oldest', {
    ...call,
    oldest,
  })
  const taken = await db.rows(
    `insert into work.idempotency (key, person_id, method, path, created_at) values (:key, :personId, :method, :path, :now)
     on conflict do nothing returning key`,
    call,
  )
  if (taken.length > 0) return null
  const found = await db.row<KeptAnswer>(
    'select method, path, status, body from work.idempotency where key = :key and person_id = :personId',
    call,
  )
  return found ?? claim({ db } as Services, call)
}

function replayed(earlier: KeptAnswer, call: Call): Settled {
  if (earlier.method !== call.method || earlier.path !== call.path)
    throw new Problem(
      'invalid-values',
      'This Idempotency-Key was used for another call. Use a new key for each thing you do.',
    )
  if (earlier.status === null)
    throw new Problem(
      'wrong-state',
      'The first call with this Idempotency-Key is still under way. Try again in a moment.',
    )
  return {
    status: earlier.status,
    headers: { 'Idempotency-Replayed': 'true' },
    body: earlier.body ?? undefined,
  }
}
