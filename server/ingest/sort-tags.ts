import type { TagRecord } from './tag-record.ts'

type Tags = Pick<TagRecord, 'times' | 'channels'>

/** Starts of the ascending runs of the times, and their end. */
function runsOf(times: BigInt64Array): number[] {
  const starts = [0]
  for (let i = 1; i < times.length; i++) if (times[i]! < times[i - 1]!) starts.push(i)
  starts.push(times.length)
  return starts
}

function mergeRun(from: Tags, to: Tags, start: number, middle: number, end: number): void {
  let [a, b] = [start, middle]
  for (let at = start; at < end; at++) {
    // On equal times the left run goes first: that keeps file order.
    const left = a < middle && (b >= end || from.times[a]! <= from.times[b]!)
    const source = left ? a++ : b++
    to.times[at] = from.times[source]!
    to.channels[at] = from.channels[source]!
  }
}

/**
 * Sorts tags by time, stably, merging the runs that are in order already: nearly sorted files cost little more than one
 * pass. Returns the given arrays when nothing is to be done.
 */
export function sortTags(tags: Tags): Tags {
  let from = tags
  let to: Tags | null = null
  let starts = runsOf(tags.times)
  while (starts.length > 2) {
    to ??= { times: new BigInt64Array(tags.times.length), channels: new Uint16Array(tags.times.length) }
    const merged: number[] = []
    for (let i = 0; i + 1 < starts.length; i += 2) {
      const end = starts[i + 2] ?? starts[i + 1]!
      mergeRun(from, to, starts[i]!, starts[i + 1]!, end)
      merged.push(starts[i]!)
    }
    merged.push(tags.times.length)
    starts = merged
    ;[from, to] = [to, from]
  }
  return from
}
