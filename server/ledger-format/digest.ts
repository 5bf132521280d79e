import { sha256, sha512 } from '@noble/hashes/sha2.js'
import { bytesToHex, hexToBytes } from '@noble/hashes/utils.js'

/** SHA-256 as 64 lower-case hex digits. */
export function sha256Hex(bytes: Uint8Array): string {
  return bytesToHex(sha256(bytes))
}

/** SHA-512 as 128 lower-case hex digits. */
export function sha512Hex(bytes: Uint8Array): string {
  return bytesToHex(sha512(bytes))
}

/** A digest that takes its input in pieces. */
export interface Digest {
  update(bytes: Uint8Array): void
  hex(): string
}

/** Makes digests; a platform with a faster implementation may give its own to `verifyBundle`. */
export type Digester = (algorithm: 'sha256' | 'sha512') => Digest

export const pureDigester: Digester = (algorithm) => {
  const hash = (algorithm === 'sha256' ? sha256 : sha512).create()
  return { update: (bytes) => void hash.update(bytes), hex: () => bytesToHex(hash.digest()) }
}

export const toHex = (bytes: Uint8Array): string => bytesToHex(bytes)
export const fromHex = (hex: string): Uint8Array => hexToBytes(hex)

const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/'

/** Standard base64 with padding (RFC 4648 section 4). */
export function toBase64(bytes: Uint8Array): string {
  let text = ''
  for (let i = 0; i < bytes.length; i += 3) {
    const word = ((bytes[i] ?? 0) << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0)
    const digits = [word >> 18, (word >> 12) & 63, (word >> 6) & 63, word & 63].map((d) => alphabet.charAt(d))
    text += digits.slice(0, Math.min(4, bytes.length - i + 1)).join('')
  }
  return text.padEnd(Math.ceil(text.length / 4) * 4, '=')
}

/** Bytes of standard base64; anything that `toBase64` would not have written (stray bits, blanks) is refused. */
export function fromBase64(text: string): Uint8Array {
  const digits = text.replace(/={1,2}$/, '')
  const bytes = new Uint8Array((digits.length * 6) >> 3)
  let word = 0
  let bits = 0
  let at = 0
  for (const digit of digits) {
    const value = alphabet.indexOf(digit)
    if (value < 0) throw new Error('Text is not standard base64.')
    word = ((word << 6) | value) & 0xffff
    bits += 6
    if (bits >= 8) {
      bits -= 8
      bytes[at++] = word >> bits
    }
  }
  if (toBase64(bytes) !== text) throw new Error('Text is not standard base64.')
  return bytes
}
