import { Problem } from '../../contract/problems.ts'
import type { Received } from './receive-stream.ts'

/** What the sender says of the file, if anything: size by `X-File-Size`, digest by `Repr-Digest` (RFC 9530). */
export interface Declared {
  size: number | null
  sha256: string | null
}

export function readDeclared(header: (name: string) => string | undefined): Declared {
  const size = header('x-file-size')
  const digest = header('repr-digest')?.match(/sha-256=:([A-Za-z0-9+/=]+):/)?.[1]
  if (size !== undefined && !/^\d{1,16}$/.test(size))
    throw new Problem('upload-refused', 'X-File-Size must be the number of bytes of the file.')
  return {
    size: size === undefined ? null : Number(size),
    sha256: digest === undefined ? null : Buffer.from(digest, 'base64').toString('hex'),
  }
}

export function emptyFile(name: string): Problem {
  return new Problem(
    'upload-refused',
    `${name} is empty: it has no bytes. Nothing was kept; check the file on the acquisition computer.`,
  )
}

/** Refuses an upload that is empty, cut short or changed on the way; the caller removes what arrived. */
export function requireAsDeclared(received: Received, declared: Declared): void {
  if (received.size === 0) throw emptyFile(received.name)
  if (declared.size !== null && declared.size !== received.size)
    throw new Problem(
      'upload-refused',
      `${received.size} of ${declared.size} bytes of ${received.name} arrived. Nothing was kept; the file on your side is safe, send it again.`,
    )
  if (declared.sha256 !== null && declared.sha256 !== received.sha256)
    throw new Problem(
      'upload-refused',
      `${received.name} changed on the way: what arrived has another SHA-256 than was announced. Nothing was kept; send it again.`,
    )
}
