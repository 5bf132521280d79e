const LITTLE_ENDIAN = new Uint8Array(new Uint32Array([1]).buffer)[0] === 1
const LOW = LITTLE_ENDIAN ? 0 : 1
const HIGH = 1 - LOW
const TWO_TO_32 = 4294967296

/** Differences up to here stay exact when two of them are added: half of 2^53. */
export const EXACT_SPAN = 2n ** 52n

/** The 32-bit halves of 64-bit times, seen in place: reading them makes no BigInt, which is many times quicker. */
function halves(times: BigInt64Array): { words: Int32Array; unsigned: Uint32Array } {
  return {
    words: new Int32Array(times.buffer, times.byteOffset, 2 * times.length),
    unsigned: new Uint32Array(times.buffer, times.byteOffset, 2 * times.length),
  }
}

/**
 * Writes times[from .. to) - base into `out` as doubles.
 *
 * Exact as long as |time - base| < 2^53: the difference of the upper words times 2^32 is a scaling by a power of two,
 * the difference of the lower words is below 2^32, and their sum is an integer that a double holds, so no step rounds.
 */
export function offsetsFrom(
  times: BigInt64Array,
  from: number,
  to: number,
  base: bigint,
  out: Float64Array,
): void {
  const { words, unsigned } = halves(times)
  const baseHigh = Number(base >> 32n)
  const baseLow = Number(base & 0xffffffffn)
  for (let i = from, k = 0; i < to; i++, k++) {
    out[k] = (words[2 * i + HIGH]! - baseHigh) * TWO_TO_32 + (unsigned[2 * i + LOW]! - baseLow)
  }
}

/** Copies the times of records [from, to) whose channel is `channel`; the order is kept. */
export function pickChannel(
  times: BigInt64Array,
  channels: Uint16Array,
  channel: number,
  from = 0,
  to = times.length,
): BigInt64Array {
  let count = 0
  for (let i = from; i < to; i++) if (channels[i] === channel) count++
  const picked = new BigInt64Array(count)
  const source = halves(times).words
  const target = halves(picked).words
  for (let i = from, k = 0; i < to; i++) {
    if (channels[i] !== channel) continue
    target[k++] = source[2 * i]!
    target[k++] = source[2 * i + 1]!
  }
  return picked
}

/** First index in the ascending `times` whose time is at or after `edge`, searched from `from` on. */
export function lowerBound(times: BigInt64Array, edge: bigint, from = 0): number {
  let low = from
  let high = times.length
  while (low < high) {
    const middle = (low + high) >>> 1
    if (times[middle]! < edge) low = middle + 1
    else high = middle
  }
  return low
}

export function joined(a: BigInt64Array, b: BigInt64Array): BigInt64Array {
  if (a.length === 0) return b
  const both = new BigInt64Array(a.length + b.length)
  both.set(a)
  both.set(b, a.length)
  return both
}
