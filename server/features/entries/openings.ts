import type { Transaction } from 'sequelize'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import type { EntryRow } from './repository.ts'

export interface Opening {
  kind: 'text' | 'calculation' | 'file'
  id: string
  time: Date
}

/**
 * Notes that a person who may witness opened something of a submitted entry, from the person's own request (rulings 17):
 * the witness's record lists it. The first time counts; repeated opening adds nothing.
 */
export async function noteOpening(
  services: Services,
  actor: Actor,
  entry: Pick<EntryRow, 'id' | 'phase' | 'submittedAt'>,
  kind: Opening['kind'],
  objectId: string,
): Promise<void> {
  if (entry.phase !== 'with-witness' || entry.submittedAt === null || actor.kind !== 'person') return
  await services.db.run(
    `insert into work.openings (entry_id, person_id, kind, object_id, submitted_at, at)
     values (:entryId, :personId, :kind, :objectId, :submittedAt, :at) on conflict do nothing`,
    {
      entryId: entry.id,
      personId: actor.personId,
      kind,
      objectId,
      submittedAt: entry.submittedAt,
      at: services.clock.now(),
    },
  )
}

/** What the person opened since the entry was submitted, in order of time, then id. */
export function openingsOf(
  services: Services,
  entry: Pick<EntryRow, 'id' | 'submittedAt'>,
  personId: string,
  t?: Transaction,
): Promise<Opening[]> {
  return services.db.rows<Opening>(
    `select kind, object_id as id, at as time from work.openings
     where entry_id = :entryId and person_id = :personId and submitted_at = :submittedAt order by at, object_id`,
    { entryId: entry.id, personId, submittedAt: entry.submittedAt },
    t,
  )
}
