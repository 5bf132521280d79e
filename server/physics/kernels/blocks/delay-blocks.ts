import { EXACT_SPAN, lowerBound, offsetsFrom } from './halves.ts'

/** Starts taken at once: large enough to spread the cost of a search, small enough to stay in the cache. */
const STARTS_PER_BLOCK = 1 << 16

/** Offsets of one block: start offsets from a base, stop offsets from that base + lo, so that a delay d = lo + (stop - start). `firstStart` is the index of the first start. */
export type VisitBlock = (
  starts: Float64Array,
  startCount: number,
  stops: Float64Array,
  stopCount: number,
  firstStart: number,
) => void

/**
 * Walks two ascending channels in blocks and hands each block over as doubles, together with every stop that lies
 * within the delays [lo, lo + width) of one of its starts.
 *
 * Exact: a block spans at most 2^52 ps (75 minutes) and width is at most 2^52 ps, so every offset and every difference of two
 * offsets is an integer below 2^53. The large parts, the absolute time and lo, are taken off in 64-bit integers.
 */
export function forEachDelayBlock(
  starts: BigInt64Array,
  stops: BigInt64Array,
  lo: bigint,
  width: bigint,
  visit: VisitBlock,
): void {
  const startOffsets = new Float64Array(Math.min(STARTS_PER_BLOCK, starts.length))
  let stopOffsets = new Float64Array(0)
  let stopFrom = 0
  for (let from = 0; from < starts.length;) {
    const base = starts[from]!
    const most = Math.min(from + STARTS_PER_BLOCK, starts.length)
    const to = starts[most - 1]! - base < EXACT_SPAN ? most : lowerBound(starts, base + EXACT_SPAN, from)
    stopFrom = lowerBound(stops, base + lo, stopFrom)
    const stopTo = lowerBound(stops, starts[to - 1]! + lo + width, stopFrom)
    if (stopTo > stopFrom) {
      if (stopOffsets.length < stopTo - stopFrom) stopOffsets = new Float64Array(2 * (stopTo - stopFrom))
      offsetsFrom(starts, from, to, base, startOffsets)
      offsetsFrom(stops, stopFrom, stopTo, base + lo, stopOffsets)
      visit(startOffsets, to - from, stopOffsets, stopTo - stopFrom, from)
    }
    from = to
  }
}
