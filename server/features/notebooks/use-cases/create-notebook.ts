import { randomUUID } from 'node:crypto'
import { Problem } from '../../../contract/problems.ts'
import type { Role } from '../../../contract/common.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { insertNotebook, upsertMember } from '../repository.ts'

/** In which role the creator keeps the notebook: the one of theirs that may write. */
function keepingRole(roles: readonly Role[]): Role {
  const role = roles.find((r) => r === 'experimentalist') ?? roles.find((r) => r === 'supervisor')
  if (role === undefined)
    throw new Problem(
      'not-allowed',
      'A notebook is opened by an experimentalist or a supervisor; your roles do not include writing.',
    )
  return role
}

/** Opens a notebook; whoever opens it keeps it. */
export async function createNotebook(services: Services, actor: Actor, title: string): Promise<string> {
  const id = randomUUID()
  const role = keepingRole(actor.roles)
  await services.db.transaction(async (t) => {
    const now = services.clock.now()
    await insertNotebook(services.db, { id, title, createdBy: actor.personId, createdAt: now }, t)
    await upsertMember(
      services.db,
      { notebookId: id, personId: actor.personId, role, keeper: true, addedAt: now },
      t,
    )
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'notebook.created',
      subject: { kind: 'notebook', id },
      payload: { keeper: actor.personId, role },
    })
  })
  return id
}
