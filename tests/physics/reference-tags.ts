import { readFileSync } from 'node:fs'
import type { TagRecord } from '../../server/contract/tag-record.ts'
import { referencePath } from '../support/reference.ts'

/** Exact answers for the reference records, by an independent program (reference/README.md). */
export interface ExpectedRecord {
  durationPs: number
  counts: Record<string, number>
  correlation?: {
    a: number
    b: number
    binPs: number
    halfRangePs: number
    offsetPs: number
    delaysPs: number[]
    counts: number[]
    g2: number[]
  }[]
  coincidences?: {
    a: number
    b: number
    windowPs: number
    delayPs: number
    offPeakWindows: number
    offPeakStepPs: number
    counts: number
    rate: number
    accidentalsProduct: number
    offPeakCounts: number
    accidentalsOffPeak: number
    g2: number
  }[]
  heralded?: Record<string, number>[]
  pulsed?: {
    a: number
    b: number
    periodPs: number
    peakWindowPs: number
    sidePeaks: number
    peaks: { m: number; counts: number }[]
    g2Zero: number
  }[]
}

export const recordNames = ['emitter-cw', 'chaotic', 'heralded', 'emitter-pulsed'] as const

export function readExpected(): Record<(typeof recordNames)[number], ExpectedRecord> {
  return JSON.parse(readFileSync(referencePath('tags/expected.json'), 'utf8'))
}

const read = new Map<string, TagRecord>()

/** One of the reference records, read once in each test file. */
export function readReferenceTags(name: string): TagRecord {
  const record = read.get(name) ?? parseTags(name)
  read.set(name, record)
  return record
}

/** `timestamp_ps,channel` with a header line, already in order of time. */
function parseTags(name: string): TagRecord {
  const lines = readFileSync(referencePath(`tags/${name}.csv`), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
  return {
    times: BigInt64Array.from(lines, (line) => BigInt(line.slice(0, line.indexOf(',')))),
    channels: Uint16Array.from(lines, (line) => Number(line.slice(line.indexOf(',') + 1))),
    declaredDurationPs: null,
  }
}
