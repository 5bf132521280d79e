import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { decodeColumns, decodeTable, encodeColumns, encodeTable } from '../../server/ingest/columns.ts'

const record = {
  times: BigInt64Array.of(-(2n ** 61n), -1n, 0n, 2n ** 61n),
  channels: Uint16Array.of(0, 1, 65_535, 2),
  declaredDurationPs: 2n ** 62n,
}

describe('stored tags', () => {
  it('have the bytes that their description says', () => {
    const bytes = Buffer.from(
      encodeColumns({
        times: BigInt64Array.of(-2n),
        channels: Uint16Array.of(258),
        declaredDurationPs: null,
      }),
    )
    const expected =
      '4853544147434f4c 01000000 00000000 0100000000000000 0000000000000000 feffffffffffffff 0201'
    expect(bytes.toString('hex')).toBe(expected.replaceAll(' ', ''))
  })

  it('come back the same, from bytes at any place in memory', () => {
    const bytes = encodeColumns(record)
    expect(decodeColumns(bytes)).toEqual(record)
    expect(decodeColumns(encodeColumns({ ...record, declaredDurationPs: null })).declaredDurationPs).toBe(
      null,
    )
    for (let shift = 1; shift < 9; shift++) {
      const moved = Buffer.alloc(bytes.length + shift)
      moved.set(bytes, shift)
      expect(decodeColumns(moved.subarray(shift))).toEqual(record)
    }
  })

  it('of no tags are stored too', () => {
    const empty = { times: new BigInt64Array(0), channels: new Uint16Array(0), declaredDurationPs: 5n }
    expect(decodeColumns(encodeColumns(empty))).toEqual(empty)
  })

  it('cut, extended, of another kind or version are refused', () => {
    const bytes = encodeColumns(record)
    const changed = (at: number) => Uint8Array.from(bytes, (byte, i) => (i === at ? byte ^ 1 : byte))
    expect(() => decodeColumns(bytes.subarray(0, -1))).toThrow('cut or damaged')
    expect(() => decodeColumns(new Uint8Array([...bytes, 0]))).toThrow('cut or damaged')
    expect(() => decodeColumns(bytes.subarray(0, 31))).toThrow('not stored columns')
    expect(() => decodeColumns(changed(0))).toThrow('not stored columns')
    expect(() => decodeColumns(changed(9))).toThrow('version 257')
    expect(() => decodeColumns(changed(16))).toThrow('cut or damaged')
    expect(() => decodeColumns(changed(23))).toThrow('cut or damaged')
    expect(() => decodeTable(bytes)).toThrow('not stored columns')
    expect(() => encodeColumns({ ...record, channels: new Uint16Array(1) })).toThrow('needs its channel')
  })
})

describe('stored tables', () => {
  it('come back the same', () => {
    const column = fc.tuple(
      fc.string(),
      fc.boolean(),
      fc.array(fc.double({ noNaN: true }), { minLength: 3, maxLength: 3 }),
    )
    fc.assert(
      fc.property(fc.array(column, { minLength: 1, maxLength: 5 }), (given) => {
        const table = {
          columns: given.map(([name]) => name),
          integer: given.map(([, integer]) => integer),
          rows: 3,
          values: given.map(([, , values]) => Float64Array.from(values)),
        }
        expect(decodeTable(Buffer.from(encodeTable(table)))).toEqual(table)
      }),
    )
  })

  it('damaged are refused', () => {
    const bytes = encodeTable({ columns: ['µ'], integer: [true], rows: 1, values: [Float64Array.of(1)] })
    expect(() => decodeTable(bytes.subarray(0, -8))).toThrow('cut or damaged')
    expect(() => decodeTable(bytes.map((byte, i) => (i === 24 ? 0x78 : byte)))).toThrow('names')
    expect(() =>
      encodeTable({ columns: ['a'], integer: [true], rows: 2, values: [Float64Array.of(1)] }),
    ).toThrow('as many values')
  })
})
