export type { TagRecord } from '../contract/tag-record.ts'

/** What a tag record holds at a glance. Times and durations in ps. */
export interface TagSummary {
  tags: number
  /** The declared acquisition time, else last tag - first tag over all channels. */
  durationPs: bigint
  firstPs: bigint
  lastPs: bigint
  /** Greatest common divisor of the steps between tags; 0 when all tags have one time. */
  resolutionPs: bigint
  /** Tags that came after a later one in the file (neighbours compared). */
  outOfOrder: number
  /** Largest step back between neighbours in the file; 0 for a file in order. */
  largestStepBackPs: bigint
  /** Counts of each channel that has any, by channel. */
  channels: { channel: number; counts: number }[]
}
