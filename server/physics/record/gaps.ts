import { EXACT_SPAN, offsetsFrom } from '../kernels/blocks/halves.ts'

export interface Gaps {
  /** Smallest and largest step between neighbouring tags, ps; null below two tags. */
  smallestPs: number | null
  largestPs: number | null
  /** Greatest common divisor of the steps: the resolution that the times show. 0 where all times are equal. */
  resolutionPs: number
}

const PIECE = 1 << 16

/** Steps between neighbouring tags of one ascending channel. A step beyond 2^52 ps is rounded to a double. */
export function gapsOf(times: BigInt64Array): Gaps {
  if (times.length < 2) return { smallestPs: null, largestPs: null, resolutionPs: 0 }
  let smallest = Infinity
  let largest = 0
  let resolution = 0
  const offsets = new Float64Array(PIECE + 1)
  for (let from = 0; from < times.length - 1; from += PIECE) {
    const to = Math.min(from + PIECE + 1, times.length)
    writeOffsets(times, from, to, offsets)
    for (let i = 1; i < to - from; i++) {
      const step = offsets[i]! - offsets[i - 1]!
      if (step < smallest) smallest = step
      if (step > largest) largest = step
      if (resolution !== 1) resolution = commonDivisor(step, resolution)
    }
  }
  return { smallestPs: smallest, largestPs: largest, resolutionPs: resolution }
}

function writeOffsets(times: BigInt64Array, from: number, to: number, out: Float64Array): void {
  const base = times[from]!
  if (times[to - 1]! - base < EXACT_SPAN) return offsetsFrom(times, from, to, base, out)
  for (let i = from; i < to; i++) out[i - from] = Number(times[i]! - base)
}

/** Euclid's algorithm; the divisor of zero and n is n. */
export function commonDivisor(a: number, b: number): number {
  let [x, y] = [a, b]
  while (y !== 0) [x, y] = [y, x % y]
  return x
}
