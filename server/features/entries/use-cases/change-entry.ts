import type { Experiment } from '../../../contract/common.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { requireWritableEntry } from '../access.ts'
import { updateEntry } from '../repository.ts'
import { dateInZone } from '../work-date.ts'

export interface EntryDetails {
  title?: string
  experiment?: Experiment
  runAt?: string
  lateRemark?: string | null
  important?: boolean
}

/** Title, experiment, time of the run, remark on late writing and the important flag: all of it enters the signed body. */
export async function changeEntry(
  services: Services,
  actor: Actor,
  entryId: string,
  details: EntryDetails,
): Promise<void> {
  await services.db.transaction(async (t) => {
    await requireWritableEntry(services, actor, entryId, t)
    const { runAt, ...rest } = details
    const time = runAt === undefined ? undefined : new Date(runAt)
    await updateEntry(
      services.db,
      entryId,
      {
        ...rest,
        ...(time === undefined
          ? {}
          : { runAt: time, workDate: dateInZone(time, services.config.laboratory.zone) }),
      },
      services.clock.now(),
      t,
    )
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'entry.changed',
      subject: { kind: 'entry', id: entryId },
      payload: { members: Object.keys(details).sort() },
    })
  })
}
