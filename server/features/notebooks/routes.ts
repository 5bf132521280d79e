import { endpoints } from '../../contract/endpoints.ts'
import { notebookRights } from '../../contract/policy.ts'
import type { Notebook } from '../../contract/notebooks.ts'
import type { Actor } from '../../platform/http/actor.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { actorOf, appendEvent } from '../ledger/index.ts'
import { requireNotebook } from './access.ts'
import {
  findNotebook,
  membersOf,
  notebookNumber,
  notebooksOf,
  setTitle,
  type NotebookRow,
} from './repository.ts'
import { createNotebook } from './use-cases/create-notebook.ts'
import { removeMember, setMember } from './use-cases/set-member.ts'

async function present(services: Services, actor: Actor, rows: NotebookRow[]): Promise<Notebook[]> {
  const members = await membersOf(
    services.db,
    rows.map((row) => row.id),
  )
  return rows.map((row) => {
    const here = members.filter((member) => member.notebookId === row.id)
    const rights = notebookRights(
      actor.roles,
      here.find((member) => member.personId === actor.personId) ?? null,
    )
    return {
      id: row.id,
      number: notebookNumber(row.number),
      title: row.title,
      witnessesRequired: row.witnessesRequired,
      createdAt: row.createdAt.toISOString(),
      entries: row.entries,
      members: here.map(({ personId, login, name, role, keeper }) => ({
        personId,
        login,
        name,
        role,
        keeper,
      })),
      allowed: (['write', 'keep', 'witness', 'export'] as const).filter((right) => rights.has(right)),
    }
  })
}

async function one(services: Services, actor: Actor, id: string): Promise<Notebook> {
  await requireNotebook(services, actor, id, 'read')
  const row = await findNotebook(services.db, id)
  const [notebook] = await present(services, actor, row === null ? [] : [row])
  return notebook as Notebook
}

export function notebookRoutes(services: Services): Route[] {
  return [
    route(endpoints.listNotebooks, async ({ actor, query }) => {
      const rows = await notebooksOf(services.db, actor.personId, Number(query.cursor ?? 0), query.limit + 1)
      const page = rows.slice(0, query.limit)
      const items = (await present(services, actor, page)).filter((n) =>
        n.members.some((m) => m.personId === actor.personId && actor.roles.includes(m.role)),
      )
      return { items, nextCursor: rows.length > query.limit ? String(page.at(-1)?.number) : null }
    }),
    route(endpoints.createNotebook, async ({ actor, body }) => {
      const id = await createNotebook(services, actor, body.title)
      return answer(await one(services, actor, id), {
        status: 201,
        headers: { location: `/api/v1/notebooks/${id}` },
      })
    }),
    route(endpoints.getNotebook, ({ actor, params }) => one(services, actor, params.id)),
    route(endpoints.changeNotebook, async ({ actor, params, body }) => {
      await services.db.transaction(async (t) => {
        await requireNotebook(services, actor, params.id, 'keep', t)
        await setTitle(services.db, params.id, body.title, t)
        await appendEvent(services, t, {
          actor: actorOf(actor),
          action: 'notebook.renamed',
          subject: { kind: 'notebook', id: params.id },
          payload: {},
        })
      })
      return one(services, actor, params.id)
    }),
    route(endpoints.setMember, async ({ actor, params, body }) => {
      await setMember(services, actor, params.id, params.personId, body.role)
      return one(services, actor, params.id)
    }),
    route(endpoints.removeMember, async ({ actor, params }) => {
      await removeMember(services, actor, params.id, params.personId)
      return undefined
    }),
  ]
}
