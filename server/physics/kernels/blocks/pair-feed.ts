import { joined, lowerBound } from './halves.ts'

export interface PairFeed {
  /** Gives the next stretch of the record: ascending tags, none earlier than the last one given before. */
  push(starts: BigInt64Array, stops: BigInt64Array): void
  /** Ends a stretch: no pair is made across this point (another input, a gap of a selection). */
  cut(): void
}

/**
 * Feeds a record in pieces to a kernel that counts pairs with delays in [lo, lo + width). Tags near the end of a piece are
 * kept until no later tag can pair with them, so pieces of any size give the same counts as the whole.
 */
export function createPairFeed(
  lo: bigint,
  width: bigint,
  count: (starts: BigInt64Array, stops: BigInt64Array) => void,
): PairFeed {
  const none = new BigInt64Array(0)
  let waitingStarts: BigInt64Array = none
  let waitingStops: BigInt64Array = none
  return {
    push(starts, stops) {
      if (starts.length === 0 && stops.length === 0) return
      const allStops = joined(waitingStops, stops)
      if (starts.length > 0) count(starts, allStops)
      if (stops.length > 0 && waitingStarts.length > 0) count(waitingStarts, stops)
      const end = latest(starts, stops)
      // A later stop is at `end` or after: it pairs with starts after end - (lo + width); later starts want stops from end + lo on.
      waitingStarts = keepFrom(joined(waitingStarts, starts), end - lo - width + 1n)
      waitingStops = keepFrom(allStops, end + lo)
    },
    cut() {
      waitingStarts = none
      waitingStops = none
    },
  }
}

function latest(a: BigInt64Array, b: BigInt64Array): bigint {
  const endA = a[a.length - 1]
  const endB = b[b.length - 1]
  if (endA === undefined) return endB!
  return endB === undefined || endA > endB ? endA : endB
}

/** A copy, so that the piece it came from can be freed. */
function keepFrom(times: BigInt64Array, edge: bigint): BigInt64Array {
  return times.slice(lowerBound(times, edge))
}
