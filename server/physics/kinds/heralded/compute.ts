import type { TagRecord } from '../../../contract/tag-record.ts'
import type { Computed, ComputeTask, Note } from '../../definition.ts'
import { createPairHistogram } from '../../kernels/pair-histogram/pair-histogram.ts'
import { partnerFlags } from '../../kernels/partner-flags/partner-flags.ts'
import { windowStart } from '../../kernels/window-count/window-count.ts'
import { channelNotes, fewPairsNote, resolutionNote } from '../../notes/pair-notes.ts'
import { picosecondsJson } from '../../quantities.ts'
import { channelTimes } from '../../record/channel.ts'
import { poolPairs, requireInside } from '../../record/pooled.ts'
import type { HeraldedParameters, HeraldedResult } from './definition.ts'
import { heraldedG2, heraldingEfficiency, type HeraldCounts } from './derive.ts'

interface Window {
  lo: bigint
  width: bigint
}

const HALF_BINS = 60n

/** Outcomes of heralds in two windows, pooled over the inputs (definitions.md B6, physics.md section 4). */
export function compute({
  parameters,
  inputs,
  progress,
}: ComputeTask<HeraldedParameters>): Computed<HeraldedResult> {
  const { herald, a, b } = parameters
  const windowA = windowOf(parameters.delayAPs, parameters.windowAPs)
  const windowB = windowOf(parameters.delayBPs, parameters.windowBPs)
  const withA = poolPairs(inputs, herald, a)
  const withB = poolPairs(inputs, herald, b)
  requireInside(
    withA,
    reachOf(parameters.delayAPs, parameters.windowAPs),
    '/parameters/delayAPs',
    'The window of arm A',
  )
  requireInside(
    withB,
    reachOf(parameters.delayBPs, parameters.windowBPs),
    '/parameters/delayBPs',
    'The window of arm B',
  )
  const delays = delayHistogram(windowA, windowB)
  const counts: HeraldCounts = { heralds: 0, heraldsWithA: 0, heraldsWithB: 0, heraldsWithBoth: 0 }
  inputs.forEach(({ record }, i) => {
    progress?.(i, inputs.length)
    addRecord(record, parameters, windowA, windowB, counts, delays)
  })
  const g2 = heraldedG2(counts)
  return {
    result: {
      windowAPs: parameters.windowAPs,
      delayAPs: parameters.delayAPs,
      windowBPs: parameters.windowBPs,
      delayBPs: parameters.delayBPs,
      durationPs: picosecondsJson(withA.durationPs),
      durationFrom: withA.durationFrom,
      ...counts,
      g2,
      efficiencyA: heraldingEfficiency(counts.heraldsWithA, counts.heralds),
      efficiencyB: heraldingEfficiency(counts.heraldsWithB, counts.heralds),
      delays: {
        binPs: picosecondsJson(delays.binPs),
        delaysPs: Array.from({ length: 2 * Number(HALF_BINS) + 1 }, (_, i) =>
          picosecondsJson(delays.centrePs + (BigInt(i) - HALF_BINS) * delays.binPs),
        ),
        a: Array.from(delays.a.counts()),
        b: Array.from(delays.b.counts()),
      },
    },
    notes: [
      ...(g2.value === null ? [noArm] : fewPairsNote(counts.heraldsWithBoth, 'The outcome of both arms')),
      ...(g2.value !== null && g2.value > 0 && g2.u === null ? [everyArmFires] : []),
      ...resolutionNote(withA, Number(parameters.windowAPs), 'The window of arm A'),
      ...resolutionNote(withB, Number(parameters.windowBPs), 'The window of arm B'),
      ...channelNotes(withA, herald, a),
      ...channelNotes(withB, b, b),
    ],
  }
}

const noArm: Note = {
  code: 'zero-denominator',
  detail: 'No herald is answered in one of the arms: heralded g2 does not exist. Check channels and delays.',
}

const everyArmFires: Note = {
  code: 'no-uncertainty',
  detail: 'Nearly every herald is answered in both arms: the counting formula gives no uncertainty for g2.',
}

function windowOf(delayPs: number | string, windowPs: number | string): Window {
  const width = BigInt(windowPs)
  return { lo: windowStart(BigInt(delayPs), width), width }
}

/** |c| + w, which must lie inside the record. */
function reachOf(delayPs: number | string, windowPs: number | string): bigint {
  const centre = BigInt(delayPs)
  return (centre < 0n ? -centre : centre) + BigInt(windowPs)
}

/** Histograms of both arms over both windows and as much again around them. */
function delayHistogram(windowA: Window, windowB: Window) {
  const [endA, endB] = [windowA.lo + windowA.width, windowB.lo + windowB.width]
  const lo = windowA.lo < windowB.lo ? windowA.lo : windowB.lo
  const hi = endA > endB ? endA : endB
  const binPs = ((hi - lo) * 2n) / (2n * HALF_BINS + 1n) + 1n
  const centrePs = (lo + hi) / 2n
  const options = { binPs, halfBins: Number(HALF_BINS), offsetPs: centrePs, sameChannel: false }
  return { binPs, centrePs, a: createPairHistogram(options), b: createPairHistogram(options) }
}

function addRecord(
  record: TagRecord,
  { herald, a, b }: HeraldedParameters,
  windowA: Window,
  windowB: Window,
  counts: HeraldCounts,
  delays: ReturnType<typeof delayHistogram>,
): void {
  const heralds = channelTimes(record, herald)
  const armA = channelTimes(record, a)
  const armB = channelTimes(record, b)
  const answersA = partnerFlags(heralds, armA, windowA.lo, windowA.width)
  const answersB = partnerFlags(heralds, armB, windowB.lo, windowB.width)
  counts.heralds += heralds.length
  for (let i = 0; i < heralds.length; i++) {
    counts.heraldsWithA += answersA[i]!
    counts.heraldsWithB += answersB[i]!
    counts.heraldsWithBoth += answersA[i]! & answersB[i]!
  }
  delays.a.push(heralds, armA)
  delays.b.push(heralds, armB)
  delays.a.cut()
  delays.b.cut()
}
