import type { Bucket, NewVersion, Version } from './buckets.ts'
import { header, type Call } from './call.ts'
import { S3Error } from './errors.ts'
import { defaultRetention, parseRetention, type Locked } from './locks.ts'

const metaPrefix = 'x-amz-meta-'
/** Bytes of all user metadata names and values, as S3. */
const largestMetadata = 2048
const longestKey = 1024

/** What the headers of a PUT or of a multipart start say of the object to come. */
export type Described = Pick<NewVersion, 'key' | 'contentType' | 'metadata' | 'retention' | 'legalHold'>

function metadataOf(call: Call): Record<string, string> {
  const pairs = Object.entries(call.request.headers)
    .filter(([name]) => name.startsWith(metaPrefix))
    .map(([name, value]): [string, string] => [name.slice(metaPrefix.length), String(value)])
  const size = pairs.reduce(
    (sum, [name, value]) => sum + Buffer.byteLength(name) + Buffer.byteLength(value),
    0,
  )
  if (size > largestMetadata)
    throw new S3Error('MetadataTooLarge', 'User metadata may hold at most 2048 bytes.')
  return Object.fromEntries(pairs)
}

function lockOf(call: Call, bucket: Bucket): Locked {
  const [mode, until, hold] = ['mode', 'retain-until-date', 'legal-hold'].map((n) =>
    header(call, `x-amz-object-lock-${n}`),
  )
  if (mode === undefined && until === undefined && hold === undefined) {
    return { retention: defaultRetention(bucket.defaultRetention, call.now), legalHold: false }
  }
  requireLock(bucket)
  if (call.request.method === 'PUT' && header(call, 'content-md5') === undefined) {
    throw new S3Error(
      'InvalidRequest',
      'Content-MD5 is required for PUT requests with object lock parameters.',
    )
  }
  if (hold !== undefined && hold !== 'ON' && hold !== 'OFF') {
    throw new S3Error('InvalidArgument', 'The legal hold must be ON or OFF.')
  }
  const retention =
    mode === undefined && until === undefined
      ? defaultRetention(bucket.defaultRetention, call.now)
      : parseRetention(mode, until, 'InvalidArgument')
  if (retention && Date.parse(retention.until) <= call.now) {
    throw new S3Error('InvalidArgument', 'The retain until date must be in the future.')
  }
  return { retention, legalHold: hold === 'ON' }
}

/** Throws when the bucket was not made with object lock. */
export function requireLock(bucket: Bucket): void {
  if (!bucket.objectLock) throw new S3Error('InvalidRequest', 'Bucket is missing Object Lock Configuration.')
}

/** Reads the headers that describe a new object. */
export function describe(call: Call, bucket: Bucket): Described {
  if (Buffer.byteLength(call.key) > longestKey)
    throw new S3Error('KeyTooLongError', 'The key is longer than 1024 bytes.')
  return {
    key: call.key,
    contentType: header(call, 'content-type') ?? 'binary/octet-stream',
    metadata: metadataOf(call),
    ...lockOf(call, bucket),
  }
}

/** Headers of a GET or HEAD answer. */
export function headersOf(version: Version): Record<string, string> {
  const metadata = Object.entries(version.metadata).map(([name, value]) => [`${metaPrefix}${name}`, value])
  const lock = version.retention
    ? {
        'x-amz-object-lock-mode': version.retention.mode,
        'x-amz-object-lock-retain-until-date': version.retention.until,
      }
    : {}
  return {
    'content-type': version.contentType,
    etag: `"${version.etag}"`,
    'last-modified': new Date(version.lastModified).toUTCString(),
    'accept-ranges': 'bytes',
    'x-amz-version-id': version.versionId,
    ...lock,
    ...(version.legalHold ? { 'x-amz-object-lock-legal-hold': 'ON' } : {}),
    ...Object.fromEntries(metadata),
  }
}
