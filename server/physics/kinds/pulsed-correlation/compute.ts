import type { Computed, ComputeTask, Note } from '../../definition.ts'
import { createWindowCount, windowStart } from '../../kernels/window-count/window-count.ts'
import { brief } from '../../notes/numbers.ts'
import { channelNotes, fewPairsNote, resolutionNote } from '../../notes/pair-notes.ts'
import { picosecondsJson, quantity } from '../../quantities.ts'
import { forEachPiece } from '../../record/channel.ts'
import { poolPairs, requireInside, type PooledPairs } from '../../record/pooled.ts'
import { refuse } from '../../refuse.ts'
import type { PulsedParameters, PulsedResult } from './definition.ts'
import { centralOverSide, sideScatterOf, withoutFloor } from './derive.ts'
import { findPeriod } from './period.ts'

/** Peak areas and g2(0) under pulsed excitation (definitions.md B5). */
export function compute({
  parameters,
  inputs,
  progress,
}: ComputeTask<PulsedParameters>): Computed<PulsedResult> {
  const { a, b, sidePeaks } = parameters
  if (a === b)
    refuse('/parameters/b', 'Choose two channels: the dead time of one detector removes the central peak.')
  const widthPs = BigInt(parameters.peakWindowPs)
  const offsetPs = BigInt(parameters.offsetPs)
  const pooled = poolPairs(inputs, a, b)
  const period = periodOf(parameters, pooled)
  const step = period.value!
  requireFit(parameters, step)
  const reach = BigInt(Math.ceil((sidePeaks + 0.5) * step)) + (offsetPs < 0n ? -offsetPs : offsetPs) + widthPs
  requireInside(pooled, reach, '/parameters/sidePeaks', 'The outermost peak')
  const centres = peakNumbers(sidePeaks).map((m) => ({ m, centre: nearest(m * step) + offsetPs }))
  const counts = countAt(
    pooled,
    parameters,
    centres.map((c) => c.centre),
    widthPs,
    progress,
  )
  const peaks = centres.map(({ m, centre }, i) => ({
    m,
    delayPs: picosecondsJson(centre),
    counts: counts[i]!,
  }))
  const floorCounts = countFloor(pooled, parameters, step)
  const result: PulsedResult = {
    periodPs: period,
    peakWindowPs: parameters.peakWindowPs,
    offsetPs: parameters.offsetPs,
    countsA: pooled.countsA,
    countsB: pooled.countsB,
    durationPs: picosecondsJson(pooled.durationPs),
    durationFrom: pooled.durationFrom,
    peaks,
    g2Zero: centralOverSide(peaks),
    ...(floorCounts === null
      ? {}
      : {
          g2ZeroCorrected: withoutFloor(
            peaks,
            { counts: floorCounts, widthPs: Number(parameters.floorWindowPs) },
            Number(widthPs),
          ),
        }),
    sideScatter: sideScatterOf(peaks),
    floorCounts,
  }
  return { result, notes: notesOf(result, pooled, parameters) }
}

const peakNumbers = (sidePeaks: number): number[] =>
  Array.from({ length: 2 * sidePeaks + 1 }, (_, i) => i - sidePeaks)

/** round(y) = floor(y + 1/2) (definitions.md B1). */
const nearest = (y: number): bigint => BigInt(Math.floor(y + 0.5))

function periodOf(
  { periodPs, peakWindowPs, offsetPs }: PulsedParameters,
  pooled: PooledPairs,
): PulsedResult['periodPs'] {
  if (periodPs !== undefined) return quantity(periodPs, null, 'ps')
  const found = findPeriod(pooled, BigInt(peakWindowPs), BigInt(offsetPs))
  return (
    found ?? refuse('/parameters/periodPs', 'The delays show no period. Give the period of the excitation.')
  )
}

