import { decodeText, textStart } from '../../text.ts'
import type { Delimiter } from './options.ts'

const delimiterCharacter = { comma: ',', semicolon: ';', tab: '\t' }
/** Where several would do, the rarer in numbers goes first: 1,5;2 and 1 , 2. */
const delimiterOrder: Delimiter[] = ['tab', 'semicolon', 'comma', 'spaces']

export const numberForm = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/

/** How a file is cut into columns. */
export interface Layout {
  delimiter: Delimiter
  /** Names by the header line, a comment line just before the rows, or col1, col2, ... */
  names: string[]
  /** The names stand in the file. */
  named: boolean
  /** The first line that is no comment is a header, not a row. */
  hasHeader: boolean
  comments: string[]
  /** First rows, cut into fields. */
  rows: string[][]
}

export const isComment = (line: string) => /^[ \t]*[#%]/.test(line)

export const decimalCommaOf = (delimiter: Delimiter) => delimiter === 'tab' || delimiter === 'semicolon'

/** True for the text of a number in a file with that delimiter. */
export function isNumber(field: string, delimiter: Delimiter): boolean {
  return numberForm.test(decimalCommaOf(delimiter) ? field.replace(',', '.') : field)
}

function splitQuoted(line: string, character: string): string[] {
  const fields = ['']
  let quoted = false
  for (const c of line) {
    if (c === '"') quoted = !quoted
    if (c === character && !quoted) fields.push('')
    else fields[fields.length - 1] += c
  }
  return fields
}

/** Fields of a line: blanks around them and quotes go. */
export function splitFields(line: string, delimiter: Delimiter): string[] {
  const fields =
    delimiter === 'spaces'
      ? line.trim().split(/[ \t]+/)
      : line.includes('"')
        ? splitQuoted(line, delimiterCharacter[delimiter])
        : line.split(delimiterCharacter[delimiter])
  return fields.map((field) =>
    field
      .trim()
      .replace(/^"(.*)"$/, '$1')
      .trim(),
  )
}

/** Lines of the beginning of a file that are not blank; one that may be cut is left out. */
function linesOf(head: Uint8Array, isWhole: boolean): string[] {
  const end = isWhole ? head.length : head.lastIndexOf(0x0a) + 1
  const text = decodeText(head.subarray(textStart(head), end))
  return text.split('\n').filter((line) => line.trim() !== '')
}

const looksLikeRow = (fields: string[], delimiter: Delimiter) =>
  fields.some((field) => isNumber(field, delimiter))

/** How well a delimiter fits: share of the lines, header included, with the number of columns of most rows, at least two. */
function fitOf(lines: string[], delimiter: Delimiter): number {
  const split = lines.map((line) => splitFields(line, delimiter))
  const usual = mostCommon(
    split.filter((fields) => looksLikeRow(fields, delimiter)).map((fields) => fields.length),
  )
  if (usual < 2) return 0
  return split.filter((fields) => fields.length === usual).length / lines.length
}

function mostCommon(values: number[]): number {
  const counts = new Map<number, number>()
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1)
  const [best = [0]] = [...counts].sort((a, b) => b[1] - a[1])
  return best[0]
}

function findDelimiter(lines: string[]): Delimiter {
  const fits = delimiterOrder.map((delimiter) => ({ delimiter, fit: fitOf(lines, delimiter) }))
  const best = Math.max(...fits.map(({ fit }) => fit))
  if (best > 0) return fits.find(({ fit }) => fit === best)!.delimiter
  // No rows to go by: what cuts the first line, which may be a header alone.
  return delimiterOrder.find((delimiter) => splitFields(lines[0]!, delimiter).length > 1) ?? 'spaces'
}

/** Fields of a header; between spaces a unit in brackets belongs to the name, and names may be of several words. */
function headerFields(line: string, delimiter: Delimiter, width: number): string[] {
  const fields = splitFields(line, delimiter)
  if (delimiter !== 'spaces' || fields.length === width) return fields
  const others = [splitFields(line.replace(/[ \t]+(?=[([])/g, ''), 'spaces'), line.trim().split(/\t+| {2,}/)]
  return others.find((names) => names.length === width) ?? fields
}

/** Names as they stand, an empty one as colN. */
const namesFrom = (fields: string[]) => fields.map((field, i) => (field === '' ? `col${i + 1}` : field))

function namesOf(
  header: string[] | null,
  lastComment: string | undefined,
  columns: number,
  delimiter: Delimiter,
) {
  if (header) return namesFrom(header)
  if (lastComment === undefined) return null
  const fields = headerFields(lastComment.replace(/^[ \t]*[#%]+/, ''), delimiter, columns)
  const isNames = fields.length === columns && !fields.some((field) => isNumber(field, delimiter))
  return isNames ? namesFrom(fields) : null
}

/**
 * Finds how the beginning of a delimited file is laid out: the first 64 KiB or the whole of a smaller file.
 * Null when it holds no line that is not a comment.
 */
export function layoutOf(
  head: Uint8Array,
  isWhole: boolean,
  chosen: { delimiter?: Delimiter | undefined; header?: boolean | undefined },
): Layout | null {
  const lines = linesOf(head, isWhole)
  const first = lines.findIndex((line) => !isComment(line))
  if (first < 0) return null
  const comments = lines.slice(0, first)
  const body = lines.slice(first, first + 200).filter((line) => !isComment(line))
  const delimiter = chosen.delimiter ?? findDelimiter(body)
  const split = body.map((line) => splitFields(line, delimiter))
  const hasHeader = chosen.header ?? !split[0]!.every((field) => field === '' || isNumber(field, delimiter))
  const rows = hasHeader ? split.slice(1) : split
  const width = mostCommon(rows.map((fields) => fields.length))
  const header = hasHeader ? headerFields(body[0]!, delimiter, width) : null
  const columns = header?.length ?? width
  const names = chosen.header === false ? null : namesOf(header, comments.at(-1), columns, delimiter)
  const numbered = Array.from({ length: columns }, (_, i) => `col${i + 1}`)
  return { delimiter, names: names ?? numbered, named: names !== null, hasHeader, comments, rows }
}
