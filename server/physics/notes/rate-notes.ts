import type { Note } from '../definition.ts'
import type { Exposure } from '../record/exposure.ts'
import type { Gaps } from '../record/gaps.ts'
import type { Dispersion } from '../statistics/dispersion.ts'
import { brief, percent } from './numbers.ts'

const MEAN_GAPS = 20
const DRIFT_P = 0.01

/** The rate is not constant: two-sided p of the index of dispersion below 0.01. */
export function driftNote(channel: number, dispersion: Dispersion | null): Note[] {
  if (dispersion === null || dispersion.p >= DRIFT_P) return []
  const word = dispersion.value > 1 ? 'varies more' : 'varies less'
  return [
    {
      code: 'rate-drift',
      detail: `Channel ${channel}: the rate ${word} than counts of constant rate, index of dispersion ${brief(dispersion.value)} over ${dispersion.bins} bins, p = ${brief(dispersion.p)}.`,
    },
  ]
}

/** The channel is silent at the start or the end of the record for more than twenty mean gaps. */
export function spanNotes(channel: number, times: BigInt64Array, exposure: Exposure): Note[] {
  if (times.length === 0) return []
  const allowed = MEAN_GAPS * (Number(exposure.durationPs) / times.length)
  const atStart = Number(times[0]! - exposure.firstPs)
  const atEnd = Number(exposure.lastPs - times[times.length - 1]!)
  if (atStart <= allowed && atEnd <= allowed) return []
  const [where, gap] = atStart > allowed ? ['starts', atStart] : ['ends', atEnd]
  return [
    {
      code: 'channel-span',
      detail: `Channel ${channel} ${where} ${brief(gap / 1e12)} s inside the record, more than ${MEAN_GAPS} of its mean gaps: its rate holds for a shorter time than T.`,
    },
  ]
}

/** A pause inside the record, longer than chance and than a hundredth of it. */
export function pauseNote(channel: number, counts: number, gaps: Gaps, exposure: Exposure): Note[] {
  const duration = Number(exposure.durationPs)
  const allowed = Math.max(MEAN_GAPS * (duration / counts), duration / 100)
  if (gaps.largestPs === null || gaps.largestPs <= allowed) return []
  return [
    {
      code: 'pause',
      detail: `Channel ${channel} pauses for ${brief(gaps.largestPs / 1e12)} s. Select the time ranges in which the source was seen.`,
    },
  ]
}

/** Dead time takes more than one per cent of the tags. */
export function deadTimeNote(channel: number, rateTimesDeadTime: number): Note[] {
  if (rateTimesDeadTime <= 0.01) return []
  return [
    {
      code: 'dead-time',
      detail: `Channel ${channel}: R tau_d = ${percent(rateTimesDeadTime)}. The uncorrected rate is low by about as much, and the counts vary less than Poisson counts do.`,
    },
  ]
}

/** Without a declared acquisition time the span of few tags is a poor measure of T. */
export function undeclaredNote(channel: number, counts: number, exposure: Exposure): Note[] {
  if (exposure.durationFrom === 'declared' || counts >= 1000) return []
  return [
    {
      code: 'short-undeclared',
      detail: `Channel ${channel} has ${counts} tags and the acquisition time is not declared: T = last - first tag is short by about one gap. Give the run its duration.`,
    },
  ]
}
