import { utf8ToBytes } from '@noble/hashes/utils.js'
import type { TableData } from './reading.ts'
import type { TagRecord } from './tag-record.ts'
import { decodeText } from './text.ts'

/*
 * Stored form of what was read, little-endian throughout.
 * Tags:  "HSTAGCOL", u32 version, u32 1 when a duration is declared, u64 count, i64 declared duration in ps,
 *        count times as i64 in ps, count channels as u16.
 * Table: "HSTABCOL", u32 version, u32 length of the names, u64 rows, names as JSON (padded to 8 bytes with blanks),
 *        each column as f64.
 */
const tagMagic = 'HSTAGCOL'
const tableMagic = 'HSTABCOL'
const version = 1
const tagHeader = 32
const tableHeader = 24

function writeStart(bytes: Uint8Array, magic: string): DataView {
  bytes.set(utf8ToBytes(magic))
  const view = new DataView(bytes.buffer)
  view.setUint32(8, version, true)
  return view
}

function checkStart(bytes: Uint8Array, magic: string, header: number): DataView {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  if (bytes.length < header || decodeText(bytes.subarray(0, 8)) !== magic) {
    throw new RangeError(`These bytes are not stored columns: they do not begin with ${magic}.`)
  }
  const found = view.getUint32(8, true)
  if (found !== version)
    throw new RangeError(`Stored columns of version ${found} cannot be read, only of version ${version}.`)
  return view
}

function checkLength(bytes: Uint8Array, expected: number): void {
  if (bytes.length === expected) return
  throw new RangeError(
    `The stored columns hold ${bytes.length} bytes instead of ${expected}: they are cut or damaged.`,
  )
}

const bytesOf = (array: BigInt64Array | Uint16Array | Float64Array) =>
  new Uint8Array(array.buffer, array.byteOffset, array.byteLength)

/** The stored form of a tag record. */
export function encodeColumns(record: TagRecord): Uint8Array {
  const { times, channels, declaredDurationPs } = record
  if (times.length !== channels.length) throw new RangeError('Every time of a tag record needs its channel.')
  const bytes = new Uint8Array(tagHeader + 10 * times.length)
  const view = writeStart(bytes, tagMagic)
  view.setUint32(12, declaredDurationPs === null ? 0 : 1, true)
  view.setBigUint64(16, BigInt(times.length), true)
  view.setBigInt64(24, declaredDurationPs ?? 0n, true)
  bytes.set(bytesOf(times), tagHeader)
  bytes.set(bytesOf(channels), tagHeader + times.byteLength)
  return bytes
}

/**
 * The tag record of its stored form; a view of the same memory where its alignment allows.
 * @throws RangeError when the bytes are of another kind or version, cut or damaged.
 */
export function decodeColumns(bytes: Uint8Array): TagRecord {
  const view = checkStart(bytes, tagMagic, tagHeader)
  const count = Number(view.getBigUint64(16, true))
  checkLength(bytes, tagHeader + 10 * count)
  const aligned = bytes.byteOffset % 8 === 0 ? bytes : new Uint8Array(bytes)
  const start = aligned.byteOffset + tagHeader
  return {
    times: new BigInt64Array(aligned.buffer, start, count),
    channels: new Uint16Array(aligned.buffer, start + 8 * count, count),
    declaredDurationPs: view.getUint32(12, true) === 0 ? null : view.getBigInt64(24, true),
  }
}

/** The stored form of a table or histogram. */
export function encodeTable(table: TableData): Uint8Array {
  const plain = JSON.stringify({ columns: table.columns, integer: table.integer })
  const names = utf8ToBytes(plain + ' '.repeat((8 - (utf8ToBytes(plain).length % 8)) % 8))
  const bytes = new Uint8Array(tableHeader + names.length + 8 * table.rows * table.columns.length)
  const view = writeStart(bytes, tableMagic)
  view.setUint32(12, names.length, true)
  view.setBigUint64(16, BigInt(table.rows), true)
  bytes.set(names, tableHeader)
  table.values.forEach((column, i) => {
    if (column.length !== table.rows)
      throw new RangeError('Every column of a table needs as many values as it has rows.')
    bytes.set(bytesOf(column), tableHeader + names.length + 8 * table.rows * i)
  })
  return bytes
}

/**
 * The table of its stored form.
 * @throws RangeError when the bytes are of another kind or version, cut or damaged.
 */
export function decodeTable(bytes: Uint8Array): TableData {
  const view = checkStart(bytes, tableMagic, tableHeader)
  const namesLength = view.getUint32(12, true)
  const rows = Number(view.getBigUint64(16, true))
  const start = tableHeader + namesLength
  const { columns, integer } = parseNames(bytes.subarray(tableHeader, start))
  checkLength(bytes, start + 8 * rows * columns.length)
  const values = columns.map((_, i) => {
    const column = new Uint8Array(bytes.subarray(start + 8 * rows * i, start + 8 * rows * (i + 1)))
    return new Float64Array(column.buffer)
  })
  return { columns, rows, values, integer }
}

function parseNames(bytes: Uint8Array): Pick<TableData, 'columns' | 'integer'> {
  try {
    return JSON.parse(decodeText(bytes)) as Pick<TableData, 'columns' | 'integer'>
  } catch {
    throw new RangeError('The names of the stored columns are damaged.')
  }
}
