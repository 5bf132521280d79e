import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { certificateAuthority, issueCertificate } from '../laboratory/index.ts'
import { appendEvent, systemActor } from '../ledger/index.ts'
import { keysOf, type KeyRow } from './repository.ts'

type Enrolled = Pick<KeyRow, 'enrolmentId' | 'personId' | 'enrolmentSha256' | 'publicKey'>

/**
 * Certifies a key that may sign from now on. Whatever key the person had before is revoked first, in the same transaction,
 * so that at no place of the ledger two keys of one person count.
 */
export async function certify(
  services: Pick<Services, 'db' | 'clock' | 'config'>,
  key: Enrolled,
  name: string,
  t: Transaction,
): Promise<void> {
  const now = services.clock.now()
  const subject = (id: string) => ({ kind: 'key', id }) as const
  for (const old of await keysOf(services.db, [key.personId], t)) {
    if (old.enrolmentId === key.enrolmentId || old.revokedAt) continue
    await services.db.run(
      `insert into record.revocations (enrolment_id, reason, revoked_at) values (:id, 'superseded', :now)`,
      { id: old.enrolmentId, now },
      t,
    )
    const payload = { enrolmentSha256: old.enrolmentSha256, reason: 'superseded' }
    await appendEvent(services, t, {
      actor: systemActor,
      action: 'key.revoked',
      subject: subject(old.enrolmentId),
      payload,
    })
  }
  const certificate = await issueCertificate(
    await certificateAuthority(services, t),
    { name, subjectId: key.personId, publicKey: key.publicKey },
    now,
  )
  await services.db.run(
    `insert into record.certificates (sha256, enrolment_id, serial, pem, not_before, not_after, certified_at)
     values (:sha256, :enrolmentId, :serial, :pem, :notBefore, :notAfter, :now)`,
    { ...certificate, enrolmentId: key.enrolmentId, now },
    t,
  )
  await appendEvent(services, t, {
    actor: systemActor,
    action: 'key.certified',
    subject: subject(key.enrolmentId),
    payload: {
      enrolmentSha256: key.enrolmentSha256,
      certificateSha256: certificate.sha256,
      notAfter: certificate.notAfter.toISOString(),
    },
  })
}
