import type { TagRecord, TagSummary } from './tag-record.ts'

/** Named columns of numbers, all of `rows` values. */
export interface TableData {
  columns: string[]
  rows: number
  values: Float64Array[]
  /** Which columns hold whole numbers below 2^53 only. */
  integer: boolean[]
}

/** What the bytes of a file are. */
export type Reading =
  | { kind: 'tags'; record: TagRecord; summary: TagSummary }
  | ({ kind: 'table' | 'histogram' } & TableData)
  | { kind: 'other'; detail: string }

/**
 * Takes a file in pieces of any size, in order. Both calls throw UnreadableFile; what is read does not depend on how
 * the bytes were cut into pieces.
 */
export interface Parser {
  push(chunk: Uint8Array): void
  finish(): Reading
}

/** How to read a file, as found from its beginning. */
export interface DetectedReading {
  format: string
  version: number
  options: Record<string, unknown>
  /** False when something was guessed that the file does not say. */
  confident: boolean
  /** What was guessed, as sentences for people; null when nothing was. */
  doubt: string | null
}

/** How much of the beginning of a file the recognition looks at, in bytes. */
export const headBytes = 65_536
