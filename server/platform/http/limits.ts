import { ipKeyGenerator, rateLimit } from 'express-rate-limit'
import type { RequestHandler } from 'express'
import { Problem } from '../../contract/problems.ts'
import { visitorOf } from './access.ts'

/**
 * Per person, or per address where nobody is signed in. A script that starts calculations and asks for each ten times a
 * second makes some 1200 calls a minute.
 */
const CALLS_PER_MINUTE = 3000
const SIGN_INS_PER_MINUTE = 120

export function limitCalls(): RequestHandler {
  return limiter(CALLS_PER_MINUTE, true)
}

export function limitSignIns(): RequestHandler {
  return limiter(SIGN_INS_PER_MINUTE, false)
}

function limiter(limit: number, byPerson: boolean): RequestHandler {
  return rateLimit({
    windowMs: 60_000,
    limit,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    keyGenerator: (req) => (byPerson && visitorOf(req)?.personId) || ipKeyGenerator(req.ip ?? ''),
    handler: (_req, _res, next) => {
      const extra = { retryAfterS: 60 }
      next(
        new Problem(
          'too-many-requests',
          `More than ${limit} calls in a minute. Wait a minute; nothing was changed.`,
          { extra },
        ),
      )
    },
  })
}
