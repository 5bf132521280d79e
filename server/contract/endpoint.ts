import { z } from 'zod'
import type { ProblemCode } from './problems.ts'

/** What an endpoint's body is: parsed JSON, a multipart upload, or nothing. */
export type BodyKind = z.ZodType | 'multipart' | null
/** What an endpoint answers: JSON of a schema, bytes or a stream of events it writes itself, or nothing (204). */
export type ReplyKind = z.ZodType | 'bytes' | 'events' | null

export interface Endpoint<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends BodyKind = BodyKind,
  Reply extends ReplyKind = ReplyKind,
> {
  method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'
  /** Under /api/v1, with `:name` for path parameters. */
  path: string
  summary: string
  /** Group in the OpenAPI document. */
  tag: string
  /** `anyone` needs no session. */
  access: 'anyone' | 'signed-in'
  /** Which scope of a personal token may call it; `never` for everything that signs, appoints or exports. */
  token: 'never' | 'read' | 'record'
  params: Params
  query: Query
  body: Body
  reply: Reply
  /** Status of success. */
  status: number
  /** Codes this endpoint may answer beside the ones every endpoint has. */
  problems: ProblemCode[]
}

type Given<P extends z.ZodType, Q extends z.ZodType, B extends BodyKind, R extends ReplyKind> = Pick<
  Endpoint<P, Q, B, R>,
  'method' | 'path' | 'summary' | 'tag'
> & {
  access?: 'anyone' | 'signed-in'
  token?: 'never' | 'read' | 'record'
  params?: P
  query?: Q
  body?: B
  reply: R
  status?: number
  problems?: ProblemCode[]
}

const nothing = z.object({})
type Nothing = typeof nothing

/** Declares an endpoint; what is left out has the usual value (signed in, no token writes, no parameters, no body). */
export function endpoint<
  R extends ReplyKind,
  P extends z.ZodType = Nothing,
  Q extends z.ZodType = Nothing,
  B extends BodyKind = null,
>(given: Given<P, Q, B, R>): Endpoint<P, Q, B, R> {
  return {
    access: 'signed-in',
    token: given.method === 'GET' ? 'read' : 'never',
    status: 200,
    problems: [],
    ...given,
    params: given.params ?? (nothing as unknown as P),
    query: given.query ?? (nothing as unknown as Q),
    body: (given.body ?? null) as B,
  }
}

export type ParamsOf<E extends Endpoint> = z.output<E['params']>
export type QueryOf<E extends Endpoint> = z.output<E['query']>
export type BodyOf<E extends Endpoint> = E['body'] extends z.ZodType ? z.output<E['body']> : undefined
export type BodyInputOf<E extends Endpoint> = E['body'] extends z.ZodType ? z.input<E['body']> : undefined
export type ReplyOf<E extends Endpoint> = E['reply'] extends z.ZodType ? z.output<E['reply']> : undefined
