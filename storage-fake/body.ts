import { createHash } from 'node:crypto'
import { createWriteStream } from 'node:fs'
import { rm } from 'node:fs/promises'
import type { IncomingMessage } from 'node:http'
import { pipeline } from 'node:stream/promises'
import type { PayloadHash } from './authorisation.ts'
import { S3Error } from './errors.ts'

/** Largest body of one PUT: 5 GiB, as S3. */
export const largestPut = 5 * 1024 ** 3
/** Largest XML document: ten thousand parts of a multipart upload fit. */
const largestDocument = 2 * 1024 ** 2
/** How much of a refused upload is read before the answer, so that the client gets to see it. */
const drainLimit = 64 * 1024 ** 2

export const emptyHash = createHash('sha256').digest('hex')

export interface Received {
  size: number
  /** MD5 in hex: the ETag of a plain object. */
  md5: string
}

function declaredLength(request: IncomingMessage, limit: number): number {
  const length = request.headers['content-length']
  if (length === undefined) throw new S3Error('MissingContentLength', 'The header Content-Length is needed.')
  if (Number(length) > limit) throw new S3Error('EntityTooLarge', `The body is larger than ${limit} bytes.`)
  return Number(length)
}

/** The declared MD5 as 16 bytes; null when none is declared. Throws InvalidDigest on another form. */
function declaredMd5(request: IncomingMessage): Buffer | null {
  const header = request.headers['content-md5']
  if (header === undefined) return null
  const md5 = Buffer.from(String(header), 'base64')
  if (md5.length !== 16 || md5.toString('base64') !== header)
    throw new S3Error('InvalidDigest', 'Content-MD5 is not valid.')
  return md5
}

/** Hashes what passes and compares it at the end with what was declared. */
class Digests {
  size = 0
  private readonly md5 = createHash('md5')
  private readonly sha256: ReturnType<typeof createHash> | null

  constructor(
    private readonly length: number,
    private readonly expectedMd5: Buffer | null,
    private readonly payloadHash: PayloadHash,
  ) {
    this.sha256 = payloadHash === 'UNSIGNED-PAYLOAD' ? null : createHash('sha256')
  }

  add(chunk: Buffer): void {
    this.size += chunk.length
    this.md5.update(chunk)
    this.sha256?.update(chunk)
  }

  finish(): Received {
    const md5 = this.md5.digest()
    if (this.size !== this.length)
      throw new S3Error('IncompleteBody', 'The body is shorter than its Content-Length.')
    if (this.expectedMd5 && !md5.equals(this.expectedMd5))
      throw new S3Error('BadDigest', 'The body does not fit its Content-MD5.')
    if (this.sha256 && this.sha256.digest('hex') !== this.payloadHash) {
      throw new S3Error('XAmzContentSHA256Mismatch', 'The body does not fit its x-amz-content-sha256.')
    }
    return { size: this.size, md5: md5.toString('hex') }
  }
}

function digestsOf(request: IncomingMessage, payloadHash: PayloadHash, limit: number): Digests {
  return new Digests(declaredLength(request, limit), declaredMd5(request), payloadHash)
}

/**
 * Streams a body into a new file, flushed to disk. On any failure (wrong digest, connection lost) the file is gone.
 * Throws BadDigest, XAmzContentSHA256Mismatch, IncompleteBody, EntityTooLarge, MissingContentLength, InvalidDigest.
 */
export async function receiveFile(
  request: IncomingMessage,
  payloadHash: PayloadHash,
  path: string,
): Promise<Received> {
  const digests = digestsOf(request, payloadHash, largestPut)
  try {
    await pipeline(
      request,
      async function* (source: AsyncIterable<Buffer>) {
        for await (const chunk of source) {
          digests.add(chunk)
          yield chunk
        }
      },
      createWriteStream(path, { flags: 'wx', flush: true }),
    )
    return digests.finish()
  } catch (error) {
    await rm(path, { force: true })
    if (request.errored || (request.destroyed && !request.complete))
      throw new S3Error('IncompleteBody', 'The connection was lost.')
    throw error
  }
}

/** Reads a small XML body. Throws as `receiveFile`. */
export async function receiveText(request: IncomingMessage, payloadHash: PayloadHash): Promise<string> {
  const digests = digestsOf(request, payloadHash, largestDocument)
  const chunks: Buffer[] = []
  for await (const chunk of request as AsyncIterable<Buffer>) {
    digests.add(chunk)
    chunks.push(chunk)
  }
  digests.finish()
  return Buffer.concat(chunks).toString('utf8')
}

/** Checks that a request which takes no body has none and says so in its signature. */
export function expectNoBody(request: IncomingMessage, payloadHash: PayloadHash): void {
  const length = Number(request.headers['content-length'] ?? 0)
  if (length > 0 || request.headers['transfer-encoding'] !== undefined) {
    throw new S3Error('UnexpectedContent', 'This request does not support content.')
  }
  if (payloadHash !== 'UNSIGNED-PAYLOAD' && payloadHash !== emptyHash) {
    throw new S3Error(
      'XAmzContentSHA256Mismatch',
      'The body is empty but its x-amz-content-sha256 is of another.',
    )
  }
}

/** Reads on what a refused client still sends, up to a limit. */
export async function drain(request: IncomingMessage): Promise<void> {
  if (request.complete || request.destroyed) return
  let read = 0
  await new Promise<void>((resolve) => {
    request.on('data', (chunk: Buffer) => {
      read += chunk.length
      if (read > drainLimit) resolve()
    })
    request
      .once('close', resolve)
      .once('end', resolve)
      .once('error', () => resolve())
    request.resume()
  })
}
