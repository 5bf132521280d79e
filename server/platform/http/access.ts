import type { Request, RequestHandler } from 'express'
import type { Endpoint } from '../../contract/endpoint.ts'
import { Problem } from '../../contract/problems.ts'
import { sessionActor } from '../identity/session.ts'
import type { Services } from '../services.ts'
import { tokenActor, type Actor } from './actor.ts'

const visitors = new WeakMap<Request, Actor | null>()

/** Who calls, after `loadVisitor`; null when nobody is signed in. */
export function visitorOf(req: Request): Actor | null {
  return visitors.get(req) ?? null
}

/** Finds out who calls. With an Authorization header cookies count for nothing (contract.md, ruling 20). */
export function loadVisitor(services: Services): RequestHandler {
  return async (req, _res, next) => {
    const authorization = req.get('authorization')
    const visitor =
      authorization === undefined ? await sessionActor(services, req) : await bearer(services, authorization)
    visitors.set(req, visitor)
    next()
  }
}

async function bearer({ db, clock }: Services, authorization: string): Promise<Actor> {
  const secret = /^Bearer ([\w.~+/=-]{16,200})$/i.exec(authorization)?.[1]
  const actor = secret === undefined ? null : await tokenActor(db, clock, secret)
  if (!actor)
    throw new Problem(
      'not-signed-in',
      'This token is unknown, expired or ended. Make a new one on the Tokens page.',
    )
  return actor
}

/** 401 for nobody, 403 for a token that may not call this endpoint. */
export function requireAccess({ access, token }: Endpoint, visitor: Actor | null): void {
  if (!visitor) {
    if (access === 'anyone') return
    throw new Problem(
      'not-signed-in',
      'You are not signed in, or your session has ended. Sign in and try again; nothing was changed.',
    )
  }
  if (visitor.kind === 'person') return
  if (token === 'never')
    throw new Problem(
      'not-allowed',
      'A token may not do this; it takes a person who is signed in. Nothing was changed.',
    )
  if (!visitor.scopes.includes(token))
    throw new Problem(
      'not-allowed',
      `This token lacks the scope "${token}". Make one that has it on the Tokens page.`,
    )
}
