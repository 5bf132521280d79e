import { randomUUID } from 'node:crypto'
import { Problem } from '../../../contract/problems.ts'
import { checkDocument, DocumentError } from '../../../document/index.ts'
import { contentSha256 } from '../../../ledger-format/content.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { requireNotebook } from '../../notebooks/index.ts'
import { requireLockedEntry, requireOpen } from '../access.ts'
import { contentTag, tagMatches } from '../content-tag.ts'
import { updateEntry, type EntryRow } from '../repository.ts'
import { findSave, insertSave, revisionsOf, type Document } from '../saves-repository.ts'
import { cutRevision } from './cut-revision.ts'

/** A revision is cut after this much typing, and after this long a pause (rulings 27). */
const TYPING_MS = 60_000
const PAUSE_MS = 5 * 60_000

export interface Saved {
  revision: number
  save: number
  savedAt: string
  tag: string
}

/**
 * Saves the text. The state comes first (a sealed entry takes no write whatever its If-Match), then the rights, then the
 * If-Match: another save in between means that this one is refused and nothing is overwritten.
 */
export async function saveContent(
  services: Services,
  actor: Actor,
  entryId: string,
  ifMatch: string | undefined,
  content: unknown,
): Promise<Saved> {
  return services.db.transaction(async (t) => {
    const locked = await requireLockedEntry(services, actor, entryId, 'read', t)
    requireOpen(locked)
    await requireNotebook(services, actor, locked.notebookId, 'write', t)
    requireCurrent(locked, ifMatch)
    const document = checkedDocument(content)
    const entry = await cutBefore(services, locked, actor, t)
    const save = {
      entryId,
      number: entry.saveNumber + 1,
      personId: actor.personId,
      tokenId: actor.tokenId ?? null,
      savedAt: services.clock.now(),
      contentSha256: contentSha256(document),
    }
    await insertSave(services.db, save, document, t)
    await updateEntry(
      services.db,
      entryId,
      { saveNumber: save.number, contentSha256: save.contentSha256 },
      save.savedAt,
      t,
    )
    return {
      revision: entry.revision,
      save: save.number,
      savedAt: save.savedAt.toISOString(),
      tag: contentTag(save.number, save.contentSha256),
    }
  })
}

function requireCurrent(entry: EntryRow, ifMatch: string | undefined): void {
  if (ifMatch === undefined)
    throw new Problem(
      'missing-precondition',
      'Send If-Match with the ETag of the text you changed, so that nobody is overwritten.',
    )
  const current = contentTag(entry.saveNumber, entry.contentSha256)
  if (!tagMatches(ifMatch, current))
    throw new Problem(
      'stale-content',
      'The text was saved by somebody else since you opened it. Nothing was overwritten; fetch the newest text and put your change on it.',
      { extra: { etag: current } },
    )
}

function checkedDocument(content: unknown): Document {
  try {
    return checkDocument(content, randomUUID) as Document
  } catch (error) {
    if (!(error instanceof DocumentError)) throw error
    throw new Problem('invalid-values', `The text was not saved: ${error.detail}`, {
      errors: [{ pointer: error.pointer, detail: error.detail }],
    })
  }
}

/** Closes the revision before this save when it is due: another writer, a pause, or a minute of typing. */
async function cutBefore(
  services: Services,
  entry: EntryRow,
  actor: Actor,
  t: Parameters<typeof cutRevision>[1],
): Promise<EntryRow> {
  const last = await findSave(services.db, entry.id, entry.saveNumber, t)
  if (last === null) return entry
  const now = services.clock.now().getTime()
  if (last.personId !== actor.personId) return cutRevision(services, t, entry, 'author-change')
  if (now - last.savedAt.getTime() > PAUSE_MS) return cutRevision(services, t, entry, 'pause')
  const revisedSave = (await revisionsOf(services.db, entry.id, t)).at(-1)?.saveNumber ?? 0
  const first = await findSave(services.db, entry.id, revisedSave + 1, t)
  if (first !== null && now - first.savedAt.getTime() > TYPING_MS)
    return cutRevision(services, t, entry, 'typing')
  return entry
}
