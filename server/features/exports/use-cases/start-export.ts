import { randomUUID } from 'node:crypto'
import { Problem } from '../../../contract/problems.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { entriesOfNotebook, requireEntry, type EntryRow } from '../../entries/index.ts'
import { requireNotebook } from '../../notebooks/index.ts'
import { insertExport } from '../repository.ts'

export type ExportRequest = { withoutRaw: boolean } & ({ notebookId: string } | { entryIds: string[] })

const KEPT_MS = 7 * 86_400_000
const ALL = 2 ** 31 - 1

/** Queues a bundle of chosen entries, or of a notebook; at least one of them must be sealed. Answers the export's id. */
export async function startExport(services: Services, actor: Actor, request: ExportRequest): Promise<string> {
  const entries =
    'notebookId' in request
      ? await notebookEntries(services, actor, request.notebookId)
      : await chosenEntries(services, actor, request.entryIds)
  if (!entries.some(({ state }) => state === 'sealed'))
    throw new Problem(
      'wrong-state',
      'Only sealed entries are exported, and none of these is sealed yet. Nothing was started.',
    )
  const id = randomUUID()
  const createdAt = services.clock.now()
  await services.db.transaction(async (t) => {
    await insertExport(
      services.db,
      {
        id,
        personId: actor.personId,
        notebookId: 'notebookId' in request ? request.notebookId : null,
        entryIds: entries.map((entry) => entry.id),
        withoutRaw: request.withoutRaw,
        createdAt,
        expiresAt: new Date(createdAt.getTime() + KEPT_MS),
      },
      t,
    )
    await services.queue.send('build-export', { exportId: id }, { transaction: t, retryLimit: 2 })
  })
  return id
}

async function notebookEntries(services: Services, actor: Actor, notebookId: string): Promise<EntryRow[]> {
  await requireNotebook(services, actor, notebookId, 'export')
  return entriesOfNotebook(services.db, notebookId, ALL, ALL)
}

async function chosenEntries(
  services: Services,
  actor: Actor,
  entryIds: readonly string[],
): Promise<EntryRow[]> {
  const entries: EntryRow[] = []
  for (const id of new Set(entryIds)) entries.push(await requireEntry(services, actor, id, 'export'))
  return entries
}
