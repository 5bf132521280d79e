import { deflateSync } from 'node:zlib'
import { describe, expect, test } from 'vitest'
import { sha256Hex } from '../../server/ledger-format/digest.ts'
import { checkAttachments } from '../../server/ledger-format/verify/check-rendered.ts'

type Living = Parameters<typeof checkAttachments>[1]

/** A record whose packed form ends in this byte (found by trying). */
function recordEndingIn(byte: number): { record: Buffer; packed: Buffer } {
  for (let n = 0; n < 10_000; n++) {
    const record = Buffer.from(JSON.stringify({ schema: 'halfsilver-record/1', padding: 'a'.repeat(n) }))
    const packed = deflateSync(record)
    if (packed.at(-1) === byte) return { record, packed }
  }
  throw new Error(`no record packs to an end of ${byte}`)
}

function pdfWith(stream: Buffer): Buffer {
  const head = '%PDF-1.7\n1 0 obj\n<< /Type /EmbeddedFile /F (1-authorship-record.json) >>\nstream\n'
  return Buffer.concat([Buffer.from(head), stream, Buffer.from('\nendstream\nendobj\n')])
}

const living = (record: Buffer) =>
  [{ name: '1-authorship', recordSha256: sha256Hex(record) }] as unknown as Living

describe('attachments', () => {
  // The last byte of a packed stream is the end of its checksum and may be any, a line end too.
  test.each([0x0a, 0x0d, 0x41])('a packed record that ends in byte %i is found', (byte) => {
    const { record, packed } = recordEndingIn(byte)
    expect(() => checkAttachments(pdfWith(packed), living(record))).not.toThrow()
  })

  test.each(['{"a":1}', '{"a":1}\n', '{"a":1}\r', '{"a":1}\r\n'])(
    'a record lying plain (%j) is found',
    (text) => {
      const record = Buffer.from(text)
      expect(() => checkAttachments(pdfWith(record), living(record))).not.toThrow()
    },
  )

  test('another record is not', () => {
    const { packed } = recordEndingIn(0x41)
    expect(() => checkAttachments(pdfWith(packed), living(Buffer.from('{}')))).toThrow(/not attached/)
  })
})
