/** Where a file stops being readable, and what of it is usable. */
export interface Unreadable {
  /** Line of the file, from 1; null when no one line is to blame. */
  line: number | null
  found: string
  expected: string
  usable: string
}

/** A file that cannot be read as was asked; the message is a sentence for people. */
export class UnreadableFile extends Error {
  readonly line: number | null
  readonly found: string
  readonly expected: string
  readonly usable: string

  constructor(message: string, detail: Partial<Unreadable> = {}) {
    super(message)
    this.name = 'UnreadableFile'
    this.line = detail.line ?? null
    this.found = detail.found ?? ''
    this.expected = detail.expected ?? ''
    this.usable = detail.usable ?? ''
  }
}

/** A whole number with thin spaces in its thousands. */
export function grouped(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, '\u2009')
}

/** A piece of a file fit to be shown in a sentence: printable, at most 60 characters. */
export function shown(text: string): string {
  const printable = text.replace(/[\p{Cc}\p{Cs}\ufffe\uffff]/gu, '·')
  return printable.length > 60 ? `“${printable.slice(0, 60)}…”` : `“${printable}”`
}

const firstRows = (rows: number) =>
  rows === 0
    ? 'No row before it is readable.'
    : rows === 1
      ? 'The first row is readable.'
      : `The first ${grouped(rows)} rows are readable.`

/** What a row holds that does not fit, and what would. */
export interface Mismatch {
  found: string
  expected: string
}

/** A row that does not fit; `rows` is how many before it were read. */
export function badRow(line: number, { found, expected }: Mismatch, rows: number): UnreadableFile {
  const usable = firstRows(rows)
  const message = `Line ${grouped(line)} cannot be read: found ${shown(found)}, expected ${expected}. ${usable}`
  return new UnreadableFile(message, { line, found, expected, usable })
}

/** A last row without its end: the file was probably cut while it was written or copied. */
export function cutRow(line: number, { found, expected }: Mismatch, rows: number): UnreadableFile {
  const usable = firstRows(rows)
  const message =
    `The file ends in the middle of its last row: line ${grouped(line)} holds only ${shown(found)}, expected ${expected}. ` +
    `It was probably cut while it was written or copied. ${usable}`
  return new UnreadableFile(message, { line, found, expected, usable })
}
