import { Router, type Request, type RequestHandler, type Response } from 'express'
import type { z } from 'zod'
import type { Endpoint } from '../../contract/endpoint.ts'
import { Problem, type FieldError, nothingHere } from '../../contract/problems.ts'
import type { Services } from '../services.ts'
import { requireAccess, visitorOf } from './access.ts'
import { answerOnce } from './idempotency.ts'
import { Answer, type Context, type Route } from './route.ts'

/** All routes of the features under one router; throws when two claim the same call. */
export function mountRoutes(services: Services, routes: Route[]): Router {
  const router = Router()
  const taken = new Set<string>()
  for (const route of routes) {
    const { method, path } = route.endpoint
    const call = `${method} ${path.replace(/:\w+/g, ':')}`
    if (taken.has(call)) throw new Error(`two handlers for ${call}`)
    taken.add(call)
    const verb = method.toLowerCase() as 'get' | 'post' | 'put' | 'patch' | 'delete'
    router[verb](path, mounted(services, route))
  }
  return router
}

function mounted(services: Services, route: Route): RequestHandler {
  const { endpoint } = route
  return async (req, res) => {
    const visitor = visitorOf(req)
    requireAccess(endpoint, visitor)
    requireType(endpoint, req)
    const context = contextOf(endpoint, req, res)
    const answered = async () => {
      const result = await route.handle(context)
      return settled(services, endpoint, result)
    }
    const written = endpoint.reply === 'bytes' || endpoint.reply === 'events'
    if (written) {
      await route.handle(context)
      return
    }
    const { status, headers, body } = await answerOnce(services, endpoint, req, visitor, answered)
    res.status(status).set(headers)
    if (body === undefined) res.end()
    else res.json(body)
  }
}

export interface Settled {
  status: number
  headers: Record<string, string>
  body: unknown
}

/** Parses the reply by its schema: what leaves is what the contract says. Drift fails, except in production. */
function settled({ config, log }: Services, endpoint: Endpoint, result: unknown): Settled {
  const given = result instanceof Answer ? result : new Answer(result, undefined, {})
  const head = { status: given.status ?? endpoint.status, headers: given.headers }
  if (endpoint.reply === null || typeof endpoint.reply === 'string') return { ...head, body: undefined }
  const parsed = endpoint.reply.safeParse(given.body)
  if (parsed.success) return { ...head, body: parsed.data }
  const call = `${endpoint.method} ${endpoint.path}`
  log.error({ call, issues: parsed.error.issues.slice(0, 10) }, 'the reply is not what the contract says')
  if (!config.production)
    throw new Error(`${call} answers otherwise than the contract says: ${parsed.error.message}`)
  return { ...head, body: given.body }
}

function contextOf(endpoint: Endpoint, req: Request, res: Response): Context<Endpoint> {
  const params = endpoint.params.safeParse(req.params)
  if (!params.success) throw nothingHere()
  const visitor = visitorOf(req)
  return {
    params: params.data,
    query: parsedOr(endpoint.query, req.query, 'The query of the address does not fit.'),
    body: bodyOf(endpoint, req) as undefined,
    visitor,
    get actor() {
      if (!visitor) throw new Problem('not-signed-in', 'Sign in first; nothing was changed.')
      return visitor
    },
    header: (name) => req.get(name),
    req,
    res,
  }
}

function bodyOf({ body }: Endpoint, req: Request): unknown {
  if (body === null || body === 'multipart') return undefined
  return parsedOr(body, req.body, 'Some values do not fit; nothing was changed.')
}

function parsedOr(schema: z.ZodType, value: unknown, sentence: string): unknown {
  const parsed = schema.safeParse(value)
  if (parsed.success) return parsed.data
  throw new Problem('invalid-values', sentence, { errors: parsed.error.issues.flatMap(fieldErrors) })
}

/** JSON pointers (RFC 6901) and sentences of one zod issue. */
export function fieldErrors(issue: z.core.$ZodIssue): FieldError[] {
  const at = (path: PropertyKey[]) =>
    path.map((key) => '/' + String(key).replaceAll('~', '~0').replaceAll('/', '~1')).join('')
  if (issue.code === 'unrecognized_keys')
    return issue.keys.map((key) => ({
      pointer: at([...issue.path, key]),
      detail: 'There is no such field here.',
    }))
  return [{ pointer: at(issue.path), detail: sentence(issue) }]
}

function sentence(issue: z.core.$ZodIssue): string {
  if (issue.code === 'invalid_type' && issue.input === undefined && /undefined/.test(issue.message))
    return 'This is missing.'
  return issue.message.replace(/^Invalid input: /, '').replace(/^./, (first) => first.toUpperCase()) + '.'
}

/** 415 for a body that is neither what the endpoint takes nor absent (also what keeps forms of other sites out). */
function requireType({ body }: Endpoint, req: Request) {
  const hasBody =
    req.headers['transfer-encoding'] !== undefined || Number(req.headers['content-length'] ?? 0) > 0
  if (body === 'multipart') {
    if (!req.is('multipart/form-data'))
      throw new Problem(
        'unreadable-type',
        'Send the file as multipart/form-data in the field "file"; nothing was stored.',
      )
    return
  }
  if (hasBody && !req.is('application/json'))
    throw new Problem('unreadable-type', 'Send the values as application/json; nothing was changed.')
}
