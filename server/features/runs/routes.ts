import { endpoints } from '../../contract/endpoints.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import type { RawFile } from '../../contract/files.ts'
import type { Run } from '../../contract/runs.ts'
import { requireEntry, requireOpen, requireWritableEntry } from '../entries/index.ts'
import { presentFiles, receiveFile } from '../files/index.ts'
import { requireNotebook } from '../notebooks/index.ts'
import { requireRun, requireWritableRun, runSubject } from './access.ts'
import { listApparatus } from './apparatus-repository.ts'
import { presentRuns } from './present.ts'
import { findRun, runsOfNotebook } from './repository.ts'
import { changeRun, createRun, createRunInEntry, fileRun } from './use-cases/create-run.ts'

/** Runs, uploads to runs and entries, and the equipment that runs name. */
export function runRoutes(services: Services): Route[] {
  async function one(actor: Actor, id: string): Promise<Run> {
    const run = await findRun(services.db, id)
    const [shown] = await presentRuns(services, actor, run === null ? [] : [run])
    return shown as Run
  }

  async function shownFile(actor: Actor, file: Parameters<typeof presentFiles>[2][number]): Promise<RawFile> {
    const [shown] = await presentFiles(services, actor, [file])
    return shown as RawFile
  }

  return [
    route(endpoints.listRuns, async ({ actor, params, query }) => {
      await requireNotebook(services, actor, params.id, 'read')
      const rows = await runsOfNotebook(
        services.db,
        params.id,
        Number(query.cursor ?? 2 ** 31 - 1),
        query.limit + 1,
      )
      const page = rows.slice(0, query.limit)
      return {
        items: await presentRuns(services, actor, page),
        nextCursor: rows.length > query.limit ? String(page.at(-1)?.number) : null,
      }
    }),
    route(endpoints.createRun, async ({ actor, params, body }) =>
      answer(await one(actor, await createRun(services, actor, params.id, body)), { status: 201 }),
    ),
    route(endpoints.createRunInEntry, async ({ actor, params, body }) => {
      if (!('runId' in body))
        return answer(await one(actor, await createRunInEntry(services, actor, params.id, body)), {
          status: 201,
        })
      await fileRun(services, actor, params.id, body.runId)
      return answer(await one(actor, body.runId), { status: 201 })
    }),
    route(endpoints.getRun, async ({ actor, params }) => {
      await requireRun(services, actor, params.id)
      return one(actor, params.id)
    }),
    route(endpoints.changeRun, async ({ actor, params, body }) => {
      await changeRun(services, actor, params.id, body)
      return one(actor, params.id)
    }),
    route(endpoints.uploadToEntry, async ({ actor, params, req, res, header }) => {
      const entry = await requireEntry(services, actor, params.id, 'write')
      requireOpen(entry)
      const target = {
        entryId: entry.id,
        runId: null,
        async claim(t: Parameters<typeof requireWritableEntry>[3]) {
          await requireWritableEntry(services, actor, entry.id, t)
          return { kind: 'entry' as const, id: entry.id }
        },
      }
      return answer(
        await shownFile(actor, await receiveFile(services, actor, target, { req, res, header })),
        { status: 201 },
      )
    }),
    route(endpoints.uploadToRun, async ({ actor, params, req, res, header }) => {
      await services.db.transaction((t) => requireWritableRun(services, actor, params.id, t))
      const target = {
        entryId: null,
        runId: params.id,
        claim: async (t: Parameters<typeof requireWritableRun>[3]) =>
          runSubject(await requireWritableRun(services, actor, params.id, t)),
      }
      return answer(
        await shownFile(actor, await receiveFile(services, actor, target, { req, res, header })),
        { status: 201 },
      )
    }),
    route(endpoints.listDetectors, async () => ({
      items: await listApparatus(services.db, 'detector'),
      nextCursor: null,
    })),
    route(endpoints.listSources, async () => ({
      items: await listApparatus(services.db, 'source'),
      nextCursor: null,
    })),
  ]
}
