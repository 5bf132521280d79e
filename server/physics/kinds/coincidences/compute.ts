import type { Computed, ComputeTask, Note } from '../../definition.ts'
import {
  afterpulseNote,
  channelNotes,
  fewPairsNote,
  narrowWindowNote,
  resolutionNote,
  wideWindowNote,
} from '../../notes/pair-notes.ts'
import { picosecondsJson } from '../../quantities.ts'
import { chancePairs, poolPairs, requireInside, type PooledPairs } from '../../record/pooled.ts'
import { countWindows } from './count.ts'
import type { CoincidencesParameters, CoincidencesResult } from './definition.ts'
import { deriveCoincidences, type DerivedCoincidences } from './derive.ts'
import type { PairCounts } from './pair-statistics.ts'

const size = (ps: bigint): bigint => (ps < 0n ? -ps : ps)

/** Pairs in a window with both estimates of accidentals (definitions.md B2). */
export function compute({
  parameters,
  inputs,
  progress,
}: ComputeTask<CoincidencesParameters>): Computed<CoincidencesResult> {
  const { a, b, offPeakWindows: perSide } = parameters
  const widthPs = BigInt(parameters.windowPs)
  const centrePs = BigInt(parameters.delayPs)
  const stepPs = BigInt(parameters.offPeakStepPs ?? 0)
  const used = parameters.subtract!
  const pooled = poolPairs(inputs, a, b)
  requireInside(pooled, size(centrePs) + widthPs, '/parameters/delayPs', 'The window')
  if (perSide > 0) {
    const reach = size(centrePs) + BigInt(perSide) * stepPs + widthPs
    requireInside(pooled, reach, '/parameters/offPeakWindows', 'The outermost off-peak window')
  }
  const { pairs, offPeakCounts, windows } = countWindows(
    pooled,
    { a, b, widthPs, centrePs, perSide, stepPs },
    progress,
  )
  const lo = centrePs - widthPs / 2n
  const counted: PairCounts = {
    countsA: pooled.countsA,
    countsB: pooled.countsB,
    durationS: pooled.durationS,
    pairs,
    product: chancePairs(pooled, Number(widthPs), centrePs),
    offPeak: perSide > 0 ? { counts: offPeakCounts, windows: 2 * perSide } : null,
    sameChannel: pooled.sameChannel,
    holdsZero: lo <= 0n && 0n < lo + widthPs,
    centred: centrePs === 0n,
    darkA: { value: parameters.darkRates.a.value, u: parameters.darkRates.a.u ?? 0 },
    darkB: { value: parameters.darkRates.b.value, u: parameters.darkRates.b.u ?? 0 },
    relativeUDuration: (parameters.uDurationPs ?? 0) / Number(pooled.durationPs),
  }
  const derived = deriveCoincidences(counted, used)
  return {
    result: {
      windowPs: parameters.windowPs,
      delayPs: parameters.delayPs,
      countsA: counted.countsA,
      countsB: counted.countsB,
      durationPs: picosecondsJson(pooled.durationPs),
      durationFrom: pooled.durationFrom,
      counts: pairs,
      rate: derived.rate,
      accidentals: { ...derived.accidentals, offPeakCounts: counted.offPeak?.counts ?? null, used },
      trueRate: derived.trueRate,
      car: derived.car,
      rawCar: derived.rawCar,
      g2: derived.g2,
      klyshko: derived.klyshko,
      expectedByProduct: counted.product,
      windows: windows.map((w) => ({ delayPs: picosecondsJson(w.centrePs), counts: w.counts })),
    },
    notes: notesOf(parameters, pooled, counted, derived),
  }
}

function notesOf(
  parameters: CoincidencesParameters,
  pooled: PooledPairs,
  counted: PairCounts,
  derived: DerivedCoincidences,
): Note[] {
  const { a, b } = parameters
  const widthPs = Number(parameters.windowPs)
  return [
    ...fewPairsNote(counted.pairs, `The window of ${widthPs} ps`),
    ...(counted.offPeak?.counts === 0 ? [emptyOffPeak(counted.offPeak.windows)] : []),
    ...(counted.product === 0 ? [noSingles] : []),
    ...((derived.trueRate.value ?? 0) < 0 ? [belowZero] : []),
    ...narrowWindowNote(widthPs, parameters.responseFwhmPs),
    ...wideWindowNote(pooled, widthPs),
    ...resolutionNote(pooled, widthPs, 'The window'),
    ...channelNotes(pooled, a, b),
    ...afterpulseNote(pooled, a),
  ]
}

const emptyOffPeak = (windows: number): Note => ({
  code: 'zero-accidentals',
  detail: `The ${windows} off-peak windows hold no pair: the ratio to accidentals does not exist, only an upper limit of the accidentals.`,
})

const noSingles: Note = {
  code: 'zero-denominator',
  detail: 'One of the channels has no tags: g2 and the ratio to accidentals do not exist.',
}

const belowZero: Note = {
  code: 'below-zero',
  detail:
    'The true rate is below zero: more accidentals were subtracted than pairs were counted. For antibunched light the window sees fewer pairs than chance.',
}
