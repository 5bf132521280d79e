import { setTimeout as pause } from 'node:timers/promises'
import { beforeAll, expect, inject, test } from 'vitest'
import type { BundleExport } from '../../server/contract/exports.ts'
import type { Json } from '../../server/ledger-format/canonical-json.ts'
import { verifyBundle, type VerifyReport } from '../../server/ledger-format/verify/index.ts'
import { askJudge, judgeIsThere } from '../ledger/sample/judge.ts'
import { signIn, type PersonClient } from '../support/session.ts'
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

// Bundles: shapes 2. The product's own verification reads each; the judge beside the checkout does too where it is there.

let maren: Signer, farid: Signer, noor: PersonClient, bram: PersonClient
let notebook: string, sealed: string, draft: string
beforeAll(async () => {
  const url = inject('url')
  ;[maren, farid, noor, bram] = await Promise.all([
    signerOf(url, 'maren'),
    signerOf(url, 'farid'),
    signIn(url, 'noor'),
    signIn(url, 'bram'),
  ])
  notebook = await notebookOf(maren.client, 'To be exported', { farid: 'supervisor', noor: 'auditor' })
  sealed = await newEntry(maren.client, notebook, 'Sealed with a file')
  const form = new FormData()
  form.set('file', new Blob(['not tags but kept as it came\n']), 'Notiz μ.txt')
  await maren.client.ok('POST', `entries/${sealed}/files`, form)
  await written(sealed)
  await sign(maren, sealed, 'authorship')
  await maren.client.ok('POST', `entries/${sealed}/returns`, { reason: 'One more word.' })
  await written(sealed)
  await sealOf(sealed)
  draft = await newEntry(maren.client, notebook, 'Still a draft')
})

async function written(id: string): Promise<void> {
  await write(maren.client, id, paragraph('What was seen.'), {
    type: 'mathBlock',
    attrs: { latex: 'g^{(2)}(0) < \\tfrac{1}{2}' },
  })
  for (let i = 0; i < 100 && (await entryOf(maren.client, id)).blocks.length > 0; i++) await pause(100)
}

async function sealOf(id: string): Promise<void> {
  expect(await sign(maren, id, 'authorship')).toMatchObject({ status: 201 })
  expect(await sign(farid, id, 'witness-read')).toMatchObject({ status: 201 })
}

async function bundleOf(
  who: PersonClient,
  body: object,
): Promise<{ id: string; zip: Buffer; name: string | null }> {
  const started = await who.call<BundleExport>('POST', 'exports', body)
  expect(started.status, started.bytes.toString()).toBe(202)
  let state = started.json
  for (
    const end = Date.now() + 50_000;
    !['done', 'failed'].includes(state.status) && Date.now() < end;
    await pause(100)
  )
    state = await who.ok<BundleExport>('GET', `exports/${state.id}`)
  expect(state).toMatchObject({ status: 'done', error: null })
  const { bytes } = await who.call('GET', `exports/${state.id}/bundle`)
  expect(bytes.length).toBe(state.size)
  return { id: state.id, zip: bytes, name: state.name }
}

const source = (zip: Buffer) => ({
  size: zip.length,
  read: (offset: number, length: number) => new Uint8Array(zip.subarray(offset, offset + length)),
})
const failures = (report: VerifyReport) =>
  report.checks.filter(({ ok }) => ok !== true).map(({ name, path, detail }) => `${name}: ${path}: ${detail}`)

async function verified(zip: Buffer): Promise<VerifyReport> {
  const anchors = await noor.ok<Json>('GET', 'ledger/anchors')
  return verifyBundle(source(zip), { anchors })
}

