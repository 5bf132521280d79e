import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { canonicalBytes, parseCanonical, parseJson } from '../../server/ledger-format/canonical-json.ts'
import { sha256Hex } from '../../server/ledger-format/digest.ts'
import { utf8Bytes, utf8Text } from '../../server/ledger-format/utf8.ts'
import { referencePath } from '../support/reference.ts'

const vectors = referencePath('vectors/jcs/testdata')
const read = (...path: string[]) => new Uint8Array(readFileSync(join(vectors, ...path)))
const text = (value: string) => utf8Bytes(value)

describe('canonical JSON', () => {
  // Published test data of RFC 8785 (origin in vectors/ORIGIN.md).
  it.each(readdirSync(join(vectors, 'input')))('writes %s as RFC 8785 says', (name) => {
    const written = canonicalBytes(parseJson(read('input', name)))
    expect(Buffer.from(written).equals(read('output', name))).toBe(true)
    expect(parseCanonical(read('output', name))).toEqual(parseJson(read('input', name)))
  })

  it('gives the digests written down in the standard’s notes', () => {
    // standards.md B1: SHA-256 of the canonical values.json and weird.json.
    const digest = (name: string) => sha256Hex(canonicalBytes(parseJson(read('input', name))))
    expect(digest('values.json')).toBe('2d5e01a318d0f0879ab568c4be289c8b1f64ef8921a53c6277d5e069978baacb')
    expect(digest('weird.json')).toBe('6af595a9aa80110b964b4de3f82a05fa6ae7423005019bacfa2620dddc4e94d1')
  })

  // RFC 8785 appendix B: IEEE 754 doubles by their bits.
  it.each([
    ['4340000000000001', '9007199254740994'],
    ['444b1ae4d6e2ef50', '1e+21'],
    ['3eb0c6f7a0b5ed8c', '9.999999999999997e-7'],
    ['8000000000000000', '0'],
  ])('writes the double %s as %s', (bits, written) => {
    const value = new DataView(Buffer.from(bits, 'hex').buffer.slice(0, 8))
    Buffer.from(bits, 'hex').forEach((byte, i) => value.setUint8(i, byte))
    expect(utf8Text(canonicalBytes(value.getFloat64(0)))).toBe(written)
  })

  it.each([
    ['a member twice', '{"a":1,"b":{"c":1},"a":2}'],
    ['a member twice, once escaped', '{"a":1,"\\u0061":2}'],
    ['a member twice deep inside', '[{"x":[{"a":1,"a":1}]}]'],
    ['a lone surrogate', '{"a":"\\ud800"}'],
    ['a number beyond all doubles', '{"a":1e400}'],
    ['NaN', '{"a":NaN}'],
    ['a byte order mark', '\ufeff{}'],
    ['nothing', ''],
    ['two values', '{} {}'],
  ])('refuses %s', (_, source) => {
    expect(() => parseJson(text(source))).toThrow()
  })

  it.each([
    ['the same name in different objects', '{"a":{"a":[{"a":1},{"a":2}]},"b":"a"}'],
    ['a name as a value', '{"a":"a","b":["a","a"]}'],
    ['brackets and quotes inside strings', '{"a":"{\\"a\\":1,\\"a\\":2}","b":"]["}'],
  ])('takes %s', (_, source) => {
    expect(parseJson(text(source))).toEqual(JSON.parse(source))
  })

  it.each([
    ['spaces', '{"a": 1}'],
    ['members out of order', '{"b":1,"a":2}'],
    ['1.0 for 1', '{"a":1.0}'],
    ['an escape where plain is canonical', '{"a":"\\u0041"}'],
    ['a newline at the end', '{"a":1}\n'],
  ])('says that %s is not canonical', (_, source) => {
    expect(parseJson(text(source))).toEqual(JSON.parse(source))
    expect(() => parseCanonical(text(source))).toThrow('canonical')
  })

  it.each([
    ['overlong', [0xc0, 0xaf]],
    ['a surrogate', [0xed, 0xa0, 0x80]],
    ['beyond U+10FFFF', [0xf4, 0x90, 0x80, 0x80]],
    ['cut short', [0xe2, 0x82]],
    ['a stray continuation', [0x80]],
    ['a bad continuation', [0xc3, 0x28]],
  ])('refuses UTF-8 that is %s', (_, bytes) => {
    expect(() => utf8Text(Uint8Array.from(bytes))).toThrow('UTF-8')
  })

  it('reads UTF-8 of one to four bytes', () => {
    const sample = 'a é € 😀 \u0000 \u{10ffff}'.repeat(2000)
    expect(utf8Text(new Uint8Array(Buffer.from(sample)))).toBe(sample)
    expect(() => utf8Bytes('\ud800')).toThrow()
  })
})
