import { scryptAsync } from '@noble/hashes/scrypt.js'
import type { Meaning } from '../../../server/contract/signatures.ts'
import { sameBytes } from '../../../server/ledger-format/bytes.ts'
import { fromBase64, sha256Hex, toBase64, toHex } from '../../../server/ledger-format/digest.ts'
import { publicKeyOf, signMessage } from '../../../server/ledger-format/ed25519.ts'
import { call, callForBytes } from '../../lib/call.ts'

/*
 * Signing on the signer's own device (shapes 5). The passphrase and the open key never leave this page: the server sees the
 * proof, which opens nothing by itself, and the signature.
 */

/** Parameters that turn a passphrase into 64 bytes; the least that the server takes. */
export interface Kdf {
  name: 'scrypt'
  n: number
  r: number
  p: number
  /** Base64 of 16 bytes. */
  salt: string
}

export interface DerivedKeys {
  /** 32 bytes: key of AES-256-GCM over the private key. */
  wrappingKey: Uint8Array
  /** 32 bytes: what the server asks for before it gives out the wrapped key. */
  proof: Uint8Array
}

export function newKdf(): Kdf {
  return { name: 'scrypt', n: 2 ** 17, r: 8, p: 1, salt: toBase64(crypto.getRandomValues(new Uint8Array(16))) }
}

/**
 * Wrapping key and proof of a passphrase: scrypt over its NFKC form in UTF-8. It takes about a second and lets the page
 * live meanwhile. `onProgress` gets shares from 0 to 1.
 */
export async function deriveKeys(passphrase: string, kdf: Kdf, onProgress?: (share: number) => void): Promise<DerivedKeys> {
  const { n: N, r, p, salt } = kdf
  const bytes = await scryptAsync(new TextEncoder().encode(passphrase.normalize('NFKC')), fromBase64(salt), {
    N,
    r,
    p,
    dkLen: 64,
    onProgress,
  })
  return { wrappingKey: bytes.slice(0, 32), proof: bytes.slice(32) }
}

/** DER of a PKCS#8 Ed25519 private key before its 32-byte seed (RFC 8410 section 7). */
const pkcs8Prefix = Uint8Array.of(0x30, 0x2e, 2, 1, 0, 0x30, 5, 6, 3, 0x2b, 0x65, 0x70, 4, 0x22, 4, 0x20)

export interface NewKey {
  /** 32 bytes. */
  seed: Uint8Array
  /** Raw 32 bytes. */
  publicKey: Uint8Array
}

/** A new Ed25519 key. */
export function createKey(): NewKey {
  const seed = crypto.getRandomValues(new Uint8Array(32))
  return { seed, publicKey: publicKeyOf(seed) }
}

async function aesKey(wrappingKey: Uint8Array, use: 'encrypt' | 'decrypt'): Promise<CryptoKey> {
  return crypto.subtle.importKey('raw', wrappingKey.slice(), 'AES-GCM', false, [use])
}

/** The private key (PKCS#8, 48 bytes) encrypted by AES-256-GCM, tag at the end; both base64. */
export async function wrapKey(seed: Uint8Array, wrappingKey: Uint8Array): Promise<{ wrappedKey: string; iv: string }> {
  const iv = crypto.getRandomValues(new Uint8Array(12))
  const plain = new Uint8Array([...pkcs8Prefix, ...seed])
  const wrapped = await crypto.subtle.encrypt({ name: 'AES-GCM', iv }, await aesKey(wrappingKey, 'encrypt'), plain)
  plain.fill(0)
  return { wrappedKey: toBase64(new Uint8Array(wrapped)), iv: toBase64(iv) }
}

/** The seed (32 bytes) out of a wrapped key. @throws when the key was wrapped with another passphrase or is damaged. */
export async function unwrapKey(wrapped: { wrappedKey: string; iv: string }, wrappingKey: Uint8Array): Promise<Uint8Array> {
  const iv = fromBase64(wrapped.iv).slice()
  const bytes = fromBase64(wrapped.wrappedKey).slice()
  const plain = new Uint8Array(
    await crypto.subtle.decrypt({ name: 'AES-GCM', iv }, await aesKey(wrappingKey, 'decrypt'), bytes),
  )
  if (plain.length !== 48 || !sameBytes(plain.subarray(0, 16), pkcs8Prefix)) throw new Error('The stored key is no Ed25519 key.')
  return plain.slice(16)
}

/**
 * Opens my signing key with the passphrase, uses it once and drops it.
 * @throws {ApiProblem} wrong-passphrase (attemptsLeft), signing-locked (until), key-not-active.
 */
export async function withSigningKey<T>(
  passphrase: string,
  use: (sign: (message: Uint8Array) => string) => Promise<T>,
  onProgress?: (share: number) => void,
): Promise<T> {
  const { kdf } = await call('getSigningKey', {})
  if (kdf === null) throw new Error('You have no signing key yet. Make one on the page of your signing key.')
  const derived = await deriveKeys(passphrase, kdf, onProgress)
  let seed: Uint8Array | null = null
  try {
    const wrapped = await call('unlockSigningKey', { body: { proof: toBase64(derived.proof) } })
    const open = (seed = await unwrapKey(wrapped, derived.wrappingKey))
    return await use((message) => toBase64(signMessage(open, message)))
  } finally {
    seed?.fill(0)
    derived.proof.fill(0)
    derived.wrappingKey.fill(0)
  }
}

export interface Presence {
  runId: string
  /** UTC. */
  from: string
  to: string
}

export interface PreparedRecord {
  /** The exact bytes to sign. */
  bytes: Uint8Array
  recordSha256: string
}

/** Fetches the bytes to sign and checks that they came whole: their SHA-256 is the one the server names for them. */
export async function fetchRecord(entryId: string, meaning: Meaning, presence?: Presence): Promise<PreparedRecord> {
  const { bytes, headers } = await callForBytes('getSigningRecord', { params: { id: entryId }, query: { meaning, ...presence } })
  const recordSha256 = sha256Hex(bytes)
  const named = /sha-256=:([^:]+):/.exec(headers.get('Repr-Digest') ?? '')?.[1]
  if (named === undefined || recordSha256 !== toHex(fromBase64(named)))
    throw new Error('The bytes to sign did not come whole. Nothing was signed; try again.')
  return { bytes, recordSha256 }
}

/** Signs prepared bytes, which the caller has checked and shown, and gives the signature. */
export function signRecord(
  entryId: string,
  meaning: Meaning,
  prepared: PreparedRecord,
  passphrase: string,
  onProgress?: (share: number) => void,
) {
  return withSigningKey(
    passphrase,
    (sign) =>
      call('signEntry', {
        params: { id: entryId },
        body: { meaning, recordSha256: prepared.recordSha256, signature: sign(prepared.bytes) },
      }),
    onProgress,
  )
}
