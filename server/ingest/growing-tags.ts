import type { TagRecord } from './tag-record.ts'

const firstBlockRows = 1 << 10
const largestBlockRows = 1 << 18

/** How far a file was from ascending order. */
export interface Disorder {
  outOfOrder: number
  largestStepBackPs: bigint
}

/**
 * Collects tags in file order, in blocks, so that growing copies nothing. A time comes as two halves of its 64-bit two's
 * complement (high signed, low unsigned), which spares a BigInt a tag; typed arrays are little-endian on every machine
 * that Node 20 is built for but s390x, which is not supported.
 */
export class GrowingTags {
  length = 0
  private readonly disorder: Disorder = { outOfOrder: 0, largestStepBackPs: 0n }
  private readonly blocks: { halves: Int32Array; channels: Uint16Array }[] = []
  private halves = new Int32Array(0)
  private channels = new Uint16Array(0)
  private used = 0
  private lastHigh = -0x8000_0000
  private lastLow = 0

  push(high: number, low: number, channel: number): void {
    if (this.used === this.channels.length) this.addBlock()
    const at = this.used++
    this.halves[2 * at] = low
    this.halves[2 * at + 1] = high
    this.channels[at] = channel
    this.length += 1
    if (high < this.lastHigh || (high === this.lastHigh && low < this.lastLow)) this.noteStepBack(high, low)
    this.lastHigh = high
    this.lastLow = low
  }

  private addBlock(): void {
    const rows = Math.min(largestBlockRows, Math.max(firstBlockRows, 4 * this.channels.length))
    this.halves = new Int32Array(2 * rows)
    this.channels = new Uint16Array(rows)
    this.blocks.push({ halves: this.halves, channels: this.channels })
    this.used = 0
  }

  private noteStepBack(high: number, low: number): void {
    const step = (BigInt(this.lastHigh - high) << 32n) + BigInt(this.lastLow - low)
    this.disorder.outOfOrder += 1
    if (step > this.disorder.largestStepBackPs) this.disorder.largestStepBackPs = step
  }

  /** The tags in file order. */
  collect(): Pick<TagRecord, 'times' | 'channels'> & Disorder {
    const halves = new Int32Array(2 * this.length)
    const channels = new Uint16Array(this.length)
    let at = 0
    for (const block of this.blocks) {
      const rows = Math.min(block.channels.length, this.length - at)
      halves.set(block.halves.subarray(0, 2 * rows), 2 * at)
      channels.set(block.channels.subarray(0, rows), at)
      at += rows
    }
    return { times: new BigInt64Array(halves.buffer), channels, ...this.disorder }
  }
}
