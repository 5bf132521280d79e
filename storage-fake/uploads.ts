import { randomBytes } from 'node:crypto'
import { mkdir, rename, rm, stat } from 'node:fs/promises'
import { join } from 'node:path'
import type { Buckets } from './buckets.ts'
import { isMissing, moveInto, namesIn, readJson, writeJson } from './disk.ts'
import { S3Error } from './errors.ts'
import type { Described } from './object-headers.ts'

export interface Upload extends Described {
  uploadId: string
  initiated: string
}

export interface Part {
  number: number
  etag: string
  size: number
  path: string
  /** ISO 8601 */
  lastModified: string
}

const uploadIdForm = /^[0-9a-f]{32}$/

/**
 * Unfinished multipart uploads in `buckets/<name>/uploads/<upload id>/`: `upload.json` and one file
 * `<part number>.<md5>` a part, so that a part and its digest appear in one rename.
 */
export class Uploads {
  constructor(private readonly buckets: Buckets) {}

  private folder(bucket: string, uploadId = ''): string {
    return join(this.buckets.bucketFolder(bucket), 'uploads', uploadId)
  }

  async start(bucket: string, described: Described, initiated: string): Promise<Upload> {
    const upload: Upload = { ...described, uploadId: randomBytes(16).toString('hex'), initiated }
    const folder = this.folder(bucket, upload.uploadId)
    await mkdir(folder, { recursive: true })
    await writeJson(join(folder, 'upload.json'), upload, this.buckets.tempFolder)
    return upload
  }

  /** Throws NoSuchUpload, also when the upload is of another key. */
  async find(bucket: string, key: string, uploadId: string): Promise<Upload> {
    const path = join(this.folder(bucket, uploadId), 'upload.json')
    const upload = uploadIdForm.test(uploadId) ? await readJson<Upload>(path) : null
    if (upload?.key !== key)
      throw new S3Error('NoSuchUpload', 'The upload does not exist: it may be aborted or completed.')
    return upload
  }

  /** Unfinished uploads of a bucket, by key, then by age. */
  async list(bucket: string): Promise<Upload[]> {
    const ids = await namesIn(this.folder(bucket))
    const uploads = await Promise.all(
      ids.map((id) => readJson<Upload>(join(this.folder(bucket, id), 'upload.json'))),
    )
    return uploads
      .filter((upload) => upload !== null)
      .sort(
        (a, b) =>
          Buffer.compare(Buffer.from(a.key), Buffer.from(b.key)) ||
          a.initiated.localeCompare(b.initiated) ||
          a.uploadId.localeCompare(b.uploadId),
      )
  }

  /** Puts a flushed temporary file in place as a part; an earlier part of that number is replaced. */
  async addPart(
    bucket: string,
    uploadId: string,
    number: number,
    md5: string,
    tempFile: string,
  ): Promise<void> {
    const folder = this.folder(bucket, uploadId)
    const prefix = `${String(number).padStart(5, '0')}.`
    try {
      await moveInto(tempFile, join(folder, prefix + md5))
    } catch (error) {
      await rm(tempFile, { force: true })
      if (isMissing(error))
        throw new S3Error('NoSuchUpload', 'The upload was aborted while the part came in.')
      throw error
    }
    const older = (await namesIn(folder)).filter((name) => name.startsWith(prefix) && name !== prefix + md5)
    for (const name of older) await rm(join(folder, name), { force: true })
  }

  /** Parts that are there, by number. */
  async parts(bucket: string, uploadId: string): Promise<Part[]> {
    const folder = this.folder(bucket, uploadId)
    const names = (await namesIn(folder)).filter((name) => /^\d{5}\.[0-9a-f]{32}$/.test(name))
    return Promise.all(
      names.map(async (name): Promise<Part> => {
        const path = join(folder, name)
        const { size, mtime } = await stat(path)
        return {
          number: Number(name.slice(0, 5)),
          etag: name.slice(6),
          size,
          path,
          lastModified: mtime.toISOString(),
        }
      }),
    )
  }

  /** Removes an upload with its parts, at once for every other request. */
  async remove(bucket: string, uploadId: string): Promise<void> {
    const grave = this.buckets.tempFile()
    await rename(this.folder(bucket, uploadId), grave)
    await rm(grave, { recursive: true })
  }
}
