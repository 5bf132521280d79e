import type { Version } from './buckets.ts'
import type { Call, Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { encodePercent } from './signature.ts'
import { xmlDocument } from './xml.ts'

const mostEntries = 1000

/** A whole number from the query within 0..1000. Throws InvalidArgument. */
export function limitOf(call: Call, name: string): number {
  const text = call.query.get(name)
  if (text === undefined) return mostEntries
  if (!/^\d{1,10}$/.test(text))
    throw new S3Error('InvalidArgument', `${name} must be a whole number of at least 0.`)
  return Math.min(Number(text), mostEntries)
}

/** How names are written in the answer: as they are, or percent-encoded when encoding-type=url. */
function nameWriter(call: Call): (name: string) => string {
  const type = call.query.get('encoding-type')
  if (type === undefined) return (name) => name
  if (type !== 'url') throw new S3Error('InvalidArgument', 'encoding-type must be url.')
  return (name) => name.split('/').map(encodePercent).join('/')
}

/** The common prefix that a key falls under: up to the first delimiter after the prefix; null when there is none. */
function commonPrefix(key: string, prefix: string, delimiter: string): string | null {
  const at = delimiter === '' ? -1 : key.indexOf(delimiter, prefix.length)
  return at < 0 ? null : key.slice(0, at + delimiter.length)
}

const isAfter = (name: string, mark: string) => Buffer.compare(Buffer.from(name), Buffer.from(mark)) > 0

interface Page {
  versions: Version[]
  prefixes: string[]
  /** Last key or common prefix of the page, when more follow. */
  next: string | null
}

/** One page of newest versions and common prefixes after a mark, in key order. */
function pageOf(newest: Version[], prefix: string, delimiter: string, after: string, limit: number): Page {
  const page: Page = { versions: [], prefixes: [], next: null }
  let last = after
  for (const version of newest) {
    const common = commonPrefix(version.key, prefix, delimiter)
    const name = common ?? version.key
    if (after !== '' && !isAfter(name, after)) continue
    if (common !== null && page.prefixes.at(-1) === common) continue
    if (page.versions.length + page.prefixes.length >= limit) {
      page.next = limit > 0 ? last : null
      return page
    }
    if (common === null) page.versions.push(version)
    else page.prefixes.push(common)
    last = name
  }
  return page
}

const encodeToken = (name: string) => Buffer.from(name, 'utf8').toString('base64url')

/** GET ?list-type=2: the newest version of each key, delete markers left out. */
export async function listObjects(call: Call): Promise<Reply> {
  const bucket = await call.buckets.bucket(call.bucket)
  const write = nameWriter(call)
  const { query } = call
  const [prefix, delimiter] = [query.get('prefix') ?? '', query.get('delimiter') ?? '']
  const [startAfter, token] = [query.get('start-after'), query.get('continuation-token')]
  const after = token === undefined ? (startAfter ?? '') : Buffer.from(token, 'base64url').toString('utf8')
  const limit = limitOf(call, 'max-keys')
  const newest = (await call.buckets.keys(bucket.name, prefix)).map(({ versions }) => versions[0]!)
  const page = pageOf(
    newest.filter((v) => !v.deleteMarker),
    prefix,
    delimiter,
    after,
    limit,
  )
  const xml = xmlDocument('ListBucketResult', {
    Name: bucket.name,
    Prefix: write(prefix),
    Delimiter: delimiter === '' ? undefined : write(delimiter),
    MaxKeys: limit,
    EncodingType: query.get('encoding-type'),
    KeyCount: page.versions.length + page.prefixes.length,
    IsTruncated: page.next !== null,
    ContinuationToken: token,
    StartAfter: startAfter === undefined ? undefined : write(startAfter),
    NextContinuationToken: page.next === null ? undefined : encodeToken(page.next),
    Contents: page.versions.map((v) => ({
      Key: write(v.key),
      LastModified: v.lastModified,
      ETag: `"${v.etag}"`,
      Size: v.size,
      StorageClass: 'STANDARD',
    })),
    CommonPrefixes: page.prefixes.map((name) => ({ Prefix: write(name) })),
  })
  return { status: 200, xml }
}

interface Listed extends Version {
  isLatest: boolean
}

/** Drops everything up to and with the marked version (or, without a version, the marked key). */
function afterMarker(listed: Listed[], key: string | undefined, versionId: string | undefined): Listed[] {
  if (key === undefined || key === '') return listed
  if (versionId === undefined || versionId === '') return listed.filter((v) => isAfter(v.key, key))
  return listed.filter((v) => isAfter(v.key, key) || (v.key === key && v.versionId < versionId))
}

/** GET ?versions: all versions and delete markers, newest first within a key. A delimiter is not offered. */
export async function listVersions(call: Call): Promise<Reply> {
  const bucket = await call.buckets.bucket(call.bucket)
  const write = nameWriter(call)
  const { query } = call
  if (query.get('delimiter')) throw new S3Error('NotImplemented', 'Versions are listed without a delimiter.')
  const limit = limitOf(call, 'max-keys')
  const [keyMarker, versionMarker] = [query.get('key-marker'), query.get('version-id-marker')]
  const all = (await call.buckets.keys(bucket.name, query.get('prefix') ?? '')).flatMap(({ versions }) =>
    versions.map((version, i): Listed => ({ ...version, isLatest: i === 0 })),
  )
  const rest = afterMarker(all, keyMarker, versionMarker)
  const page = rest.slice(0, limit)
  const last = rest.length > limit ? page.at(-1) : undefined
  const common = (v: Listed) => ({
    Key: write(v.key),
    VersionId: v.versionId,
    IsLatest: v.isLatest,
    LastModified: v.lastModified,
  })
  const xml = xmlDocument('ListVersionsResult', {
    Name: bucket.name,
    Prefix: write(query.get('prefix') ?? ''),
    KeyMarker: write(keyMarker ?? ''),
    VersionIdMarker: versionMarker ?? '',
    MaxKeys: limit,
    EncodingType: query.get('encoding-type'),
    IsTruncated: last !== undefined,
    NextKeyMarker: last && write(last.key),
    NextVersionIdMarker: last?.versionId,
    Version: page
      .filter((v) => !v.deleteMarker)
      .map((v) => ({ ...common(v), ETag: `"${v.etag}"`, Size: v.size, StorageClass: 'STANDARD' })),
    DeleteMarker: page.filter((v) => v.deleteMarker).map(common),
  })
  return { status: 200, xml }
}
