import { ed25519 } from '@noble/curves/ed25519.js'
import { sha512 } from '@noble/hashes/sha2.js'
import { concatBytes } from '@noble/hashes/utils.js'
import { sameBytes } from './bytes.ts'

const { Point } = ed25519
const order = Point.Fn.ORDER

function decodeKey(publicKey: Uint8Array) {
  // The second argument asks for RFC 8032's canonical encoding: y below p, no sign on x = 0.
  const point = Point.fromBytes(publicKey, false)
  if (point.isSmallOrder()) throw new Error('public key is of small order')
  return point
}

/** True for 32 bytes that encode, canonically, a point that is not of small order. Enrolment refuses other keys. */
export function isUsablePublicKey(publicKey: Uint8Array): boolean {
  try {
    decodeKey(publicKey)
    return true
  } catch {
    return false
  }
}

/**
 * Strict Ed25519 (shapes "Common"): S < L, key canonical and not of small order, encode(S·B − k·A) equal to the bytes of R.
 * Whatever passes here passes in OpenSSL too; libraries that multiply by the cofactor accept more.
 * @param publicKey raw 32 bytes
 * @param signature raw 64 bytes
 */
export function verifySignature(publicKey: Uint8Array, message: Uint8Array, signature: Uint8Array): boolean {
  if (publicKey.length !== 32 || signature.length !== 64) return false
  const r = signature.subarray(0, 32)
  const s = littleEndian(signature.subarray(32))
  if (s >= order) return false
  try {
    const k = littleEndian(sha512(concatBytes(r, publicKey, message))) % order
    const difference = Point.BASE.multiplyUnsafe(s).add(decodeKey(publicKey).negate().multiplyUnsafe(k))
    return sameBytes(difference.toBytes(), r)
  } catch {
    return false
  }
}

/** Signature (64 bytes) by a private key (32-byte seed). */
export function signMessage(seed: Uint8Array, message: Uint8Array): Uint8Array {
  return ed25519.sign(message, seed)
}

/** Raw public key (32 bytes) of a private key (32-byte seed). */
export function publicKeyOf(seed: Uint8Array): Uint8Array {
  return ed25519.getPublicKey(seed)
}

function littleEndian(bytes: Uint8Array): bigint {
  return bytes.reduceRight((n, byte) => (n << 8n) | BigInt(byte), 0n)
}

/** DER of a SubjectPublicKeyInfo before the 32 bytes of an Ed25519 key (RFC 8410). */
const spkiPrefix = Uint8Array.of(0x30, 0x2a, 0x30, 0x05, 0x06, 0x03, 0x2b, 0x65, 0x70, 0x03, 0x21, 0x00)

/** SubjectPublicKeyInfo (DER, 44 bytes) of a raw public key; its SHA-256 is the `keySha256` of heads. */
export function spkiOf(publicKey: Uint8Array): Uint8Array {
  if (publicKey.length !== 32) throw new Error('An Ed25519 public key has 32 bytes.')
  return concatBytes(spkiPrefix, publicKey)
}

/** Raw public key of a SubjectPublicKeyInfo. @throws when it is not an Ed25519 key. */
export function rawKeyOf(spki: Uint8Array): Uint8Array {
  if (spki.length !== 44 || !sameBytes(spki.subarray(0, 12), spkiPrefix))
    throw new Error('not an Ed25519 public key')
  return spki.slice(12)
}
