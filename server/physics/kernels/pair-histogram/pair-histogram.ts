import { forEachDelayBlock } from '../blocks/delay-blocks.ts'
import { EXACT_SPAN } from '../blocks/halves.ts'
import { createPairFeed, type PairFeed } from '../blocks/pair-feed.ts'
import { addBlock } from './add-block.ts'

export interface PairHistogram extends PairFeed {
  /** Counts of bins k = -halfBins .. halfBins so far (a copy; exact to 2^53). */
  counts(): Float64Array
}

export interface PairHistogramOptions {
  binPs: bigint
  /** K: there are 2 K + 1 bins. */
  halfBins: number
  /** Cable offset o, subtracted from t_B - t_A. */
  offsetPs: bigint
  /** Start and stop are one channel: a tag is then never paired with itself. */
  sameChannel: boolean
}

/**
 * Histogram of all pair delays d = t_B - t_A - o: bin k holds k b - floor(b/2) <= d < k b - floor(b/2) + b
 * (definitions.md B1, B3). The record is pushed in pieces; the histogram so far can be read at any time.
 */
export function createPairHistogram(options: PairHistogramOptions): PairHistogram {
  const { binPs, halfBins, offsetPs, sameChannel } = options
  const bins = 2 * halfBins + 1
  const lo = offsetPs - BigInt(halfBins) * binPs - binPs / 2n
  const width = BigInt(bins) * binPs
  const counts = new Float64Array(bins)
  const addPairs = width <= EXACT_SPAN ? addInBlocks : addInIntegers
  const feed = createPairFeed(lo, width, (starts, stops) => addPairs(starts, stops, lo, binPs, counts))
  return {
    push(starts, stops) {
      feed.push(starts, stops)
      // Every tag met itself once, at d = 0, which lies in the bin in the middle (a cable offset is refused for one channel).
      if (sameChannel) counts[halfBins]! -= starts.length
    },
    cut: () => feed.cut(),
    counts: () => counts.slice(),
  }
}

function addInBlocks(
  starts: BigInt64Array,
  stops: BigInt64Array,
  lo: bigint,
  binPs: bigint,
  counts: Float64Array,
): void {
  const bin = Number(binPs)
  const width = binPs * BigInt(counts.length)
  forEachDelayBlock(starts, stops, lo, width, (a, aCount, b, bCount) =>
    addBlock(a, aCount, b, bCount, bin, counts),
  )
}

/** The same for ranges beyond 2^52 ps (75 minutes), where doubles could lose picoseconds: slow, in 64-bit integers. */
function addInIntegers(
  starts: BigInt64Array,
  stops: BigInt64Array,
  lo: bigint,
  binPs: bigint,
  counts: Float64Array,
): void {
  const width = binPs * BigInt(counts.length)
  let first = 0
  for (const start of starts) {
    while (first < stops.length && stops[first]! - start < lo) first++
    for (let j = first; j < stops.length && stops[j]! - start < lo + width; j++) {
      counts[Number((stops[j]! - start - lo) / binPs)]! += 1
    }
  }
}
