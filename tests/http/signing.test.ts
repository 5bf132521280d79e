import { beforeAll, expect, inject, test } from 'vitest'
import { parseCanonical } from '../../server/ledger-format/canonical-json.ts'
import type { SignedRecord } from '../../server/ledger-format/record.ts'
import { fetchRecord } from '../../src/features/signatures/signing.ts'
import {
  entryOf,
  newEntry,
  notebookOf,
  paragraph,
  sign,
  signerOf,
  write,
  type Signer,
} from './signing-people.ts'

// The life of an entry: rulings 13 to 17, states and phases; signed bytes: shapes 1.

let maren: Signer, teo: Signer, farid: Signer
let notebook: string
beforeAll(async () => {
  const url = inject('url')
  ;[maren, teo, farid] = await Promise.all([
    signerOf(url, 'maren'),
    signerOf(url, 'teo'),
    signerOf(url, 'farid'),
  ])
  notebook = await notebookOf(maren.client, 'Life of an entry', {
    teo: 'experimentalist',
    farid: 'supervisor',
    noor: 'auditor',
  })
})

const record = async (who: Signer, id: string, meaning: 'authorship' | 'witness-read') =>
  parseCanonical((await fetchRecord(id, meaning, undefined, who.calls)).bytes) as unknown as SignedRecord

test('two authors, a return, a second round, a seal; every signature given stays in the record', async () => {
  const id = await newEntry(maren.client, notebook, 'Two hands')
  await write(maren.client, id, paragraph('Begun by Maren.'))
  await write(teo.client, id, paragraph('Begun by Maren.'), paragraph('Continued by Teo.'))
  expect(await sign(farid, id, 'witness-read')).toMatchObject({ status: 409, code: 'wrong-state' })

  expect((await sign(maren, id, 'authorship')).status).toBe(201)
  expect(await entryOf(maren.client, id)).toMatchObject({ state: 'draft', phase: 'collecting' })
  expect((await write(teo.client, id, paragraph('Changed.'))).status).toBe(409)
  expect((await sign(maren, id, 'authorship')).status).toBe(403)
  expect((await sign(farid, id, 'witness-read')).status).toBe(409)
  expect((await sign(teo, id, 'authorship')).status).toBe(201)
  expect(await entryOf(maren.client, id)).toMatchObject({ state: 'submitted', phase: 'with-witness' })
  expect(await sign(maren, id, 'witness-read')).toMatchObject({ status: 403 })

  await farid.client.ok('POST', `entries/${id}/returns`, { reason: 'Name the filter.' })
  const returned = await entryOf(maren.client, id)
  expect(returned).toMatchObject({
    state: 'draft',
    phase: 'returned',
    returned: { reason: 'Name the filter.' },
    bodySha256: null,
  })
  expect(returned.signatures.map(({ voided }) => voided)).toEqual([true, true])

  await write(maren.client, id, paragraph('Begun by Maren, filter 0.3 nm.'))
  await sign(maren, id, 'authorship')
  await sign(teo, id, 'authorship')
  await farid.client.ok('GET', `entries/${id}/content`)
  const signed = await record(farid, id, 'witness-read')
  expect(signed.signing.opened).toMatchObject([{ kind: 'text', id }])
  expect(signed.signing.earlier).toHaveLength(2)
  expect(signed.history).toMatchObject({ returns: [{ reason: 'Name the filter.' }], voided: [{}, {}] })
  expect(signed.authors.map(({ revisions }) => revisions.length).sort()).toEqual([1, 2])
  expect((await sign(farid, id, 'witness-read')).status).toBe(201)
  const sealed = await entryOf(maren.client, id)
  expect(sealed).toMatchObject({ state: 'sealed', phase: 'sealed', bodySha256: signed.bodySha256 })
  expect(sealed.seal?.digest).toMatch(/^[0-9a-f]{64}$/)
  expect(sealed.signatures.filter(({ voided }) => !voided)).toHaveLength(3)

  for (const [method, path, body] of [
    ['PUT', 'content', { type: 'doc', content: [paragraph('late')] }],
    ['PATCH', '', { title: 'Another title' }],
    ['POST', 'returns', { reason: 'late' }],
    ['POST', 'withdrawals', { reason: 'late' }],
  ] as const) {
    const answer = await maren.client.call(method, `entries/${id}/${path}`.replace(/\/$/, ''), body, {
      'if-match': '*',
    })
    expect(answer.status, `${method} ${path}`).toBe(409)
  }
})

test('the same state gives the same bytes; a change in between makes them worthless', async () => {
  const id = await newEntry(maren.client, notebook, 'Same bytes')
  await write(maren.client, id, paragraph('One.'))
  const first = await fetchRecord(id, 'authorship', undefined, maren.calls)
  expect((await fetchRecord(id, 'authorship', undefined, maren.calls)).sha256).toBe(first.sha256)
  await write(maren.client, id, paragraph('Two.'))
  const body = { meaning: 'authorship', recordSha256: first.sha256, signature: maren.sign(first.bytes) }
  expect(await maren.client.call('POST', `entries/${id}/signatures`, body)).toMatchObject({
    status: 409,
    json: { code: 'record-changed' },
  })
  expect((await entryOf(maren.client, id)).state).toBe('draft')
})

