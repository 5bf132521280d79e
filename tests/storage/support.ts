import { createHash } from 'node:crypto'
import { mkdtemp, readdir, rm } from 'node:fs/promises'
import { request as httpRequest, type IncomingHttpHeaders } from 'node:http'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { Client } from 'minio'
import { startStorageFake, type StorageFakeOptions } from '../../storage-fake/server.ts'
import { canonicalRequest, signature, stringToSign, type HeaderLine } from '../../storage-fake/signature.ts'

export const keys = { accessKey: 'notebook', secretKey: 'secret/with+signs', region: 'us-east-1' }

/** A server on a new folder, with a client; `end` stops it and removes the folder. */
export async function startedStorage(more: Partial<StorageFakeOptions> = {}) {
  const folder = more.folder ?? (await mkdtemp(join(tmpdir(), 'storage-')))
  const server = await startStorageFake({ folder, ...keys, ...more })
  const end = async () => {
    await server.close()
    await rm(folder, { recursive: true, force: true })
  }
  return { folder, server, port: server.port, client: clientOf(server.port), end }
}

export function clientOf(port: number, more: object = {}): Client {
  return new Client({ endPoint: '127.0.0.1', port, useSSL: false, partSize: 8 << 20, ...keys, ...more })
}

/** Every file below a folder, as relative paths. */
export async function filesUnder(folder: string): Promise<string[]> {
  const entries = await readdir(folder, { recursive: true, withFileTypes: true })
  return entries.filter((e) => e.isFile()).map((e) => join(e.parentPath, e.name).slice(folder.length + 1))
}

export async function bytesOf(stream: AsyncIterable<Buffer>): Promise<Buffer> {
  const chunks: Buffer[] = []
  for await (const chunk of stream) chunks.push(chunk)
  return Buffer.concat(chunks)
}

export interface RawRequest {
  method: string
  /** Path and query as sent. */
  target: string
  headers?: Record<string, string>
  body?: Buffer | string
  /** What is signed in place of the body's own hash. */
  payloadHash?: string
  signedAt?: Date
  secretKey?: string
  accessKey?: string
  region?: string
  service?: string
  /** Changes the headers after signing. */
  tamper?: (headers: Record<string, string>) => void
  /** Stops sending and cuts the connection after the body given, whatever Content-Length says. */
  cut?: boolean
}

export interface RawAnswer {
  status: number
  headers: IncomingHttpHeaders
  body: string
  /** Code of the S3 error document. */
  code: string | undefined
}

/** Headers of a signed request. */
export function signedHeaders(port: number, raw: RawRequest): Record<string, string> {
  const { signedAt = new Date(), region = keys.region, service = 's3', body = '' } = raw
  const timestamp = signedAt.toISOString().replace(/[-:]|\.\d+/g, '')
  const payloadHash = raw.payloadHash ?? createHash('sha256').update(body).digest('hex')
  const headers: Record<string, string> = {
    host: `127.0.0.1:${port}`,
    'x-amz-date': timestamp,
    'x-amz-content-sha256': payloadHash,
    'content-length': String(Buffer.byteLength(body)),
    ...raw.headers,
  }
  const names = Object.keys(headers)
    .filter((name) => name !== 'content-length')
    .sort()
  const [path = '', query = ''] = raw.target.split('?')
  const lines = Object.entries(headers).map(([name, value]): HeaderLine => [name, value])
  const canonical = canonicalRequest({
    method: raw.method,
    path,
    query,
    headers: lines,
    signedHeaders: names,
    payloadHash,
  })
  const scope = { day: timestamp.slice(0, 8), region, service }
  const signed = signature(stringToSign(canonical, timestamp, scope), raw.secretKey ?? keys.secretKey, scope)
  const credential = `${raw.accessKey ?? keys.accessKey}/${scope.day}/${region}/${service}/aws4_request`
  headers.authorization = `AWS4-HMAC-SHA256 Credential=${credential}, SignedHeaders=${names.join(';')}, Signature=${signed}`
  raw.tamper?.(headers)
  return headers
}

/** Sends a request signed by hand, for what the client library never sends. */
export async function sendRaw(port: number, raw: RawRequest): Promise<RawAnswer> {
  const headers = signedHeaders(port, raw)
  return new Promise((resolve, reject) => {
    const options = { host: '127.0.0.1', port, method: raw.method, path: raw.target, headers, agent: false }
    const request = httpRequest(options, (response) => {
      void bytesOf(response).then((bytes) => {
        const body = bytes.toString('utf8')
        const code = /<Code>(.*?)<\/Code>/.exec(body)?.[1]
        resolve({ status: response.statusCode ?? 0, headers: response.headers, body, code })
      }, reject)
    })
    request.on('error', reject)
    if (raw.cut) request.write(raw.body, () => setTimeout(() => request.destroy(new Error('cut')), 50))
    else request.end(raw.body)
  })
}
