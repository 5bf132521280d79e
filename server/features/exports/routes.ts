import { pipeline } from 'node:stream/promises'
import { endpoints } from '../../contract/endpoints.ts'
import type { BundleExport } from '../../contract/exports.ts'
import { Problem } from '../../contract/problems.ts'
import type { Actor } from '../../platform/http/actor.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { entryNumber, findEntry, requireEntry } from '../entries/index.ts'
import { requireNotebook } from '../notebooks/index.ts'
import { exportsOf, findExport, type ExportRow } from './repository.ts'
import { startExport } from './use-cases/start-export.ts'

/** Starting a bundle, its state, and the bundle itself. */
export function exportRoutes(services: Services): Route[] {
  return [
    route(endpoints.listExports, async ({ actor }) => {
      const rows = await exportsOf(services.db, actor.personId)
      return { items: await Promise.all(rows.map((row) => present(services, row))), nextCursor: null }
    }),
    route(endpoints.startExport, async ({ actor, body }) => {
      const id = await startExport(services, actor, body)
      const started = await present(services, await requireOwn(services, actor, id))
      return answer(started, { status: 202, headers: { location: `/api/v1/exports/${id}` } })
    }),
    route(endpoints.getExport, async ({ actor, params }) =>
      present(services, await requireOwn(services, actor, params.id)),
    ),
    route(endpoints.getBundle, async ({ actor, params, res }) => {
      const row = await requireOwn(services, actor, params.id)
      await requireRights(services, actor, row)
      if (row.status !== 'done' || !row.objectKey || !row.sha256)
        throw new Problem('wrong-state', `The bundle is not ready: its export is ${row.status}.`)
      res.status(200).set({
        'Content-Type': 'application/zip',
        'Content-Length': String(row.size),
        'Content-Disposition': `attachment; filename="${row.name}.zip"`,
        'Repr-Digest': `sha-256=:${Buffer.from(row.sha256, 'hex').toString('base64')}:`,
        ETag: `"${row.sha256}"`,
        'Cache-Control': 'private, no-store, no-transform',
      })
      await pipeline(await services.storage.get(row.objectKey, row.objectVersion), res)
      return undefined
    }),
  ]
}

/** An export is its maker's alone; to everybody else, and after its time, it does not exist. */
async function requireOwn(services: Services, actor: Actor, id: string): Promise<ExportRow> {
  const row = await findExport(services.db, id)
  if (!row || row.personId !== actor.personId)
    throw new Problem('not-found', 'There is no such export, or it is not yours.')
  if (row.expiresAt <= services.clock.now())
    throw new Problem(
      'not-found',
      'This export has expired. Start it again; the same sealed state gives the same bundle.',
    )
  return row
}

/** The rights may have ended since the export was started (threat B20). */
async function requireRights(services: Services, actor: Actor, row: ExportRow): Promise<void> {
  if (row.notebookId !== null) await requireNotebook(services, actor, row.notebookId, 'export')
  for (const id of row.entryIds) await requireEntry(services, actor, id, 'export')
}

async function present(services: Services, row: ExportRow): Promise<BundleExport> {
  const entries = await Promise.all(row.entryIds.map((id) => findEntry(services.db, id)))
  return {
    id: row.id,
    status: row.status,
    entries: entries.flatMap((entry) => (entry ? [{ id: entry.id, number: entryNumber(entry) }] : [])),
    notebookId: row.notebookId,
    name: row.name,
    size: row.size === null ? null : Number(row.size),
    sha256: row.sha256,
    error: row.error,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
  }
}
