import type { Services } from '../platform/services.ts'

/** Digest of a person's newest enrolment, as the endorser reads it on the screen. */
export async function enrolmentDigest(services: Services, personId: string): Promise<string> {
  const row = await services.db.row<{ sha256: string }>(
    `select sha256 from record.enrolments where person_id = :personId order by enrolled_at desc limit 1`,
    { personId },
  )
  if (row === null) throw new Error(`person ${personId} has not enrolled a key`)
  return row.sha256
}
