import { endpoints } from '../../contract/endpoints.ts'
import { Problem } from '../../contract/problems.ts'
import { emptyDocument } from '../../document/index.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { requireEntry, requireWritableEntry } from './access.ts'
import { contentTag } from './content-tag.ts'
import { noteOpening } from './openings.ts'
import { contentOfSave, revisionsOf, type Revision } from './saves-repository.ts'
import { cutRevision } from './use-cases/cut-revision.ts'
import { saveContent } from './use-cases/save-content.ts'

function presentRevision(revision: Revision) {
  const { personId, author, at, cause, contentSha256 } = revision
  return {
    revision: revision.revision,
    authorId: personId,
    author,
    time: at.toISOString(),
    cause,
    contentSha256,
  }
}

/** The text of an entry and its history. */
export function contentRoutes(services: Services): Route[] {
  return [
    route(endpoints.getContent, async ({ actor, params }) => {
      const entry = await requireEntry(services, actor, params.id, 'read')
      await noteOpening(services, actor, entry, 'text', entry.id)
      const content = (await contentOfSave(services.db, entry.id, entry.saveNumber)) ?? emptyDocument()
      return answer(content, { headers: { etag: contentTag(entry.saveNumber, entry.contentSha256) } })
    }),
    route(endpoints.putContent, async ({ actor, params, body, header }) => {
      const { tag, ...saved } = await saveContent(services, actor, params.id, header('if-match'), body)
      return answer(saved, { headers: { etag: tag } })
    }),
    route(endpoints.cutRevision, async ({ actor, params, body }) => {
      const entry = await services.db.transaction(async (t) =>
        cutRevision(services, t, await requireWritableEntry(services, actor, params.id, t), body.cause),
      )
      return { revision: entry.revision }
    }),
    route(endpoints.listRevisions, async ({ actor, params }) => {
      await requireEntry(services, actor, params.id, 'read')
      return { items: (await revisionsOf(services.db, params.id)).map(presentRevision), nextCursor: null }
    }),
    route(endpoints.getRevision, async ({ actor, params }) => {
      await requireEntry(services, actor, params.id, 'read')
      const found = (await revisionsOf(services.db, params.id)).find((r) => r.revision === params.n)
      const content =
        found === undefined ? null : await contentOfSave(services.db, params.id, found.saveNumber)
      if (found === undefined || content === null)
        throw new Problem('not-found', `The entry has no revision ${params.n}.`)
      return { ...presentRevision(found), content }
    }),
  ]
}
