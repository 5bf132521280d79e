import type { TagRecord } from '../../contract/tag-record.ts'
import { MAX_PICOSECONDS } from '../parameters.ts'
import { PS_PER_S } from '../quantities.ts'
import { refuse } from '../refuse.ts'

/** How long a record was taken and between which tags it lies. */
export interface Exposure {
  firstPs: bigint
  lastPs: bigint
  /** T: the declared acquisition time, else last - first tag over all channels. */
  durationPs: bigint
  durationFrom: 'declared' | 'tags'
}

/** Reads the exposure of a record and refuses records that no calculation can use (definitions.md B1). */
export function exposureOf(record: TagRecord, pointer: string): Exposure {
  const { times, declaredDurationPs } = record
  if (times.length === 0) return emptyExposure(declaredDurationPs, pointer)
  const firstPs = times[0]!
  const lastPs = times[times.length - 1]!
  if (firstPs < -MAX_PICOSECONDS || lastPs > MAX_PICOSECONDS) {
    refuse(
      pointer,
      'A tag lies beyond 2^61 ps (27 days) from zero, where differences overflow. Give times from the start of the run.',
    )
  }
  const span = lastPs - firstPs
  if (declaredDurationPs === null) return { firstPs, lastPs, durationPs: span, durationFrom: 'tags' }
  if (declaredDurationPs < span) {
    refuse(
      pointer,
      `The declared acquisition time of ${declaredDurationPs} ps is shorter than the ${span} ps between the first and the last tag. Correct the duration of the run.`,
    )
  }
  return { firstPs, lastPs, durationPs: declaredDurationPs, durationFrom: 'declared' }
}

function emptyExposure(declared: bigint | null, pointer: string): Exposure {
  if (declared !== null && declared > 0n) {
    return { firstPs: 0n, lastPs: 0n, durationPs: declared, durationFrom: 'declared' }
  }
  return refuse(
    pointer,
    'The record holds no tags and states no acquisition time, so there is no rate. Give the run its duration.',
  )
}

export const seconds = (ps: bigint): number => Number(ps) / PS_PER_S

/** T - |D| in ps: how much of the record can hold pairs with raw delay D. */
export function overlapPs(exposure: Exposure, delayPs: bigint): number {
  return Number(exposure.durationPs - (delayPs < 0n ? -delayPs : delayPs))
}

/** One word for how the durations of several pooled inputs were formed. */
export function durationOrigin(exposures: Exposure[]): 'declared' | 'tags' {
  return exposures.every((e) => e.durationFrom === 'declared') ? 'declared' : 'tags'
}
