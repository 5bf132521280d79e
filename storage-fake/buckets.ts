import { createHash, randomBytes } from 'node:crypto'
import { mkdir, rm, rmdir } from 'node:fs/promises'
import { join } from 'node:path'
import { moveInto, namesIn, readJson, tempName, writeJson } from './disk.ts'
import { S3Error } from './errors.ts'
import type { DefaultRetention, Locked } from './locks.ts'
import { Serial } from './serial.ts'

export interface Bucket {
  name: string
  createdAt: string
  objectLock: boolean
  defaultRetention: DefaultRetention | null
}

/** One version of an object, or a delete marker (which has no bytes). */
export interface Version extends Locked {
  key: string
  versionId: string
  deleteMarker: boolean
  size: number
  etag: string
  lastModified: string
  contentType: string
  /** User metadata: names without x-amz-meta-, in lower case. */
  metadata: Record<string, string>
}

export type NewVersion = Omit<Version, 'versionId'>

const versionIdForm = /^\d{10}-[0-9a-f]{16}$/

/**
 * Buckets of versioned objects in a folder, and nothing kept in memory:
 * `buckets/<name>/bucket.json`, `buckets/<name>/objects/<sha256 of key>/<version id>.{json,data}`, `temp/`.
 * A version exists once its .json does; version ids sort by age.
 */
export class Buckets {
  readonly tempFolder: string
  /** Changes of one key (or one bucket's settings) happen one after another. */
  readonly serial = new Serial()
  private readonly root: string

  constructor(folder: string) {
    this.root = join(folder, 'buckets')
    this.tempFolder = join(folder, 'temp')
  }

  /** Makes the folders and clears what a crash left half written. */
  async open(): Promise<void> {
    await mkdir(this.root, { recursive: true })
    await rm(this.tempFolder, { recursive: true, force: true })
    await mkdir(this.tempFolder, { recursive: true })
    for (const bucket of await namesIn(this.root)) {
      for (const hash of await namesIn(join(this.root, bucket, 'objects')))
        await this.clearOrphans(bucket, hash)
    }
  }

  private async clearOrphans(bucket: string, hash: string): Promise<void> {
    const folder = join(this.root, bucket, 'objects', hash)
    const names = await namesIn(folder)
    const orphans = names.filter((n) => n.endsWith('.data') && !names.includes(n.replace(/data$/, 'json')))
    for (const name of orphans) await rm(join(folder, name))
    if (orphans.length === names.length) await rmdir(folder)
  }

  tempFile(): string {
    return tempName(this.tempFolder)
  }

  bucketFolder(name: string): string {
    return join(this.root, name)
  }

  private objectFolder(bucket: string, key: string): string {
    return join(this.root, bucket, 'objects', createHash('sha256').update(key, 'utf8').digest('hex'))
  }

  /** Throws InvalidBucketName or BucketAlreadyOwnedByYou. */
  async createBucket(bucket: Bucket): Promise<void> {
    if (!isBucketName(bucket.name)) throw new S3Error('InvalidBucketName', 'The bucket name is not valid.')
    await this.serial.run(bucket.name, async () => {
      if (await readJson(this.bucketFile(bucket.name))) {
        throw new S3Error('BucketAlreadyOwnedByYou', 'You already own a bucket of this name.')
      }
      await mkdir(join(this.bucketFolder(bucket.name), 'objects'), { recursive: true })
      await this.saveBucket(bucket)
    })
  }

  private bucketFile(name: string): string {
    return join(this.bucketFolder(name), 'bucket.json')
  }

  async saveBucket(bucket: Bucket): Promise<void> {
    await writeJson(this.bucketFile(bucket.name), bucket, this.tempFolder)
  }

  /** Throws NoSuchBucket. */
  async bucket(name: string): Promise<Bucket> {
    const bucket = isBucketName(name) ? await readJson<Bucket>(this.bucketFile(name)) : null
    if (!bucket) throw new S3Error('NoSuchBucket', 'The bucket does not exist.')
    return bucket
  }

  async listBuckets(): Promise<Bucket[]> {
    const buckets = await Promise.all(
      (await namesIn(this.root)).map((name) => readJson<Bucket>(this.bucketFile(name))),
    )
    return buckets.filter((bucket) => bucket !== null)
  }

