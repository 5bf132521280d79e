import { createHash } from 'node:crypto'
import http from 'node:http'
import https from 'node:https'
import { Readable } from 'node:stream'
import { buffer } from 'node:stream/consumers'
import { Client, RETENTION_MODES } from 'minio'
import { putHashed, PART_SIZE } from './put-hashed.ts'

export { EmptyStream } from './put-hashed.ts'

export interface StorageSettings {
  endpoint: string
  accessKey: string
  secretKey: string
  region: string
  bucket: string
}

export interface StoredObject {
  /** Null where the store keeps no versions. */
  versionId: string | null
  size: number
  sha256: string
  sha512: string
}

export interface ByteRange {
  offset: number
  length?: number
}

/** The S3 store, one bucket with object locking. Keys are used once: bytes under a key never change. */
export interface ObjectStore {
  /** Makes the bucket, with object locking on, when it is not there. */
  ensureBucket(): Promise<void>
  /** Throws unless the bucket can be reached. */
  check(): Promise<void>
  /**
   * Stores a stream of unknown length and hashes it on the way; memory stays at about one part (16 MiB).
   * A stream that fails, or `signal`, throws, and nothing of it stays in the store.
   */
  putStream(key: string, stream: Readable, options?: { signal?: AbortSignal }): Promise<StoredObject>
  putBytes(key: string, bytes: Uint8Array): Promise<StoredObject>
  get(key: string, versionId?: string | null, range?: ByteRange): Promise<Readable>
  getBytes(key: string, versionId?: string | null, range?: ByteRange): Promise<Buffer>
  /** Null when there is no such object. */
  stat(key: string, versionId?: string | null): Promise<{ size: number; versionId: string | null } | null>
  remove(key: string, versionId?: string | null): Promise<void>
  /** From now until that time nobody, also not the owner of the store's keys, can remove or replace this version. */
  lock(key: string, versionId: string | null, until: Date): Promise<void>
}

export function openObjectStore({
  endpoint,
  accessKey,
  secretKey,
  region,
  bucket,
}: StorageSettings): ObjectStore {
  const { hostname, port, protocol } = new URL(endpoint)
  const client = new Client({
    endPoint: hostname,
    port: port ? Number(port) : undefined,
    useSSL: protocol === 'https:',
    accessKey,
    secretKey,
    region,
    partSize: PART_SIZE,
    // A connection for each call: one kept open may be closed by the store at the moment it is used again, and the client
    // does not repeat a call whose connection breaks.
    transportAgent: new (protocol === 'https:' ? https : http).Agent({ keepAlive: false }),
  })
  const version = (versionId?: string | null) => (versionId ? { versionId } : {})

  async function get(key: string, versionId?: string | null, range?: ByteRange) {
    if (!range) return client.getObject(bucket, key, version(versionId))
    if (range.length === 0) return Readable.from([])
    return client.getPartialObject(bucket, key, range.offset, range.length ?? 0, version(versionId))
  }

  return {
    async ensureBucket() {
      if (!(await client.bucketExists(bucket)))
        await client.makeBucket(bucket, region, { ObjectLocking: true })
    },
    async check() {
      if (!(await client.bucketExists(bucket))) throw new Error(`the bucket ${bucket} is not in the store`)
    },
    putStream: (key, stream, { signal } = {}) => putHashed(client, bucket, key, stream, signal),
    async putBytes(key, bytes) {
      const body = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength)
      const { versionId } = await client.putObject(bucket, key, body, body.length)
      const digest = (name: string) => createHash(name).update(body).digest('hex')
      return {
        versionId: versionId ?? null,
        size: body.length,
        sha256: digest('sha256'),
        sha512: digest('sha512'),
      }
    },
    get,
    getBytes: async (key, versionId, range) => buffer(await get(key, versionId, range)),
    async stat(key, versionId) {
      try {
        const found = await client.statObject(bucket, key, version(versionId))
        return { size: found.size, versionId: found.versionId ?? null }
      } catch (error) {
        if (isMissing(error)) return null
        throw error
      }
    },
    remove: (key, versionId) => client.removeObject(bucket, key, version(versionId)),
    async lock(key, versionId, until) {
      const retention = {
        mode: RETENTION_MODES.COMPLIANCE,
        retainUntilDate: until.toISOString(),
        ...version(versionId),
      }
      // The declared type of this argument admits no value at all (minio 8.0.7).
      await client.putObjectRetention(
        bucket,
        key,
        retention as unknown as Parameters<Client['putObjectRetention']>[2],
      )
    },
  }
}

const missingCodes = ['NotFound', 'NoSuchKey', 'NoSuchVersion', 'NoSuchBucket']

/** True for the error that an absent object gives. */
function isMissing(error: unknown): boolean {
  return error instanceof Error && 'code' in error && missingCodes.includes(String(error.code))
}
