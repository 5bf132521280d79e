import type { Run } from '../../contract/runs.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { isOpen } from '../../contract/policy.ts'
import { findEntry } from '../entries/index.ts'
import { filesOfRuns, presentFiles } from '../files/index.ts'
import { runNumber, type RunRow } from './repository.ts'

/** Picoseconds as the interface gives them: a number below 2^53, else a string of digits. */
export function presentPicoseconds(ps: string | null): number | string | null {
  if (ps === null) return null
  return Number.isSafeInteger(Number(ps)) ? Number(ps) : ps
}

export async function presentRuns(services: Services, actor: Actor, runs: readonly RunRow[]): Promise<Run[]> {
  const files = await presentFiles(
    services,
    actor,
    await filesOfRuns(
      services.db,
      runs.map((run) => run.id),
    ),
  )
  const entryIds = [...new Set(runs.map((run) => run.entryId).filter((id) => id !== null))]
  const entries = await Promise.all(entryIds.map((id) => findEntry(services.db, id)))
  return runs.map((run) => {
    const entry = entries.find((found) => found?.id === run.entryId)
    return {
      id: run.id,
      number: runNumber(run.number),
      notebookId: run.notebookId,
      entryId: run.entryId,
      experiment: run.experiment,
      startedAt: run.startedAt.toISOString(),
      durationPs: presentPicoseconds(run.durationPs),
      conditions: run.conditions,
      apparatus: run.apparatus,
      files: files.filter((file) => file.runId === run.id),
      frozen: entry !== undefined && entry !== null && !isOpen(entry.phase),
    }
  })
}
