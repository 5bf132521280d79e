import { createHash } from 'node:crypto'
import { describe, expect, test } from 'vitest'
import { canonicalBytes } from '../../server/ledger-format/canonical-json.ts'
import { buildRecord, type SignedRecord } from '../../server/ledger-format/record.ts'
import { checkRecord, RecordMismatch, type Expected } from '../../src/features/signatures/record-check.ts'
import {
  authorRecord,
  body,
  certificate,
  content,
  entryOnScreen,
  hex,
  laboratory,
  maren,
  signingOf,
  statementOf,
  uuid,
} from './signing-fixture.ts'

const expected: Expected = {
  entry: entryOnScreen(),
  content,
  laboratory,
  meaning: 'authorship',
  signer: maren,
  key: { certificate, enrolmentSha256: hex('d') },
}
const record = authorRecord()

/** The record with some members changed and every digest in it made anew, as a server that means ill would. */
function forged(change: (record: SignedRecord) => void): Uint8Array {
  const copy = structuredClone(record.record)
  change(copy)
  copy.contentSha256 = createHash('sha256').update(canonicalBytes(copy.content)).digest('hex')
  const { bodySha256: _old, signing: part, ...rest } = copy
  const bodySha256 = createHash('sha256').update(canonicalBytes(rest)).digest('hex')
  return canonicalBytes({ ...rest, bodySha256, signing: part })
}

describe('bytes that say what the screen shows', () => {
  test('are taken, and what they say comes back', () => {
    expect(checkRecord(record.bytes, expected).bodySha256).toBe(body.bodySha256)
  })

  test('a forgery without a change is the record itself, so that the cases below change one thing each', () => {
    expect(forged(() => {})).toEqual(record.bytes)
  })
})

describe('bytes that say something else are refused with what differs', () => {
  const cases: [string, (copy: SignedRecord) => void, RegExp][] = [
    ['another laboratory', (copy) => (copy.laboratory.id = uuid(99)), /laboratory/],
    ['another entry', (copy) => (copy.entry.id = uuid(98)), /another entry/],
    ['another number', (copy) => (copy.entry.number = 'N-07/043'), /another entry/],
    ['another title', (copy) => (copy.entry.title = 'Purity of dot 31c'), /title/],
    ['an earlier revision', (copy) => (copy.entry.revision = 16), /revision 16/],
    [
      'another text',
      (copy) => (copy.content = { type: 'doc', content: [] }),
      /text on the screen|text in the bytes/,
    ],
    ['another file digest', (copy) => (copy.files[0]!.sha256 = hex('f')), /emitter\.csv/],
    ['a file less', (copy) => copy.files.pop(), /leave out a file/],
    ['another figure', (copy) => (copy.calculations[0]!.figures[0]!.value = '0.082'), /figures of C1/],
    ['another uncertainty', (copy) => (copy.calculations[0]!.figures[0]!.u = null), /figures of C1/],
    [
      'another meaning',
      (copy) => Object.assign(copy.signing, { meaning: 'witness-read', opened: [] }),
      /meaning/,
    ],
    ['another signer', (copy) => (copy.signing.signer.subjectId = uuid(2)), /signer/],
    ['another name', (copy) => (copy.signing.signer.name = 'Teo Laukkanen'), /signer/],
    ['another key', (copy) => (copy.signing.signer.enrolmentSha256 = hex('0')), /key/],
    ['another certificate', (copy) => (copy.signing.signer.certificateSha256 = hex('0')), /certificate/],
    [
      'another sentence',
      (copy) => (copy.signing.statement = 'I owe the bearer a thousand pounds.'),
      /sentence/,
    ],
  ]
  test.each(cases)('%s', (_, change, words) => {
    const check = () => checkRecord(forged(change), expected)
    expect(check).toThrow(RecordMismatch)
    expect(check).toThrow(words)
  })

  test('bytes that are not canonical', () => {
    const spaced = new TextEncoder().encode(JSON.stringify(record.record, null, 1))
    expect(() => checkRecord(spaced, expected)).toThrow(/no record/)
  })

  test('another form', () => {
    const other = canonicalBytes({ ...record.record, schema: 'halfsilver-head/1' })
    expect(() => checkRecord(other, expected)).toThrow(/no record/)
  })

  test('a wrong digest inside', () => {
    expect(() => checkRecord(canonicalBytes({ ...record.record, bodySha256: hex('0') }), expected)).toThrow(
      /digest/,
    )
  })

  test('a witness gets no other body than the author signed', () => {
    const opened = buildRecord(
      body,
      signingOf({ meaning: 'witness-read', opened: [], statement: statementOf('witness-read') }),
    )
    const witness: Expected = { ...expected, meaning: 'witness-read' }
    expect(
      checkRecord(opened.bytes, { ...witness, entry: { ...entryOnScreen(), bodySha256: body.bodySha256 } })
        .signing.opened,
    ).toEqual([])
    expect(() =>
      checkRecord(opened.bytes, { ...witness, entry: { ...entryOnScreen(), bodySha256: hex('0') } }),
    ).toThrow(/first signer/)
  })
})
