import { randomUUID } from 'node:crypto'
import type { Role } from '../../../contract/common.ts'
import type { Services } from '../../../platform/services.ts'
import { appendEvent } from '../../ledger/index.ts'
import { insertPerson } from '../repository.ts'

/** A person of the laboratory, bound to a numeric account of the code host (a login can be renamed; the number cannot). */
export async function addPerson(
  services: Services,
  person: {
    id?: string
    login: string
    name: string
    email: string | null
    provider: string
    providerAccountId: string
    roles: Role[]
  },
): Promise<string> {
  const id = person.id ?? randomUUID()
  await services.db.transaction(async (t) => {
    await insertPerson(services.db, { ...person, id, createdAt: services.clock.now() }, t)
    await appendEvent(services, t, {
      actor: { kind: 'system', id: null, onBehalfOf: null },
      action: 'person.added',
      subject: { kind: 'person', id },
      payload: { roles: person.roles },
    })
  })
  return id
}
