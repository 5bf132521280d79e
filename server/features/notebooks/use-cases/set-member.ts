import { mayBeAddedAs } from '../../../contract/policy.ts'
import { Problem } from '../../../contract/problems.ts'
import type { Role } from '../../../contract/common.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { findPerson } from '../../people/index.ts'
import { requireNotebook } from '../access.ts'
import { deleteMember, findMembership, upsertMember } from '../repository.ts'

/** Adds a person, or changes their role, in a role that they hold in the laboratory. */
export async function setMember(
  services: Services,
  actor: Actor,
  notebookId: string,
  personId: string,
  role: Role,
): Promise<void> {
  await services.db.transaction(async (t) => {
    await requireNotebook(services, actor, notebookId, 'keep', t)
    const person = await findPerson(services.db, personId, t)
    if (person === null || !person.active)
      throw new Problem('not-found', 'There is no such person in the laboratory.')
    if (!mayBeAddedAs(person.roles, role))
      throw new Problem(
        'not-allowed',
        `${person.name} is not ${article(role)} in the laboratory and cannot be added as one here. The manager gives roles.`,
      )
    await upsertMember(
      services.db,
      { notebookId, personId, role, keeper: false, addedAt: services.clock.now() },
      t,
    )
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'notebook.member-set',
      subject: { kind: 'notebook', id: notebookId },
      payload: { personId, role },
    })
  })
}

/** Ends a membership; a notebook never loses its keeper. */
export async function removeMember(
  services: Services,
  actor: Actor,
  notebookId: string,
  personId: string,
): Promise<void> {
  await services.db.transaction(async (t) => {
    await requireNotebook(services, actor, notebookId, 'keep', t)
    const membership = await findMembership(services.db, notebookId, personId, t)
    if (membership === null) throw new Problem('not-found', 'This person is not a member of the notebook.')
    if (membership.keeper)
      throw new Problem('wrong-state', 'The keeper cannot leave: a notebook always has one.')
    await deleteMember(services.db, notebookId, personId, t)
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'notebook.member-removed',
      subject: { kind: 'notebook', id: notebookId },
      payload: { personId },
    })
  })
}

function article(role: Role): string {
  return role === 'experimentalist' || role === 'auditor' ? `an ${role}` : `a ${role}`
}
