import type { Run } from '../../../server/contract/runs.ts'
import { overlaps } from '../../../server/ledger-format/record.ts'

/** Why these times (UTC, null where none could be read) cannot be signed as presence at a run, or null. */
export function presenceTrouble(run: Run, from: string | null, to: string | null): string | null {
  if (from === null || to === null) return 'Write the times as 2026-11-12 11:30.'
  if (from > to) return 'The end lies before the beginning.'
  const durationPs = run.durationPs === null ? null : String(run.durationPs)
  return overlaps({ from, to }, { startedAt: run.startedAt, durationPs })
    ? null
    : `The times do not overlap ${run.number}.`
}

/** When a run began and ended, UTC, widened to whole seconds, in which presence is written. */
export function spanOfRun(run: Run): { from: string; to: string } {
  const begin = Date.parse(run.startedAt)
  const end = begin + Number(run.durationPs ?? 0) / 1e9
  const seconds = (ms: number) => new Date(ms * 1000).toISOString()
  return { from: seconds(Math.floor(begin / 1000)), to: seconds(Math.ceil(end / 1000)) }
}
