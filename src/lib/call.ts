import type { z } from 'zod'
import { endpoints, type EndpointName } from '../../server/contract/endpoints.ts'
import type { BodyInputOf, ReplyOf } from '../../server/contract/endpoint.ts'
import { problemFrom, unreachable } from './api-problem.ts'
import { personActive } from './person-active.ts'
import { hadSession, untilSignedIn } from './session-gate.ts'
import { urlOf, type PathValues, type QueryValues } from './url-of.ts'

type Table = typeof endpoints
type ParamsFor<N extends EndpointName> = z.output<Table[N]['params']>

/** Path parameters are asked for where the path has some, a body where the endpoint takes one. */
export type CallOptions<N extends EndpointName> = (string extends keyof ParamsFor<N>
  ? { params?: undefined }
  : { params: ParamsFor<N> & PathValues }) &
  (Table[N]['body'] extends z.ZodType ? { body: BodyInputOf<Table[N]> } : { body?: undefined }) & {
    query?: Partial<z.output<Table[N]['query']>> & QueryValues
    ifMatch?: string
    signal?: AbortSignal
    /** Lets the request outlive the page. */
    keepalive?: boolean
    /** When the session ended: wait for a sign-in in another window (usual), or throw. */
    signedOut?: 'wait' | 'throw'
  }

export interface Answer<T> {
  reply: T
  etag: string | null
}

/** Calls an endpoint of the table and gives its reply, parsed. @throws {ApiProblem} */
export async function call<N extends EndpointName>(
  name: N,
  options: CallOptions<N>,
): Promise<ReplyOf<Table[N]>> {
  return (await callForAnswer(name, options)).reply
}

/** Like `call`, with the ETag of the answer. @throws {ApiProblem} */
export async function callForAnswer<N extends EndpointName>(
  name: N,
  options: CallOptions<N>,
): Promise<Answer<ReplyOf<Table[N]>>> {
  const response = await fetchEndpoint(name, options)
  const schema = endpoints[name].reply
  const json: unknown = response.status === 204 || schema === null ? undefined : await response.json()
  const reply = isSchema(schema) ? schema.parse(json) : undefined
  return { reply: reply as ReplyOf<Table[N]>, etag: response.headers.get('ETag') }
}

/** Calls an endpoint that answers bytes. @throws {ApiProblem} */
export async function callForBytes<N extends EndpointName>(
  name: N,
  options: CallOptions<N>,
): Promise<{ bytes: Uint8Array; headers: Headers }> {
  const response = await fetchEndpoint(name, options)
  return { bytes: new Uint8Array(await response.arrayBuffer()), headers: response.headers }
}

async function fetchEndpoint<N extends EndpointName>(name: N, options: CallOptions<N>): Promise<Response> {
  const response = await send(name, options)
  if (response.ok) return response
  if (response.status === 401 && hadSession()) {
    const again = untilSignedIn()
    if (options.signedOut !== 'throw') {
      await again
      return fetchEndpoint(name, options)
    }
  }
  throw problemFrom(response.status, await response.json().catch(() => null))
}

async function send<N extends EndpointName>(name: N, options: CallOptions<N>): Promise<Response> {
  const { body, ifMatch, signal, keepalive } = options
  try {
    return await fetch(urlOf(name, options.params, options.query), {
      method: endpoints[name].method,
      credentials: 'same-origin',
      signal,
      keepalive,
      headers: {
        Accept: 'application/json',
        ...personActive(),
        ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
        ...(ifMatch === undefined ? {} : { 'If-Match': ifMatch }),
      },
      body: body === undefined ? undefined : JSON.stringify(body),
    })
  } catch (error) {
    if (signal?.aborted) throw error
    throw unreachable()
  }
}

function isSchema(reply: unknown): reply is z.ZodType {
  return typeof reply === 'object' && reply !== null
}
