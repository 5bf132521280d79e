import { createTrace } from '../kernels/trace/trace.ts'
import type { Exposure } from '../record/exposure.ts'
import { refuse } from '../refuse.ts'

export interface TimeBins {
  startPs: bigint
  binPs: bigint
  bins: number
}

const MOST_BINS = 1_000_000

/** Default number of time bins for a channel of N tags: about ten tags a bin, a hundred bins at most (definitions.md B7). */
export const defaultBinCount = (counts: number): number => Math.min(100, Math.floor(counts / 10))

/** Time bins of a record from its first tag on: of a given width, else `bins` equal ones; the remainder of T is dropped. */
export function timeBins(exposure: Exposure, widthPs: bigint | null, bins: number): TimeBins {
  const { firstPs, durationPs } = exposure
  if (widthPs === null) return { startPs: firstPs, binPs: bins > 0 ? durationPs / BigInt(bins) : 0n, bins }
  const count = durationPs / widthPs
  if (count < 1n)
    refuse('/parameters/traceBinPs', 'The time bin is longer than the record. Choose a shorter one.')
  if (count > BigInt(MOST_BINS)) {
    refuse(
      '/parameters/traceBinPs',
      `The record would fall into ${count} time bins; at most ${MOST_BINS} are computed. Choose a longer bin.`,
    )
  }
  return { startPs: firstPs, binPs: widthPs, bins: Number(count) }
}

/** Tags of a channel in each time bin; empty where there are no bins. */
export function countsInBins(times: BigInt64Array, bins: TimeBins): number[] {
  if (bins.bins < 1 || bins.binPs < 1n) return []
  const trace = createTrace(bins)
  trace.push(times)
  return Array.from(trace.counts())
}
