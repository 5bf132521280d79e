import { randomBytes } from 'node:crypto'
import { createReadStream } from 'node:fs'
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import { pipeline } from 'node:stream/promises'
import { authorise } from './authorisation.ts'
import { drain, expectNoBody } from './body.ts'
import { Buckets } from './buckets.ts'
import type { Call, Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { operationOf } from './operations.ts'
import { decodePercent, parseQuery } from './signature.ts'
import { Uploads } from './uploads.ts'
import { errorDocument } from './xml.ts'

export interface StorageFakeOptions {
  /** Folder that holds all state: a second start on it finds everything again. */
  folder: string
  /** 0 or left out: any free port. */
  port?: number
  accessKey: string
  secretKey: string
  region: string
  /** Whether the key holds s3:BypassGovernanceRetention (the application's key should not). */
  mayBypassGovernance?: boolean
  /** Milliseconds since 1970; for tests of expiry. */
  clock?: () => number
}

export interface StorageFake {
  port: number
  close(): Promise<void>
}

type Settings = StorageFakeOptions & { buckets: Buckets; uploads: Uploads; now: () => number }

const idleTimeoutMs = 120_000

function callOf(request: IncomingMessage, settings: Settings): Call {
  const now = settings.now()
  const payloadHash = authorise(request, settings, now)
  const [path = '/', ...rest] = (request.url ?? '/').split('?')
  const [bucket = '', ...key] = path.slice(1).split('/')
  const asksBypass = request.headers['x-amz-bypass-governance-retention'] === 'true'
  if (asksBypass && !settings.mayBypassGovernance) {
    throw new S3Error('AccessDenied', 'This key may not bypass governance retention.')
  }
  return {
    request,
    bucket: decodePercent(bucket),
    key: decodePercent(key.join('/')),
    query: new Map(parseQuery(rest.join('?'))),
    payloadHash,
    now,
    bypassGovernance: asksBypass,
    region: settings.region,
    buckets: settings.buckets,
    uploads: settings.uploads,
  }
}

async function handle(request: IncomingMessage, settings: Settings): Promise<Reply> {
  const call = callOf(request, settings)
  const operation = operationOf(call)
  if (!operation.hasBody) expectNoBody(request, call.payloadHash)
  return operation.run(call)
}

function errorReply(error: unknown, request: IncomingMessage, requestId: string): Reply {
  const known = error instanceof S3Error ? error : new S3Error('InternalError', 'An internal error occurred.')
  if (!(error instanceof S3Error)) process.stderr.write(`storage: ${String(error)}\n`)
  const resource = (request.url ?? '/').split('?')[0]!
  const xml = errorDocument(known.code, known.message, resource, requestId)
  return { status: known.status, headers: known.headers, xml }
}

async function send(reply: Reply, method: string | undefined, response: ServerResponse): Promise<void> {
  const { file, xml, headers = {} } = reply
  const bytes = file ? file.end - file.start + 1 : Buffer.byteLength(xml ?? '')
  const type: Record<string, string> = xml === undefined ? {} : { 'content-type': 'application/xml' }
  const length: Record<string, string> = reply.status === 204 ? {} : { 'content-length': String(bytes) }
  response.writeHead(reply.status, { ...type, ...length, ...headers })
  if (file && method !== 'HEAD' && bytes > 0) {
    await pipeline(createReadStream(file.path, { start: file.start, end: file.end }), response)
  } else {
    response.end(method === 'HEAD' ? undefined : xml)
  }
}

async function answer(request: IncomingMessage, response: ServerResponse, settings: Settings): Promise<void> {
  const requestId = randomBytes(8).toString('hex').toUpperCase()
  response.setHeader('x-amz-request-id', requestId)
  response.setHeader('server', 'storage')
  const reply = await handle(request, settings).catch(async (error: unknown) => {
    await drain(request)
    if (!request.complete) response.setHeader('connection', 'close')
    return errorReply(error, request, requestId)
  })
  try {
    await send(reply, request.method, response)
  } catch (error) {
    // The client went away, or the file under the object did: what is sent cannot be taken back.
    response.destroy()
    const gone = error instanceof Error && 'code' in error && error.code === 'ERR_STREAM_PREMATURE_CLOSE'
    if (!gone) process.stderr.write(`storage: ${String(error)}\n`)
  }
}

/**
 * Starts an S3-compatible object server on 127.0.0.1: Signature V4, versions, multipart, object lock.
 * `close` cuts open connections, waits until what they left half done is cleared, and frees the port.
 */
export async function startStorageFake(options: StorageFakeOptions): Promise<StorageFake> {
  const buckets = new Buckets(options.folder)
  await buckets.open()
  const settings: Settings = {
    ...options,
    buckets,
    uploads: new Uploads(buckets),
    now: options.clock ?? Date.now,
  }
  const running = new Set<Promise<void>>()
  const server = createServer((request, response) => {
    const task = answer(request, response, settings).finally(() => running.delete(task))
    running.add(task)
  })
  // A large upload may take longer than Node's five minutes; a silent connection is cut instead.
  server.requestTimeout = 0
  server.timeout = idleTimeoutMs
  // Longer than clients keep a connection, or they send into one that is just being closed.
  server.keepAliveTimeout = 65_000
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(options.port ?? 0, '127.0.0.1', resolve)
  })
  return {
    port: (server.address() as AddressInfo).port,
    close: async () => {
      const closed = new Promise<void>((resolve) => server.close(() => resolve()))
      server.closeAllConnections()
      await closed
      await Promise.allSettled(running)
    },
  }
}
