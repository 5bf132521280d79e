import type { Note } from '../definition.ts'
import { chancePairs, type PooledPairs } from '../record/pooled.ts'
import { commonDivisor, gapsOf } from '../record/gaps.ts'
import { createWindowCount } from '../kernels/window-count/window-count.ts'
import { dispersionOf } from '../statistics/dispersion.ts'
import { countsInBins, defaultBinCount, timeBins } from '../statistics/time-bins.ts'
import { brief, percent } from './numbers.ts'
import { driftNote, spanNotes, undeclaredNote } from './rate-notes.ts'

const FEW_PAIRS = 10
/** Afterpulses beyond this share of the tags are told. */
const AFTERPULSE_SHARE = 0.001
const AFTERPULSE_RANGE_PS = 1_000_000n

/** What the channels that are paired show by themselves: drift, silent ends, a short undeclared record. */
export function channelNotes(pooled: PooledPairs, a: number, b: number): Note[] {
  return pooled.inputs.flatMap(({ exposure, timesA, timesB }) => {
    const pairs: [number, BigInt64Array][] =
      a === b
        ? [[a, timesA]]
        : [
            [a, timesA],
            [b, timesB],
          ]
    return pairs.flatMap(([channel, times]) => {
      const bins = timeBins(exposure, null, defaultBinCount(times.length))
      return [
        ...driftNote(channel, dispersionOf(countsInBins(times, bins))),
        ...spanNotes(channel, times, exposure),
        ...undeclaredNote(channel, times.length, exposure),
      ]
    })
  })
}

/** The bin or window that carries the result holds fewer than ten pairs. */
export function fewPairsNote(pairs: number, where: string): Note[] {
  if (pairs >= FEW_PAIRS) return []
  const count = pairs === 0 ? 'no pair' : pairs === 1 ? '1 pair' : `${pairs} pairs`
  return [
    {
      code: 'few-pairs',
      detail: `${where} holds ${count}: its uncertainty is asymmetric. Fewer than ${FEW_PAIRS} carry the result.`,
    },
  ]
}

/** The width is narrower than the resolution that the time stamps show. */
export function resolutionNote(pooled: PooledPairs, widthPs: number, what: string): Note[] {
  const steps = pooled.inputs.flatMap(({ timesA, timesB }) => [
    gapsOf(timesA).resolutionPs,
    gapsOf(timesB).resolutionPs,
  ])
  const resolution = steps.reduce(commonDivisor, 0)
  if (widthPs >= resolution) return []
  return [
    {
      code: 'finer-than-resolution',
      detail: `${what} of ${widthPs} ps is narrower than the resolution of the time stamps, ${resolution} ps: neighbouring bins then hold unequal shares.`,
    },
  ]
}

/** The width cuts the timing response: narrower than three standard deviations of it. */
export function narrowWindowNote(widthPs: number, responseFwhmPs: number | undefined): Note[] {
  if (responseFwhmPs === undefined) return []
  const sigma = responseFwhmPs / (2 * Math.sqrt(2 * Math.log(2)))
  if (widthPs >= 3 * sigma) return []
  return [
    {
      code: 'narrow-window',
      detail: `The window of ${widthPs} ps is narrower than 3 sigma = ${brief(3 * sigma)} ps of the timing response: pairs are lost outside it.`,
    },
  ]
}

/** Several pairs in one window are likely: (R_A + R_B) w above 0.1, where sqrt(N_c) is too small. */
export function wideWindowNote(pooled: PooledPairs, widthPs: number): Note[] {
  const load = ((pooled.countsA + pooled.countsB) / Number(pooled.durationPs)) * widthPs
  if (load <= 0.1) return []
  return [
    {
      code: 'wide-window',
      detail: `(R_A + R_B) w = ${brief(load)}: tags often have several partners in the window of ${widthPs} ps, and the uncertainty from sqrt(N_c) is too small.`,
    },
  ]
}

/**
 * Excess of pairs at short lag in the autocorrelation of one detector, from its dead time (taken as the smallest gap) to 1 us,
 * as a share of its tags (definitions.md B15). Told above 0.1 %, and only where it exceeds three standard deviations of the pairs.
 */
export function afterpulseNote(pooled: PooledPairs, channel: number): Note[] {
  if (!pooled.sameChannel) return []
  let excess = 0
  let pairs = 0
  for (const one of pooled.inputs) {
    const from = BigInt(Math.max(1, gapsOf(one.timesA).smallestPs ?? 1))
    const width = AFTERPULSE_RANGE_PS - from
    if (width <= 0n || one.exposure.durationPs <= AFTERPULSE_RANGE_PS) return []
    const window = createWindowCount({ loPs: from, widthPs: width, sameChannel: true })
    window.push(one.timesA, one.timesA)
    const centre = (from + AFTERPULSE_RANGE_PS) / 2n
    pairs += window.count()
    excess += window.count() - chancePairs({ ...pooled, inputs: [one] }, Number(width), centre)
  }
  const share = excess / pooled.countsA
  if (!(share > AFTERPULSE_SHARE) || excess < 3 * Math.sqrt(pairs)) return []
  return [
    {
      code: 'afterpulsing',
      detail: `Channel ${channel}: ${percent(share)} more pairs than chance within 1 µs. Afterpulsing or crosstalk is suspected, unless the light itself is bunched on that scale.`,
    },
  ]
}
