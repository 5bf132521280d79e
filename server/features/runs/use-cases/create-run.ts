import { randomUUID } from 'node:crypto'
import type { z } from 'zod'
import type { Transaction } from 'sequelize'
import { Problem } from '../../../contract/problems.ts'
import type { apparatusUseSchema, newRunSchema, RunApparatus } from '../../../contract/runs.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { requireWritableEntry } from '../../entries/index.ts'
import { actorOf, appendEvent } from '../../ledger/index.ts'
import { requireNotebook } from '../../notebooks/index.ts'
import { apparatusById } from '../apparatus-repository.ts'
import { requireWritableRun, runSubject } from '../access.ts'
import { fileRunIn, insertRun, lockRun, updateRun, type RunRow } from '../repository.ts'

type RunStart = z.output<typeof newRunSchema>
type ApparatusUse = z.output<typeof apparatusUseSchema>

/** A run that is not yet filed in an entry. */
export async function createRun(
  services: Services,
  actor: Actor,
  notebookId: string,
  start: RunStart,
): Promise<string> {
  return services.db.transaction(async (t) => {
    await requireNotebook(services, actor, notebookId, 'write', t)
    return addRun(services, actor, notebookId, start, t)
  })
}

/** A run made and filed in an entry at once. */
export async function createRunInEntry(
  services: Services,
  actor: Actor,
  entryId: string,
  start: RunStart,
): Promise<string> {
  return services.db.transaction(async (t) => {
    const entry = await requireWritableEntry(services, actor, entryId, t)
    const id = await addRun(services, actor, entry.notebookId, start, t)
    await appendFiling(services, actor, entryId, id, t)
    return id
  })
}

/** Files a run in an entry of the same notebook; it stays there, and its own chain ends here. */
export async function fileRun(
  services: Services,
  actor: Actor,
  entryId: string,
  runId: string,
): Promise<void> {
  await services.db.transaction(async (t) => {
    const entry = await requireWritableEntry(services, actor, entryId, t)
    const run = await lockRun(services.db, runId, t)
    if (run === null || run.notebookId !== entry.notebookId)
      throw new Problem('not-found', 'There is no such run in the notebook of this entry.')
    if (run.entryId !== null)
      throw new Problem('wrong-state', 'The run is filed already; a run is filed once and stays.')
    await appendFiling(services, actor, entryId, runId, t)
  })
}

export type RunDetails = Partial<RunStart>

/** Changes conditions, times or equipment of a run that is not frozen. */
export async function changeRun(
  services: Services,
  actor: Actor,
  runId: string,
  details: RunDetails,
): Promise<void> {
  await services.db.transaction(async (t) => {
    const run = await requireWritableRun(services, actor, runId, t)
    const changed: RunRow = {
      ...run,
      experiment: details.experiment ?? run.experiment,
      startedAt: details.startedAt === undefined ? run.startedAt : new Date(details.startedAt),
      durationPs: details.durationPs === undefined ? run.durationPs : textOf(details.durationPs),
      conditions: details.conditions ?? run.conditions,
      apparatus:
        details.apparatus === undefined ? run.apparatus : await asUsed(services, details.apparatus, t),
    }
    await updateRun(services.db, runId, changed, t)
    await appendEvent(services, t, {
      actor: actorOf(actor),
      action: 'run.changed',
      subject: runSubject(run),
      payload: { runId, members: Object.keys(details).sort() },
    })
  })
}

async function addRun(
  services: Services,
  actor: Actor,
  notebookId: string,
  start: RunStart,
  t: Transaction,
): Promise<string> {
  const id = randomUUID()
  const now = services.clock.now()
  await insertRun(
    services.db,
    {
      id,
      notebookId,
      experiment: start.experiment,
      startedAt: start.startedAt === undefined ? now : new Date(start.startedAt),
      durationPs: textOf(start.durationPs),
      conditions: start.conditions,
      apparatus: await asUsed(services, start.apparatus, t),
      createdBy: actor.personId,
      createdAt: now,
    },
    t,
  )
  await appendEvent(services, t, {
    actor: actorOf(actor),
    action: 'run.created',
    subject: { kind: 'run', id },
    payload: { notebookId },
  })
  return id
}

async function appendFiling(
  services: Services,
  actor: Actor,
  entryId: string,
  runId: string,
  t: Transaction,
): Promise<void> {
  await fileRunIn(services.db, runId, entryId, t)
  const end = await services.db.row<{ sequence: string; digest: string }>(
    `select subject_sequence as sequence, digest from record.events where subject_kind = 'run' and subject_id = :runId
     order by subject_sequence desc limit 1`,
    { runId },
    t,
  )
  if (end === null) throw new Error(`run ${runId} has no events`)
  await appendEvent(services, t, {
    actor: actorOf(actor),
    action: 'entry.run-filed',
    subject: { kind: 'entry', id: entryId },
    payload: { runId, runSubjectSequence: Number(end.sequence), runDigest: end.digest },
  })
}

/** Equipment as used: the register's version and figures of today, with the role and channel it had. */
async function asUsed(
  services: Services,
  uses: readonly ApparatusUse[],
  t: Transaction,
): Promise<RunApparatus[]> {
  const register = await apparatusById(
    services.db,
    uses.map((use) => use.id),
    t,
  )
  return uses.map((use, index) => {
    const found = register.find((apparatus) => apparatus.id === use.id)
    if (found === undefined)
      throw new Problem('invalid-values', 'This piece of equipment is not in the register.', {
        errors: [{ pointer: `/apparatus/${index}/id`, detail: 'is not in the apparatus register' }],
      })
    const { id, version, kind, name, figures } = found
    return { id, version, kind, name, role: use.role, channel: use.channel, figures }
  })
}

function textOf(ps: number | string | null): string | null {
  return ps === null ? null : String(ps)
}
