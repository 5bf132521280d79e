import type { KeyInput } from '../../ledger-format/bundle/index.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { eventsOf } from '../ledger/index.ts'

interface Row {
  id: string
  document: Buffer
  signature: Buffer
  endorsement: Buffer | null
  endorsementSignature: Buffer | null
}

/** Every key ever enrolled with its endorsement and events: what a bundle chooses its keys from. */
export async function keyInputs(services: Pick<Services, 'db'>, t?: Transaction): Promise<KeyInput[]> {
  const rows = await services.db.rows<Row>(
    `select e.id, e.document, e.signature, n.document as endorsement, n.signature as "endorsementSignature"
     from record.enrolments e left join record.endorsements n on n.enrolment_id = e.id order by e.sha256`,
    {},
    t,
  )
  const events = await eventsOf(
    services,
    rows.map(({ id }) => ({ kind: 'key', id })),
    t,
  )
  return rows.map((row) => ({
    enrolment: row.document,
    enrolmentSignature: row.signature,
    endorsement:
      row.endorsement && row.endorsementSignature
        ? { document: row.endorsement, signature: row.endorsementSignature }
        : null,
    events: events.filter(({ subject }) => subject.id === row.id),
  }))
}

/** SHA-256 of the first manager's enrolment; null before it. */
export async function rootEnrolmentSha256(
  services: Pick<Services, 'db'>,
  t?: Transaction,
): Promise<string | null> {
  const row = await services.db.row<{ sha256: string }>(
    'select sha256 from record.enrolments where root',
    {},
    t,
  )
  return row?.sha256 ?? null
}
