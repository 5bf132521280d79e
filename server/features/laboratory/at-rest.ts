import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto'

/*
 * What must not be readable from a dump of the database or a copy of the key folder is wrapped once more by
 * HALFSILVER_SECRET, which lies in neither (threat B7): AES-256-GCM, a key per purpose, the purpose authenticated.
 */

/** Bytes sealed for one purpose: 12 bytes of nonce, the ciphertext, 16 bytes of tag. */
export function sealAtRest(secret: string, purpose: string, plain: Uint8Array): Buffer {
  const nonce = randomBytes(12)
  const cipher = createCipheriv('aes-256-gcm', keyFor(secret, purpose), nonce).setAAD(Buffer.from(purpose))
  return Buffer.concat([nonce, cipher.update(plain), cipher.final(), cipher.getAuthTag()])
}

/** @throws when the secret is another one, the purpose differs, or the bytes were changed. */
export function openAtRest(secret: string, purpose: string, sealed: Uint8Array): Buffer {
  const bytes = Buffer.from(sealed)
  const decipher = createDecipheriv('aes-256-gcm', keyFor(secret, purpose), bytes.subarray(0, 12))
  decipher.setAAD(Buffer.from(purpose)).setAuthTag(bytes.subarray(-16))
  try {
    return Buffer.concat([decipher.update(bytes.subarray(12, -16)), decipher.final()])
  } catch {
    throw new Error(
      `What is stored as "${purpose}" does not open: HALFSILVER_SECRET is not the one it was stored with, or it was changed.`,
    )
  }
}

function keyFor(secret: string, purpose: string): Buffer {
  return Buffer.from(hkdfSync('sha256', secret, 'halfsilver at rest', purpose, 32))
}
