import { scryptSync } from 'node:crypto'
import { expect, test } from 'vitest'
import { deriveKeys } from '../../src/features/signatures/signing.ts'

const hex = (bytes: Uint8Array) => Buffer.from(bytes).toString('hex')

test('derivation is scrypt of RFC 7914 (section 12, third vector), split into wrapping key and proof', async () => {
  const salt = Buffer.from('SodiumChloride').toString('base64')
  const { wrappingKey, proof } = await deriveKeys('pleaseletmein', { name: 'scrypt', n: 16384, r: 8, p: 1, salt })
  expect(hex(wrappingKey)).toBe('7023bdcb3afd7348461c06cd81fd38ebfda8fbba904f8e3ea9b543f6545da1f2')
  expect(hex(proof)).toBe('d5432955613f0fcf62d49705242a9af9e61e85dc0d651e40dfcf017b45575887')
})

test('at the strength in use the browser and OpenSSL derive the same bytes, whatever form the letters have', async () => {
  const salt = Buffer.alloc(16, 7)
  const { wrappingKey, proof } = await deriveKeys('ridgeway ﬁlter café', {
    name: 'scrypt',
    n: 2 ** 17,
    r: 8,
    p: 1,
    salt: salt.toString('base64'),
  })
  const openssl = scryptSync('ridgeway filter café'.normalize('NFKC'), salt, 64, { N: 2 ** 17, r: 8, p: 1, maxmem: 2 ** 28 })
  expect(hex(wrappingKey) + hex(proof)).toBe(openssl.toString('hex'))
})
