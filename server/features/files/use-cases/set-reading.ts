import { setTimeout as pause } from 'node:timers/promises'
import type { Transaction } from 'sequelize'
import { Problem, nothingHere } from '../../../contract/problems.ts'
import { formatVersion, readingOptions } from '../../../ingest/registry.ts'
import { readingSha256 } from '../../../ledger-format/content.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { requireNotebook } from '../../notebooks/index.ts'
import { requireWritableEntry } from '../../entries/index.ts'
import { chooseReading, findFile, type FileRow } from '../repository.ts'

/** How long a request waits for a worker to read a file before it answers that the reading goes on. */
const WAIT_MS = 120_000
const POLL_MS = 60

/** Reads a file in another way than was found by itself, and answers when that is done. */
export async function setReading(
  services: Services,
  actor: Actor,
  fileId: string,
  choice: { format: string; options: Record<string, unknown> },
): Promise<FileRow> {
  const options = readingOptions(choice.format, choice.options)
  await services.db.transaction(async (t) => {
    const subject = await claimFile(services, actor, fileId, t)
    await chooseReading(services.db, fileId, { format: choice.format, options, by: actor.personId }, t)
    await services.queue.send('read-file', { fileId }, { transaction: t })
    const sha256 = readingSha256({ format: choice.format, version: formatVersion(choice.format), options })
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'reading.set',
      subject,
      payload: { fileId, readingSha256: sha256 },
    })
  })
  const file = await waitForReading(services, fileId, WAIT_MS)
  if (file.readingStatus === 'unreadable')
    throw new Problem('unreadable-file', file.readingDetail ?? 'The file cannot be read in this way.')
  return file
}

/** A file whose reading the caller may choose now, with its entry or its unfiled run locked; answers whose act it is. */
async function claimFile(
  services: Services,
  actor: Actor,
  fileId: string,
  t: Transaction,
): Promise<{ kind: 'entry' | 'run'; id: string }> {
  const file = await findFile(services.db, fileId, t)
  if (file === null) throw nothingHere()
  await requireNotebook(services, actor, file.notebookId, 'write', t)
  if (file.homeEntryId !== null) {
    await requireWritableEntry(services, actor, file.homeEntryId, t)
    return { kind: 'entry', id: file.homeEntryId }
  }
  const runId = file.runId as string
  const run = await services.db.row<{ filed: boolean }>(
    'select entry_id is not null as filed from work.runs where id = :runId for update',
    { runId },
    t,
  )
  if (run?.filed) throw new Problem('wrong-state', 'The run was filed just now; look again.')
  return { kind: 'run', id: runId }
}

/** The file as soon as a worker has read it; still pending when that takes longer than `waitMs`. */
export async function waitForReading(services: Services, fileId: string, waitMs: number): Promise<FileRow> {
  const end = Date.now() + waitMs
  for (;;) {
    const file = await findFile(services.db, fileId)
    if (file === null) throw nothingHere()
    if (file.readingStatus !== 'pending' || Date.now() > end) return file
    await pause(POLL_MS)
  }
}
