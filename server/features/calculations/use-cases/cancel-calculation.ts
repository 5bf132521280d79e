import { Problem } from '../../../contract/problems.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { requireWritableEntry } from '../../entries/index.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { announce, cancelChannel } from '../announce.ts'
import { cancel, type CalculationRow } from '../repository.ts'

/** Stops a calculation that waits or runs; one that is over stays as it is. */
export async function cancelCalculation(
  services: Services,
  actor: Actor,
  calculation: CalculationRow,
): Promise<void> {
  await services.db.transaction(async (t) => {
    await requireWritableEntry(services, actor, calculation.entryId, t)
    const stopped = await cancel(services.db, calculation.id, services.clock.now(), t)
    if (!stopped) throw new Problem('wrong-state', 'The calculation is over: there is nothing to stop.')
    await announce(services, calculation.id, t)
    await services.events.notify(cancelChannel(calculation.id), null, t)
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'calculation.cancelled',
      subject: { kind: 'entry', id: calculation.entryId },
      payload: { calculationId: calculation.id },
    })
  })
}
