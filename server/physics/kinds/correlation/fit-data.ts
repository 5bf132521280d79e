import type { CorrelationData } from '../../fits/correlation-data.ts'
import type { FitData } from '../../fits/fit-result.ts'
import type { HistogramShape } from './count.ts'

/**
 * The histogram as a fit sees it. A whole picosecond stands for the picosecond around it, hence the halves. An
 * autocorrelation is even and its pairs come in twos: only k >= 0 is fitted, with counts and norm of bin 0 halved
 * (definitions.md B3).
 */
export function fitDataOf(
  { binPs, halfBins }: HistogramShape,
  counts: Float64Array,
  norm: Float64Array,
  sameChannel: boolean,
): FitData {
  const bin = Number(binPs)
  const lowest = (k: number) => k * bin - Math.floor(bin / 2) - 0.5
  const all: CorrelationData = {
    from: Float64Array.from(counts, (_, i) => lowest(i - halfBins)),
    to: Float64Array.from(counts, (_, i) => lowest(i - halfBins) + bin),
    counts,
    norm,
  }
  if (!sameChannel) return { fitted: all, all, firstFitted: 0 }
  const fitted: CorrelationData = {
    from: all.from.slice(halfBins),
    to: all.to.slice(halfBins),
    counts: counts.slice(halfBins),
    norm: norm.slice(halfBins),
  }
  fitted.counts[0]! /= 2
  fitted.norm[0]! /= 2
  return { fitted, all, firstFitted: halfBins }
}
