import type { Services } from '../../../platform/services.ts'
import { appendEvent } from '../../ledger/index.ts'

/** A sign-in belongs to the person's own chain, so that it never reaches a bundle. */
export async function recordSignIn(services: Services, personId: string): Promise<void> {
  await services.db.transaction(async (t) => {
    await appendEvent(services, t, {
      actor: { kind: 'person', id: personId, onBehalfOf: null },
      action: 'person.signed-in',
      subject: { kind: 'person', id: personId },
      payload: {},
    })
  })
}
