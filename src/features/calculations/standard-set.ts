import type { RawFile } from '../../../server/contract/files.ts'
import type { NewCalculation } from './mutations.ts'

/** What is computed first from a record of two detectors behind a splitter. */
export const standardSetName = 'Singles, coincidences, correlation'

/**
 * The first three calculations of a tag file: A is the channel with most counts, B the next. Window 2 ns, bins of
 * 500 ps over ±60 ns, accidentals from ten windows on each side 100 ns apart, two-level fit: the usual first look
 * at an emitter with a lifetime of nanoseconds (common practice); every value can be changed in its block.
 */
export function standardSet(file: RawFile): NewCalculation[] {
  const inputs = [{ fileId: file.id }]
  const [a, b] = byCounts(file)
  const singles = { kind: 'singles', inputs, parameters: {} }
  if (a === undefined || b === undefined) return [singles]
  return [
    singles,
    {
      kind: 'coincidences',
      inputs,
      parameters: { a, b, windowPs: 2000, delayPs: 0, offPeakWindows: 10, offPeakStepPs: 100_000 },
    },
    {
      kind: 'correlation',
      inputs,
      parameters: { a, b, binPs: 500, halfRangePs: 60_000, fit: { model: 'two-level' } },
    },
  ]
}

/** Channel numbers, the one with most counts first. */
function byCounts(file: RawFile): number[] {
  return [...(file.reading.channels ?? [])]
    .sort((one, two) => two.counts - one.counts)
    .map(({ channel }) => channel)
}

/** Whether the set can be computed from this file. */
export function canStartSet(file: RawFile): boolean {
  return file.reading.status === 'ready' && file.reading.kind === 'tags' && (file.reading.tags ?? 0) > 0
}
