import { z } from 'zod'
import type { Endpoint } from '../../contract/endpoint.ts'
import { endpoints } from '../../contract/endpoints.ts'
import { problemSchema, problemTable, type ProblemCode } from '../../contract/problems.ts'

type Json = Record<string, unknown>

const always: ProblemCode[] = ['invalid-values', 'too-many-requests', 'internal']
const signedIn: ProblemCode[] = ['not-signed-in', 'not-allowed', 'not-found']

/** The OpenAPI 3.1 document of the endpoint table, from the schemas that validate requests and replies. */
export function openApiDocument(origin: string): Json {
  const paths: Record<string, Json> = {}
  for (const [name, endpoint] of Object.entries(endpoints) as [string, Endpoint][]) {
    const path = endpoint.path.replace(/:(\w+)/g, '{$1}')
    paths[path] = { ...paths[path], [endpoint.method.toLowerCase()]: operation(name, endpoint) }
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Halfsilver',
      version: '1',
      description:
        'A browser uses its session cookie and sends Origin with every write; a script sends a personal token. ' +
        'Errors are application/problem+json (RFC 9457). Writes accept an Idempotency-Key.',
    },
    servers: [{ url: `${origin}/api/v1` }],
    paths,
    components: {
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: '__Host-hs' },
        token: { type: 'http', scheme: 'bearer' },
      },
      schemas: { Problem: schema(problemSchema, 'output') },
    },
  }
}

function operation(name: string, endpoint: Endpoint): Json {
  return {
    operationId: name,
    summary: endpoint.summary,
    tags: [endpoint.tag],
    security: security(endpoint),
    parameters: [...parameters(endpoint.params, 'path'), ...parameters(endpoint.query, 'query')],
    ...(endpoint.body === null
      ? {}
      : { requestBody: { required: true, content: requestContent(endpoint.body) } }),
    responses: { [endpoint.status]: reply(endpoint.reply), ...problems(endpoint) },
  }
}

function security({ access, token }: Endpoint): Json[] {
  if (access === 'anyone') return []
  return token === 'never' ? [{ session: [] }] : [{ session: [] }, { token: [] }]
}

function parameters(given: z.ZodType, place: 'path' | 'query'): Json[] {
  const { properties = {}, required = [] } = schema(given, 'input') as {
    properties?: Record<string, Json>
    required?: string[]
  }
  return Object.entries(properties).map(([name, of]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    schema: of,
  }))
}

function requestContent(body: NonNullable<Endpoint['body']>): Json {
  if (body !== 'multipart') return { 'application/json': { schema: schema(body, 'input') } }
  const file = { type: 'string', contentMediaType: 'application/octet-stream' }
  return { 'multipart/form-data': { schema: { type: 'object', properties: { file }, required: ['file'] } } }
}

function reply(kind: Endpoint['reply']): Json {
  if (kind === null) return { description: 'Done' }
  if (kind === 'bytes') return { description: 'The bytes', content: { '*/*': {} } }
  if (kind === 'events')
    return {
      description: 'Server-sent events',
      content: { 'text/event-stream': { schema: { type: 'string' } } },
    }
  return { description: 'Done', content: { 'application/json': { schema: schema(kind, 'output') } } }
}

function problems({ access, problems: own }: Endpoint): Json {
  const byStatus = new Map<number, ProblemCode[]>()
  for (const code of new Set([...always, ...(access === 'anyone' ? [] : signedIn), ...own]))
    byStatus.set(problemTable[code].status, [...(byStatus.get(problemTable[code].status) ?? []), code])
  const content = { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } }
  return Object.fromEntries(
    [...byStatus].map(([status, codes]) => [status, { description: codes.join(', '), content }]),
  )
}

function schema(of: z.ZodType, io: 'input' | 'output'): Json {
  const { $schema: _, ...rest } = z.toJSONSchema(of, { io, unrepresentable: 'any', target: 'draft-2020-12' })
  return rest
}
