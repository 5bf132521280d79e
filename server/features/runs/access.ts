import type { Transaction } from 'sequelize'
import { Problem, nothingHere } from '../../contract/problems.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { requireWritableEntry } from '../entries/index.ts'
import { requireNotebook } from '../notebooks/index.ts'
import { findRun, lockRun, type RunRow } from './repository.ts'

export async function requireRun(services: Services, actor: Actor, id: string): Promise<RunRow> {
  const run = await findRun(services.db, id)
  if (run === null) throw nothingHere()
  await requireNotebook(services, actor, run.notebookId, 'read')
  return run
}

/** A run that the caller may change: unfiled, or filed in an entry that is being written. Locks the entry, then the run. */
export async function requireWritableRun(
  services: Services,
  actor: Actor,
  id: string,
  t: Transaction,
): Promise<RunRow> {
  const seen = await findRun(services.db, id, t)
  if (seen === null) throw nothingHere()
  await requireNotebook(services, actor, seen.notebookId, 'read', t)
  if (seen.entryId !== null) await requireWritableEntry(services, actor, seen.entryId, t)
  await requireNotebook(services, actor, seen.notebookId, 'write', t)
  const run = await lockRun(services.db, id, t)
  if (run === null || run.entryId !== seen.entryId)
    throw new Problem('wrong-state', 'The run was filed just now; look again.')
  return run
}

/** On whose chain an act on a run stands: the entry's once the run is filed. */
export function runSubject(run: Pick<RunRow, 'id' | 'entryId'>): { kind: 'entry' | 'run'; id: string } {
  return run.entryId === null ? { kind: 'run', id: run.id } : { kind: 'entry', id: run.entryId }
}