test('a signature over other bytes, by another key, or for another person or meaning is refused', async () => {
  const id = await newEntry(maren.client, notebook, 'Wrong signatures')
  await write(maren.client, id, paragraph('Text.'))
  const { bytes, sha256 } = await fetchRecord(id, 'authorship', undefined, maren.calls)
  const give = (who: Signer, meaning: string, signature: string) =>
    who.client.call('POST', `entries/${id}/signatures`, { meaning, recordSha256: sha256, signature })
  expect((await give(maren, 'authorship', teo.sign(bytes))).status).toBe(422)
  expect((await give(maren, 'authorship', maren.sign(bytes.slice(1)))).status).toBe(422)
  expect((await give(teo, 'authorship', teo.sign(bytes))).status).toBe(403)
  expect((await give(maren, 'witness-read', maren.sign(bytes))).status).toBe(409)
  expect((await entryOf(maren.client, id)).signatures).toEqual([])
  expect((await give(maren, 'authorship', maren.sign(bytes))).status).toBe(201)
})

test('an empty entry, and one written long after the work, say what is in the way', async () => {
  const id = await newEntry(maren.client, notebook, 'Blocked')
  expect((await entryOf(maren.client, id)).blocks.map(({ code }) => code)).toEqual(['nothing-written'])
  await write(maren.client, id, paragraph('Written late.'))
  await maren.client.ok('PATCH', `entries/${id}`, {
    runAt: new Date(Date.now() - 5 * 86_400_000).toISOString(),
  })
  expect(await sign(maren, id, 'authorship')).toMatchObject({ status: 409, code: 'signing-blocked' })
  expect((await entryOf(maren.client, id)).blocks.map(({ code }) => code)).toEqual(['late-remark-missing'])
  await maren.client.ok('PATCH', `entries/${id}`, { lateRemark: 'The cryostat log was read later.' })
  expect((await sign(maren, id, 'authorship')).status).toBe(201)
})

test('a witness who was present names a run and times that overlap it', async () => {
  const id = await newEntry(maren.client, notebook, 'Present')
  const startedAt = new Date(Date.now() - 3_600_000).toISOString()
  const run = await maren.client.ok<{ id: string }>('POST', `entries/${id}/runs`, {
    startedAt,
    durationPs: 60_000_000_000_000,
  })
  await write(maren.client, id, paragraph('A run.'))
  await sign(maren, id, 'authorship')
  const at = (minutes: number) => new Date(Date.parse(startedAt) + minutes * 60_000).toISOString()
  const present = (from: number, to: number) =>
    sign(farid, id, 'witness-present', { runId: run.id, from: at(from), to: at(to) })
  expect(await present(5, 9)).toMatchObject({ status: 422 })
  expect((await present(-1, 9)).status).toBe(201)
  const [, witness] = (await entryOf(maren.client, id)).signatures
  expect(witness?.statement).toContain(at(-1))
})

test('whoever supplied something cannot witness; an author recalls; a draft is withdrawn and stays readable', async () => {
  const id = await newEntry(maren.client, notebook, 'Recalled')
  await write(maren.client, id, paragraph('Text.'))
  await farid.client.ok('POST', `entries/${id}/runs`, {})
  await sign(maren, id, 'authorship')
  expect((await sign(farid, id, 'witness-read')).status).toBe(403)
  await maren.client.ok('POST', `entries/${id}/returns`, { reason: 'A word is missing.' })
  await maren.client.ok('POST', `entries/${id}/withdrawals`, { reason: 'Begun in the wrong notebook.' })
  expect(await entryOf(farid.client, id)).toMatchObject({ state: 'withdrawn', phase: 'withdrawn' })
  expect((await write(maren.client, id, paragraph('more'))).status).toBe(409)
})

test('an addendum is an entry of its own; once sealed, the original points to it', async () => {
  const id = await newEntry(maren.client, notebook, 'Amended')
  await write(maren.client, id, paragraph('Text.'))
  expect((await maren.client.call('POST', `entries/${id}/addenda`, {})).status).toBe(409)
  await sign(maren, id, 'authorship')
  await sign(farid, id, 'witness-read')
  const addendum = await maren.client.ok<{ id: string }>('POST', `entries/${id}/addenda`, {})
  await write(maren.client, addendum.id, paragraph('A correction.'))
  const signed = await record(maren, addendum.id, 'authorship')
  expect(signed.entry.amends).toMatchObject({
    entryId: id,
    bodySha256: (await entryOf(maren.client, id)).bodySha256,
  })
  await sign(maren, addendum.id, 'authorship')
  expect((await sign(farid, addendum.id, 'witness-read')).status).toBe(201)
  expect((await entryOf(maren.client, id)).amendedBy).toMatchObject([{ entryId: addendum.id }])
})
