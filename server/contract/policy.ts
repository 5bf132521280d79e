import type { Role } from './common.ts'

/**
 * Who may do what. A right needs the role in the laboratory and in the notebook: whoever loses one of them loses the right
 * at once. A supervisor may also write; a manager neither writes nor witnesses; an auditor reads and exports.
 */
export interface Membership {
  role: Role
  keeper: boolean
}

export type NotebookRight = 'read' | 'write' | 'keep' | 'witness' | 'export'

/** Rights in a notebook of a person with these laboratory roles and this membership (null: not a member). */
export function notebookRights(
  laboratoryRoles: readonly Role[],
  membership: Membership | null,
): Set<NotebookRight> {
  if (membership === null || !laboratoryRoles.includes(membership.role)) return new Set()
  const rights = new Set<NotebookRight>(['read'])
  const { role } = membership
  if (role === 'experimentalist' || role === 'supervisor') rights.add('write').add('export')
  if (role === 'supervisor') rights.add('witness')
  if (role === 'auditor') rights.add('export')
  if (membership.keeper) rights.add('keep')
  return rights
}

/** A keeper adds people only in a role that they hold in the laboratory: nobody is raised by being added. */
export function mayBeAddedAs(laboratoryRoles: readonly Role[], role: Role): boolean {
  return laboratoryRoles.includes(role)
}

export type EntryState = 'draft' | 'submitted' | 'sealed' | 'withdrawn'
export type EntryPhase = 'writing' | 'collecting' | 'returned' | 'with-witness' | 'sealed' | 'withdrawn'
export type EntryAction =
  | 'edit'
  | 'sign:authorship'
  | 'witness:read'
  | 'witness:present'
  | 'return'
  | 'reopen'
  | 'withdraw'
  | 'addendum'
  | 'export'

/** What a person is to an entry. */
export interface EntryStanding {
  rights: ReadonlySet<NotebookRight>
  /** Wrote a revision or an unrevised save. */
  author: boolean
  /** Author, or supplied a run, file, reading or calculation: such a person never witnesses. */
  contributed: boolean
  /** Has a living signature of authorship. */
  signedAsAuthor: boolean
  /** Has a living signature as witness. */
  witnessed: boolean
}

/** Content and what else enters the signed body can change only while the entry is being written. */
export function isOpen(phase: EntryPhase): boolean {
  return phase === 'writing' || phase === 'returned'
}

/** The acts open to a person on an entry in this phase. */
export function entryActions(phase: EntryPhase, standing: EntryStanding): EntryAction[] {
  const { rights, author } = standing
  const actions: EntryAction[] = []
  const mayWitness = rights.has('witness') && !standing.contributed && !standing.witnessed
  if (isOpen(phase) && rights.has('write')) actions.push('edit')
  if ((isOpen(phase) || phase === 'collecting') && author && rights.has('write') && !standing.signedAsAuthor)
    actions.push('sign:authorship')
  if (phase === 'with-witness' && mayWitness) actions.push('witness:read', 'witness:present')
  if (
    phase === 'with-witness' &&
    ((rights.has('witness') && !standing.contributed) || (author && rights.has('write')))
  )
    actions.push('return')
  if (phase === 'collecting' && rights.has('write')) actions.push('reopen')
  if (isOpen(phase) && rights.has('write')) actions.push('withdraw')
  if (phase === 'sealed' && rights.has('write')) actions.push('addendum')
  if (phase === 'sealed' && rights.has('export')) actions.push('export')
  return actions
}
