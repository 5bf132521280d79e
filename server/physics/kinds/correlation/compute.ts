import type { Computed, ComputeTask } from '../../definition.ts'
import { fitCorrelation } from '../../fits/fit-correlation.ts'
import type { FitResult } from '../../fits/fit-result.ts'
import { picosecondsJson, quantity } from '../../quantities.ts'
import { poolPairs, requireInside, type PooledPairs } from '../../record/pooled.ts'
import { refuse } from '../../refuse.ts'
import { correctedQuantity, signalShare, withoutBackground, type SignalShare } from './background.ts'
import { g2Bins, type G2Bins } from './bins.ts'
import { blockScatter, countBins, normOfBins, type HistogramShape } from './count.ts'
import type { CorrelationParameters, CorrelationResult } from './definition.ts'
import { fitDataOf } from './fit-data.ts'
import { notesOf } from './notes.ts'

const MOST_HALF_BINS = 100_000

const size = (ps: bigint): bigint => (ps < 0n ? -ps : ps)

/** Histogram of pair delays as g2 with everything that is read from it (definitions.md B3). */
export function compute({
  parameters,
  inputs,
  progress,
}: ComputeTask<CorrelationParameters>): Computed<CorrelationResult> {
  const shape = shapeOf(parameters)
  const pooled = poolPairs(inputs, parameters.a, parameters.b)
  const reach = BigInt(parameters.halfRangePs) + size(shape.offsetPs) + shape.binPs
  requireInside(pooled, reach, '/parameters/halfRangePs', 'The range of delays')
  const counts = countBins(pooled, shape, progress)
  const norm = normOfBins(pooled, shape)
  const bins = g2Bins(counts, norm, pooled.sameChannel ? shape.halfBins : -1)
  const share = parameters.background && signalShare(parameters.background, pooled)
  const g2Zero = zeroBin(bins, shape)
  const result: CorrelationResult = {
    binPs: parameters.binPs,
    offsetPs: parameters.offsetPs,
    countsA: pooled.countsA,
    countsB: pooled.countsB,
    durationPs: picosecondsJson(pooled.durationPs),
    durationFrom: pooled.durationFrom,
    g2Zero,
    ...(share ? { g2ZeroCorrected: correctedQuantity(g2Zero, share) } : {}),
    blockU: blockScatter(pooled, shape),
    fit: fitOf(parameters, pooled, shape, counts, norm, share),
    delaysPs: Array.from(counts, (_, i) => picosecondsJson(BigInt(i - shape.halfBins) * shape.binPs)),
    counts: Array.from(counts),
    ...bins,
    ...(share ? { g2Corrected: bins.g2.map((g) => (g === null ? null : withoutBackground(g, share))) } : {}),
  }
  return { result, notes: notesOf(result, pooled, shape, norm) }
}

function shapeOf(parameters: CorrelationParameters): HistogramShape {
  const binPs = BigInt(parameters.binPs)
  const offsetPs = BigInt(parameters.offsetPs)
  const halfBins = BigInt(parameters.halfRangePs) / binPs
  if (halfBins > BigInt(MOST_HALF_BINS)) {
    refuse(
      '/parameters/binPs',
      `The range holds ${2n * halfBins + 1n} bins; at most ${2 * MOST_HALF_BINS + 1} are computed. Choose a wider bin or a shorter range.`,
    )
  }
  if (parameters.a === parameters.b && offsetPs !== 0n) {
    refuse(
      '/parameters/offsetPs',
      'A channel has no cable offset against itself. Leave it out, or choose two channels.',
    )
  }
  return { a: parameters.a, b: parameters.b, binPs, halfBins: Number(halfBins), offsetPs }
}

/** g2(0) is the bin k = 0, raw; no fit and no correction enters. */
function zeroBin(bins: G2Bins, { halfBins, binPs }: HistogramShape): CorrelationResult['g2Zero'] {
  const value = bins.g2[halfBins]!
  const u = bins.u[halfBins]!
  const up = bins.g2Up[halfBins]!
  const zero = quantity(value, u, '1', value === 0 && up !== null ? { upper: up } : {})
  const { upper, ...rest } = zero
  return { ...rest, method: 'bin', binPs: picosecondsJson(binPs), ...(upper === undefined ? {} : { upper }) }
}

function fitOf(
  { fit: request }: CorrelationParameters,
  pooled: PooledPairs,
  shape: HistogramShape,
  counts: Float64Array,
  norm: Float64Array,
  share: SignalShare | undefined,
): FitResult | null {
  if (request === undefined) return null
  if (!norm.every((m) => m > 0)) {
    refuse(
      '/parameters/fit',
      'A channel has no tags, so there is nothing to fit. Choose channels that have tags, or leave the fit out.',
    )
  }
  // An autocorrelation is even: its zero delay is known.
  const tau0Ps = request.tau0Ps ?? (pooled.sameChannel ? 0 : undefined)
  const fit = fitCorrelation(fitDataOf(shape, counts, norm, pooled.sameChannel), { ...request, tau0Ps })
  if (share === undefined || fit.g2Zero === undefined) return fit
  const { linewidth, ...rest } = fit
  return {
    ...rest,
    g2ZeroCorrected: correctedQuantity(fit.g2Zero, share),
    ...(linewidth ? { linewidth } : {}),
  }
}
