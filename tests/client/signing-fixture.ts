import { createHash } from 'node:crypto'
import type { Entry } from '../../server/contract/entries.ts'
import { buildBody, buildRecord, type Signing } from '../../server/ledger-format/record.ts'
import { signingStatement } from '../../server/ledger-format/statements.ts'

/** A small entry as it stands on a screen, and the record that a server that means well prepares for it. */
export const uuid = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`
export const hex = (digit: string) => digit.repeat(64)
const time = '2026-11-12T15:20:00.000Z'

export const maren = { id: uuid(1), name: 'Maren Adeyemi' }
export const laboratory = { id: uuid(9), name: 'Ridgeway Photonics Laboratory' }
const certificateDer = Buffer.from('a certificate')
export const certificate = `-----BEGIN CERTIFICATE-----\n${certificateDer.toString('base64')}\n-----END CERTIFICATE-----\n`
const certificateSha256 = createHash('sha256').update(certificateDer).digest('hex')
export const content = {
  type: 'doc',
  content: [{ type: 'paragraph', attrs: { id: 'p1' }, content: [{ type: 'text', text: 'Dot 31b.' }] }],
}
const figures = [{ pointer: '/g2', label: 'g2(0)', value: '0.083', u: '0.011', unit: '1' }]
const file = { id: uuid(20), name: 'emitter.csv', size: 1200, sha256: hex('a') }

export const body = buildBody({
  laboratory: { ...laboratory, demo: true },
  notebook: { id: uuid(8), number: 'N-07', title: 'Nanobeam dots' },
  entry: {
    id: uuid(7),
    number: 'N-07/042',
    title: 'Purity of dot 31b',
    experiment: 'hbt',
    revision: 17,
    workDate: '2026-11-12',
    writtenFrom: time,
    writtenTo: time,
    lateRemark: null,
    important: false,
    witnessesRequired: 1,
    amends: null,
  },
  authors: [{ subjectId: maren.id, name: maren.name, revisions: [17], exception: null }],
  contributors: [],
  content,
  runs: [],
  files: [
    {
      ...file,
      size: '1200',
      runId: null,
      uploadedBy: maren.id,
      uploadedAt: time,
      via: 'browser',
      reading: null,
    },
  ],
  calculations: [
    {
      id: uuid(30),
      label: 'C1',
      kind: 'correlation',
      version: 1,
      engine: '1.0.0',
      parameters: {},
      inputs: [{ fileId: file.id, sha256: file.sha256, readingSha256: hex('b'), homeEntry: null }],
      resultSha256: hex('c'),
      finishedAt: time,
      figures,
      notes: [],
    },
  ],
  quotes: [],
  history: { returns: [], voided: [] },
})

export const statementOf = (meaning: Signing['meaning']) =>
  signingStatement(meaning, {
    laboratory: laboratory.name,
    number: 'N-07/042',
    revision: 17,
    title: 'Purity of dot 31b',
  })

export function signingOf(over: Partial<Signing> = {}): Signing {
  return {
    id: uuid(40),
    meaning: 'authorship',
    statement: statementOf('authorship'),
    signer: {
      subjectId: maren.id,
      name: maren.name,
      role: 'experimentalist',
      certificateSha256,
      enrolmentSha256: hex('d'),
    },
    time,
    zone: 'Europe/Berlin',
    presentFor: null,
    opened: null,
    release: '1.0.0',
    policyVersion: '1',
    ledger: { sequence: 4803, leafHash: hex('e') },
    earlier: [],
    ...over,
  }
}

export const authorRecord = () => buildRecord(body, signingOf())

export function entryOnScreen(): Entry {
  return {
    id: uuid(7),
    notebookId: uuid(8),
    number: 'N-07/042',
    title: 'Purity of dot 31b',
    experiment: 'hbt',
    state: 'draft',
    phase: 'writing',
    important: false,
    authors: [{ personId: maren.id, name: maren.name, signed: false }],
    createdAt: time,
    updatedAt: time,
    submittedAt: null,
    runAt: time,
    workDate: '2026-11-12',
    lateRemark: null,
    revision: 17,
    contentSha256: hex('0'),
    bodySha256: null,
    runs: [],
    files: [
      {
        ...file,
        entryId: uuid(7),
        runId: null,
        state: 'verified',
        uploadedBy: maren.id,
        uploadedByName: maren.name,
        uploadedAt: time,
        sameBytesAs: [],
        reading: noReading,
      },
    ],
    calculations: [{ id: uuid(30), label: 'C1', kind: 'correlation', status: 'done', stale: false, figures }],
    signatures: [],
    witnesses: { required: 1, given: 0 },
    returned: null,
    amends: null,
    amendedBy: [],
    seal: null,
    blocks: [],
    allowed: ['edit', 'sign:authorship'],
  }
}

const noReading: Entry['files'][number]['reading'] = {
  status: 'pending',
  format: null,
  version: null,
  options: null,
  kind: null,
  tags: null,
  durationPs: null,
  firstPs: null,
  lastPs: null,
  resolutionPs: null,
  outOfOrder: null,
  channels: null,
  detail: null,
}
