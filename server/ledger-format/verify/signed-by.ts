import { isUsablePublicKey, verifySignature } from '../ed25519.ts'
import { need } from './report.ts'

/** Throws unless the strict Ed25519 rule of shapes "Common" holds. `what` names the signature. */
export function checkSigned(
  publicKey: Uint8Array,
  message: Uint8Array,
  signature: Uint8Array,
  what = 'signature',
): void {
  need(publicKey.length === 32 && signature.length === 64, `${what}: wrong length of key or signature`)
  need(isUsablePublicKey(publicKey), `${what}: public key is not canonical or of small order`)
  need(verifySignature(publicKey, message, signature), `${what}: does not verify`)
}
