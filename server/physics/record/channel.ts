import type { TagRecord } from '../../contract/tag-record.ts'
import { pickChannel } from '../kernels/blocks/halves.ts'

/** Times of one channel of a record, ascending; empty where the channel has no tags. */
export function channelTimes(record: TagRecord, channel: number): BigInt64Array {
  return pickChannel(record.times, record.channels, channel)
}

/** Channel numbers that have tags, ascending. */
export function channelsOf(record: TagRecord): number[] {
  const seen = new Uint8Array(65536)
  for (let i = 0; i < record.channels.length; i++) seen[record.channels[i]!] = 1
  const found: number[] = []
  for (let channel = 0; channel < seen.length; channel++) if (seen[channel] === 1) found.push(channel)
  return found
}

/** Tags handed to a kernel at once, so that progress is seen and a computation can be stopped. */
const TAGS_PER_PIECE = 1 << 20

/** Runs over two channels of a record in pieces of equal tag count, in order of time. */
export function forEachPiece(
  record: TagRecord,
  start: number,
  stop: number,
  visit: (starts: BigInt64Array, stops: BigInt64Array, tagsDone: number) => void,
): void {
  const { times, channels } = record
  for (let from = 0; from < times.length; from += TAGS_PER_PIECE) {
    const to = Math.min(from + TAGS_PER_PIECE, times.length)
    const starts = pickChannel(times, channels, start, from, to)
    visit(starts, start === stop ? starts : pickChannel(times, channels, stop, from, to), to)
  }
}
