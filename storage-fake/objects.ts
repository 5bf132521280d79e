import { receiveFile } from './body.ts'
import type { NewVersion, Version } from './buckets.ts'
import { header, type Call, type Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { checkDeletable } from './locks.ts'
import { describe, headersOf } from './object-headers.ts'

/** PUT of a whole object: every PUT is a new version. */
export async function putObject(call: Call): Promise<Reply> {
  const bucket = await call.buckets.bucket(call.bucket)
  const described = describe(call, bucket)
  const temp = call.buckets.tempFile()
  const received = await receiveFile(call.request, call.payloadHash, temp)
  const lastModified = new Date(call.now).toISOString()
  const version = await call.buckets.addVersion(
    bucket.name,
    { ...described, size: received.size, etag: received.md5, lastModified, deleteMarker: false },
    temp,
  )
  return { status: 200, headers: { etag: `"${version.etag}"`, 'x-amz-version-id': version.versionId } }
}

/** The version that a request names, or the newest. Throws NoSuchKey, NoSuchVersion. */
export async function namedVersion(call: Call): Promise<Version> {
  const versionId = call.query.get('versionId')
  return versionId === undefined
    ? call.buckets.latest(call.bucket, call.key)
    : call.buckets.version(call.bucket, call.key, versionId)
}

function refuseMarker(version: Version, byVersion: boolean): void {
  if (!version.deleteMarker) return
  const headers = { 'x-amz-delete-marker': 'true', 'x-amz-version-id': version.versionId }
  if (byVersion) throw new S3Error('MethodNotAllowed', 'The version is a delete marker.', headers)
  throw new S3Error('NoSuchKey', 'The key does not exist.', headers)
}

/** First and last byte that a Range header asks for; null for the whole object. Throws InvalidRange. */
export function parseRange(range: string | undefined, size: number): { start: number; end: number } | null {
  const match = /^bytes=(\d*)-(\d*)$/.exec(range ?? '')
  // Several ranges and other units are ignored, as S3 does.
  if (!match || (match[1] === '' && match[2] === '')) return null
  const [first, last] = [match[1]!, match[2]!]
  const start = first === '' ? Math.max(0, size - Number(last)) : Number(first)
  const end = first === '' || last === '' ? size - 1 : Math.min(Number(last), size - 1)
  if (first !== '' && last !== '' && Number(last) < Number(first)) return null
  if (start >= size || (first === '' && Number(last) === 0)) {
    throw new S3Error('InvalidRange', 'The requested range is not satisfiable.', {
      'content-range': `bytes */${size}`,
    })
  }
  return { start, end }
}

const answerHeaders = [
  'content-type',
  'content-language',
  'expires',
  'cache-control',
  'content-disposition',
  'content-encoding',
]

/** Query parameters by which a GET chooses headers of its answer. */
export const answerOverrides = answerHeaders.map((name) => `response-${name}`)

/** GET or HEAD of an object, whole or a range. */
export async function getObject(call: Call): Promise<Reply> {
  await call.buckets.bucket(call.bucket)
  const version = await namedVersion(call)
  refuseMarker(version, call.query.has('versionId'))
  const range = parseRange(header(call, 'range'), version.size)
  const { start, end } = range ?? { start: 0, end: version.size - 1 }
  const overrides = answerHeaders.flatMap((name) => {
    const value = call.query.get(`response-${name}`)
    return value === undefined ? [] : [[name, value]]
  })
  return {
    status: range ? 206 : 200,
    headers: {
      ...headersOf(version),
      ...(range ? { 'content-range': `bytes ${start}-${end}/${version.size}` } : {}),
      ...Object.fromEntries(overrides),
    },
    file: { path: call.buckets.dataFile(call.bucket, version), start, end },
  }
}

function deleteMarker(key: string, now: number): NewVersion {
  const lastModified = new Date(now).toISOString()
  const nothing = { size: 0, etag: '', contentType: '', metadata: {}, retention: null, legalHold: false }
  return { key, deleteMarker: true, lastModified, ...nothing }
}

export interface Deletion {
  versionId: string | undefined
  /** The delete marker made or removed, if any. */
  marker: Version | null
}

/**
 * Without a version id adds a delete marker; with one removes that version for good, if no lock forbids it (403).
 * A version that does not exist is deleted already.
 */
export async function deleteOne(call: Call, key: string, versionId: string | undefined): Promise<Deletion> {
  const { buckets, bucket } = call
  if (versionId === undefined) {
    const marker = await buckets.addVersion(bucket, deleteMarker(key, call.now), null)
    return { versionId: marker.versionId, marker }
  }
  return buckets.serial.run(`${bucket}/${key}`, async () => {
    const version = await buckets.version(bucket, key, versionId).catch((error: unknown) => {
      if (error instanceof S3Error && error.code === 'NoSuchVersion') return null
      throw error
    })
    if (!version) return { versionId, marker: null }
    checkDeletable(version, call.now, call.bypassGovernance)
    await buckets.removeVersion(bucket, version)
    return { versionId, marker: version.deleteMarker ? version : null }
  })
}

/** DELETE of one object or version. */
export async function deleteObject(call: Call): Promise<Reply> {
  await call.buckets.bucket(call.bucket)
  const { versionId, marker } = await deleteOne(call, call.key, call.query.get('versionId'))
  const headers = {
    ...(versionId === undefined ? {} : { 'x-amz-version-id': versionId }),
    ...(marker ? { 'x-amz-delete-marker': 'true' } : {}),
  }
  return { status: 204, headers }
}
