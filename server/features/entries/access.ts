import type { Transaction } from 'sequelize'
import { isOpen, type NotebookRight } from '../../contract/policy.ts'
import { Problem, nothingHere } from '../../contract/problems.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { requireNotebook } from '../notebooks/index.ts'
import { findEntry, lockEntry, type EntryRow } from './repository.ts'

const STATE_SENTENCES: Record<string, string> = {
  collecting:
    'The first author has signed, so the text is locked. Reopen the entry to change it; that voids the signatures given.',
  'with-witness': 'The entry is with the witness. Take it back with a reason to change it.',
  sealed: 'The entry is sealed and cannot change. Write an addendum instead.',
  withdrawn: 'The entry is withdrawn: it stays readable, but takes no change.',
}

/** Refuses changes of what enters the signed body unless the entry is being written. */
export function requireOpen(entry: EntryRow): void {
  if (!isOpen(entry.phase))
    throw new Problem('wrong-state', STATE_SENTENCES[entry.phase] ?? 'The entry takes no change now.')
}

/** An entry the caller may use in this way; who may not read it is told the same as if it did not exist. */
export async function requireEntry(
  services: Services,
  actor: Actor,
  entryId: string,
  right: NotebookRight,
  t?: Transaction,
): Promise<EntryRow> {
  return checked(services, actor, await findEntry(services.db, entryId, t), right, t)
}

/** The same with the entry's row locked until the transaction ends. */
export async function requireLockedEntry(
  services: Services,
  actor: Actor,
  entryId: string,
  right: NotebookRight,
  t: Transaction,
): Promise<EntryRow> {
  return checked(services, actor, await lockEntry(services.db, entryId, t), right, t)
}

/** An entry open for writing by the caller, locked. State comes before everything else that could be wrong. */
export async function requireWritableEntry(
  services: Services,
  actor: Actor,
  entryId: string,
  t: Transaction,
): Promise<EntryRow> {
  const entry = await requireLockedEntry(services, actor, entryId, 'read', t)
  requireOpen(entry)
  await requireNotebook(services, actor, entry.notebookId, 'write', t)
  return entry
}

async function checked(
  services: Services,
  actor: Actor,
  entry: EntryRow | null,
  right: NotebookRight,
  t?: Transaction,
): Promise<EntryRow> {
  if (entry === null) throw nothingHere()
  await requireNotebook(services, actor, entry.notebookId, right, t)
  return entry
}
