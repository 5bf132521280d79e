import type { Transaction } from 'sequelize'
import { notebookRights, type NotebookRight } from '../../contract/policy.ts'
import { Problem, nothingHere } from '../../contract/problems.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { findMembership } from './repository.ts'

const REFUSALS: Record<NotebookRight, string> = {
  read: 'You may not read this notebook.',
  write:
    'You may read this notebook but not write in it. Its keeper can give you the role of experimentalist or supervisor.',
  keep: 'Only the keeper of the notebook may do this.',
  witness: 'Only a supervisor of this notebook may do this.',
  export: 'Your role in this notebook does not include exporting.',
}

/**
 * The caller's rights in a notebook, which must hold `right`. Who may not even read it is told the same as if it did not
 * exist.
 */
export async function requireNotebook(
  services: Services,
  actor: Actor,
  notebookId: string,
  right: NotebookRight,
  t?: Transaction,
): Promise<Set<NotebookRight>> {
  const membership = await findMembership(services.db, notebookId, actor.personId, t)
  const rights = notebookRights(actor.roles, membership)
  if (!rights.has('read')) throw nothingHere()
  if (!rights.has(right)) throw new Problem('not-allowed', REFUSALS[right])
  return rights
}
