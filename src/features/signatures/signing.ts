import { scryptAsync } from '@noble/hashes/scrypt.js'
import { randomBytes, utf8ToBytes } from '@noble/hashes/utils.js'
import type { EntrySignature, Meaning, SigningKey } from '../../../server/contract/signatures.ts'
import { fromBase64, fromHex, sha256Hex, toBase64 } from '../../../server/ledger-format/digest.ts'
import { publicKeyOf, signMessage } from '../../../server/ledger-format/ed25519.ts'
import { call, callForBytes } from '../../lib/call.ts'

/*
 * Signing on the signer's own device: the passphrase, what is derived from it and the open key never leave it. Nothing of
 * React is used here; it runs in Node too, where a test or a script gives its own calls.
 */

/** How the module reaches the server. */
export interface SigningCalls {
  call: typeof call
  callForBytes: typeof callForBytes
}
const ownCalls: SigningCalls = { call, callForBytes }

/** Told between 0 and 1 while the passphrase is turned into keys, which takes about a second. */
export type OnProgress = (share: number) => void

export interface Presence {
  runId: string
  from: string
  to: string
}

export interface PreparedRecord {
  /** The exact bytes to sign. */
  bytes: Uint8Array
  sha256: string
}

export type Kdf = NonNullable<SigningKey['kdf']>

/** Fetches the bytes that the server prepared and compares them with the digest that came beside them. */
export async function fetchRecord(
  entryId: string,
  meaning: Meaning,
  presence?: Presence,
  calls = ownCalls,
): Promise<PreparedRecord> {
  const query = { meaning, ...presence }
  const { bytes, headers } = await calls.callForBytes('getSigningRecord', { params: { id: entryId }, query })
  const sha256 = sha256Hex(bytes)
  const announced = /sha-256=:([^:]+):/.exec(headers.get('Repr-Digest') ?? '')?.[1]
  if (announced !== toBase64(fromHex(sha256)))
    throw new Error('The bytes to sign did not arrive as they were sent. Nothing was signed; try again.')
  return { bytes, sha256 }
}

/** Opens the key by the passphrase, signs the prepared bytes and hands the signature in. */
export async function signRecord(
  entryId: string,
  meaning: Meaning,
  prepared: PreparedRecord,
  passphrase: string,
  onProgress?: OnProgress,
  calls = ownCalls,
): Promise<EntrySignature> {
  const give = (sign: (bytes: Uint8Array) => string) =>
    calls.call('signEntry', {
      params: { id: entryId },
      body: { meaning, recordSha256: prepared.sha256, signature: sign(prepared.bytes) },
    })
  return withSigningKey(passphrase, give, onProgress, calls)
}

/**
 * Fetches the wrapped key against the proof and opens it for `work`, which gets a function that signs bytes (base64); then
 * key and derived bytes are overwritten. @throws {ApiProblem} wrong-passphrase, signing-locked, key-not-active
 */
export async function withSigningKey<T>(
  passphrase: string,
  work: (sign: (bytes: Uint8Array) => string) => Promise<T>,
  onProgress?: OnProgress,
  calls = ownCalls,
): Promise<T> {
  const { kdf } = await calls.call('getSigningKey', {})
  if (kdf === null) throw new Error('You have no signing key yet. Enrol one first.')
  const { wrappingKey, proof } = await deriveKeys(passphrase, kdf, onProgress)
  const secrets = [wrappingKey, proof]
  try {
    const { wrappedKey, iv } = await calls.call('unlockSigningKey', { body: { proof: toBase64(proof) } })
    const seed = await unwrapKey({ wrappedKey, iv }, wrappingKey)
    secrets.push(seed)
    return await work((bytes) => toBase64(signMessage(seed, bytes)))
  } finally {
    for (const secret of secrets) secret.fill(0)
  }
}

/** A new Ed25519 key: 32-byte seed and raw public key. */
export function createKey(): { seed: Uint8Array; publicKey: Uint8Array } {
  const seed = randomBytes(32)
  return { seed, publicKey: publicKeyOf(seed) }
}

/** Cost of a new key's derivation, with a salt of its own: 128 MiB, about a second on a desk computer. */
export function newKdf(): Kdf {
  return { name: 'scrypt', n: 2 ** 17, r: 8, p: 1, salt: toBase64(randomBytes(16)) }
}

/** 64 bytes of scrypt over the passphrase (NFKC, UTF-8): the wrapping key, then the proof. The caller overwrites both. */
export async function deriveKeys(
  passphrase: string,
  { n, r, p, salt }: Kdf,
  onProgress?: OnProgress,
): Promise<{ wrappingKey: Uint8Array; proof: Uint8Array }> {
  const bytes = utf8ToBytes(passphrase.normalize('NFKC'))
  const derived = await scryptAsync(bytes, fromBase64(salt), {
    N: n,
    r,
    p,
    dkLen: 64,
    onProgress,
    maxmem: 2 ** 31,
  })
  bytes.fill(0)
  return { wrappingKey: derived.subarray(0, 32), proof: derived.subarray(32) }
}

/** PKCS#8 (DER) of an Ed25519 key before its 32 bytes (RFC 8410). */
const pkcs8Prefix = fromHex('302e020100300506032b657004220420')

/** The private key as PKCS#8 under AES-256-GCM, the tag at its end: 64 bytes. */
export async function wrapKey(
  seed: Uint8Array,
  wrappingKey: Uint8Array,
): Promise<{ wrappedKey: string; iv: string }> {
  const pkcs8 = new Uint8Array(48)
  pkcs8.set(pkcs8Prefix)
  pkcs8.set(seed, pkcs8Prefix.length)
  const iv = new Uint8Array(randomBytes(12))
  const sealed = await crypto.subtle.encrypt(
    { name: 'AES-GCM', iv },
    await aesKey(wrappingKey, 'encrypt'),
    pkcs8,
  )
  pkcs8.fill(0)
  return { wrappedKey: toBase64(new Uint8Array(sealed)), iv: toBase64(iv) }
}

async function unwrapKey(
  { wrappedKey, iv }: { wrappedKey: string; iv: string },
  wrappingKey: Uint8Array,
): Promise<Uint8Array> {
  const algorithm = { name: 'AES-GCM', iv: new Uint8Array(fromBase64(iv)) }
  const key = await aesKey(wrappingKey, 'decrypt')
  const pkcs8 = new Uint8Array(
    await crypto.subtle.decrypt(algorithm, key, new Uint8Array(fromBase64(wrappedKey))),
  )
  const seed = pkcs8.slice(pkcs8Prefix.length)
  if (pkcs8.length !== 48 || pkcs8Prefix.some((byte, at) => byte !== pkcs8[at]))
    throw new Error('The stored key is not an Ed25519 key.')
  pkcs8.fill(0)
  return seed
}

const aesKey = (raw: Uint8Array, use: 'encrypt' | 'decrypt') =>
  crypto.subtle.importKey('raw', new Uint8Array(raw), 'AES-GCM', false, [use])
