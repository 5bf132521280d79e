import { forEachDelayBlock } from '../blocks/delay-blocks.ts'
import { EXACT_SPAN, lowerBound } from '../blocks/halves.ts'
import { createPairFeed, type PairFeed } from '../blocks/pair-feed.ts'

export interface WindowCount extends PairFeed {
  /** Pairs in the window so far. */
  count(): number
}

export interface WindowCountOptions {
  /** First delay of the window; it holds lo <= t_B - t_A < lo + width. */
  loPs: bigint
  widthPs: bigint
  /** Start and stop are one channel: a tag is then never paired with itself. */
  sameChannel: boolean
}

/** First delay of the window of full width w centred on c: c - floor(w/2) (definitions.md B1). */
export function windowStart(centrePs: bigint, widthPs: bigint): bigint {
  return centrePs - widthPs / 2n
}

/** Counts all pairs with a delay in one window; two pointers move once through the tags, however many pairs there are. */
export function createWindowCount({ loPs, widthPs, sameChannel }: WindowCountOptions): WindowCount {
  const holdsZero = loPs <= 0n && 0n < loPs + widthPs
  const countPairs = widthPs <= EXACT_SPAN ? countInBlocks : countInIntegers
  let total = 0
  const feed = createPairFeed(loPs, widthPs, (starts, stops) => {
    total += countPairs(starts, stops, loPs, widthPs)
  })
  return {
    push(starts, stops) {
      feed.push(starts, stops)
      if (sameChannel && holdsZero) total -= starts.length
    },
    cut: () => feed.cut(),
    count: () => total,
  }
}

function countInBlocks(starts: BigInt64Array, stops: BigInt64Array, lo: bigint, widthPs: bigint): number {
  const width = Number(widthPs)
  let total = 0
  forEachDelayBlock(starts, stops, lo, widthPs, (a, aCount, b, bCount) => {
    let first = 0
    let end = 0
    for (let i = 0; i < aCount; i++) {
      const from = a[i]!
      while (first < bCount && b[first]! < from) first++
      while (end < bCount && b[end]! < from + width) end++
      total += end - first
    }
  })
  return total
}

/** The same for windows wider than 2^52 ps (75 minutes), in 64-bit integers. */
function countInIntegers(starts: BigInt64Array, stops: BigInt64Array, lo: bigint, widthPs: bigint): number {
  let total = 0
  let first = 0
  let end = 0
  for (const start of starts) {
    first = lowerBound(stops, start + lo, first)
    end = lowerBound(stops, start + lo + widthPs, end)
    total += end - first
  }
  return total
}
