import { createHash } from 'node:crypto'
import { Transform, type Readable } from 'node:stream'
import type { Client } from 'minio'

/** Bytes the client holds in memory per upload; 10 000 parts of it are the largest object (156 GiB). */
export const PART_SIZE = 16 * 2 ** 20

/** A stream without a byte: the store keeps no object of it. */
export class EmptyStream extends Error {}

/**
 * Streams into the store and hashes on the way. The client neither listens for errors of the stream it is given (an
 * unheard error ends the process) nor settles after one, so the error is raced against the upload and the parts that
 * arrived are removed.
 */
export async function putHashed(
  client: Client,
  bucket: string,
  key: string,
  stream: Readable,
  signal?: AbortSignal,
) {
  const sha256 = createHash('sha256')
  const sha512 = createHash('sha512')
  let size = 0
  const tap = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      sha256.update(chunk)
      sha512.update(chunk)
      size += chunk.length
      done(null, chunk)
    },
  })
  const broken = new Promise<never>((_, reject) => {
    tap.once('error', reject)
    stream.once('error', (error) => tap.destroy(error))
    // A sender that goes away closes its stream without an error and without an end.
    stream.once('close', () => {
      if (!stream.readableEnded) tap.destroy(new Error('the stream ended before it was complete'))
    })
    signal?.addEventListener('abort', () => tap.destroy(reasonOf(signal)), { once: true })
  })
  broken.catch(() => undefined)
  if (signal?.aborted) tap.destroy(reasonOf(signal))
  const upload = client.putObject(bucket, key, stream.pipe(tap))
  upload.catch(() => undefined)
  try {
    const { versionId } = await Promise.race([upload, broken])
    return { versionId: versionId ?? null, size, sha256: sha256.digest('hex'), sha512: sha512.digest('hex') }
  } catch (error) {
    stream.unpipe(tap)
    stream.resume()
    await client.removeIncompleteUpload(bucket, key).catch(() => undefined)
    // The client sends a stream of unknown length in parts and fails when there is none to send.
    throw size === 0 && tap.readableEnded ? new EmptyStream('the stream had no bytes') : error
  }
}

function reasonOf(signal: AbortSignal): Error {
  return signal.reason instanceof Error ? signal.reason : new Error('the upload was stopped')
}
