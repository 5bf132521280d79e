import { endpoints } from '../../contract/endpoints.ts'
import type { Entry } from '../../contract/entries.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import {
  changeEntry,
  createEntry,
  entriesOfNotebook,
  entriesOfPerson,
  requireEntry,
} from '../entries/index.ts'
import { requireNotebook } from '../notebooks/index.ts'
import { presentEntry, presentSummaries } from './present.ts'

const NEWEST = 2 ** 31 - 1

/** Sheets: entries as they are listed and shown. */
export function sheetRoutes(services: Services): Route[] {
  async function show(actor: Actor, id: string): Promise<Entry> {
    return presentEntry(services, actor, await requireEntry(services, actor, id, 'read'))
  }

  return [
    route(endpoints.listEntries, async ({ actor, params, query }) => {
      await requireNotebook(services, actor, params.id, 'read')
      const rows = await entriesOfNotebook(
        services.db,
        params.id,
        Number(query.cursor ?? NEWEST),
        query.limit + 1,
      )
      const page = rows.slice(0, query.limit)
      return {
        items: await presentSummaries(services, page),
        nextCursor: rows.length > query.limit ? String(page.at(-1)?.serial) : null,
      }
    }),
    route(endpoints.listMyEntries, async ({ actor, query }) => {
      const offset = Number(query.cursor ?? 0)
      const rows = await entriesOfPerson(services.db, actor.personId, query, offset, query.limit + 1)
      const page = rows.slice(0, query.limit)
      const summaries = await presentSummaries(services, page)
      return {
        items: summaries.map((summary, index) => ({
          ...summary,
          notebookTitle: page[index]?.notebookTitle ?? '',
        })),
        nextCursor: rows.length > query.limit ? String(offset + query.limit) : null,
      }
    }),
    route(endpoints.createEntry, async ({ actor, params, body }) => {
      const { runAt, ...start } = body
      const id = await createEntry(services, actor, params.id, {
        ...start,
        runAt: runAt === undefined ? undefined : new Date(runAt),
      })
      return answer(await show(actor, id), { status: 201, headers: { location: `/api/v1/entries/${id}` } })
    }),
    route(endpoints.getEntry, ({ actor, params }) => show(actor, params.id)),
    route(endpoints.changeEntry, async ({ actor, params, body }) => {
      await changeEntry(services, actor, params.id, body)
      return show(actor, params.id)
    }),
  ]
}
