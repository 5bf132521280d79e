import { setTimeout as pause } from 'node:timers/promises'
import { Problem, problemBody } from '../../../contract/problems.ts'
import { buildBundle, type BundleScope } from '../../../ledger-format/bundle/index.ts'
import type { Services } from '../../../platform/services.ts'
import { entryNumber, findEntry, type EntryRow } from '../../entries/index.ts'
import { renderEvidence, renditionsOf } from '../../evidence/index.ts'
import { findFile } from '../../files/index.ts'
import { stamp } from '../../laboratory/index.ts'
import { appendEvent, findHead } from '../../ledger/index.ts'
import { notebookNumber } from '../../notebooks/index.ts'
import { signaturesOf } from '../../signatures/index.ts'
import { choose, withAddenda, type Chosen } from '../choose-entries.ts'
import { gatherBundle } from '../gather-bundle.ts'
import { findExport, finishExport, setStatus, type ExportRow } from '../repository.ts'
import { zipBundle } from '../zip-bundle.ts'

/** How long the job waits for the job that renders before it renders itself. */
const RENDER_WAIT_MS = 15_000
const RENDER_POLL_MS = 100
/** Time stamps that do not come: tried again for ten minutes, then the bundle is offered without. */
const STAMP_WAIT_MS = 10 * 60_000
const STAMP_RETRY_S = 5
const STAMP_TIMEOUT_MS = 3000

/** Builds a bundle: waits for renditions and time stamps, packs it into the store, and tells the ledger who exported what. */
export async function buildExport(services: Services, exportId: string): Promise<void> {
  const row = await findExport(services.db, exportId)
  if (!row || row.status === 'done' || row.status === 'failed') return
  try {
    if (row.status === 'queued') await setStatus(services.db, row.id, 'running')
    await build(services, row)
  } catch (error) {
    services.log.error({ err: error, export: exportId }, 'an export failed')
    const sentence =
      'The bundle could not be made. The entries are safe; start the export again, and if it stays, tell whoever runs this server.'
    await setStatus(
      services.db,
      row.id,
      'failed',
      problemBody(error instanceof Problem ? error : new Problem('internal', sentence)),
    )
  }
}

async function build(services: Services, row: ExportRow): Promise<void> {
  const entries: EntryRow[] = []
  for (const id of row.entryIds) {
    const entry = await findEntry(services.db, id)
    if (entry) entries.push(entry)
  }
  for (const entry of await withAddenda(services, entries)) await waitForEvidence(services, entry.id)
  const chosen = await choose(services, entries)
  const stamped = await stampsHaveCome(services, chosen)
  if (!stamped && services.clock.now().getTime() - row.createdAt.getTime() < STAMP_WAIT_MS) {
    await setStatus(services.db, row.id, 'waiting-for-time-stamp')
    await services.queue.send(
      'build-export',
      { exportId: row.id },
      { startAfter: STAMP_RETRY_S, retryLimit: 2 },
    )
    return
  }
  const input = await gatherBundle(services, chosen, await scopeOf(row, entries), row.withoutRaw)
  const bundle = buildBundle(input)
  const zip = zipBundle(bundle, new Date(input.head.time), (fileId) => openRaw(services, fileId))
  const objectKey = `exports/${row.id}/${crypto.randomUUID()}.zip`
  const stored = await services.storage.putStream(objectKey, zip)
  await record(services, row, chosen, { name: bundle.topFolder, objectKey, ...stored })
}

/** An export asked for seconds after the seal waits until the evidence is there. */
async function waitForEvidence(services: Services, entryId: string): Promise<void> {
  const end = Date.now() + RENDER_WAIT_MS
  while (Date.now() < end) {
    if ((await renditionsOf(services.db, entryId)).length > 0) return
    await pause(RENDER_POLL_MS)
  }
  await renderEvidence(services, entryId)
}

/** Tries what is missing at once; true when every signature and the head have their stamp. */
async function stampsHaveCome(services: Services, chosen: Chosen): Promise<boolean> {
  const signatures = await signaturesOf(
    services.db,
    chosen.entries.map(({ entry }) => entry.id),
  )
  const head = await findHead(services, chosen.treeSize)
  try {
    for (const { signature } of [...signatures, ...(head ? [head] : [])])
      await stamp(services, signature, STAMP_TIMEOUT_MS)
    return true
  } catch (error) {
    services.log.warn({ err: error }, 'an export waits for time stamps')
    return false
  }
}

async function scopeOf(row: ExportRow, entries: EntryRow[]): Promise<BundleScope> {
  const [first] = entries
  if (!first) throw new Error('An export without entries.')
  if (row.notebookId !== null) return { kind: 'notebook', number: notebookNumber(first.notebookNumber) }
  return entries.length === 1 ? { kind: 'entry', number: entryNumber(first) } : { kind: 'selection' }
}

async function openRaw(services: Services, fileId: string) {
  const file = await findFile(services.db, fileId)
  if (!file) throw new Error(`The file ${fileId} is gone.`)
  return services.storage.get(file.objectKey, file.objectVersion)
}

/** The export as an event of each entry, or of the notebook: later than the bundle's head, so that it is not in the bundle. */
async function record(
  services: Services,
  row: ExportRow,
  { entries, treeSize }: Chosen,
  made: { name: string; objectKey: string; versionId: string | null; size: number; sha256: string },
): Promise<void> {
  await services.db.transaction(async (t) => {
    const entryIds = entries.map(({ entry }) => entry.id)
    await finishExport(services.db, row.id, { ...made, entryIds, objectVersion: made.versionId }, t)
    const subjects =
      row.notebookId === null
        ? entryIds.map((id) => ({ action: 'entry.exported', subject: { kind: 'entry', id } as const }))
        : [{ action: 'notebook.exported', subject: { kind: 'notebook', id: row.notebookId } as const }]
    for (const { action, subject } of subjects)
      await appendEvent(services, t, {
        actor: { kind: 'person', id: row.personId, onBehalfOf: null },
        action,
        subject,
        payload: { exportId: row.id, sha256: made.sha256, treeSize, withoutRaw: row.withoutRaw },
      })
  })
}
