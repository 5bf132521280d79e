import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { entryNumber, hasContributed, type EntryRow } from '../entries/index.ts'

/** Tells the supervisors of the notebook who may witness that an entry waits for them. */
export async function tellWitnesses(services: Services, entry: EntryRow, t: Transaction): Promise<void> {
  const supervisors = await services.db.rows<{ id: string; email: string }>(
    `select p.id, p.email from work.members m join work.people p on p.id = m.person_id
     where m.notebook_id = :notebookId and m.role = 'supervisor' and 'supervisor' = any (p.roles)
       and p.active and p.email is not null order by p.id`,
    { notebookId: entry.notebookId },
    t,
  )
  for (const { id, email } of supervisors) {
    if (await hasContributed(services.db, entry.id, id, t)) continue
    const text = `${entryNumber(entry)}, “${entry.title}”, was signed by all its authors and waits for a witness.\n\n${address(services, entry)}\n`
    await services.mail.enqueue({ to: email, subject: `${entryNumber(entry)} waits for a witness`, text }, t)
  }
}

/** Tells the authors that their entry came back, with the reason. */
export async function tellAuthors(
  services: Services,
  entry: EntryRow,
  reason: string,
  byPerson: string,
  t: Transaction,
): Promise<void> {
  const authors = await services.db.rows<{ email: string }>(
    `select distinct p.email from record.revisions r join work.people p on p.id = r.person_id
     where r.entry_id = :entryId and p.active and p.email is not null and p.id <> :byPerson`,
    { entryId: entry.id, byPerson },
    t,
  )
  for (const { email } of authors) {
    const text = `${entryNumber(entry)}, “${entry.title}”, is open for writing again; the signatures given so far are void.\n\nReason: ${reason}\n\n${address(services, entry)}\n`
    await services.mail.enqueue({ to: email, subject: `${entryNumber(entry)} came back`, text }, t)
  }
}

const address = (services: Services, entry: EntryRow) => `${services.config.origin}/entries/${entry.id}`
