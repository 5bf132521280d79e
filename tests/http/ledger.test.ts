import pg from 'pg'
import { afterAll, beforeAll, expect, inject, test } from 'vitest'
import type { LedgerEventView } from '../../server/contract/ledger.ts'
import { fromHex, sha256Hex } from '../../server/ledger-format/digest.ts'
import { verifySignature } from '../../server/ledger-format/ed25519.ts'
import { buildEvent } from '../../server/ledger-format/event.ts'
import { headBytes, type Head } from '../../server/ledger-format/head.ts'
import { verifyConsistency, verifyInclusion } from '../../server/ledger-format/merkle.ts'
import { signIn, type PersonClient } from '../support/session.ts'

// Ledger and heads: shapes 3 and 4; proofs: RFC 9162 sections 2.1.3 and 2.1.4; what the database refuses: rulings 16, 28, B2.

let noor: PersonClient, maren: PersonClient, teo: PersonClient
let app: pg.Client, owner: pg.Client, worker: pg.Client
beforeAll(async () => {
  const environment = inject('environment')
  const url = inject('url')
  ;[noor, maren, teo] = await Promise.all([signIn(url, 'noor'), signIn(url, 'maren'), signIn(url, 'teo')])
  const connect = async (url: string | undefined) => {
    const client = new pg.Client({ connectionString: url })
    await client.connect()
    return client
  }
  app = await connect(environment.DATABASE_URL)
  owner = await connect(environment.DATABASE_OWNER_URL)
  worker = await connect(environment.DATABASE_WORKER_URL)
})
afterAll(() => Promise.all([app.end(), owner.end(), worker.end()]))

type Page = {
  items: (LedgerEventView & { actorName: string | null; subjectName: string | null })[]
  nextCursor: string | null
}
const page = (who: PersonClient, query = '') => who.ok<Page>('GET', `ledger${query}`)
const newestHead = () =>
  noor.ok<{ head: Head; signature: string; timeStamp: string | null }>('GET', 'ledger/head')
const codeOf = (work: Promise<unknown>) =>
  work.then(
    () => 'done',
    (error: { code?: string }) => error.code,
  )

test('an auditor pages through every event; others see those of their notebooks and of themselves', async () => {
  const first = await page(noor, '?limit=3')
  const next = await page(noor, `?limit=3&cursor=${first.nextCursor}`)
  expect([...first.items, ...next.items].map(({ sequence }) => sequence)).toEqual(
    Array.from({ length: 6 }, (_, n) => (first.items[0]?.sequence ?? 0) - n),
  )
  const notebook = await maren.ok<{ id: string }>('POST', 'notebooks', { title: 'Seen by members' })
  expect((await page(maren, `?subject=${notebook.id}`)).items).toMatchObject([
    { action: 'notebook.created', actorName: 'Maren Adeyemi' },
  ])
  expect((await page(teo, `?subject=${notebook.id}`)).items).toEqual([])
  const { person } = await noor.ok<{ person: { id: string } }>('GET', 'session')
  expect((await page(maren, `?subject=${person.id}`)).items).toEqual([])
})

test('the newest head is signed by the ledger key of the anchors and continues the one before', async () => {
  const { head, signature } = await newestHead()
  const anchors = await noor.ok<{ ledgerKeysSha256: string[] }>('GET', 'ledger/anchors')
  const { rows } = await owner.query<{ public_key: Buffer }>(
    'select public_key from record.ledger_keys where sha256 = $1',
    [head.keySha256],
  )
  expect(anchors.ledgerKeysSha256).toContain(head.keySha256)
  expect(
    verifySignature(
      rows[0]?.public_key ?? Buffer.alloc(32),
      headBytes(head),
      Buffer.from(signature, 'base64'),
    ),
  ).toBe(true)
  const before = head.previous
  expect(before).not.toBeNull()
  const { path } = await noor.ok<{ path: string[] }>(
    'GET',
    `ledger/consistency?from=${before?.treeSize}&to=${head.treeSize}`,
  )
  expect(
    verifyConsistency(
      before?.treeSize ?? 0,
      fromHex(before?.rootHash ?? ''),
      head.treeSize,
      fromHex(head.rootHash),
      path.map(fromHex),
    ),
  ).toBe(true)
})

test('every event up to the head has an inclusion proof that leads to it', async () => {
  const { head } = await newestHead()
  for (const sequence of [1, 2, Math.floor(head.treeSize / 2), head.treeSize]) {
    const proof = await noor.ok<{ leafHash: string; rootHash: string; path: string[] }>(
      'GET',
      `ledger/${sequence}/proof?treeSize=${head.treeSize}`,
    )
    expect(proof.rootHash).toBe(head.rootHash)
    expect(
      verifyInclusion(
        fromHex(proof.leafHash),
        sequence - 1,
        head.treeSize,
        proof.path.map(fromHex),
        fromHex(head.rootHash),
      ),
    ).toBe(true)
  }
  expect((await noor.call('GET', 'ledger/999999999/proof')).status).toBe(404)
})

