/**
 * A tag record as ingest hands it to the calculations: detection times in integer picoseconds, ascending (equal times
 * are allowed), each with its channel. `declaredDurationPs` is the acquisition time that the file or the run gives,
 * null where only the tags themselves say how long it took.
 */
export interface TagRecord {
  times: BigInt64Array
  channels: Uint16Array
  declaredDurationPs: bigint | null
}
