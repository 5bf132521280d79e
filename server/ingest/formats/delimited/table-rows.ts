import type { Reading } from '../../reading.ts'
import { decodeText } from '../../text.ts'
import { UnreadableFile, type Mismatch } from '../../unreadable-file.ts'
import { decimalCommaOf, isNumber, numberForm, splitFields, type Layout } from './layout.ts'
import { isHistogram } from './roles.ts'

class GrowingColumn {
  integer = true
  private values = new Float64Array(1024)
  private length = 0

  push(value: number): void {
    if (this.length === this.values.length) {
      const larger = new Float64Array(2 * this.length)
      larger.set(this.values)
      this.values = larger
    }
    this.values[this.length++] = value
    this.integer &&= Number.isSafeInteger(value)
  }

  collect(): Float64Array {
    return this.values.slice(0, this.length)
  }
}

/** The number that a field is; null for other text and for what a double cannot hold. */
function numberOf(field: string, decimalComma: boolean): number | null {
  const text = decimalComma ? field.replace(',', '.') : field
  const value = numberForm.test(text) ? Number(text) : NaN
  return Number.isFinite(value) ? value : null
}

/**
 * Rows of named columns of numbers. Columns whose first cell is text (labels, dates) are left out; in the others every
 * cell must be a number.
 */
export class TableRows {
  private readonly expected: string
  count = 0
  private readonly chosen: { at: number; name: string; column: GrowingColumn }[]
  private readonly decimalComma: boolean

  constructor(private readonly layout: Layout) {
    const first = layout.rows[0] ?? []
    this.chosen = layout.names
      .map((name, at) => ({ at, name, column: new GrowingColumn() }))
      .filter(({ at }) => isNumber(first[at] ?? '', layout.delimiter))
    this.decimalComma = decimalCommaOf(layout.delimiter)
    this.expected = `${layout.names.length} columns separated by ${layout.delimiter === 'spaces' ? 'spaces' : `${layout.delimiter}s`}, with numbers in ${this.chosen.map(({ name }) => name).join(', ')}`
    const names = this.chosen.map(({ name }) => name)
    const twice = names.find((name, i) => names.indexOf(name) !== i)
    if (twice !== undefined)
      throw new UnreadableFile(
        `Two columns are named ${twice}: rename one, so that it can be told which is meant.`,
      )
  }

  /** Takes one row; returns what is wrong with it, or null. */
  row(bytes: Uint8Array, start: number, end: number): Mismatch | null {
    if (this.chosen.length === 0) return null
    const line = decodeText(bytes.subarray(start, end))
    const fields = splitFields(line, this.layout.delimiter)
    if (fields.length !== this.layout.names.length) return { found: line, expected: this.expected }
    const values = this.chosen.map(({ at }) => numberOf(fields[at]!, this.decimalComma))
    if (values.includes(null)) return { found: line, expected: this.expected }
    this.chosen.forEach(({ column }, i) => column.push(values[i]!))
    this.count += 1
    return null
  }

  finish(): Reading {
    if (this.chosen.length === 0) {
      return { kind: 'other', detail: 'No rows of numbers were found in the text. It is kept as it is.' }
    }
    const columns = this.chosen.map(({ name }) => name)
    return {
      kind: isHistogram(columns) ? 'histogram' : 'table',
      columns,
      rows: this.count,
      values: this.chosen.map(({ column }) => column.collect()),
      integer: this.chosen.map(({ column }) => column.integer),
    }
  }
}
