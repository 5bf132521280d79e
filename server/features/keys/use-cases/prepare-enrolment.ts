import { randomUUID } from 'node:crypto'
import { Problem } from '../../../contract/problems.ts'
import { isUsablePublicKey } from '../../../ledger-format/ed25519.ts'
import { buildEnrolment, enrolmentBytes } from '../../../ledger-format/enrolment.ts'
import { enrolmentStatement } from '../../../ledger-format/statements.ts'
import type { Services } from '../../../platform/services.ts'
import { laboratory } from '../../laboratory/index.ts'
import { documentMinutes, minutesAfter, policyVersion } from '../policy.ts'
import { keepPending, keysOf, lockPerson } from '../repository.ts'

/** The statement that a new key is to sign about itself; the browser checks it before it signs. */
export async function prepareEnrolment(
  services: Services,
  personId: string,
  publicKey: Buffer,
): Promise<{ id: string; document: string }> {
  if (!isUsablePublicKey(publicKey))
    throw new Problem('invalid-values', 'This is not a usable Ed25519 public key; nothing was kept.', {
      errors: [{ pointer: '/publicKey', detail: 'Send the raw 32 bytes of an Ed25519 public key.' }],
    })
  const home = await laboratory(services)
  return services.db.transaction(async (t) => {
    const person = await lockPerson(services.db, personId, t)
    if (!person) throw new Problem('not-allowed', 'Your account is not active.')
    const now = services.clock.now()
    const [before] = await keysOf(services.db, [personId], t)
    const id = randomUUID()
    const document = Buffer.from(
      enrolmentBytes(
        buildEnrolment({
          laboratory: home.id,
          id,
          subjectId: personId,
          name: person.name,
          publicKey,
          supersedes: before?.enrolmentSha256 ?? null,
          policyVersion,
          statement: enrolmentStatement({ name: person.name, laboratory: home.name }),
          time: now.toISOString(),
        }),
      ),
    )
    await keepPending(
      services.db,
      { id, personId, kind: 'enrolment', document, expiresAt: minutesAfter(now, documentMinutes) },
      t,
    )
    return { id, document: document.toString('base64') }
  })
}
