import { sha256Hex, sha512Hex } from '../digest.ts'
import { utf8Bytes } from '../utf8.ts'
import { bagDeclaration, bagSignaturePath, manifestNames, tagFiles } from './layout.ts'

/** A payload file as the manifests see it. */
export interface Digested {
  path: string
  size: number
  sha256: string
  sha512: string
}

export interface BagInfo {
  organization: string
  topFolder: string
  /** YYYY-MM-DD, of the head. */
  date: string
  description: string
}

/** Orders paths by their bytes; for ASCII paths, as here, that is the order of their characters. */
export const byPath = (a: { path: string }, b: { path: string }): number =>
  a.path < b.path ? -1 : a.path > b.path ? 1 : 0

export function digested(path: string, bytes: Uint8Array): Digested {
  return { path, size: bytes.length, sha256: sha256Hex(bytes), sha512: sha512Hex(bytes) }
}

/**
 * The files of a BagIt 1.0 bag (RFC 8493) around a payload: declaration, info, manifests, tag manifests, and the one
 * signature over tagmanifest-sha256.txt that through the manifests covers every file.
 */
export function bagFiles(
  payload: readonly Digested[],
  info: BagInfo,
  sign: (bytes: Uint8Array) => Uint8Array,
): { path: string; bytes: Uint8Array }[] {
  const text = (path: string, content: string) => ({ path, bytes: utf8Bytes(content) })
  const tags = [
    text('bagit.txt', bagDeclaration),
    text('bag-info.txt', bagInfo(payload, info)),
    text(manifestNames[0], manifest(payload, 'sha256')),
    text(manifestNames[1], manifest(payload, 'sha512')),
  ]
  const listed = tags.map(({ path, bytes }) => digested(path, bytes))
  if (listed.some(({ path }) => !(tagFiles as readonly string[]).includes(path)))
    throw new Error('A tag file is unknown.')
  const signed = text('tagmanifest-sha256.txt', manifest(listed, 'sha256'))
  return [
    ...tags,
    signed,
    text('tagmanifest-sha512.txt', manifest(listed, 'sha512')),
    { path: bagSignaturePath, bytes: sign(signed.bytes) },
  ]
}

function manifest(files: readonly Digested[], algorithm: 'sha256' | 'sha512'): string {
  return [...files]
    .sort(byPath)
    .map((file) => `${file[algorithm]}  ${file.path}\n`)
    .join('')
}

function bagInfo(payload: readonly Digested[], info: BagInfo): string {
  const bytes = payload.reduce((sum, file) => sum + file.size, 0)
  return [
    `Source-Organization: ${info.organization}`,
    `External-Description: ${info.description}`,
    `External-Identifier: ${info.topFolder}`,
    `Bagging-Date: ${info.date}`,
    `Payload-Oxum: ${bytes}.${payload.length}`,
    '',
  ].join('\n')
}
