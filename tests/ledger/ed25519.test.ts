import { readFileSync } from 'node:fs'
import { createPublicKey, verify } from 'node:crypto'
import { ed25519 } from '@noble/curves/ed25519.js'
import { sha512 } from '@noble/hashes/sha2.js'
import { describe, expect, it } from 'vitest'
import { fromHex, toHex } from '../../server/ledger-format/digest.ts'
import {
  isUsablePublicKey,
  publicKeyOf,
  rawKeyOf,
  signMessage,
  spkiOf,
  verifySignature,
} from '../../server/ledger-format/ed25519.ts'
import { referencePath } from '../support/reference.ts'

interface Wycheproof {
  testGroups: {
    publicKey: { pk: string }
    tests: { tcId: number; msg: string; sig: string; result: string }[]
  }[]
}
const suite = JSON.parse(
  readFileSync(referencePath('vectors/ed25519/testvectors_v1/ed25519_test.json'), 'utf8'),
) as Wycheproof

const littleEndian = (bytes: Uint8Array) => BigInt(`0x${toHex(bytes.slice().reverse())}`)
const bytesOf = (n: bigint) => fromHex(n.toString(16).padStart(64, '0')).reverse()
const order = ed25519.Point.Fn.ORDER

/** RFC 8032 section 7.1. */
const rfc = [
  {
    seed: '9d61b19deffd5a60ba844af492ec2cc44449c5697b326919703bac031cae7f60',
    key: 'd75a980182b10ab7d54bfed3c964073a0ee172f3daa62325af021a68f707511a',
    message: '',
    signature:
      'e5564300c360ac729086e2cc806e828a84877f1eb8e5d974d873e065224901555fb8821590a33bacc61e39701cf9b46bd25bf5f0595bbe24655141438e7a100b',
  },
  {
    seed: '4ccd089b28ff96da9db6c346ec114e0f5b8a319f35aba624da8cf6ed4fb8a6fb',
    key: '3d4017c3e843895a92b70aa74d1b7ebc9c982ccf2ec4968cc0cd55f12af4660c',
    message: '72',
    signature:
      '92a009a9f0d4cab8720e820b5f642540a2b27b5416503f8fb3762223ebdb69da085ac1e43e15996e458f3613d0f11d8c387b2eaeb4302aeeb00d291612bb0c00',
  },
]

describe('strict Ed25519', () => {
  it.each(rfc)('signs and verifies RFC 8032 ($key)', ({ seed, key, message, signature }) => {
    expect(toHex(publicKeyOf(fromHex(seed)))).toBe(key)
    expect(toHex(signMessage(fromHex(seed), fromHex(message)))).toBe(signature)
    expect(verifySignature(fromHex(key), fromHex(message), fromHex(signature))).toBe(true)
    expect(verifySignature(fromHex(key), fromHex(`${message}00`), fromHex(signature))).toBe(false)
  })

  it('agrees with every Wycheproof vector', () => {
    const wrong = suite.testGroups.flatMap((group) =>
      group.tests.filter(
        (test) =>
          verifySignature(fromHex(group.publicKey.pk), fromHex(test.msg), fromHex(test.sig)) !==
          (test.result === 'valid'),
      ),
    )
    expect(wrong.map((test) => test.tcId)).toEqual([])
    expect(suite.testGroups.flatMap((group) => group.tests)).toHaveLength(151)
  })

  const seed = fromHex(rfc[0]?.seed ?? '')
  const key = publicKeyOf(seed)
  const message = fromHex('01020304')

  it('refuses S + L', () => {
    const good = signMessage(seed, message)
    const high = Uint8Array.from([
      ...good.subarray(0, 32),
      ...bytesOf(littleEndian(good.subarray(32)) + order),
    ])
    expect(verifySignature(key, message, high)).toBe(false)
  })

  it('refuses a signature whose R has a part of order 8, which a cofactored check accepts', () => {
    const h = sha512(seed).slice(0, 32)
    h[0] = (h[0] ?? 0) & 248
    h[31] = ((h[31] ?? 0) & 63) | 64
    // A point of order 8 (RFC 7748 curve, well known).
    const torsion = ed25519.Point.fromHex('c7176a703d4dd84fba3c0b760d10670f2a2053fa2c39ccc64ec7fd7792ac037a')
    const nonce = 123456789123456789n
    const r = ed25519.Point.BASE.multiply(nonce).add(torsion).toBytes()
    const k = littleEndian(sha512(Uint8Array.from([...r, ...key, ...message]))) % order
    const mixed = Uint8Array.from([...r, ...bytesOf((nonce + k * (littleEndian(h) % order)) % order)])
    expect(ed25519.verify(mixed, message, key)).toBe(true)
    expect(verifySignature(key, message, mixed)).toBe(false)
    const nodeKey = createPublicKey({ key: Buffer.from(spkiOf(key)), format: 'der', type: 'spki' })
    expect(verify(null, message, nodeKey, mixed)).toBe(false)
  })

  it('refuses keys of small order, not canonical, or no point', () => {
    const small = ['01'.padEnd(64, '0'), '00'.repeat(32), `${'ec'}${'ff'.repeat(30)}7f`]
    // p + 1 encodes y = 1 another way; 2 is no y of the curve.
    const others = [`ee${'ff'.repeat(30)}7f`, '02'.padEnd(64, '0'), 'aabb']
    for (const hex of [...small, ...others]) expect(isUsablePublicKey(fromHex(hex))).toBe(false)
    expect(isUsablePublicKey(key)).toBe(true)
    // Small-order key, R = key, S = 0: true for lax rules whatever the message.
    const point = fromHex('01'.padEnd(64, '0'))
    expect(verifySignature(point, message, Uint8Array.from([...point, ...new Uint8Array(32)]))).toBe(false)
  })

  it('refuses wrong lengths without an error', () => {
    expect(verifySignature(key, message, new Uint8Array(63))).toBe(false)
    expect(verifySignature(key.subarray(1), message, new Uint8Array(64))).toBe(false)
  })

  it('wraps keys as RFC 8410 says', () => {
    expect(rawKeyOf(spkiOf(key))).toEqual(key)
    expect(
      createPublicKey({ key: Buffer.from(spkiOf(key)), format: 'der', type: 'spki' }).asymmetricKeyType,
    ).toBe('ed25519')
    expect(() => rawKeyOf(spkiOf(key).subarray(1))).toThrow()
  })
})
