import { Problem } from '../../contract/problems.ts'
import { parseCanonical } from '../../ledger-format/canonical-json.ts'
import type { Enrolment } from '../../ledger-format/enrolment.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { inactiveSentence, keyInForce, policyVersion, type CertifiedKey } from '../keys/index.ts'

export interface Signer {
  key: CertifiedKey
  /** What the person declared at enrolment; its name is the one certified and printed. */
  enrolment: Enrolment
}

/**
 * The gates before every signature, in one place (rulings 26): a key whose holder was identified by an endorser, certified
 * and not ended, enrolled under the accountability statement of the policy in force.
 */
export async function requireSigner(services: Services, personId: string, t: Transaction): Promise<Signer> {
  const found = await keyInForce(services, personId, t)
  if (found.key === null) throw new Problem('key-not-active', inactiveSentence(found.status))
  const enrolment = parseCanonical(found.key.document) as unknown as Enrolment
  if (enrolment.policyVersion !== policyVersion)
    throw new Problem(
      'key-not-active',
      'Your key was enrolled under an earlier signing policy. Enrol a new key to sign under the present one.',
    )
  return { key: found.key, enrolment }
}
