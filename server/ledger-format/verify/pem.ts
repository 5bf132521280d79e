import { fromBase64 } from '../digest.ts'
import { utf8Text } from '../utf8.ts'
import { need, Wrong } from './report.ts'

/**
 * DER of each block of a PEM file (RFC 7468) that holds blocks of one label only.
 * @throws Wrong when there is none, or one of another label.
 */
export function pemBlocks(bytes: Uint8Array, label: string): Uint8Array[] {
  const text = utf8Text(bytes)
  const blocks = [
    ...text.matchAll(/-----BEGIN ([A-Z0-9 ]+)-----\r?\n([A-Za-z0-9+/=\r\n]+)-----END ([A-Z0-9 ]+)-----/g),
  ]
  const begun = text.split('-----BEGIN').length - 1
  const right = blocks.every(([, begin, , end]) => begin === label && end === label)
  need(blocks.length > 0 && blocks.length === begun && right, `not a file of ${label.toLowerCase()}s only`)
  return blocks.map(([, , body = '']) => fromBase64(body.replace(/[\r\n]/g, '')))
}

/** DER of the one block of a PEM file. */
export function pemBlock(bytes: Uint8Array, label: string): Uint8Array {
  const [first, ...more] = pemBlocks(bytes, label)
  if (!first || more.length > 0) throw new Wrong(`not one ${label.toLowerCase()}`)
  return first
}
