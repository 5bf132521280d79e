import { randomUUID } from 'node:crypto'
import { beforeAll, expect, inject, test } from 'vitest'
import type { SigningKey } from '../../server/contract/signatures.ts'
import { createKey, newKdf, wrapKey } from '../../src/features/signatures/signing.ts'
import { signMessage } from '../../server/ledger-format/ed25519.ts'
import { fromBase64, toBase64 } from '../../server/ledger-format/digest.ts'
import { signIn, type PersonClient } from '../support/session.ts'

// Enrolment and unlocking: shapes 5; five wrong proofs lock for 15 minutes: records.md, Signatures.

let noor: PersonClient, teo: PersonClient
beforeAll(async () => {
  ;[noor, teo] = await Promise.all([signIn(inject('url'), 'noor'), signIn(inject('url'), 'teo')])
})

const zeros = (size: number) => toBase64(new Uint8Array(size))

test('guesses sent at once are counted one after another: five are told wrong, the others find the lock', async () => {
  const proof = zeros(32)
  const answers = await Promise.all(
    Array.from({ length: 9 }, () =>
      noor.call<{ attemptsLeft?: number; until?: string }>('POST', 'me/signing-key/unlock', { proof }),
    ),
  )
  const wrong = answers.filter(({ status }) => status === 403)
  expect(wrong.map(({ json }) => json.attemptsLeft).sort()).toEqual([0, 1, 2, 3, 4])
  const locked = answers.filter(({ status }) => status === 423)
  expect(locked).toHaveLength(4)
  for (const { headers } of locked) expect(Number(headers.get('retry-after'))).toBeGreaterThan(800)
  expect(await noor.ok<SigningKey>('GET', 'me/signing-key')).toMatchObject({ status: 'locked' })
})

test('the lock is told by mail and in the ledger, on the person alone', async () => {
  const { person } = await noor.ok<{ person: { id: string } }>('GET', 'session')
  const { items } = await noor.ok<{ items: { action: string; subject: object }[] }>(
    'GET',
    `ledger?subject=${person.id}&limit=20`,
  )
  expect(items.filter(({ action }) => action === 'signing.refused').length).toBeGreaterThanOrEqual(5)
  expect(items).toContainEqual(
    expect.objectContaining({ action: 'signing.locked', subject: { kind: 'person', id: person.id } }),
  )
})

test('answers that hold key material are never stored on the way', async () => {
  expect((await teo.call('GET', 'me/signing-key')).headers.get('cache-control')).toBe('no-store')
  expect(
    (await teo.call('POST', 'me/signing-key/unlock', { proof: zeros(32) })).headers.get('cache-control'),
  ).toBe('no-store')
})

/** A whole enrolment of teo, with one thing changed. */
async function enrol(change: (body: Record<string, unknown>) => Record<string, unknown>) {
  const { seed, publicKey } = createKey()
  const prepared = await teo.ok<{ id: string; document: string }>('POST', 'me/signing-key/enrolments', {
    publicKey: toBase64(publicKey),
  })
  const wrapped = await wrapKey(seed, new Uint8Array(32))
  const signature = toBase64(signMessage(seed, fromBase64(prepared.document)))
  const body = { enrolmentId: prepared.id, signature, kdf: newKdf(), ...wrapped, proofSha256: '0'.repeat(64) }
  return teo.call<{ code?: string }>('PUT', 'me/signing-key', change(body))
}

test('a key is enrolled only with its own signature, a strong derivation and a prepared statement', async () => {
  const kdf = newKdf()
  const refused: [string, (body: Record<string, unknown>) => Record<string, unknown>][] = [
    ['a signature by another key', (body) => ({ ...body, signature: zeros(64) })],
    ['a weak derivation', (body) => ({ ...body, kdf: { ...kdf, n: 2 ** 16 } })],
    ['a derivation that is no power of two', (body) => ({ ...body, kdf: { ...kdf, n: 2 ** 17 + 1 } })],
    ['a short salt', (body) => ({ ...body, kdf: { ...kdf, salt: zeros(8) } })],
    ['a wrapped key of another size', (body) => ({ ...body, wrappedKey: zeros(48) })],
  ]
  for (const [what, change] of refused) expect((await enrol(change)).status, what).toBe(422)
  expect((await enrol((body) => ({ ...body, enrolmentId: randomUUID() }))).json.code).toBe('record-expired')
})

test('public keys of small order or another encoding are refused before anything is signed', async () => {
  // The neutral element and a point of order two (RFC 8032 encodings), and a y that is not below p.
  const bad = ['01' + '00'.repeat(31), 'ec' + 'ff'.repeat(30) + '7f', 'ee' + 'ff'.repeat(30) + '7f']
  for (const hex of bad) {
    const publicKey = Buffer.from(hex, 'hex').toString('base64')
    expect((await teo.call('POST', 'me/signing-key/enrolments', { publicKey })).status, hex).toBe(422)
  }
})

test('nobody endorses their own key, and an experimentalist endorses none', async () => {
  const { items } = await teo.ok<{ items: { id: string; login: string }[] }>('GET', 'people')
  const id = (login: string) => items.find((person) => person.login === login)?.id
  const body = { enrolmentSha256: '0'.repeat(64), identity: 'Seen.' }
  expect((await teo.call('POST', `people/${id('teo')}/endorsements`, body)).status).toBe(403)
  expect((await teo.call('POST', `people/${id('maren')}/endorsements`, body)).status).toBe(403)
})
