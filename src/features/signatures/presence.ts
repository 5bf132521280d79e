import type { Run } from '../../../server/contract/runs.ts'
import { overlaps } from '../../../server/ledger-format/record.ts'

/** Why these times (UTC, null where none could be read) cannot be signed as presence at a run, or null. */
export function presenceTrouble(run: Run, from: string | null, to: string | null): string | null {
  if (from === null || to === null) return 'Write the times as 2026-11-12 11:30.'
  if (from > to) return 'The end lies before the beginning.'
  const durationPs = run.durationPs === null ? null : String(run.durationPs)
  return overlaps({ from, to }, { startedAt: run.startedAt, durationPs }) ? null : `The times do not overlap ${run.number}.`
}

/** When a run ended, UTC. */
export function endOfRun(run: Run): string {
  return new Date(Date.parse(run.startedAt) + Number(run.durationPs ?? 0) / 1e9).toISOString()
}