test('a bundle asked for right after the seal holds, for us and for the judge; the same state gives the same bytes', async () => {
  const first = await bundleOf(noor, { entryIds: [sealed] })
  const report = await verified(first.zip)
  expect(failures(report)).toEqual([])
  expect(report).toMatchObject({ verdict: 'holds', anchors: 'matched' })
  expect((await bundleOf(maren.client, { entryIds: [sealed] })).zip.equals(first.zip)).toBe(true)
  if (judgeIsThere) {
    const anchors = Buffer.from(JSON.stringify(await noor.ok('GET', 'ledger/anchors')))
    const answer = askJudge(first.zip, { '--anchors': anchors })
    expect(answer.checks.filter(({ ok }) => ok !== true)).toEqual([])
    expect(answer.verdict).toBe('holds')
  }
})

test('a byte changed anywhere in it is found', async () => {
  const { zip } = await bundleOf(noor, { entryIds: [sealed] })
  for (const name of [
    'record.json',
    'record.sig',
    'entry.pdf',
    'VERIFY.md',
    'timestamp.tsr',
    'events.jsonl',
  ]) {
    const forged = Buffer.from(zip)
    const at = forged.indexOf(name) + name.length + 40
    forged[at] = (forged[at] ?? 0) ^ 1
    const report = await verified(forged)
    expect(report.verdict, name).toBe('broken')
    expect(
      failures(report).some((line) => line.includes(name)),
      name,
    ).toBe(true)
  }
})

test('without its raw files a bundle is incomplete, not broken', async () => {
  const { zip } = await bundleOf(noor, { entryIds: [sealed], withoutRaw: true })
  const report = await verified(zip)
  expect(report.verdict).toBe('incomplete')
  expect(failures(report).every((line) => line.startsWith('raw file'))).toBe(true)
})

test('a notebook is exported whole: every number is in or named as left out, and sealed addenda travel along', async () => {
  const addendum = await maren.client.ok<{ id: string }>('POST', `entries/${sealed}/addenda`, {})
  await write(maren.client, addendum.id, paragraph('A correction.'))
  await sealOf(addendum.id)
  const whole = await bundleOf(noor, { notebookId: notebook })
  const report = await verified(whole.zip)
  expect(failures(report)).toEqual([])
  expect(whole.name).toMatch(/-N-\d+-\d{4}-\d\d-\d\d$/)
  const [sealedNumber, draftNumber, addendumNumber] = await Promise.all(
    [sealed, draft, addendum.id].map(async (id) => (await entryOf(noor, id)).number),
  )
  expect(report.about.entries).toEqual([sealedNumber, addendumNumber])
  expect(whole.zip.toString('latin1')).toContain(`"number":"${draftNumber}","reason":"not-sealed"`)
  expect((await verified((await bundleOf(noor, { entryIds: [sealed] })).zip)).about.entries).toEqual([
    sealedNumber,
    addendumNumber,
  ])
  expect((await verified((await bundleOf(noor, { entryIds: [addendum.id] })).zip)).verdict).toBe('holds')
})

test('only sealed entries, only for members, and a bundle only for who made it', async () => {
  expect((await noor.call('POST', 'exports', { entryIds: [draft] })).status).toBe(409)
  expect((await bram.call('POST', 'exports', { entryIds: [sealed] })).status).toBe(404)
  expect((await bram.call('POST', 'exports', { notebookId: notebook })).status).toBe(404)
  const { id } = await bundleOf(noor, { entryIds: [sealed] })
  expect((await maren.client.call('GET', `exports/${id}/bundle`)).status).toBe(404)
  expect(
    (await noor.ok<{ items: { id: string }[] }>('GET', 'exports')).items.map((item) => item.id),
  ).toContain(id)
})

test('the right to export is asked again at the download', async () => {
  const { id } = await bundleOf(noor, { entryIds: [sealed] })
  const { items } = await noor.ok<{ items: { id: string; login: string }[] }>('GET', 'people')
  const noorId = items.find(({ login }) => login === 'noor')?.id
  expect((await maren.client.call('DELETE', `notebooks/${notebook}/members/${noorId}`)).status).toBe(204)
  try {
    expect((await noor.call('GET', `exports/${id}/bundle`)).status).toBe(404)
  } finally {
    await maren.client.ok('PUT', `notebooks/${notebook}/members/${noorId}`, { role: 'auditor' })
  }
})
