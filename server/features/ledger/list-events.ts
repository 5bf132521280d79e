import type { Role } from '../../contract/common.ts'
import type { LedgerEventView } from '../../contract/ledger.ts'
import { parseCanonical } from '../../ledger-format/canonical-json.ts'
import type { Services } from '../../platform/services.ts'

interface Reader {
  personId: string
  roles: readonly Role[]
}

interface Wanted {
  limit: number
  before: number
  action?: string
  subject?: string
}

interface Row {
  canonical: Buffer
  digest: string
  leafHash: string
  actorName: string | null
  subjectName: string | null
}

export type NamedEvent = LedgerEventView & { actorName: string | null; subjectName: string | null }

/** SQL: the notebook of an event's subject is one in which the reader is a member in a role that they still hold. */
const ofOwnNotebooks = `(
  (e.subject_kind = 'person' and e.subject_id = :personId)
  or exists (
    select 1 from work.members m
    where m.person_id = :personId and m.role = any (array[:roles]::text[]) and m.notebook_id = case e.subject_kind
      when 'notebook' then e.subject_id
      when 'entry' then (select x.notebook_id from work.entries x where x.id = e.subject_id)
      when 'run' then (select x.notebook_id from work.runs x where x.id = e.subject_id) end))`

/**
 * Events newest first, with the names that the events themselves do not hold. Auditors and managers see all of them, others
 * those of notebooks they may read and of themselves.
 */
export async function listEvents(
  services: Pick<Services, 'db'>,
  reader: Reader,
  wanted: Wanted,
): Promise<NamedEvent[]> {
  const seesAll = reader.roles.some((role) => role === 'auditor' || role === 'manager')
  if (reader.roles.length === 0) return []
  const rows = await services.db.rows<Row>(
    `select e.canonical, e.digest, e.leaf_hash as "leafHash",
       (select p.name from work.people p where p.id = e.actor_id) as "actorName",
       case e.subject_kind
         when 'entry' then (select 'N-' || lpad(n.number::text, greatest(2, length(n.number::text)), '0') || '/'
             || lpad(x.serial::text, greatest(3, length(x.serial::text)), '0')
           from work.entries x join work.notebooks n on n.id = x.notebook_id where x.id = e.subject_id)
         when 'run' then (select 'R-' || lpad(x.number::text, greatest(4, length(x.number::text)), '0') from work.runs x where x.id = e.subject_id)
         when 'notebook' then (select 'N-' || lpad(x.number::text, greatest(2, length(x.number::text)), '0') from work.notebooks x where x.id = e.subject_id)
         when 'person' then (select x.name from work.people x where x.id = e.subject_id)
         when 'key' then (select 'key of ' || p.name from record.enrolments x join work.people p on p.id = x.person_id where x.id = e.subject_id)
         when 'laboratory' then (select x.name from record.laboratory x where x.id = e.subject_id)
         when 'apparatus' then (select x.name from work.apparatus x where x.id = e.subject_id) end as "subjectName"
     from record.events e
     where e.sequence < :before and (:action = '' or e.action = :action)
       and (:subject = '' or e.subject_id::text = :subject) and (:seesAll or ${ofOwnNotebooks})
     order by e.sequence desc limit :limit`,
    {
      personId: reader.personId,
      roles: reader.roles,
      before: wanted.before,
      limit: wanted.limit,
      action: wanted.action ?? '',
      subject: wanted.subject ?? '',
      seesAll,
    },
  )
  return rows.map(({ canonical, ...rest }) => ({
    ...(parseCanonical(canonical) as unknown as LedgerEventView),
    ...rest,
  }))
}
