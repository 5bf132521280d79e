import type { Transaction } from 'sequelize'
import type { Services } from '../../../platform/services.ts'
import { appendEvent } from '../../ledger/index.ts'
import { findSave, insertRevision, revisionsOf } from '../saves-repository.ts'
import { updateEntry, type EntryRow } from '../repository.ts'

export type RevisionCause =
  'typing' | 'pause' | 'author-change' | 'leaving' | 'calculation' | 'restore' | 'signature'

/**
 * Makes a revision of the newest save, in its writer's name, if there are saves since the last revision. Answers the
 * entry as it is afterwards. The caller holds the entry's lock.
 */
export async function cutRevision(
  services: Services,
  t: Transaction,
  entry: EntryRow,
  cause: RevisionCause,
): Promise<EntryRow> {
  const revisions = await revisionsOf(services.db, entry.id, t)
  if (entry.saveNumber === (revisions.at(-1)?.saveNumber ?? 0)) return entry
  const save = await findSave(services.db, entry.id, entry.saveNumber, t)
  if (save === null) throw new Error(`save ${entry.saveNumber} of entry ${entry.id} is missing`)
  const revision = entry.revision + 1
  const at = services.clock.now()
  await insertRevision(
    services.db,
    {
      entryId: entry.id,
      revision,
      personId: save.personId,
      tokenId: save.tokenId,
      at,
      cause,
      saveNumber: save.number,
      contentSha256: save.contentSha256,
    },
    t,
  )
  await updateEntry(services.db, entry.id, { revision }, at, t)
  await appendEvent(services, t, {
    actor:
      save.tokenId === null
        ? { kind: 'person', id: save.personId, onBehalfOf: null }
        : { kind: 'token', id: save.tokenId, onBehalfOf: save.personId },
    action: 'entry.revised',
    subject: { kind: 'entry', id: entry.id },
    payload: { revision, contentSha256: save.contentSha256, cause },
  })
  return { ...entry, revision, updatedAt: at }
}
