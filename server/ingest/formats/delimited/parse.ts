import { LineSplitter } from '../../line-splitter.ts'
import { headBytes, type Parser, type Reading } from '../../reading.ts'
import { notText, textStart } from '../../text.ts'
import { UnreadableFile, badRow, cutRow } from '../../unreadable-file.ts'
import { declaredDuration } from './comments.ts'
import { layoutOf, type Layout } from './layout.ts'
import type { DelimitedOptions } from './options.ts'
import { TableRows } from './table-rows.ts'
import { TagRows } from './tag-rows.ts'

const carriageReturn = 0x0d
const hash = 0x23
const percent = 0x25

/**
 * Reads delimited text: the layout from the first 64 KiB, however they come in pieces, then row by row.
 */
export class DelimitedParser implements Parser {
  private head: Uint8Array | null = new Uint8Array(0)
  private rows: TagRows | TableRows | null = null
  private headerPending = false
  private readonly lines = new LineSplitter((bytes, start, end) => this.line(bytes, start, end))

  constructor(private readonly options: DelimitedOptions) {}

  push(chunk: Uint8Array): void {
    if (this.head === null) return this.lines.push(chunk)
    const taken = Math.min(chunk.length, headBytes - this.head.length)
    const head = new Uint8Array(this.head.length + taken)
    head.set(this.head)
    head.set(chunk.subarray(0, taken), this.head.length)
    this.head = head
    if (head.length < headBytes) return
    this.begin(head, false)
    this.lines.push(chunk.subarray(taken))
  }

  finish(): Reading {
    if (this.head !== null) this.begin(this.head, true)
    const last = this.lines.end()
    if (last !== null) this.lastLine(last)
    return this.rows!.finish()
  }

  private begin(head: Uint8Array, isWhole: boolean): void {
    this.head = null
    if (head.length === 0) throw new UnreadableFile('The file is empty.')
    const why = notText(head)
    if (why !== null) throw new UnreadableFile(`${why} It cannot be read as delimited text.`)
    const layout = layoutOf(head, isWhole, this.options)
    if (layout === null) throw new UnreadableFile('The file holds no rows: it is blank or has comments only.')
    this.headerPending = layout.hasHeader
    this.rows = this.rowsOf(layout)
    this.lines.push(head.subarray(textStart(head)))
  }

  private rowsOf(layout: Layout): TagRows | TableRows {
    if (this.options.time === undefined) return new TableRows(layout)
    return new TagRows(layout, this.options, declaredDuration(layout.comments))
  }

  /** True for a line that holds a row; its end without a carriage return is told by `rowEnd`. */
  private isRow(bytes: Uint8Array, start: number, end: number): boolean {
    let at = start
    while (at < end && (bytes[at] === 0x20 || bytes[at] === 0x09)) at++
    if (at === end || bytes[at] === hash || bytes[at] === percent) return false
    if (!this.headerPending) return true
    this.headerPending = false
    return false
  }

  private line(bytes: Uint8Array, start: number, lineEnd: number): void {
    const end = lineEnd > start && bytes[lineEnd - 1] === carriageReturn ? lineEnd - 1 : lineEnd
    if (!this.isRow(bytes, start, end)) return
    const wrong = this.rows!.row(bytes, start, end)
    if (wrong !== null) throw badRow(this.lines.line, wrong, this.rows!.count)
  }

  /** The line at the end of the file without a line feed: whole, or cut. */
  private lastLine(bytes: Uint8Array): void {
    const end = bytes.at(-1) === carriageReturn ? bytes.length - 1 : bytes.length
    if (!this.isRow(bytes, 0, end)) return
    const wrong = this.rows!.row(bytes, 0, end)
    if (wrong !== null) throw cutRow(this.lines.line, wrong, this.rows!.count)
  }
}
