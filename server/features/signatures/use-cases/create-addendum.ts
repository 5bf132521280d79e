import { Problem } from '../../../contract/problems.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { createEntryIn, entryNumber, findEntry } from '../../entries/index.ts'
import { requireAction, standingOf } from '../standing.ts'

/** A new entry of the same notebook that amends a sealed one; the sealed one stays as it is and points to it once sealed. */
export async function createAddendum(
  services: Services,
  actor: Actor,
  entryId: string,
  title: string | undefined,
): Promise<{ id: string; number: string }> {
  return services.db.transaction(async (t) => {
    const standing = await standingOf(services, actor.personId, entryId, t)
    requireAction(standing, 'addendum', 'Only a sealed entry gets an addendum.')
    const { entry } = standing
    if (entry.bodySha256 === null) throw new Problem('wrong-state', 'The entry has no sealed body to amend.')
    const start = {
      title: title ?? `Addendum to ${entryNumber(entry)}`,
      experiment: entry.experiment,
      amends: { entryId, bodySha256: entry.bodySha256 },
    }
    const id = await createEntryIn(services, actor, entry.notebookId, start, t)
    const made = await findEntry(services.db, id, t)
    if (!made) throw new Error('The addendum just made is not there.')
    return { id, number: entryNumber(made) }
  })
}