  /** Removes an empty bucket. Throws BucketNotEmpty when any version is left. */
  async removeBucket(name: string): Promise<void> {
    await this.serial.run(name, async () => {
      if ((await namesIn(join(this.bucketFolder(name), 'objects'))).length > 0) {
        throw new S3Error('BucketNotEmpty', 'The bucket still holds object versions.')
      }
      await rm(this.bucketFolder(name), { recursive: true })
    })
  }

  /** Versions of a key, newest first. */
  async versions(bucket: string, key: string): Promise<Version[]> {
    return this.versionsIn(this.objectFolder(bucket, key))
  }

  private async versionsIn(folder: string): Promise<Version[]> {
    const names = (await namesIn(folder)).filter((name) => name.endsWith('.json')).reverse()
    const versions = await Promise.all(names.map((name) => readJson<Version>(join(folder, name))))
    return versions.filter((version) => version !== null)
  }

  /** The newest version of a key, which may be a delete marker. Throws NoSuchKey. */
  async latest(bucket: string, key: string): Promise<Version> {
    const folder = this.objectFolder(bucket, key)
    const newest = (await namesIn(folder)).findLast((name) => name.endsWith('.json'))
    const version = newest === undefined ? null : await readJson<Version>(join(folder, newest))
    if (!version) throw new S3Error('NoSuchKey', 'The key does not exist.')
    return version
  }

  /** One version of a key by its id. Throws NoSuchVersion. */
  async version(bucket: string, key: string, versionId: string): Promise<Version> {
    const path = join(this.objectFolder(bucket, key), `${versionId}.json`)
    const version = versionIdForm.test(versionId) ? await readJson<Version>(path) : null
    if (!version) throw new S3Error('NoSuchVersion', 'The version does not exist.')
    return version
  }

  dataFile(bucket: string, version: Version): string {
    return join(this.objectFolder(bucket, version.key), `${version.versionId}.data`)
  }

  /** Adds the newest version of a key from a flushed temporary file (null for a delete marker). */
  async addVersion(bucket: string, given: NewVersion, tempFile: string | null): Promise<Version> {
    return this.serial.run(`${bucket}/${given.key}`, async () => {
      const folder = this.objectFolder(bucket, given.key)
      await this.bucket(bucket)
      await mkdir(folder, { recursive: true })
      const newest = (await namesIn(folder)).at(-1)
      const sequence = newest === undefined ? 1 : Number(newest.slice(0, 10)) + 1
      const versionId = `${String(sequence).padStart(10, '0')}-${randomBytes(8).toString('hex')}`
      const version: Version = { ...given, versionId }
      if (tempFile !== null) await moveInto(tempFile, this.dataFile(bucket, version))
      await this.saveVersion(bucket, version)
      return version
    })
  }

  async saveVersion(bucket: string, version: Version): Promise<void> {
    const path = join(this.objectFolder(bucket, version.key), `${version.versionId}.json`)
    await writeJson(path, version, this.tempFolder)
  }

  /** Removes a version for good; whether it may be removed is the caller's to check, within the same serial task. */
  async removeVersion(bucket: string, version: Version): Promise<void> {
    const folder = this.objectFolder(bucket, version.key)
    await rm(join(folder, `${version.versionId}.json`))
    await rm(this.dataFile(bucket, version), { force: true })
    if ((await namesIn(folder)).length === 0) await rmdir(folder)
  }

  /** Every key that starts with the prefix with its versions, newest first; keys in the order of their UTF-8 bytes. */
  async keys(bucket: string, prefix: string): Promise<{ key: string; versions: Version[] }[]> {
    const root = join(this.bucketFolder(bucket), 'objects')
    const found: { key: string; versions: Version[] }[] = []
    for (const hash of await namesIn(root)) {
      const versions = await this.versionsIn(join(root, hash))
      const key = versions[0]?.key
      if (key?.startsWith(prefix)) found.push({ key, versions })
    }
    return found.sort((a, b) => Buffer.compare(Buffer.from(a.key), Buffer.from(b.key)))
  }
}

function isBucketName(name: string): boolean {
  return /^[a-z0-9][a-z0-9.-]{1,61}[a-z0-9]$/.test(name) && !name.includes('..')
}
