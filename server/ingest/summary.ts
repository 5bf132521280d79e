import type { Disorder } from './growing-tags.ts'
import type { TagRecord, TagSummary } from './tag-record.ts'

function gcd(a: bigint, b: bigint): bigint {
  while (b !== 0n) [a, b] = [b, a % b]
  return a
}

/**
 * Greatest common divisor of the steps between neighbours of ascending times, in ps; 0 when there is no step.
 * Steps below 2^53 ps (2.5 h) are exact in a double, which is much faster; the others go by BigInt.
 */
export function resolution(times: BigInt64Array): bigint {
  const halves = new Int32Array(times.buffer, times.byteOffset, 2 * times.length)
  let common = 0
  for (let i = 2; i < halves.length; i += 2) {
    const step = (halves[i + 1]! - halves[i - 1]!) * 2 ** 32 + ((halves[i]! >>> 0) - (halves[i - 2]! >>> 0))
    if (step > Number.MAX_SAFE_INTEGER) return resolutionByBigInt(times)
    if (step === 0 || (common !== 0 && step % common === 0)) continue
    let [a, b] = [step, common]
    while (b !== 0) [a, b] = [b, a % b]
    common = a
    if (common === 1) break
  }
  return BigInt(common)
}

function resolutionByBigInt(times: BigInt64Array): bigint {
  let common = 0n
  for (let i = 1; i < times.length && common !== 1n; i++) common = gcd(times[i]! - times[i - 1]!, common)
  return common
}

function countsOf(channels: Uint16Array): TagSummary['channels'] {
  const counts = new Float64Array(65_536)
  for (let i = 0; i < channels.length; i++) counts[channels[i]!]! += 1
  const found: TagSummary['channels'] = []
  counts.forEach((n, channel) => {
    if (n > 0) found.push({ channel, counts: n })
  })
  return found
}

/** Describes a record of at least one tag. */
export function summarise(record: TagRecord, { outOfOrder, largestStepBackPs }: Disorder): TagSummary {
  const { times, channels, declaredDurationPs } = record
  const [firstPs, lastPs] = [times[0]!, times[times.length - 1]!]
  return {
    tags: times.length,
    durationPs: declaredDurationPs ?? lastPs - firstPs,
    firstPs,
    lastPs,
    resolutionPs: resolution(times),
    outOfOrder,
    largestStepBackPs,
    channels: countsOf(channels),
  }
}
