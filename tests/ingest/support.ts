import { createParser, detectReading } from '../../server/ingest/registry.ts'
import type { DetectedReading, Reading } from '../../server/ingest/reading.ts'

export const bytes = (text: string) => new Uint8Array(Buffer.from(text, 'utf8'))

/** Reads text or bytes as delimited, in pieces of a size. */
export function read(
  content: string | Uint8Array,
  options: Record<string, unknown>,
  piece = 65_536,
): Reading {
  const all = typeof content === 'string' ? bytes(content) : content
  const parser = createParser('delimited', 1, options)
  for (let at = 0; at < all.length; at += piece) parser.push(all.subarray(at, at + piece))
  return parser.finish()
}

export function detect(content: string | Uint8Array): DetectedReading {
  const all = typeof content === 'string' ? bytes(content) : content
  const found = detectReading(all.subarray(0, 65_536), 'file.csv')
  if ('unreadable' in found) throw new Error(found.unreadable)
  return found
}

/** Recognises and reads. */
export function readAsFound(content: string | Uint8Array, piece?: number): Reading {
  const found = detect(content)
  const parser = createParser(found.format, found.version, found.options)
  const all = typeof content === 'string' ? bytes(content) : content
  const size = piece ?? Math.max(1, all.length)
  for (let at = 0; at < all.length; at += size) parser.push(all.subarray(at, at + size))
  return parser.finish()
}

export function tagsOf(reading: Reading) {
  if (reading.kind !== 'tags') throw new Error(`The reading is ${reading.kind}, not tags.`)
  const { record, summary } = reading
  return {
    times: [...record.times],
    channels: [...record.channels],
    declaredDurationPs: record.declaredDurationPs,
    summary,
  }
}
