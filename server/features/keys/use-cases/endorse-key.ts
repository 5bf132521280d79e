import { randomUUID } from 'node:crypto'
import { Problem } from '../../../contract/problems.ts'
import { parseCanonical } from '../../../ledger-format/canonical-json.ts'
import { sha256Hex } from '../../../ledger-format/digest.ts'
import { verifySignature } from '../../../ledger-format/ed25519.ts'
import { buildEndorsement, endorsementBytes, type Endorsement } from '../../../ledger-format/endorsement.ts'
import type { Enrolment } from '../../../ledger-format/enrolment.ts'
import { endorsementStatement } from '../../../ledger-format/statements.ts'
import type { Transaction } from '../../../platform/db/database.ts'
import type { Services } from '../../../platform/services.ts'
import { laboratory } from '../../laboratory/index.ts'
import { appendEvent } from '../../ledger/index.ts'
import { certify } from '../certify.ts'
import { documentMinutes, minutesAfter } from '../policy.ts'
import {
  currentKey,
  keepPending,
  keysOf,
  keyStatus,
  lockPerson,
  takePending,
  type KeyRow,
} from '../repository.ts'
import { inactiveSentence } from './unlock-key.ts'

/** The endorsement of a key that waits for one, to be signed by the caller's own key. */
export async function prepareEndorsement(
  services: Services,
  endorserId: string,
  personId: string,
  given: { enrolmentSha256: string; identity: string },
): Promise<{ id: string; document: string }> {
  const home = await laboratory(services)
  return services.db.transaction(async (t) => {
    const { endorser, role, ownKey } = await requireEndorser(services, endorserId, personId, t)
    const key = await requireWaiting(services, personId, given.enrolmentSha256, t)
    const enrolment = parseCanonical(key.document) as unknown as Enrolment
    const now = services.clock.now()
    const id = randomUUID()
    const document = Buffer.from(
      endorsementBytes(
        buildEndorsement({
          laboratory: home.id,
          id,
          enrolmentSha256: key.enrolmentSha256,
          subjectId: personId,
          publicKey: enrolment.publicKey,
          endorser: {
            subjectId: endorserId,
            name: endorser.name,
            role,
            enrolmentSha256: ownKey.enrolmentSha256,
          },
          identity: given.identity,
          statement: endorsementStatement({
            endorser: endorser.name,
            person: enrolment.name,
            laboratory: home.name,
            keyDigits: key.enrolmentSha256.slice(0, 16),
          }),
          time: now.toISOString(),
        }),
      ),
    )
    const expiresAt = minutesAfter(now, documentMinutes)
    await keepPending(services.db, { id, personId: endorserId, kind: 'endorsement', document, expiresAt }, t)
    return { id, document: document.toString('base64') }
  })
}

/** Takes the signed endorsement; the endorsed key is certified and can sign from now on. */
export async function endorseKey(
  services: Services,
  endorserId: string,
  personId: string,
  given: { endorsementId: string; signature: Buffer },
): Promise<void> {
  await services.db.transaction(async (t) => {
    const { ownKey } = await requireEndorser(services, endorserId, personId, t)
    const pending = await takePending(
      services.db,
      { id: given.endorsementId, personId: endorserId, kind: 'endorsement' },
      t,
    )
    if (!pending || pending.expiresAt <= services.clock.now())
      throw new Problem(
        'record-expired',
        'The prepared endorsement has expired or was used. Begin again; nothing was changed.',
      )
    const document = parseCanonical(pending.document) as unknown as Endorsement
    if (document.subjectId !== personId || document.endorser.enrolmentSha256 !== ownKey.enrolmentSha256)
      throw new Problem(
        'record-changed',
        'Your key or the person is another than when this was prepared. Begin again.',
      )
    const key = await requireWaiting(services, personId, document.enrolmentSha256, t)
    if (!verifySignature(ownKey.publicKey, pending.document, given.signature))
      throw new Problem(
        'invalid-values',
        'The signature is not one of your key over the endorsement; nothing was changed.',
        {
          errors: [{ pointer: '/signature', detail: 'Sign the document bytes with your own signing key.' }],
        },
      )
    await recordEndorsement(
      services,
      endorserId,
      key,
      { id: given.endorsementId, document: pending.document, signature: given.signature },
      t,
    )
    await certify(services, key, (parseCanonical(key.document) as unknown as Enrolment).name, t)
  })
}

async function recordEndorsement(
  services: Services,
  endorserId: string,
  key: KeyRow,
  endorsement: { id: string; document: Buffer; signature: Buffer },
  t: Transaction,
): Promise<void> {
  const sha256 = sha256Hex(endorsement.document)
  await services.db.run(
    `insert into record.endorsements (id, enrolment_id, endorser_id, sha256, document, signature, endorsed_at)
     values (:id, :enrolmentId, :endorserId, :sha256, :document, :signature, :now)`,
    { ...endorsement, enrolmentId: key.enrolmentId, endorserId, sha256, now: services.clock.now() },
    t,
  )
  await appendEvent(services, t, {
    actor: { kind: 'person', id: endorserId, onBehalfOf: null },
    action: 'key.endorsed',
    subject: { kind: 'key', id: key.enrolmentId },
    payload: { enrolmentSha256: key.enrolmentSha256, endorsementSha256: sha256 },
  })
}

/** A manager or supervisor, another person, whose own key can sign. Both people's rows are locked, in one order. */
async function requireEndorser(services: Services, endorserId: string, personId: string, t: Transaction) {
  if (endorserId === personId)
    throw new Problem('not-allowed', 'Nobody endorses a key of their own. Ask a manager or supervisor.')
  for (const id of [endorserId, personId].sort()) await lockPerson(services.db, id, t)
  const endorser = await lockPerson(services.db, endorserId, t)
  const role = (['manager', 'supervisor'] as const).find((candidate) => endorser?.roles.includes(candidate))
  if (!endorser || !role) throw new Problem('not-allowed', 'A key is endorsed by a manager or a supervisor.')
  const now = services.clock.now()
  const ownKey = currentKey(await keysOf(services.db, [endorserId], t), now)
  const status = ownKey ? keyStatus(ownKey, now) : 'none'
  if (!ownKey || status !== 'active') throw new Problem('key-not-active', inactiveSentence(status))
  return { endorser, role, ownKey }
}

/** The newest key of the person, if it waits for endorsement; an older one is never endorsed any more. */
async function requireWaiting(
  services: Services,
  personId: string,
  enrolmentSha256: string,
  t: Transaction,
): Promise<KeyRow> {
  const [newest] = await keysOf(services.db, [personId], t)
  if (!newest || newest.enrolmentSha256 !== enrolmentSha256)
    throw new Problem(
      'record-changed',
      'This is not the newest enrolment of the person. Look at the newest one and compare its digits again.',
    )
  if (keyStatus(newest, services.clock.now()) !== 'awaiting-endorsement')
    throw new Problem('wrong-state', 'This key does not wait for an endorsement.')
  return newest
}
