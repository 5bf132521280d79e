import { createPairHistogram } from '../../kernels/pair-histogram/pair-histogram.ts'
import { createWindowCount } from '../../kernels/window-count/window-count.ts'
import { forEachPiece } from '../../record/channel.ts'
import { chancePairs, type PooledPairs } from '../../record/pooled.ts'
import { lowerBound } from '../../kernels/blocks/halves.ts'

export interface HistogramShape {
  a: number
  b: number
  binPs: bigint
  /** K: bins k = -K .. K. */
  halfBins: number
  offsetPs: bigint
}

/** Counts of every bin, summed over the inputs. */
export function countBins(
  pooled: PooledPairs,
  { a, b, binPs, halfBins, offsetPs }: HistogramShape,
  progress?: (done: number, of: number) => void,
): Float64Array {
  const histogram = createPairHistogram({ binPs, halfBins, offsetPs, sameChannel: pooled.sameChannel })
  const total = pooled.inputs.reduce((sum, { input }) => sum + input.record.times.length, 0)
  let before = 0
  for (const { input } of pooled.inputs) {
    forEachPiece(input.record, a, b, (starts, stops, done) => {
      histogram.push(starts, stops)
      progress?.(before + done, total)
    })
    histogram.cut()
    before += input.record.times.length
  }
  return histogram.counts()
}

/** Norm of every bin: pairs expected by chance, at g2 = 1. */
export function normOfBins(pooled: PooledPairs, { binPs, halfBins, offsetPs }: HistogramShape): Float64Array {
  const width = Number(binPs)
  return Float64Array.from({ length: 2 * halfBins + 1 }, (_, i) =>
    chancePairs(pooled, width, BigInt(i - halfBins) * binPs + offsetPs),
  )
}

const BLOCKS = 10

/**
 * Standard deviation of g2(0) over ten equal blocks of the run, divided by sqrt 10: what drift, blinking and intensity noise add
 * to the Poisson u. Each block has its own N and T; pairs across a cut are left out. Null where a block has no chance pairs.
 */
export function blockScatter(pooled: PooledPairs, { binPs, offsetPs }: HistogramShape): number | null {
  const values: number[] = []
  for (let block = 0; block < BLOCKS; block++) {
    const part = blockOf(pooled, block)
    const window = createWindowCount({
      loPs: offsetPs - binPs / 2n,
      widthPs: binPs,
      sameChannel: pooled.sameChannel,
    })
    for (const { timesA, timesB } of part.inputs) {
      window.push(timesA, timesB)
      window.cut()
    }
    const norm = chancePairs(part, Number(binPs), offsetPs)
    if (!(norm > 0)) return null
    values.push(window.count() / norm)
  }
  const mean = values.reduce((sum, g) => sum + g, 0) / BLOCKS
  const variance = values.reduce((sum, g) => sum + (g - mean) ** 2, 0) / (BLOCKS - 1)
  return Math.sqrt(variance / BLOCKS)
}

/** The tenth number `block` of every input. */
function blockOf(pooled: PooledPairs, block: number): PooledPairs {
  const inputs = pooled.inputs.map(({ input, exposure, timesA, timesB }) => {
    const edge = (k: number) => exposure.firstPs + (exposure.durationPs * BigInt(k)) / BigInt(BLOCKS)
    // The last tag ends the record and belongs to the last block.
    const [from, to] = [edge(block), block === BLOCKS - 1 ? exposure.lastPs + 1n : edge(block + 1)]
    const cut = (times: BigInt64Array) => times.subarray(lowerBound(times, from), lowerBound(times, to))
    const partA = cut(timesA)
    return {
      input,
      exposure: { ...exposure, durationPs: exposure.durationPs / BigInt(BLOCKS) },
      timesA: partA,
      timesB: pooled.sameChannel ? partA : cut(timesB),
    }
  })
  return { ...pooled, inputs }
}
