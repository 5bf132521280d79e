import { createCipheriv, createHash, generateKeyPairSync, randomBytes, scryptSync, sign, type KeyObject } from 'node:crypto'
import { endorseKey, enrolKey, prepareEndorsement, prepareEnrolment } from '../features/keys/index.ts'
import { demoPassphrase } from '../platform/identity/demo-accounts.ts'
import type { Services } from '../platform/services.ts'

const KDF = { name: 'scrypt' as const, n: 2 ** 17, r: 8, p: 1 }
const SCRYPT_MEMORY = 2 ** 28

/** A demo person's device: it holds the open key while the demonstration is made, as a browser does for one signature. */
export interface DemoSigner {
  sign(bytes: Uint8Array): Buffer
}

/** Makes a key and enrols it as a browser would: statement signed, key wrapped by the published demo passphrase. */
export async function enrol(services: Services, personId: string): Promise<DemoSigner> {
  const { privateKey, publicKey } = generateKeyPairSync('ed25519')
  const raw = publicKey.export({ type: 'spki', format: 'der' }).subarray(-32)
  const { id, document } = await prepareEnrolment(services, personId, raw)
  const salt = randomBytes(16)
  const derived = scryptSync(demoPassphrase, salt, 64, { N: KDF.n, r: KDF.r, p: KDF.p, maxmem: SCRYPT_MEMORY })
  const iv = randomBytes(12)
  await enrolKey(services, personId, {
    enrolmentId: id,
    signature: sign(null, Buffer.from(document, 'base64'), privateKey),
    kdf: { ...KDF, salt: salt.toString('base64') },
    wrappedKey: wrap(privateKey, derived.subarray(0, 32), iv),
    iv,
    proofSha256: createHash('sha256').update(derived.subarray(32)).digest('hex'),
  })
  return { sign: (bytes) => sign(null, bytes, privateKey) }
}

/** One person endorses another's key after looking at their papers. */
export async function endorse(
  services: Services,
  endorser: { personId: string; signer: DemoSigner },
  personId: string,
  enrolmentSha256: string,
): Promise<void> {
  const { id, document } = await prepareEndorsement(services, endorser.personId, personId, {
    enrolmentSha256,
    identity: 'Known in person; staff card of the laboratory seen.',
  })
  await endorseKey(services, endorser.personId, personId, { endorsementId: id, signature: endorser.signer.sign(Buffer.from(document, 'base64')) })
}

function wrap(key: KeyObject, wrappingKey: Buffer, iv: Buffer): Buffer {
  const pkcs8 = key.export({ type: 'pkcs8', format: 'der' })
  const cipher = createCipheriv('aes-256-gcm', wrappingKey, iv)
  return Buffer.concat([cipher.update(pkcs8), cipher.final(), cipher.getAuthTag()])
}