function requireFit({ peakWindowPs, floorWindowPs }: PulsedParameters, periodPs: number): void {
  if (Number(peakWindowPs) > periodPs) {
    refuse(
      '/parameters/peakWindowPs',
      `The peak window is wider than the period of ${brief(periodPs)} ps, so that peaks would overlap.`,
    )
  }
  if (floorWindowPs !== undefined && Number(floorWindowPs) + Number(peakWindowPs) > periodPs) {
    refuse(
      '/parameters/floorWindowPs',
      'Floor window and peak window together exceed the period, so that the floor would hold peaks.',
    )
  }
}

function countAt(
  pooled: PooledPairs,
  { a, b }: PulsedParameters,
  centres: bigint[],
  widthPs: bigint,
  progress?: (done: number, of: number) => void,
): number[] {
  const windows = centres.map((c) =>
    createWindowCount({ loPs: windowStart(c, widthPs), widthPs, sameChannel: false }),
  )
  const total = pooled.inputs.reduce((sum, { input }) => sum + input.record.times.length, 0)
  let before = 0
  for (const { input } of pooled.inputs) {
    forEachPiece(input.record, a, b, (starts, stops, done) => {
      for (const window of windows) window.push(starts, stops)
      progress?.(before + done, total)
    })
    for (const window of windows) window.cut()
    before += input.record.times.length
  }
  return windows.map((window) => window.count())
}

/** Pairs halfway between the peaks, m = -M .. M - 1; null without a floor window. */
function countFloor(pooled: PooledPairs, parameters: PulsedParameters, periodPs: number): number | null {
  const { sidePeaks, floorWindowPs, offsetPs } = parameters
  if (floorWindowPs === undefined) return null
  const centres = Array.from(
    { length: 2 * sidePeaks },
    (_, i) => nearest((i - sidePeaks + 0.5) * periodPs) + BigInt(offsetPs),
  )
  return countAt(pooled, parameters, centres, BigInt(floorWindowPs)).reduce((sum, n) => sum + n, 0)
}

function notesOf(result: PulsedResult, pooled: PooledPairs, { a, b, sidePeaks }: PulsedParameters): Note[] {
  const { sideScatter, g2Zero, g2ZeroCorrected } = result
  const { slope } = sideScatter
  const edge = (sidePeaks * result.periodPs.value!) / Number(pooled.durationPs)
  const central = result.peaks.find(({ m }) => m === 0)!.counts
  return [
    ...(g2Zero.value === null ? [noSidePeaks] : fewPairsNote(central, 'The central peak')),
    ...((g2ZeroCorrected?.value ?? 0) < 0 ? [belowZero] : []),
    ...(sideScatter.p !== null && sideScatter.p < 0.01
      ? [scatterNote(sideScatter.value!, sideScatter.p)]
      : []),
    ...(slope.value !== null && slope.value < -3 * slope.u! ? [blinkingNote(slope.value, slope.u!)] : []),
    ...(edge >= 1e-6 ? [edgeNote(edge)] : []),
    ...resolutionNote(pooled, Number(result.peakWindowPs), 'The peak window'),
    ...channelNotes(pooled, a, b),
  ]
}

const noSidePeaks: Note = {
  code: 'zero-denominator',
  detail: 'The side peaks are empty: g2(0) does not exist. Check channels, period and offset.',
}

const belowZero: Note = {
  code: 'below-zero',
  detail: 'The corrected g2(0) is below zero: the floor between the peaks is higher than the central peak.',
}

const scatterNote = (value: number, p: number): Note => ({
  code: 'side-scatter',
  detail: `The side peaks scatter ${brief(value)} times as much as Poisson counts, p = ${brief(p)}: their mean is not known as well as u says.`,
})

const blinkingNote = (value: number, u: number): Note => ({
  code: 'blinking',
  detail: `The side peaks fall with |m| by ${brief(-value)} ± ${brief(u)} of their mean a period: the emitter blinks, and the mean of near peaks is too high for g2(0).`,
})

const edgeNote = (share: number): Note => ({
  code: 'record-edge',
  detail: `The outermost peak lies at ${brief(share)} of the record; peaks are not corrected for pairs beyond its ends.`,
})
