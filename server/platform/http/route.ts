import type { Request, Response } from 'express'
import type { z } from 'zod'
import type { BodyOf, Endpoint, ParamsOf, QueryOf, ReplyOf } from '../../contract/endpoint.ts'
import type { Actor } from './actor.ts'

export interface Context<E extends Endpoint> {
  params: ParamsOf<E>
  query: QueryOf<E>
  body: BodyOf<E>
  /** Who calls. Where anyone may call (`access: 'anyone'`) and nobody is signed in, reading it is 401; use `visitor`. */
  actor: Actor
  visitor: Actor | null
  header(name: string): string | undefined
  req: Request
  res: Response
}

/** A reply with a status or headers other than the endpoint's own. */
export class Answer<T> {
  constructor(
    readonly body: T,
    readonly status: number | undefined,
    readonly headers: Record<string, string>,
  ) {}
}

/** Use it in place of the bare body: `return answer(entry, { headers: { ETag: '"3"' } })`. */
export function answer<T>(
  body: T,
  more: { status?: number; headers?: Record<string, string> } = {},
): Answer<T> {
  return new Answer(body, more.status, more.headers ?? {})
}

type Returned<E extends Endpoint> = E['reply'] extends z.ZodType
  ? ReplyOf<E> | Answer<ReplyOf<E>>
  : // An async handler without a reply returns Promise<void>.
    void | Answer<undefined>

/** A handler of 'bytes' or 'events' writes to `res` itself and returns nothing. */
export type Handler<E extends Endpoint> = (context: Context<E>) => Promise<Returned<E>> | Returned<E>

export interface Route {
  endpoint: Endpoint
  handle(context: Context<Endpoint>): unknown
}

/** Ties a handler to its row of the endpoint table; what it takes and returns is typed by that row. */
export function route<E extends Endpoint>(endpoint: E, handle: Handler<E>): Route {
  return { endpoint, handle: handle as unknown as Route['handle'] }
}
