import type { Quantity } from '../../../contract/quantity.ts'
import { powerSpectrum } from '../../kernels/fourier/fourier.ts'
import { createPairHistogram } from '../../kernels/pair-histogram/pair-histogram.ts'
import { quantity } from '../../quantities.ts'
import type { PooledPairs } from '../../record/pooled.ts'

const HALF_BINS = 8192
const BINS_A_PEAK = 8
/** Below this many periods in the histogram what the spectrum shows is its envelope. */
const FEWEST_PERIODS = 4

interface DelayHistogram {
  counts: Float64Array
  bin: number
}

/**
 * Period of the excitation from the delays: the largest peak of the Fourier transform of their histogram, refined by least squares of the
 * centroids of the side peaks against m (definitions.md B5). Null where the histogram shows no period.
 */
export function findPeriod(pooled: PooledPairs, peakWindowPs: bigint, offsetPs: bigint): Quantity | null {
  const histogram = delayHistogram(pooled, peakWindowPs, offsetPs)
  const coarse = spectralPeriod(histogram)
  return coarse === null ? null : refinedPeriod(histogram, coarse)
}

/** About a thousand peak windows of delays, eight bins to a window, or as much as the shortest record holds. */
function delayHistogram(pooled: PooledPairs, peakWindowPs: bigint, offsetPs: bigint): DelayHistogram {
  const shortest = pooled.inputs.reduce(
    (least, { exposure }) => (exposure.durationPs < least ? exposure.durationPs : least),
    pooled.durationPs,
  )
  const wanted = peakWindowPs / BigInt(BINS_A_PEAK)
  const most = shortest / BigInt(4 * HALF_BINS)
  const binPs = wanted < 1n || most < 1n ? 1n : wanted < most ? wanted : most
  const histogram = createPairHistogram({ binPs, halfBins: HALF_BINS, offsetPs, sameChannel: false })
  for (const { timesA, timesB } of pooled.inputs) {
    histogram.push(timesA, timesB)
    histogram.cut()
  }
  return { counts: histogram.counts(), bin: Number(binPs) }
}

function spectralPeriod({ counts, bin }: DelayHistogram): number | null {
  const n = 2 * HALF_BINS
  const part = counts.slice(0, n)
  const mean = part.reduce((sum, c) => sum + c, 0) / n
  const power = powerSpectrum(part.map((c) => c - mean))
  let best = FEWEST_PERIODS
  for (let j = FEWEST_PERIODS; j < power.length - 1; j++) if (power[j]! > power[best]!) best = j
  // Narrow peaks have overtones nearly as strong as the fundamental: go down to the lowest that stands out.
  for (const divisor of [5, 4, 3, 2]) {
    const near = Math.round(best / divisor)
    const candidate = [near - 1, near, near + 1].reduce((a, b) => ((power[b] ?? 0) > (power[a] ?? 0) ? b : a))
    if (candidate >= FEWEST_PERIODS && power[candidate]! > power[best]! / 4) {
      best = candidate
      break
    }
  }
  // White noise of variance `mean` has n x mean in every bin.
  if (!(power[best]! > 30 * n * mean)) return null
  return (n * bin) / interpolated(power, best)
}

/** Place of a maximum from the amplitudes beside it. */
function interpolated(power: Float64Array, j: number): number {
  const [left, middle, right] = [Math.sqrt(power[j - 1]!), Math.sqrt(power[j]!), Math.sqrt(power[j + 1]!)]
  const bend = left - 2 * middle + right
  return bend === 0 ? j : j + (left - right) / (2 * bend)
}

/** Doubles the number of side peaks until all whole ones are used, so that the error of the first guess never adds up to a period. */
function refinedPeriod(histogram: DelayHistogram, coarse: number): Quantity {
  let line = { slope: coarse, intercept: 0, u: 0 }
  for (let most = 2; ; most *= 2) {
    const whole = Math.floor(((HALF_BINS + 0.5) * histogram.bin) / line.slope - 0.25)
    line = fitCentroids(histogram, line, Math.min(most, whole))
    if (most >= whole) return quantity(line.slope, line.u, 'ps')
  }
}

/** Weighted straight line through the centroids over m P -+ P/4, weight A_m; u from the scatter about it. */
function fitCentroids(histogram: DelayHistogram, guess: { slope: number; intercept: number }, most: number) {
  const points: { m: number; at: number; weight: number }[] = []
  for (let m = -most; m <= most; m++) {
    if (m === 0) continue
    const centroid = centroidOf(histogram, guess.intercept + m * guess.slope, guess.slope / 4)
    if (centroid.weight > 0) points.push({ m, ...centroid })
  }
  const total = points.reduce((sum, p) => sum + p.weight, 0)
  const meanM = points.reduce((sum, p) => sum + p.weight * p.m, 0) / total
  const meanAt = points.reduce((sum, p) => sum + p.weight * p.at, 0) / total
  const spread = points.reduce((sum, p) => sum + p.weight * (p.m - meanM) ** 2, 0)
  const slope = points.reduce((sum, p) => sum + p.weight * (p.m - meanM) * (p.at - meanAt), 0) / spread
  const intercept = meanAt - slope * meanM
  const rest = points.reduce((sum, p) => sum + p.weight * (p.at - intercept - slope * p.m) ** 2, 0)
  return { slope, intercept, u: Math.sqrt(rest / Math.max(1, points.length - 2) / spread) }
}

function centroidOf(
  { counts, bin }: DelayHistogram,
  centre: number,
  reach: number,
): { at: number; weight: number } {
  const from = Math.max(-HALF_BINS, Math.ceil((centre - reach) / bin))
  const to = Math.min(HALF_BINS, Math.floor((centre + reach) / bin))
  let weight = 0
  let sum = 0
  for (let k = from; k <= to; k++) {
    weight += counts[k + HALF_BINS]!
    sum += counts[k + HALF_BINS]! * k * bin
  }
  return { at: sum / weight, weight }
}
