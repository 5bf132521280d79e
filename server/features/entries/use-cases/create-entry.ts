import { randomUUID } from 'node:crypto'
import type { Transaction } from 'sequelize'
import type { Experiment } from '../../../contract/common.ts'
import { emptyDocument } from '../../../document/index.ts'
import { contentSha256 } from '../../../ledger-format/content.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { requireNotebook } from '../../notebooks/index.ts'
import { entryNumber, findEntry, insertEntry, takeNextSerial } from '../repository.ts'
import { dateInZone } from '../work-date.ts'

export interface EntryStart {
  title: string
  experiment: Experiment
  runAt?: Date
  amends?: { entryId: string; bodySha256: string }
}

/** A new entry with the next number of its notebook; numbers have no gaps because the notebook's row is locked. */
export async function createEntry(
  services: Services,
  actor: Actor,
  notebookId: string,
  start: EntryStart,
): Promise<string> {
  return services.db.transaction((t) => createEntryIn(services, actor, notebookId, start, t))
}

/** The same inside a transaction of the caller. */
export async function createEntryIn(
  services: Services,
  actor: Actor,
  notebookId: string,
  start: EntryStart,
  t: Transaction,
): Promise<string> {
  await requireNotebook(services, actor, notebookId, 'write', t)
  const now = services.clock.now()
  const runAt = start.runAt ?? now
  const id = randomUUID()
  await insertEntry(
    services.db,
    {
      id,
      notebookId,
      serial: await takeNextSerial(services.db, notebookId, t),
      title: start.title,
      experiment: start.experiment,
      runAt,
      workDate: dateInZone(runAt, services.config.laboratory.zone),
      contentSha256: contentSha256(emptyDocument()),
      amendsEntryId: start.amends?.entryId ?? null,
      amendsBodySha256: start.amends?.bodySha256 ?? null,
      createdBy: actor.personId,
      createdAt: now,
    },
    t,
  )
  const entry = await findEntry(services.db, id, t)
  if (entry === null) throw new Error('the entry just made is not there')
  await appendEvent(services, t, {
    actor: actorOf(actor),
    action: 'entry.created',
    subject: { kind: 'entry', id },
    payload: { notebookId, number: entryNumber(entry) },
  })
  return id
}
