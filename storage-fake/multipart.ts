import { createHash } from 'node:crypto'
import { createReadStream, createWriteStream } from 'node:fs'
import { rm } from 'node:fs/promises'
import { pipeline } from 'node:stream/promises'
import { receiveFile, receiveText } from './body.ts'
import type { Call, Reply } from './call.ts'
import { S3Error } from './errors.ts'
import { limitOf } from './listing.ts'
import { describe } from './object-headers.ts'
import type { Part, Upload } from './uploads.ts'
import { childText, parseDocument, xmlDocument, type XmlElement } from './xml.ts'

/** Every part but the last has at least 5 MiB, as S3. */
const smallestPart = 5 * 1024 ** 2
const highestPartNumber = 10_000

/** POST ?uploads */
export async function startUpload(call: Call): Promise<Reply> {
  const bucket = await call.buckets.bucket(call.bucket)
  const upload = await call.uploads.start(
    bucket.name,
    describe(call, bucket),
    new Date(call.now).toISOString(),
  )
  const xml = xmlDocument('InitiateMultipartUploadResult', {
    Bucket: bucket.name,
    Key: upload.key,
    UploadId: upload.uploadId,
  })
  return { status: 200, xml }
}

async function namedUpload(call: Call): Promise<Upload> {
  await call.buckets.bucket(call.bucket)
  return call.uploads.find(call.bucket, call.key, call.query.get('uploadId') ?? '')
}

function partNumberOf(text: string | undefined): number {
  const number = /^\d{1,5}$/.test(text ?? '') ? Number(text) : 0
  if (number < 1 || number > highestPartNumber) {
    throw new S3Error('InvalidArgument', `A part number lies between 1 and ${highestPartNumber}.`)
  }
  return number
}

/** PUT ?partNumber=&uploadId= */
export async function putPart(call: Call): Promise<Reply> {
  const upload = await namedUpload(call)
  const number = partNumberOf(call.query.get('partNumber'))
  const temp = call.buckets.tempFile()
  const { md5 } = await receiveFile(call.request, call.payloadHash, temp)
  await call.uploads.addPart(call.bucket, upload.uploadId, number, md5, temp)
  return { status: 200, headers: { etag: `"${md5}"` } }
}

/** GET ?uploadId= */
export async function listParts(call: Call): Promise<Reply> {
  const upload = await namedUpload(call)
  const limit = limitOf(call, 'max-parts')
  const marker = Number(call.query.get('part-number-marker') ?? 0)
  const rest = (await call.uploads.parts(call.bucket, upload.uploadId)).filter((part) => part.number > marker)
  const page = rest.slice(0, limit)
  const xml = xmlDocument('ListPartsResult', {
    Bucket: call.bucket,
    Key: upload.key,
    UploadId: upload.uploadId,
    PartNumberMarker: marker,
    NextPartNumberMarker: page.at(-1)?.number ?? marker,
    MaxParts: limit,
    IsTruncated: rest.length > page.length,
    Part: page.map((part) => ({
      PartNumber: part.number,
      LastModified: part.lastModified,
      ETag: `"${part.etag}"`,
      Size: part.size,
    })),
  })
  return { status: 200, xml }
}

/** GET ?uploads, without a delimiter. */
export async function listUploads(call: Call): Promise<Reply> {
  const bucket = await call.buckets.bucket(call.bucket)
  if (call.query.get('delimiter'))
    throw new S3Error('NotImplemented', 'Uploads are listed without a delimiter.')
  const prefix = call.query.get('prefix') ?? ''
  const [keyMarker, idMarker] = [call.query.get('key-marker') ?? '', call.query.get('upload-id-marker') ?? '']
  const limit = limitOf(call, 'max-uploads')
  const all = (await call.uploads.list(bucket.name)).filter((upload) => upload.key.startsWith(prefix))
  const at = all.findIndex((upload) => upload.key === keyMarker && upload.uploadId === idMarker)
  const after = (upload: Upload) => Buffer.compare(Buffer.from(upload.key), Buffer.from(keyMarker)) > 0
  const rest = at >= 0 ? all.slice(at + 1) : keyMarker === '' ? all : all.filter(after)
  const page = rest.slice(0, limit)
  const last = rest.length > page.length ? page.at(-1) : undefined
  const xml = xmlDocument('ListMultipartUploadsResult', {
    Bucket: bucket.name,
    KeyMarker: keyMarker,
    UploadIdMarker: idMarker,
    NextKeyMarker: last?.key,
    NextUploadIdMarker: last?.uploadId,
    Prefix: prefix,
    MaxUploads: limit,
    IsTruncated: last !== undefined,
    Upload: page.map((upload) => ({
      Key: upload.key,
      UploadId: upload.uploadId,
      StorageClass: 'STANDARD',
      Initiated: upload.initiated,
    })),
  })
  return { status: 200, xml }
}

