import { pipeline } from 'node:stream/promises'
import type { Request, Response } from 'express'
import { Problem } from '../../contract/problems.ts'
import type { Services } from '../../platform/services.ts'
import type { FileRow } from './repository.ts'

/** Types that a browser may show; everything else is only ever saved. */
const SHOWN_TYPES: Record<string, string> = {
  png: 'image/png',
  jpg: 'image/jpeg',
  jpeg: 'image/jpeg',
  webp: 'image/webp',
  pdf: 'application/pdf',
}

/** Sends the bytes as uploaded, whole or one range of them, in a form that no browser runs at our origin (threat B12). */
export async function sendContent(
  services: Services,
  file: FileRow,
  req: Request,
  res: Response,
): Promise<void> {
  const size = Number(file.size)
  const range = parseRange(req.get('range'), size)
  res.set({
    'content-type':
      SHOWN_TYPES[file.name.split('.').at(-1)?.toLowerCase() ?? ''] ?? 'application/octet-stream',
    'content-disposition': disposition(file.name),
    'content-security-policy': "sandbox; default-src 'none'",
    'x-content-type-options': 'nosniff',
    'repr-digest': `sha-256=:${Buffer.from(file.sha256, 'hex').toString('base64')}:`,
    'accept-ranges': 'bytes',
    etag: `"${file.sha256}"`,
  })
  if (range === null) res.set('content-length', file.size)
  else
    res.status(206).set({
      'content-range': `bytes ${range.first}-${range.last}/${size}`,
      'content-length': String(range.last - range.first + 1),
    })
  const bytes = await services.storage.get(
    file.objectKey,
    file.objectVersion ?? undefined,
    range === null ? undefined : { offset: range.first, length: range.last - range.first + 1 },
  )
  await pipeline(bytes, res)
}

/** One byte range (RFC 9110 section 14.2); several ranges are answered with the whole, as the standard allows. */
export function parseRange(header: string | undefined, size: number): { first: number; last: number } | null {
  const match = header?.match(/^bytes=(\d*)-(\d*)$/)
  if (!match || (match[1] === '' && match[2] === '')) return null
  const first = match[1] === '' ? Math.max(0, size - Number(match[2])) : Number(match[1])
  const last = match[1] === '' || match[2] === '' ? size - 1 : Math.min(Number(match[2]), size - 1)
  if (first >= size || first > last)
    throw new Problem(
      'range-not-satisfiable',
      `The file has ${size} bytes; the range asked for lies outside.`,
    )
  return { first, last }
}

/** File name for saving (RFC 6266), safe whatever it contains. */
export function disposition(name: string): string {
  const plain = name.replace(/[^A-Za-z0-9._ -]/g, '_')
  return `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(name).replace(/['()*]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`)}`
}
