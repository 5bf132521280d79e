import { parseDecimal, roundedProduct, type Decimal } from '../../decimal.ts'
import { GrowingTags } from '../../growing-tags.ts'
import type { Reading } from '../../reading.ts'
import { sortTags } from '../../sort-tags.ts'
import { summarise } from '../../summary.ts'
import { decodeText } from '../../text.ts'
import { grouped, UnreadableFile, type Mismatch } from '../../unreadable-file.ts'
import { decimalCommaOf, splitFields, type Layout } from './layout.ts'
import { unitOf, type DelimitedOptions, type Delimiter } from './options.ts'
import { TagNumberReader } from './tag-number.ts'

const space = 0x20
const tab = 0x09
const delimiterByte: Record<Delimiter, number> = { comma: 0x2c, semicolon: 0x3b, tab, spaces: space }
const largestTime = 2n ** 61n
const largestChannel = 65_535

/** Finds a column by its name. Throws UnreadableFile that lists the columns. */
function columnOf(layout: Layout, name: string): number {
  const at = layout.names.indexOf(name)
  if (at >= 0) return at
  throw new UnreadableFile(
    `There is no column ${name} in the file; its columns are ${layout.names.join(', ')}.`,
  )
}

/** Rows of a time and a channel: a fast way straight from the bytes, and an exact way for what that does not take. */
export class TagRows {
  private readonly expected: string
  private readonly tags = new GrowingTags()
  private readonly time: number
  private readonly channel: number
  private readonly unit: Decimal
  private readonly delimiter: number
  private readonly reader: TagNumberReader
  private channelRead = 0

  constructor(
    private readonly layout: Layout,
    options: DelimitedOptions,
    private readonly declaredDurationPs: bigint | null,
  ) {
    this.time = columnOf(layout, options.time!)
    this.channel = columnOf(layout, options.channel!)
    this.unit = unitOf(options)
    this.delimiter = delimiterByte[layout.delimiter]
    this.reader = new TagNumberReader(this.unit, decimalCommaOf(layout.delimiter) ? 0x2c : -1)
    const between = layout.delimiter === 'spaces' ? 'spaces' : `${layout.delimiter}s`
    this.expected = `${layout.names.length} columns separated by ${between}, with a time in ${options.unit} and a channel number`
  }

  get count(): number {
    return this.tags.length
  }

  /** Takes one row; returns what is wrong with it, or null. */
  row(bytes: Uint8Array, start: number, end: number): Mismatch | null {
    return this.fastRow(bytes, start, end) ? null : this.exactRow(decodeText(bytes.subarray(start, end)))
  }

  /** Takes a row of plain numbers; false, and nothing taken, for any other. */
  private fastRow(bytes: Uint8Array, start: number, end: number): boolean {
    const { delimiter } = this
    const last = this.layout.names.length - 1
    let at = this.skipBlanks(bytes, start, end)
    for (let column = 0; column <= last; column++) {
      if (column === this.time) at = this.reader.read(bytes, at, end)
      else if (column === this.channel) at = this.readChannel(bytes, at, end)
      else while (at < end && bytes[at] !== delimiter && bytes[at] !== tab) at++
      if (at < 0) return false
      const fieldEnd = at
      at = this.skipBlanks(bytes, at, end)
      if (column === last) break
      if (delimiter === space ? at === fieldEnd || at === end : bytes[at] !== delimiter) return false
      if (delimiter !== space) at = this.skipBlanks(bytes, at + 1, end)
    }
    if (at !== end) return false
    this.tags.push(this.reader.high, this.reader.low, this.channelRead)
    return true
  }

  /** Reads digits into `channelRead`. Returns where they end, or -1 when they must be read the exact way. */
  private readChannel(bytes: Uint8Array, start: number, end: number): number {
    let channel = 0
    let at = start
    for (; at < end && at - start < 6; at++) {
      const digit = bytes[at]! - 0x30
      if (digit < 0 || digit > 9) break
      channel = channel * 10 + digit
    }
    this.channelRead = channel
    return at === start || channel > largestChannel ? -1 : at
  }

  private skipBlanks(bytes: Uint8Array, start: number, end: number): number {
    let at = start
    while (at < end && (bytes[at] === space || (bytes[at] === tab && this.delimiter !== tab))) at++
    return at
  }

  private exactRow(line: string): Mismatch | null {
    const misfit = { found: line, expected: this.expected }
    const fields = splitFields(line, this.layout.delimiter)
    if (fields.length !== this.layout.names.length) return misfit
    const [timeText, channelText] = [fields[this.time]!, fields[this.channel]!]
    const decimal = parseDecimal(timeText, decimalCommaOf(this.layout.delimiter))
    if (!decimal || !/^\+?\d+(\.0*)?$/.test(channelText)) return misfit
    const channel = Number(channelText)
    if (channel > largestChannel)
      return { found: channelText, expected: `a channel of at most ${grouped(largestChannel)}` }
    const time = roundedProduct(decimal, this.unit)
    if (time > largestTime || time < -largestTime) {
      return { found: timeText, expected: 'a time within 2^61 ps (26.7 days) of zero' }
    }
    this.tags.push(Number(time >> 32n), Number(time & 0xffff_ffffn), channel)
    return null
  }

  finish(): Reading {
    if (this.tags.length === 0)
      throw new UnreadableFile('The file holds no tags: there is no row below its header.')
    const { times, channels, ...disorder } = this.tags.collect()
    const sorted = disorder.outOfOrder > 0 ? sortTags({ times, channels }) : { times, channels }
    const record = { ...sorted, declaredDurationPs: this.declaredDurationPs }
    return { kind: 'tags', record, summary: summarise(record, disorder) }
  }
}
