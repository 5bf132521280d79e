/** Pair counting straight from definitions.md B1, in 64-bit integers and without any shortcut: the oracle of the kernels. */
export function bruteHistogram(
  starts: BigInt64Array,
  stops: BigInt64Array,
  {
    binPs,
    halfBins,
    offsetPs,
    sameChannel,
  }: { binPs: bigint; halfBins: number; offsetPs: bigint; sameChannel: boolean },
): number[] {
  const counts = new Array<number>(2 * halfBins + 1).fill(0)
  starts.forEach((a, i) =>
    stops.forEach((b, j) => {
      if (sameChannel && i === j) return
      const delay = b - a - offsetPs
      for (let k = -halfBins; k <= halfBins; k++) {
        const lo = BigInt(k) * binPs - binPs / 2n
        if (lo <= delay && delay < lo + binPs) counts[k + halfBins]! += 1
      }
    }),
  )
  return counts
}

export function bruteWindow(
  starts: BigInt64Array,
  stops: BigInt64Array,
  lo: bigint,
  width: bigint,
  sameChannel: boolean,
): number {
  let count = 0
  starts.forEach((a, i) =>
    stops.forEach((b, j) => {
      if (!(sameChannel && i === j) && lo <= b - a && b - a < lo + width) count++
    }),
  )
  return count
}