test('a head from a mail matches; one that is larger, changed or of another root differs', async () => {
  const given = await newestHead()
  const compare = async (head: unknown) =>
    (await noor.ok<{ holds: boolean; head: string }>('POST', 'ledger/verifications', { head })).head
  expect(await compare(given)).toBe('matches')
  expect(await compare({ ...given, head: { ...given.head, rootHash: '0'.repeat(64) } })).toBe('differs')
  expect(await compare({ ...given, head: { ...given.head, treeSize: given.head.treeSize + 1 } })).toBe(
    'differs',
  )
})

test('a row changed by the owner of the database is named by the verification', async () => {
  const { rows } = await owner.query<{ canonical: Buffer }>(
    'select canonical from record.events where sequence = 3',
  )
  const own = rows[0]?.canonical ?? Buffer.alloc(0)
  const forged = Buffer.from(own.toString().replace(/"time":"\d/, '"time":"3'))
  const put = async (canonical: Buffer) => {
    await owner.query('alter table record.events disable trigger refuse_row')
    await owner.query('update record.events set canonical = $1 where sequence = 3', [canonical])
    await owner.query('alter table record.events enable trigger refuse_row')
  }
  await put(forged)
  try {
    const { holds, firstBroken } = await noor.ok<{ holds: boolean; firstBroken: { sequence: number } }>(
      'POST',
      'ledger/verifications',
      {},
    )
    expect([holds, firstBroken.sequence]).toEqual([false, 3])
  } finally {
    await put(own)
  }
  expect((await noor.ok<{ holds: boolean }>('POST', 'ledger/verifications', {})).holds).toBe(true)
})

test('the application was never granted changes of what is recorded, and triggers refuse them to the owner', async () => {
  const { rows } = await owner.query<{ name: string }>(
    "select tablename as name from pg_tables where schemaname = 'record'",
  )
  expect(rows.length).toBeGreaterThan(15)
  for (const { name } of rows) {
    const column = (
      await owner.query<{ c: string }>(
        "select column_name as c from information_schema.columns where table_schema = 'record' and table_name = $1 limit 1",
        [name],
      )
    ).rows[0]?.c
    expect(await codeOf(app.query(`update record.${name} set ${column} = ${column}`)), name).toBe('42501')
    expect(await codeOf(app.query(`delete from record.${name}`)), name).toBe('42501')
    expect(await codeOf(app.query(`truncate record.${name} cascade`)), name).toBe('42501')
    expect(await codeOf(owner.query(`truncate record.${name} cascade`)), name).toBe('23001')
  }
  expect(await codeOf(owner.query('update record.events set action = action'))).toBe('23001')
  expect(await codeOf(owner.query('delete from record.revisions'))).toBe('23001')
})

test('an event that does not continue the chain, or says other than its columns, is refused by the database', async () => {
  const state = (
    await owner.query<{ tree_size: string; last_digest: string }>(
      'select tree_size, last_digest from record.ledger_state',
    )
  ).rows[0]
  const laboratory = (await owner.query<{ id: string }>('select id from record.laboratory')).rows[0]?.id ?? ''
  const event = (change: object) =>
    buildEvent({
      epoch: 1,
      sequence: Number(state?.tree_size) + 1,
      time: '2999-01-01T00:00:00.000Z',
      actor: { kind: 'system', id: null, onBehalfOf: null },
      action: 'forged.event',
      subject: { kind: 'laboratory', id: laboratory },
      subjectSequence: 999,
      subjectPrevious: null,
      payload: {},
      previous: state?.last_digest ?? '',
      ...change,
    })
  const insert = (client: pg.Client, built: ReturnType<typeof event>, columns: object = {}) => {
    const row = {
      sequence: built.event.sequence,
      action: built.event.action,
      digest: built.digest,
      leaf: built.leafHash,
      ...columns,
    }
    return client.query(
      `insert into record.events (sequence, at, action, actor_id, subject_kind, subject_id, subject_sequence, canonical, digest, leaf_hash)
       values ($1, $2, $3, null, 'laboratory', $4, 999, $5, $6, $7)`,
      [
        row.sequence,
        built.event.time,
        row.action,
        laboratory,
        Buffer.from(built.canonical),
        row.digest,
        row.leaf,
      ],
    )
  }
  expect(await codeOf(insert(app, event({ previous: '0'.repeat(64) })))).toBe('23000')
  expect(await codeOf(insert(app, event({ sequence: Number(state?.tree_size) + 5 })))).toBe('23000')
  expect(await codeOf(insert(app, event({}), { digest: sha256Hex(new Uint8Array()) }))).toBe('23000')
  expect(await codeOf(insert(app, event({}), { action: 'laboratory.opened' }))).toBe('23000')
  expect(await codeOf(insert(worker, event({})))).toBe('42501')
})
