import { p256, p384 } from '@noble/curves/nist.js'
import { sha256, sha384, sha512 } from '@noble/hashes/sha2.js'
import { concatBytes } from '@noble/hashes/utils.js'
import { fromBER, Integer, Sequence } from 'asn1js'
import { sameBytes } from '../bytes.ts'
import { fromHex } from '../digest.ts'
import { rawKeyOf, verifySignature } from '../ed25519.ts'
import { Wrong } from './report.ts'

/** Digests by object identifier; SHA-1 and older are not here, so nothing signed with them counts. */
export const digestAlgorithms: Record<string, { name: string; hash: (bytes: Uint8Array) => Uint8Array }> = {
  '2.16.840.1.101.3.4.2.1': { name: 'sha256', hash: sha256 },
  '2.16.840.1.101.3.4.2.2': { name: 'sha384', hash: sha384 },
  '2.16.840.1.101.3.4.2.3': { name: 'sha512', hash: sha512 },
}

const sha2 = {
  sha256: '2.16.840.1.101.3.4.2.1',
  sha384: '2.16.840.1.101.3.4.2.2',
  sha512: '2.16.840.1.101.3.4.2.3',
}

/** Digest that a signature algorithm names; null where the algorithm leaves it open (rsaEncryption) or has none (Ed25519). */
const signatureAlgorithms: Record<string, { kind: 'ed25519' | 'ecdsa' | 'rsa'; digest: string | null }> = {
  '1.3.101.112': { kind: 'ed25519', digest: null },
  '1.2.840.10045.4.3.2': { kind: 'ecdsa', digest: sha2.sha256 },
  '1.2.840.10045.4.3.3': { kind: 'ecdsa', digest: sha2.sha384 },
  '1.2.840.10045.4.3.4': { kind: 'ecdsa', digest: sha2.sha512 },
  '1.2.840.113549.1.1.1': { kind: 'rsa', digest: null },
  '1.2.840.113549.1.1.11': { kind: 'rsa', digest: sha2.sha256 },
  '1.2.840.113549.1.1.12': { kind: 'rsa', digest: sha2.sha384 },
  '1.2.840.113549.1.1.13': { kind: 'rsa', digest: sha2.sha512 },
}

/** A public key as a certificate carries it. */
export interface CertifiedKey {
  /** SubjectPublicKeyInfo, DER. */
  spki: Uint8Array
  algorithm: string
  /** Object identifier of the curve, for elliptic curves. */
  curve: string | null
  /** Content of the subjectPublicKey bit string. */
  key: Uint8Array
}

/**
 * True when a signature in a certificate, revocation list or CMS message verifies.
 * @param digest object identifier of the digest where the signature algorithm does not name one (CMS)
 * @throws Wrong when the algorithm is not one of those accepted here.
 */
export function signatureHolds(
  key: CertifiedKey,
  algorithm: string,
  data: Uint8Array,
  signature: Uint8Array,
  digest: string | null = null,
): boolean {
  const known = signatureAlgorithms[algorithm]
  if (!known) throw new Wrong(`signature algorithm ${algorithm} is not accepted`)
  if (known.kind === 'ed25519') return verifySignature(rawKeyOf(key.spki), data, signature)
  const hash = digestAlgorithms[known.digest ?? digest ?? '']
  if (!hash) throw new Wrong('signed over a weak or unknown digest')
  return known.kind === 'ecdsa'
    ? ecdsaHolds(key, hash.hash(data), signature)
    : rsaHolds(key, known.digest ?? digest ?? '', hash.hash(data), signature)
}

function ecdsaHolds(key: CertifiedKey, digest: Uint8Array, signature: Uint8Array): boolean {
  const curve = key.curve === '1.2.840.10045.3.1.7' ? p256 : key.curve === '1.3.132.0.34' ? p384 : null
  if (!curve) throw new Wrong('elliptic curve is not accepted')
  try {
    return curve.verify(signature, digest, key.key, { prehash: false, lowS: false, format: 'der' })
  } catch {
    return false
  }
}

/** DER of DigestInfo before the digest (RFC 8017 section 9.2, note 1). */
const digestInfoPrefix: Record<string, Uint8Array> = {
  [sha2.sha256]: fromHex('3031300d060960864801650304020105000420'),
  [sha2.sha384]: fromHex('3041300d060960864801650304020205000430'),
  [sha2.sha512]: fromHex('3051300d060960864801650304020305000440'),
}

/** RSASSA-PKCS1-v1_5 (RFC 8017 section 8.2.2): the whole encoded message is compared. */
function rsaHolds(key: CertifiedKey, digestOid: string, digest: Uint8Array, signature: Uint8Array): boolean {
  if (key.algorithm !== '1.2.840.113549.1.1.1') throw new Wrong('key is of another kind than the signature')
  const { modulus, exponent } = rsaKey(key.key)
  const length = Math.ceil(modulus.toString(2).length / 8)
  const number = bigEndian(signature)
  if (length < 256 || signature.length !== length || number >= modulus) return false
  const info = concatBytes(digestInfoPrefix[digestOid] ?? new Uint8Array(), digest)
  const padding = new Uint8Array(length - info.length - 3).fill(0xff)
  const wanted = concatBytes(Uint8Array.of(0, 1), padding, Uint8Array.of(0), info)
  return sameBytes(bytesOf(power(number, exponent, modulus), length), wanted)
}

function rsaKey(der: Uint8Array): { modulus: bigint; exponent: bigint } {
  const { result } = fromBER(der)
  const [modulus, exponent] = result instanceof Sequence ? result.valueBlock.value : []
  if (!(modulus instanceof Integer) || !(exponent instanceof Integer)) throw new Wrong('RSA key is damaged')
  return {
    modulus: bigEndian(modulus.valueBlock.valueHexView),
    exponent: bigEndian(exponent.valueBlock.valueHexView),
  }
}

function bigEndian(bytes: Uint8Array): bigint {
  return bytes.reduce((n, byte) => (n << 8n) | BigInt(byte), 0n)
}

function bytesOf(n: bigint, length: number): Uint8Array {
  return fromHex(n.toString(16).padStart(length * 2, '0'))
}

function power(base: bigint, exponent: bigint, modulus: bigint): bigint {
  let result = 1n
  for (let [b, e] = [base, exponent]; e > 0n; [b, e] = [(b * b) % modulus, e >> 1n]) {
    if (e & 1n) result = (result * b) % modulus
  }
  return result
}
