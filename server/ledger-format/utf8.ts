import { utf8ToBytes } from '@noble/hashes/utils.js'

/** UTF-8 bytes of text; lone surrogates are refused, since encoders would silently replace them. */
export function utf8Bytes(text: string): Uint8Array {
  if (/\p{Surrogate}/u.test(text)) throw new Error('Text holds a lone surrogate, which UTF-8 cannot carry.')
  return utf8ToBytes(text)
}

const malformed = (at: number) => new Error(`Bytes are not UTF-8 (at byte ${at}).`)

/**
 * Text of UTF-8 bytes, strictly (RFC 3629): overlong forms, surrogates and values above U+10FFFF are refused. A byte
 * order mark stays in the text, where JSON then refuses it.
 */
export function utf8Text(bytes: Uint8Array): string {
  let text = ''
  let units: number[] = []
  for (let at = 0; at < bytes.length;) {
    const [code, length] = codePointAt(bytes, at)
    at += length
    if (code > 0xffff) units.push(0xd800 + ((code - 0x10000) >> 10), 0xdc00 + ((code - 0x10000) & 0x3ff))
    else units.push(code)
    if (units.length > 8000) {
      text += String.fromCharCode(...units)
      units = []
    }
  }
  return text + String.fromCharCode(...units)
}

/** Code point that begins at a byte, and how many bytes it takes. */
function codePointAt(bytes: Uint8Array, at: number): [code: number, length: number] {
  const first = bytes[at] ?? 0
  if (first < 0x80) return [first, 1]
  const length = first >= 0xf0 ? 4 : first >= 0xe0 ? 3 : 2
  if (first < 0xc2 || first > 0xf4 || at + length > bytes.length) throw malformed(at)
  let code = first & (0x7f >> length)
  for (let i = 1; i < length; i++) {
    const next = bytes[at + i] ?? 0
    if ((next & 0xc0) !== 0x80) throw malformed(at)
    code = (code << 6) | (next & 0x3f)
  }
  const least = length === 4 ? 0x10000 : length === 3 ? 0x800 : 0x80
  if (code < least || code > 0x10ffff || (code >= 0xd800 && code <= 0xdfff)) throw malformed(at)
  return [code, length]
}
