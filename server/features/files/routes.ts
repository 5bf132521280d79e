import { endpoints } from '../../contract/endpoints.ts'
import { route, type Route } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { findEntry, noteOpening } from '../entries/index.ts'
import type { Actor } from '../../platform/http/actor.ts'
import { requireFile } from './access.ts'
import { presentFiles, presentReading } from './present.ts'
import type { FileRow } from './repository.ts'
import { sendContent } from './send-content.ts'
import { setReading } from './use-cases/set-reading.ts'

async function noteFileOpening(services: Services, actor: Actor, file: FileRow): Promise<void> {
  const entry = file.homeEntryId === null ? null : await findEntry(services.db, file.homeEntryId)
  if (entry !== null) await noteOpening(services, actor, entry, 'file', file.id)
}

/** Raw files: description, bytes, reading. Uploads are routes of what they go to (entries, runs). */
export function fileRoutes(services: Services): Route[] {
  return [
    route(endpoints.getFile, async ({ actor, params }) => {
      const file = await requireFile(services, actor, params.id)
      await noteFileOpening(services, actor, file)
      const [shown] = await presentFiles(services, actor, [file])
      return shown as NonNullable<typeof shown>
    }),
    route(endpoints.getFileContent, async ({ actor, params, req, res }) => {
      const file = await requireFile(services, actor, params.id)
      await noteFileOpening(services, actor, file)
      await sendContent(services, file, req, res)
      return undefined
    }),
    route(endpoints.setReading, async ({ actor, params, body }) => {
      await requireFile(services, actor, params.id)
      return presentReading(await setReading(services, actor, params.id, body))
    }),
  ]
}
