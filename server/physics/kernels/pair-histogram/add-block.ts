/**
 * Adds the pairs of one block to the histogram: delay stop - start in [0, bins x bin). Offsets are exact integers.
 *
 * The bin number is guessed by a reciprocal and then settled by comparing exact integer products, so no rounding ever
 * decides where a pair goes; multiplying is several times quicker than dividing.
 */
export function addBlock(
  starts: Float64Array,
  startCount: number,
  stops: Float64Array,
  stopCount: number,
  bin: number,
  counts: Float64Array,
): void {
  const width = bin * counts.length
  const perBin = 1 / bin
  let first = 0
  for (let i = 0; i < startCount; i++) {
    const start = starts[i]!
    while (first < stopCount && stops[first]! < start) first++
    for (let j = first; j < stopCount; j++) {
      const delay = stops[j]! - start
      if (delay >= width) break
      let k = Math.trunc(delay * perBin)
      if (k * bin > delay) k--
      else if ((k + 1) * bin <= delay) k++
      counts[k]! += 1
    }
  }
}
