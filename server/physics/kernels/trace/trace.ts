import { lowerBound } from '../blocks/halves.ts'

export interface Trace {
  /** Gives the next ascending tags of the channel. */
  push(times: BigInt64Array): void
  /** Tags in each bin so far (a copy). */
  counts(): Float64Array
}

/**
 * Counts per time bin: bin k holds start + k b <= t < start + (k+1) b. The edges are looked up in the ascending times,
 * which costs a search per bin instead of a pass over all tags. Tags outside the bins are not counted.
 */
export function createTrace({
  startPs,
  binPs,
  bins,
}: {
  startPs: bigint
  binPs: bigint
  bins: number
}): Trace {
  const counts = new Float64Array(bins)
  return {
    push(times) {
      const last = times[times.length - 1]
      if (last === undefined || last < startPs) return
      const firstBin = times[0]! < startPs ? 0n : (times[0]! - startPs) / binPs
      let from = lowerBound(times, startPs + firstBin * binPs)
      for (let k = Number(firstBin); k < bins && from < times.length; k++) {
        const to = lowerBound(times, startPs + BigInt(k + 1) * binPs, from)
        counts[k]! += to - from
        from = to
      }
    },
    counts: () => counts.slice(),
  }
}
