import { EXACT_SPAN, lowerBound } from '../blocks/halves.ts'
import { forEachDelayBlock } from '../blocks/delay-blocks.ts'

/** For each start, 1 where at least one stop has a delay in [lo, lo + width), else 0. */
export function partnerFlags(
  starts: BigInt64Array,
  stops: BigInt64Array,
  lo: bigint,
  widthPs: bigint,
): Uint8Array {
  const flags = new Uint8Array(starts.length)
  if (widthPs > EXACT_SPAN) {
    // Beyond 75 minutes doubles could lose picoseconds: a search in 64-bit integers.
    starts.forEach((start, i) => {
      const next = stops[lowerBound(stops, start + lo)]
      flags[i] = next !== undefined && next < start + lo + widthPs ? 1 : 0
    })
    return flags
  }
  const width = Number(widthPs)
  forEachDelayBlock(starts, stops, lo, widthPs, (a, aCount, b, bCount, firstStart) => {
    let next = 0
    for (let i = 0; i < aCount; i++) {
      while (next < bCount && b[next]! < a[i]!) next++
      if (next < bCount && b[next]! - a[i]! < width) flags[firstStart + i] = 1
    }
  })
  return flags
}
