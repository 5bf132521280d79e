import { describe, expect, it } from 'vitest'
import {
  buildBody,
  buildRecord,
  describeBody,
  overlaps,
  sha256Hex,
  signingStatement,
  utf8Text,
  type RecordBody,
  type Signing,
} from '../../server/ledger-format/index.ts'
import { parseJson } from '../../server/ledger-format/canonical-json.ts'

const id = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`
const time = (second: number) => `2026-03-02T09:00:${String(second).padStart(2, '0')}.000Z`
const digest = (n: number) => String(n).padStart(64, '0')

const quote = (nodeId: string) => ({
  type: 'quotedResult',
  attrs: { id: nodeId, calculationId: id(21), pointer: '/g2' },
})

/** Parts in the worst order: every list backwards. */
function parts(change: Partial<RecordBody> = {}): Omit<RecordBody, 'schema' | 'contentSha256'> {
  const run = (n: number, number: string): RecordBody['runs'][number] => ({
    id: id(n),
    number,
    experiment: 'hbt',
    startedAt: time(0),
    durationPs: '10000000000000',
    conditions: [
      { name: 'temperature', value: '4.20', u: null, unit: 'K' },
      { name: 'power', value: '1e-6', u: '1e-7', unit: 'W' },
    ],
    apparatus: [],
    cautions: [
      { code: 'laser', acknowledgedBy: id(1), time: time(2) },
      { code: 'cryogen', acknowledgedBy: id(1), time: time(2) },
      { code: 'laser', acknowledgedBy: id(1), time: time(1) },
    ],
  })
  const file = (n: number, second: number): RecordBody['files'][number] => ({
    id: id(n),
    runId: null,
    name: `${n}.csv`,
    size: '1',
    sha256: digest(n),
    uploadedBy: id(1),
    uploadedAt: time(second),
    via: 'browser',
    reading: null,
  })
  const calculation = (n: number, label: string): RecordBody['calculations'][number] => ({
    id: id(n),
    label,
    kind: 'plan',
    version: 1,
    engine: '1.0.0',
    parameters: {},
    inputs: [],
    resultSha256: digest(n),
    finishedAt: time(1),
    figures: [],
    notes: [],
  })
  return {
    laboratory: { id: id(100), name: 'Ridgeway Photonics Laboratory', demo: true },
    notebook: { id: id(101), number: 'N-07', title: 'Pairs' },
    entry: {
      id: id(102),
      number: 'N-07/042',
      title: 'Pairs',
      experiment: 'hbt',
      revision: 10,
      workDate: '2026-03-02',
      writtenFrom: time(0),
      writtenTo: time(9),
      lateRemark: null,
      important: false,
      witnessesRequired: 1,
      amends: null,
    },
    authors: [
      { subjectId: id(2), name: 'Teo Laukkanen', revisions: [10, 2], exception: null },
      { subjectId: id(1), name: 'Maren Adeyemi', revisions: [9, 1], exception: null },
    ],
    contributors: [
      { subjectId: id(1), name: 'Maren Adeyemi', acts: ['calculation', 'reading', 'file', 'run'] },
    ],
    content: { type: 'doc', content: [{ type: 'paragraph', content: [quote('q9'), quote('q1')] }] },
    runs: [run(11, 'R-0100'), run(12, 'R-0020'), run(13, 'R-0003')],
    files: [file(33, 5), file(32, 4), file(31, 4)],
    calculations: [calculation(22, 'C10'), calculation(21, 'C2')],
    quotes: ['q1', 'q9'].map((nodeId) => ({
      nodeId,
      calculationId: id(21),
      pointer: '/g2',
      shown: '20.00 ± 0.54',
    })),
    history: {
      returns: [
        { bySubjectId: id(4), reason: 'b', time: time(3) },
        { bySubjectId: id(3), reason: 'a', time: time(3) },
      ],
      voided: [
        { recordSha256: digest(2), signatureSha256: digest(2), time: time(3) },
        { recordSha256: digest(1), signatureSha256: digest(1), time: time(3) },
      ],
    },
    ...change,
  }
}

function signing(change: Partial<Signing> = {}): Signing {
  return {
    id: id(200),
    meaning: 'authorship',
    statement: 'I wrote it.',
    signer: {
      subjectId: id(1),
      name: 'Maren Adeyemi',
      role: 'experimentalist',
      certificateSha256: digest(5),
      enrolmentSha256: digest(6),
    },
    time: time(20),
    zone: 'Europe/Berlin',
    presentFor: null,
    opened: null,
    release: '1.0.0',
    policyVersion: '1',
    ledger: { sequence: 9, leafHash: digest(7) },
    earlier: [],
    ...change,
  }
}

describe('the body of a record', () => {
  // shapes.md 1, "Order", one expectation a rule.
  it('puts every list in its order', () => {
    const { body } = buildBody(parts())
    expect(body.authors.map((author) => author.revisions)).toEqual([
      [1, 9],
      [2, 10],
    ])
    expect(body.contributors[0]?.acts).toEqual(['run', 'file', 'reading', 'calculation'])
    expect(body.runs.map((run) => run.number)).toEqual(['R-0003', 'R-0020', 'R-0100'])
    expect(body.runs[0]?.cautions.map(({ time: at, code }) => `${at.slice(17, 19)} ${code}`)).toEqual([
      '01 laser',
      '02 cryogen',
      '02 laser',
    ])
    expect(body.runs[0]?.conditions.map((condition) => condition.name)).toEqual(['temperature', 'power'])
    expect(body.files.map((file) => file.name)).toEqual(['31.csv', '32.csv', '33.csv'])
    expect(body.calculations.map((calculation) => calculation.label)).toEqual(['C2', 'C10'])
    expect(body.quotes.map((quoted) => quoted.nodeId)).toEqual(['q9', 'q1'])
    expect(body.history.returns.map((item) => item.reason)).toEqual(['a', 'b'])
    expect(body.history.voided.map((item) => item.recordSha256)).toEqual([digest(1), digest(2)])
  })

  it('gives the same bytes whatever the order it is given in, and its digest', () => {
    const one = buildBody(parts())
    const given = parts()
    const other = buildBody({
      ...given,
      files: [...given.files].reverse(),
      authors: [...given.authors].reverse(),
    })
    expect(utf8Text(other.bytes)).toBe(utf8Text(one.bytes))
    expect(one.bodySha256).toBe(sha256Hex(one.bytes))
    expect(describeBody(one.bytes)).toEqual(one)
  })

  it.each([
    ['an unknown member', { note: 'x' }],
    ['a list that is null', { quotes: null }],
    ['an integer beyond 2^53', { content: { type: 'doc', size: 2 ** 53 } }],
    ['a number where text is due', { entry: { ...parts().entry, workDate: 20260302 } }],
    ['empty text instead of null', { entry: { ...parts().entry, lateRemark: '' } }],
    ['a day that does not exist', { entry: { ...parts().entry, writtenFrom: '2026-02-30T10:00:00.000Z' } }],
    ['a time without milliseconds', { entry: { ...parts().entry, writtenFrom: '2026-02-03T10:00:00Z' } }],
    ['an upper-case id', { notebook: { ...parts().notebook, id: 'ABCDEF00-0000-4000-8000-000000000000' } }],
  ])('refuses %s', (_, change) => {
    expect(() => buildBody({ ...parts(), ...(change as object) })).toThrow()
  })

  it('refuses a quote that the content does not hold', () => {
    const quotes = [{ nodeId: 'q7', calculationId: id(21), pointer: '/g2', shown: '1' }]
    expect(() => buildBody(parts({ quotes }))).toThrow('q7 is not in the content')
  })
})

describe('a record', () => {
  const body = buildBody(parts())

  it('is the body, its digest and who signs', () => {
    const { bytes, record, recordSha256 } = buildRecord(body, signing())
    expect(recordSha256).toBe(sha256Hex(bytes))
    expect(record.bodySha256).toBe(body.bodySha256)
    expect(parseJson(bytes)).toMatchObject({
      schema: 'halfsilver-record/1',
      signing: { meaning: 'authorship' },
    })
  })

  const witness = { meaning: 'witness-present', opened: [] } as const
  it.each([
    ['opened for an author', { opened: [] }],
    ['opened null for a witness', { meaning: 'witness-read', opened: null }],
    [
      'presence for a reader',
      { meaning: 'witness-read', opened: [], presentFor: { runId: id(11), from: time(0), to: time(1) } },
    ],
    ['presence at no run', { ...witness, presentFor: null }],
    ['presence at an unknown run', { ...witness, presentFor: { runId: id(99), from: time(0), to: time(1) } }],
    ['presence after the run', { ...witness, presentFor: { runId: id(11), from: time(11), to: time(12) } }],
    ['presence backwards', { ...witness, presentFor: { runId: id(11), from: time(5), to: time(1) } }],
  ] as [string, Partial<Signing>][])('refuses %s', (_, change) => {
    expect(() => buildRecord(body, signing(change))).toThrow()
  })

  // A run of 10 s from 09:00:00.
  it.each([
    [time(10), time(11), true],
    ['2026-03-02T09:00:10.001Z', time(11), false],
    ['2026-03-02T08:00:00.000Z', time(0), true],
    ['2026-03-02T08:00:00.000Z', '2026-03-02T08:59:59.999Z', false],
  ])('presence from %s to %s overlaps: %s', (from, to, expected) => {
    expect(overlaps({ from, to }, { startedAt: time(0), durationPs: '10000000000000' })).toBe(expected)
  })
})

describe('statements', () => {
  const entry = {
    laboratory: 'Ridgeway Photonics Laboratory',
    number: 'N-07/042',
    revision: 17,
    title: 'Pairs',
  }
  it.each(['authorship', 'witness-read', 'witness-present'] as const)(
    'of %s name laboratory, entry and revision',
    (meaning) => {
      const text = signingStatement(meaning, entry, { run: 'R-0612', from: time(0), to: time(9) })
      for (const part of ['Ridgeway Photonics Laboratory', 'N-07/042', 'revision 17'])
        expect(text).toContain(part)
    },
  )

  it('of presence name the run and the times, and cannot do without', () => {
    expect(
      signingStatement('witness-present', entry, { run: 'R-0612', from: time(0), to: time(9) }),
    ).toContain('R-0612')
    expect(() => signingStatement('witness-present', entry)).toThrow()
  })
})
