import { randomUUID } from 'node:crypto'
import multer from 'multer'
import type { Request, Response } from 'express'
import { Problem } from '../../contract/problems.ts'
import { EmptyStream, type ObjectStore } from '../../platform/storage/object-store.ts'
import { emptyFile } from './declared.ts'

/** What has arrived in the store, with the digests made on the way. */
export interface Received {
  fileId: string
  name: string
  objectKey: string
  objectVersion: string | null
  size: number
  sha256: string
  sha512: string
}

/**
 * Streams the one multipart field `file` into the store under `raw/<fileId>`; memory stays flat whatever the size.
 * Refuses what is too large or has another form, and leaves nothing behind when the upload breaks off.
 */
export async function receiveStream(
  storage: ObjectStore,
  maxBytes: number,
  req: Request,
  res: Response,
): Promise<Received> {
  const upload = multer({
    storage: storeEngine(storage),
    defParamCharset: 'utf8',
    limits: { fileSize: maxBytes, files: 1, fields: 8, fieldSize: 4096, parts: 10, headerPairs: 50 },
  }).single('file')
  await new Promise<void>((resolve, reject) => {
    upload(req, res, (error: unknown) =>
      error === undefined || error === null ? resolve() : reject(asProblem(error, maxBytes)),
    )
  })
  const received = (req as Request & { file?: Received & Express.Multer.File }).file
  if (received === undefined)
    throw new Problem(
      'upload-refused',
      'No file came with the request. Send it as multipart/form-data in the field `file`.',
    )
  return received
}

function storeEngine(storage: ObjectStore): multer.StorageEngine {
  return {
    _handleFile(req, file, done) {
      const fileId = randomUUID()
      const objectKey = `raw/${fileId}`
      const ended = new AbortController()
      const stop = () => ended.abort()
      req.once('aborted', stop)
      file.stream.once('limit', stop)
      storage
        .putStream(objectKey, file.stream, { signal: ended.signal })
        .then((stored) => {
          const received: Received = {
            fileId,
            name: cleanName(file.originalname),
            objectKey,
            objectVersion: stored.versionId,
            size: stored.size,
            sha256: stored.sha256,
            sha512: stored.sha512,
          }
          done(null, received as unknown as Partial<Express.Multer.File>)
        })
        .catch((error: unknown) => {
          file.stream.resume()
          done(error instanceof EmptyStream ? emptyFile(cleanName(file.originalname)) : error)
        })
        .finally(() => req.off('aborted', stop))
    },
    _removeFile(_req, file, done) {
      const { objectKey } = file as unknown as Received
      storage.remove(objectKey).then(() => done(null), done)
    },
  }
}

/** The last part of a path, without control characters; never empty, at most 200 characters. */
export function cleanName(name: string): string {
  const last = name.split(/[/\\]/).at(-1) ?? ''
  const clean = last
    .normalize('NFC')
    // eslint-disable-next-line no-control-regex -- control and direction characters have no place in a file name
    .replace(/[\u0000-\u001f\u007f\u200e\u200f\u202a-\u202e\u2066-\u2069]/g, '')
    .trim()
  return clean.slice(0, 200) || 'unnamed'
}

function asProblem(error: unknown, maxBytes: number): unknown {
  const code = (error as { code?: string }).code
  if (code === 'LIMIT_FILE_SIZE')
    return new Problem(
      'too-large',
      `The file is larger than ${maxBytes} bytes, the limit of this laboratory. Nothing was kept.`,
    )
  if (code === 'LIMIT_UNEXPECTED_FILE' || code === 'LIMIT_FILE_COUNT')
    return new Problem('upload-refused', 'Send one file at a time in the field `file`. Nothing was kept.')
  if (code?.startsWith('LIMIT_'))
    return new Problem(
      'upload-refused',
      'The upload has more parts than an upload here needs. Nothing was kept.',
    )
  if (/unexpected end of form|malformed part|boundary not found/i.test(String((error as Error).message)))
    return new Problem(
      'upload-refused',
      'The upload broke off before its end. Nothing was kept; send the file again.',
    )
  return error
}
