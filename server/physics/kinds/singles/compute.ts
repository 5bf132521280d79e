import type { Quantity } from '../../../contract/quantity.ts'
import type { Computed, ComputeTask, Note } from '../../definition.ts'
import { deadTimeNote, driftNote, pauseNote, spanNotes, undeclaredNote } from '../../notes/rate-notes.ts'
import {
  inQuadrature,
  picosecondsJson,
  PS_PER_S,
  quantity,
  zeroCounts,
  noQuantity,
} from '../../quantities.ts'
import { channelsOf, channelTimes } from '../../record/channel.ts'
import { exposureOf, seconds, type Exposure } from '../../record/exposure.ts'
import { gapsOf } from '../../record/gaps.ts'
import { refuse } from '../../refuse.ts'
import { garwoodInterval } from '../../special/garwood.ts'
import { correctDeadTime, deadTimeLimit, type CorrectedRate } from '../../statistics/dead-time.ts'
import { dispersionOf } from '../../statistics/dispersion.ts'
import { countsInBins, defaultBinCount, timeBins } from '../../statistics/time-bins.ts'
import type { SinglesParameters, SinglesResult } from './definition.ts'

type ChannelResult = SinglesResult['channels'][number]

/** Counts and rates of each channel with their trace (definitions.md B7, physics.md section 1). */
export function compute({
  parameters,
  inputs,
  progress,
}: ComputeTask<SinglesParameters>): Computed<SinglesResult> {
  const record = inputs[0]!.record
  const exposure = exposureOf(record, '/inputs/0')
  const channels = parameters.channels ?? channelsOf(record)
  const times = new Map(channels.map((channel) => [channel, channelTimes(record, channel)]))
  const widthPs = parameters.traceBinPs === undefined ? null : BigInt(parameters.traceBinPs)
  const notes: Note[] = []
  const results = [...times].map(([channel, tags], i) => {
    progress?.(i, times.size)
    const { result, remarks } = channelResult(channel, tags, exposure, widthPs, parameters)
    notes.push(...remarks)
    return result
  })
  const most = Math.max(0, ...[...times.values()].map((tags) => tags.length))
  const bins = timeBins(exposure, widthPs, Math.max(1, defaultBinCount(most)))
  return {
    result: {
      durationPs: picosecondsJson(exposure.durationPs),
      durationFrom: exposure.durationFrom,
      firstPs: picosecondsJson(exposure.firstPs),
      lastPs: picosecondsJson(exposure.lastPs),
      channels: results,
      trace: {
        startPs: picosecondsJson(bins.startPs),
        binPs: picosecondsJson(bins.binPs),
        counts: Object.fromEntries([...times].map(([channel, tags]) => [channel, countsInBins(tags, bins)])),
      },
    },
    notes,
  }
}

function channelResult(
  channel: number,
  times: BigInt64Array,
  exposure: Exposure,
  widthPs: bigint | null,
  parameters: SinglesParameters,
): { result: ChannelResult; remarks: Note[] } {
  const counts = times.length
  const durationS = seconds(exposure.durationPs)
  const bins = timeBins(exposure, widthPs, defaultBinCount(counts))
  const dispersion = dispersionOf(countsInBins(times, bins))
  const gaps = gapsOf(times)
  const [low, high] = garwoodInterval(counts)
  const deadPs = parameters.deadTimes?.[channel]?.ps ?? 0
  return {
    result: {
      channel,
      counts,
      rate: rateOf(counts, durationS, relativeUDuration(parameters, exposure)),
      interval68: durationS > 0 ? [low / durationS, high / durationS] : null,
      sourceRate: sourceRate(channel, counts, exposure, parameters),
      dispersion: dispersion && { ...inOrder(dispersion), binPs: picosecondsJson(bins.binPs) },
      smallestGapPs: gaps.smallestPs,
    },
    remarks: [
      ...(durationS > 0
        ? deadTimeNote(channel, (counts / durationS) * (deadPs / PS_PER_S))
        : [noDuration(channel)]),
      ...driftNote(channel, dispersion),
      ...spanNotes(channel, times, exposure),
      ...pauseNote(channel, counts, gaps, exposure),
      ...undeclaredNote(channel, counts, exposure),
    ],
  }
}

const inOrder = ({ value, u, p, bins, chi2, dof }: NonNullable<ReturnType<typeof dispersionOf>>) => ({
  value,
  u,
  p,
  bins,
  chi2,
  dof,
})

const noDuration = (channel: number): Note => ({
  code: 'no-duration',
  detail: `Channel ${channel}: all tags have one time and no acquisition time is declared, so there is no rate.`,
})

function relativeUDuration({ uDurationPs = 0 }: SinglesParameters, { durationPs }: Exposure): number {
  return uDurationPs / Number(durationPs)
}

function rateOf(counts: number, durationS: number, relativeU: number): Quantity {
  if (durationS === 0) return noQuantity('cps')
  if (counts === 0) return zeroCounts(1 / durationS, 'cps')
  const rate = counts / durationS
  return quantity(rate, inQuadrature(Math.sqrt(counts) / durationS, rate * relativeU), 'cps')
}

/** R0 - D, u in quadrature; the dark rate was measured with the same dead time at negligible rate. */
function sourceRate(
  channel: number,
  counts: number,
  exposure: Exposure,
  parameters: SinglesParameters,
): Quantity | null {
  const dark = parameters.darkRates?.[channel]
  const deadTime = parameters.deadTimes?.[channel]
  const durationS = seconds(exposure.durationPs)
  if (dark === undefined && deadTime === undefined) return null
  if (durationS === 0) return noQuantity('cps')
  const darkRate = dark?.value ?? 0
  if (counts === 0) {
    const zero = zeroCounts(1 / durationS, 'cps')
    return { ...zero, value: 0 - darkRate, upper: zero.upper! - darkRate }
  }
  const corrected = undead(channel, counts, durationS, deadTime)
  const common = corrected.rate * relativeUDuration(parameters, exposure)
  return quantity(corrected.rate - darkRate, inQuadrature(corrected.u, common, dark?.u ?? 0), 'cps')
}

function undead(
  channel: number,
  counts: number,
  durationS: number,
  deadTime: NonNullable<SinglesParameters['deadTimes']>[string] | undefined,
): CorrectedRate {
  if (deadTime === undefined) return { rate: counts / durationS, u: Math.sqrt(counts) / durationS }
  const share = (counts / durationS) * (deadTime.ps / PS_PER_S)
  if (share >= deadTimeLimit(deadTime.kind)) {
    const limit = deadTime.kind === 'extending' ? '1/e = 0.368' : '1'
    refuse(
      `/parameters/deadTimes/${channel}/ps`,
      `Channel ${channel}: R tau_d = ${share.toPrecision(3)} is not possible with a dead time of this kind, which allows less than ${limit}. Check the dead time.`,
    )
  }
  return correctDeadTime(counts, durationS, deadTime)
}
