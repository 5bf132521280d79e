import { beforeAll, expect, inject, test } from 'vitest'
import { fetchRecord } from '../../src/features/signatures/signing.ts'
import { entryOf, newEntry, notebookOf, paragraph, signerOf, write, type Signer } from './signing-people.ts'

// Threat B14: signature, save, return at the same moment. Whatever comes first, state and signatures fit together.

let maren: Signer, farid: Signer
let notebook: string
beforeAll(async () => {
  ;[maren, farid] = await Promise.all([signerOf(inject('url'), 'maren'), signerOf(inject('url'), 'farid')])
  notebook = await notebookOf(maren.client, 'Races', { farid: 'supervisor' })
})

async function prepared(who: Signer, id: string, meaning: 'authorship' | 'witness-read') {
  const { bytes, sha256 } = await fetchRecord(id, meaning, undefined, who.calls)
  return () =>
    who.client.call('POST', `entries/${id}/signatures`, {
      meaning,
      recordSha256: sha256,
      signature: who.sign(bytes),
    })
}

test('50 signatures each against a save: one of the two wins, never both', async () => {
  const pairs = await Promise.all(
    Array.from({ length: 50 }, async (_, n) => {
      const id = await newEntry(maren.client, notebook, `Race ${n}`)
      await write(maren.client, id, paragraph(`Text ${n}`))
      return { id, give: await prepared(maren, id, 'authorship') }
    }),
  )
  const outcomes = await Promise.all(
    pairs.map(async ({ id, give }, n) => {
      const acts = [() => give(), () => write(maren.client, id, paragraph(`Changed ${n}`))]
      if (n % 2) acts.reverse()
      const answers = await Promise.all(acts.map((act) => act()))
      const [signed, saved] = n % 2 ? answers.reverse() : answers
      return { id, signed: signed?.status ?? 0, saved: saved?.status ?? 0 }
    }),
  )
  for (const { id, signed, saved } of outcomes) {
    expect([`${signed}/${saved}`]).toContain(signed === 201 ? '201/409' : '409/200')
    expect((await entryOf(maren.client, id)).state).toBe(signed === 201 ? 'submitted' : 'draft')
  }
  expect((await maren.client.ok<{ holds: boolean }>('POST', 'ledger/verifications', {})).holds).toBe(true)
})

test('a witness and a return at the same moment: sealed or returned, with signatures to match', async () => {
  for (let n = 0; n < 8; n++) {
    const id = await newEntry(maren.client, notebook, `Seal or return ${n}`)
    await write(maren.client, id, paragraph('Text'))
    await (
      await prepared(maren, id, 'authorship')
    )()
    const give = await prepared(farid, id, 'witness-read')
    const [witnessed, returned] = await Promise.all([
      give(),
      maren.client.call('POST', `entries/${id}/returns`, { reason: 'Recalled.' }),
    ])
    const entry = await entryOf(maren.client, id)
    const living = entry.signatures.filter(({ voided }) => !voided).length
    expect([witnessed.status, returned.status, entry.state, living]).toEqual(
      witnessed.status === 201 ? [201, 409, 'sealed', 2] : [409, 200, 'draft', 0],
    )
  }
})

test('the same signature handed in twice at once counts once', async () => {
  const id = await newEntry(maren.client, notebook, 'Twice')
  await write(maren.client, id, paragraph('Text'))
  const give = await prepared(maren, id, 'authorship')
  const statuses = (await Promise.all([give(), give(), give()])).map(({ status }) => status).sort()
  expect(statuses).toEqual([201, 409, 409])
  expect((await entryOf(maren.client, id)).signatures).toHaveLength(1)
})
