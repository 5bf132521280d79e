import type { ComputeInput } from '../definition.ts'
import { refuse } from '../refuse.ts'
import { channelTimes } from './channel.ts'
import { durationOrigin, exposureOf, overlapPs, seconds, type Exposure } from './exposure.ts'

/** One input with the counts of the two channels that are paired. */
export interface PairInput {
  input: ComputeInput
  exposure: Exposure
  timesA: BigInt64Array
  timesB: BigInt64Array
}

/** Several records of the same kind count as one: counts and norms add, so figures are pooled, not averaged. */
export interface PooledPairs {
  inputs: PairInput[]
  sameChannel: boolean
  countsA: number
  countsB: number
  durationPs: bigint
  durationS: number
  durationFrom: 'declared' | 'tags'
}

export function poolPairs(inputs: ComputeInput[], a: number, b: number): PooledPairs {
  const read = inputs.map((input, i): PairInput => {
    const exposure = exposureOf(input.record, `/inputs/${i}`)
    if (exposure.durationPs === 0n) {
      refuse(
        `/inputs/${i}`,
        'All tags have one time and no acquisition time is declared, so there is no rate. Give the run its duration.',
      )
    }
    const timesA = channelTimes(input.record, a)
    return { input, exposure, timesA, timesB: a === b ? timesA : channelTimes(input.record, b) }
  })
  const durationPs = read.reduce((sum, { exposure }) => sum + exposure.durationPs, 0n)
  return {
    inputs: read,
    sameChannel: a === b,
    countsA: read.reduce((sum, { timesA }) => sum + timesA.length, 0),
    countsB: read.reduce((sum, { timesB }) => sum + timesB.length, 0),
    durationPs,
    durationS: seconds(durationPs),
    durationFrom: durationOrigin(read.map(({ exposure }) => exposure)),
  }
}

/** N_A N_B w (T - |D|)/T^2 summed over the inputs: pairs expected by chance in `widthPs` at the raw delay D. */
export function chancePairs(pooled: PooledPairs, widthPs: number, rawDelayPs: bigint): number {
  let sum = 0
  for (const { exposure, timesA, timesB } of pooled.inputs) {
    const others = pooled.sameChannel ? Math.max(0, timesA.length - 1) : timesB.length
    const duration = Number(exposure.durationPs)
    // Doubles, left to right (definitions.md B1): the product exceeds 64-bit integers.
    sum += (timesA.length * others * widthPs * overlapPs(exposure, rawDelayPs)) / duration / duration
  }
  return sum
}

/** Refuses delays that reach beyond the shortest record: no pair could be found there. */
export function requireInside(pooled: PooledPairs, reachPs: bigint, pointer: string, what: string): void {
  for (const { exposure } of pooled.inputs) {
    if (reachPs < exposure.durationPs) continue
    refuse(
      pointer,
      `${what} reaches ${reachPs} ps, but the record lasts ${exposure.durationPs} ps. Choose a smaller one.`,
    )
  }
}
