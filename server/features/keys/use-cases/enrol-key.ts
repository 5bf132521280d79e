import { Problem } from '../../../contract/problems.ts'
import { parseCanonical } from '../../../ledger-format/canonical-json.ts'
import { sha256Hex } from '../../../ledger-format/digest.ts'
import { verifySignature } from '../../../ledger-format/ed25519.ts'
import type { Enrolment } from '../../../ledger-format/enrolment.ts'
import type { Transaction } from '../../../platform/db/database.ts'
import type { Services } from '../../../platform/services.ts'
import { sealAtRest } from '../../laboratory/index.ts'
import { appendEvent, lockLedger } from '../../ledger/index.ts'
import { certify } from '../certify.ts'
import { largestKdf } from '../policy.ts'
import {
  insertEnrolment,
  insertSigningKey,
  keysOf,
  lockPerson,
  managerAddresses,
  takePending,
  type Kdf,
  type PersonToSign,
} from '../repository.ts'

export interface SignedEnrolment {
  enrolmentId: string
  signature: Buffer
  kdf: Kdf
  /** PKCS#8 under AES-256-GCM with the tag at its end: 64 bytes. */
  wrappedKey: Buffer
  iv: Buffer
  /** SHA-256 of the proof, hex. */
  proofSha256: string
}

/**
 * Enrols a key: its own signature over the prepared statement proves that the person holds it. The first manager's key is
 * the root of the laboratory and counts at once; every other one waits until somebody else has endorsed it.
 */
export async function enrolKey(services: Services, personId: string, given: SignedEnrolment): Promise<void> {
  requireSizes(given)
  await services.db.transaction(async (t) => {
    const person = await lockPerson(services.db, personId, t)
    if (!person) throw new Problem('not-allowed', 'Your account is not active.')
    const { document, enrolment } = await takeDocument(services, personId, given.enrolmentId, t)
    const publicKey = Buffer.from(enrolment.publicKey, 'base64')
    if (!verifySignature(publicKey, document, given.signature))
      throw new Problem(
        'invalid-values',
        'The signature is not one of the new key over its statement; nothing was kept.',
        {
          errors: [
            { pointer: '/signature', detail: 'Sign the document bytes with the key that was announced.' },
          ],
        },
      )
    const newest = (await keysOf(services.db, [personId], t))[0]
    if ((newest?.enrolmentSha256 ?? null) !== enrolment.supersedes)
      throw new Problem('wrong-state', 'Another key was enrolled meanwhile. Begin the enrolment again.')
    const key = {
      enrolmentId: enrolment.id,
      personId,
      enrolmentSha256: sha256Hex(document),
      document,
      signature: given.signature,
      publicKey,
      root: await becomesRoot(services, person, t),
      enrolledAt: services.clock.now(),
    }
    await insertEnrolment(services.db, key, t)
    await insertSigningKey(
      services.db,
      { ...wrapped(services, given), enrolmentId: enrolment.id, personId, kdf: given.kdf },
      t,
    )
    await appendEvent(services, t, {
      actor: { kind: 'person', id: personId, onBehalfOf: null },
      action: key.root ? 'key.root-enrolled' : 'key.enrolled',
      subject: { kind: 'key', id: enrolment.id },
      payload: {
        subjectId: personId,
        enrolmentSha256: key.enrolmentSha256,
        supersedes: enrolment.supersedes,
      },
    })
    if (key.root) await certify(services, key, person.name, t)
    else await tellManagers(services, person, key.enrolmentSha256, t)
  })
}

function requireSizes({ kdf, signature, wrappedKey, iv }: SignedEnrolment): void {
  const fits = [
    ['/signature', signature.length === 64, '64 bytes'],
    ['/wrappedKey', wrappedKey.length === 64, '64 bytes: 48 of PKCS#8, then the tag'],
    ['/iv', iv.length === 12, '12 bytes'],
    ['/kdf/salt', Buffer.from(kdf.salt, 'base64').length === 16, '16 bytes'],
    [
      '/kdf/n',
      Number.isInteger(Math.log2(kdf.n)) && kdf.n <= largestKdf.n,
      'a power of two from 2^17 to 2^20',
    ],
    ['/kdf/r', kdf.r <= largestKdf.r, `8 to ${largestKdf.r}`],
    ['/kdf/p', kdf.p <= largestKdf.p, `1 to ${largestKdf.p}`],
  ] as const
  const errors = fits
    .filter(([, fine]) => !fine)
    .map(([pointer, , wanted]) => ({ pointer, detail: `This must be ${wanted}.` }))
  if (errors.length > 0)
    throw new Problem('invalid-values', 'The key cannot be kept like this; nothing was changed.', { errors })
}

async function takeDocument(services: Services, personId: string, id: string, t: Transaction) {
  const pending = await takePending(services.db, { id, personId, kind: 'enrolment' }, t)
  if (!pending || pending.expiresAt <= services.clock.now())
    throw new Problem(
      'record-expired',
      'The prepared statement has expired or was used. Begin the enrolment again; nothing was kept.',
    )
  return { document: pending.document, enrolment: parseCanonical(pending.document) as unknown as Enrolment }
}

/** Only the first manager enrols without anybody's endorsement; the ledger's lock keeps two from being first. */
async function becomesRoot(services: Services, person: PersonToSign, t: Transaction): Promise<boolean> {
  await lockLedger(services, t)
  const root = await services.db.row('select id from record.enrolments where root', {}, t)
  return root === null && person.roles.includes('manager')
}

function wrapped(services: Services, { enrolmentId, wrappedKey, iv, proofSha256 }: SignedEnrolment) {
  const seal = (purpose: string, bytes: Buffer) =>
    sealAtRest(services.config.secret, `${purpose} ${enrolmentId}`, bytes)
  return {
    wrappedKey: seal('signing key', wrappedKey),
    iv,
    proofDigest: seal('proof', Buffer.from(proofSha256, 'hex')),
  }
}

async function tellManagers(
  services: Services,
  person: PersonToSign,
  enrolmentSha256: string,
  t: Transaction,
): Promise<void> {
  for (const to of await managerAddresses(services.db, t)) {
    const text =
      `${person.name} enrolled a signing key. It counts once a manager or supervisor has checked who ${person.name} is ` +
      `and endorsed it.\n\nDigits of the key, to be compared with those on ${person.name}'s screen: ${enrolmentSha256.slice(0, 16)}\n`
    await services.mail.enqueue(
      { to, subject: `A signing key of ${person.name} waits for endorsement`, text },
      t,
    )
  }
}