/** DELETE ?uploadId= */
export async function abortUpload(call: Call): Promise<Reply> {
  return call.buckets.serial.run(`upload ${call.query.get('uploadId')}`, async () => {
    const upload = await namedUpload(call)
    await call.uploads.remove(call.bucket, upload.uploadId)
    return { status: 204 }
  })
}

/** The parts that a CompleteMultipartUpload names, checked against those that are there. */
export function chosenParts(root: XmlElement, present: Part[]): Part[] {
  const named = root.children.filter((child) => child.name === 'Part')
  if (named.length === 0) throw new S3Error('MalformedXML', 'At least one part must be named.')
  const chosen = named.map((element) => {
    const number = partNumberOf(childText(element, 'PartNumber'))
    const etag = childText(element, 'ETag')?.replaceAll('"', '')
    const part = present.find((p) => p.number === number && p.etag === etag)
    if (!part) throw new S3Error('InvalidPart', `Part ${number} is not there or has another ETag.`)
    return part
  })
  if (chosen.some((part, i) => i > 0 && part.number <= chosen[i - 1]!.number)) {
    throw new S3Error('InvalidPartOrder', 'The parts must be named in ascending order.')
  }
  if (chosen.slice(0, -1).some((part) => part.size < smallestPart)) {
    throw new S3Error('EntityTooSmall', 'Every part but the last must have at least 5 MiB.')
  }
  return chosen
}

/** Concatenates parts into a new file, flushed to disk. */
async function joinParts(parts: Part[], path: string): Promise<void> {
  try {
    await pipeline(
      async function* () {
        for (const part of parts) yield* createReadStream(part.path)
      },
      createWriteStream(path, { flags: 'wx', flush: true }),
    )
  } catch (error) {
    await rm(path, { force: true })
    throw error
  }
}

/** POST ?uploadId=: the ETag is the MD5 of the parts' MD5s and their number, as S3. */
export async function completeUpload(call: Call): Promise<Reply> {
  const document = await receiveText(call.request, call.payloadHash)
  return call.buckets.serial.run(`upload ${call.query.get('uploadId')}`, async () => {
    const { uploadId, initiated: _, ...described } = await namedUpload(call)
    const root = parseDocument(document, 'CompleteMultipartUpload')
    const parts = chosenParts(root, await call.uploads.parts(call.bucket, uploadId))
    const temp = call.buckets.tempFile()
    await joinParts(parts, temp)
    const md5 = createHash('md5')
      .update(Buffer.from(parts.map((part) => part.etag).join(''), 'hex'))
      .digest('hex')
    const etag = `${md5}-${parts.length}`
    const size = parts.reduce((sum, part) => sum + part.size, 0)
    const lastModified = new Date(call.now).toISOString()
    const fresh = { ...described, size, etag, lastModified, deleteMarker: false }
    const version = await call.buckets.addVersion(call.bucket, fresh, temp)
    await call.uploads.remove(call.bucket, uploadId)
    const xml = xmlDocument('CompleteMultipartUploadResult', {
      Location: `http://${call.request.headers.host ?? ''}/${call.bucket}/${call.key}`,
      Bucket: call.bucket,
      Key: call.key,
      ETag: `"${etag}"`,
    })
    return { status: 200, headers: { 'x-amz-version-id': version.versionId }, xml }
  })
}
