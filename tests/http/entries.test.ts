import { beforeAll, describe, expect, inject, test } from 'vitest'
import type { Entry } from '../../server/contract/entries.ts'
import type { Notebook } from '../../server/contract/notebooks.ts'
import type { Person } from '../../server/contract/people.ts'
import { signIn, type PersonClient } from '../support/session.ts'

const url = inject('url')
const text = (words: string) => ({ type: 'doc', content: [{ type: 'paragraph', content: [{ type: 'text', text: words }] }] })

let maren: PersonClient
let teo: PersonClient
let farid: PersonClient
let notebook: Notebook

async function newEntry(title: string): Promise<Entry> {
  return maren.ok<Entry>('POST', `notebooks/${notebook.id}/entries`, { title, experiment: 'hbt' })
}

beforeAll(async () => {
  ;[maren, teo, farid] = await Promise.all([signIn(url, 'maren'), signIn(url, 'teo'), signIn(url, 'farid')])
  notebook = await maren.ok<Notebook>('POST', 'notebooks', { title: 'Entries under test' })
})

describe('numbers', () => {
  test('fifty creates at once get 1 to 50 without a gap', async () => {
    const own = await maren.ok<Notebook>('POST', 'notebooks', { title: 'Fifty at once' })
    const made = await Promise.all(
      Array.from({ length: 50 }, (_, i) => maren.ok<Entry>('POST', `notebooks/${own.id}/entries`, { title: `Sheet ${i}` })),
    )
    const serials = made.map((entry) => Number(entry.number.split('/')[1])).sort((a, b) => a - b)
    expect(serials).toEqual(Array.from({ length: 50 }, (_, i) => i + 1))
    expect(made.every((entry) => entry.number.startsWith(`${own.number}/`))).toBe(true)
  })
})

describe('content', () => {
  test('a fresh entry has an empty text with an ETag', async () => {
    const entry = await newEntry('Fresh')
    const got = await maren.call('GET', `entries/${entry.id}/content`)
    expect(got.status).toBe(200)
    expect(got.json).toMatchObject({ type: 'doc' })
    expect(got.headers.get('etag')).toMatch(/^"0-[0-9a-f]{16}"$/)
  })

  test('of two editors with the same ETag one saves and the other is told', async () => {
    const entry = await newEntry('Two editors')
    const etag = (await maren.call('GET', `entries/${entry.id}/content`)).headers.get('etag') as string
    const answers = await Promise.all(
      ['one', 'two'].map((words) => maren.call('PUT', `entries/${entry.id}/content`, text(words), { 'if-match': etag })),
    )
    expect(answers.map((answer) => answer.status).sort()).toEqual([200, 412])
    const saved = await maren.call<{ content: unknown[] }>('GET', `entries/${entry.id}/content`)
    const winner = answers[0]?.status === 200 ? 'one' : 'two'
    expect(JSON.stringify(saved.json)).toContain(`"${winner}"`)
  })

  test('a save without If-Match is refused with 428, with a weak tag with 412', async () => {
    const entry = await newEntry('Preconditions')
    expect((await maren.call('PUT', `entries/${entry.id}/content`, text('x'))).status).toBe(428)
    const etag = (await maren.call('GET', `entries/${entry.id}/content`)).headers.get('etag') as string
    expect((await maren.call('PUT', `entries/${entry.id}/content`, text('x'), { 'if-match': `W/${etag}` })).status).toBe(412)
    expect((await maren.call('PUT', `entries/${entry.id}/content`, text('x'), { 'if-match': '*' })).status).toBe(200)
  })

  test('unknown and hostile nodes are refused by name and nothing is saved', async () => {
    const entry = await newEntry('Hostile')
    for (const content of [
      [{ type: 'script', content: [] }],
      [{ type: 'paragraph', content: [{ type: 'text', text: 'x', marks: [{ type: 'link', attrs: { href: 'javascript:alert(1)' } }] }] }],
      [{ type: 'paragraph', attrs: { onclick: 'x' } }],
    ]) {
      const refused = await maren.call<{ code: string; detail: string }>('PUT', `entries/${entry.id}/content`, { type: 'doc', content }, { 'if-match': '*' })
      expect(refused.status).toBe(422)
      expect(refused.json.detail).toMatch(/not saved/)
    }
    expect((await maren.call('GET', `entries/${entry.id}/content`)).headers.get('etag')).toMatch(/^"0-/)
  })

  test('missing ids of blocks are filled in and stay', async () => {
    const entry = await newEntry('Ids')
    await maren.ok('PUT', `entries/${entry.id}/content`, text('with an id'), { 'if-match': '*' })
    const first = await maren.ok<{ content: { attrs: { id: string } }[] }>('GET', `entries/${entry.id}/content`)
    expect(first.content[0]?.attrs.id).toBeTruthy()
    await maren.ok('PUT', `entries/${entry.id}/content`, first, { 'if-match': '*' })
    expect(await maren.ok('GET', `entries/${entry.id}/content`)).toEqual(first)
  })

  test('another writer closes the revision of the one before', async () => {
    const entry = await newEntry('Revisions')
    const person = (await maren.ok<{ items: Person[] }>('GET', 'people')).items.find((p) => p.login === 'teo') as Person
    await maren.ok('PUT', `notebooks/${notebook.id}/members/${person.id}`, { role: 'experimentalist' })
    await maren.ok('PUT', `entries/${entry.id}/content`, text('from Maren'), { 'if-match': '*' })
    await teo.ok('PUT', `entries/${entry.id}/content`, text('from Teo'), { 'if-match': '*' })
    await teo.ok('POST', `entries/${entry.id}/revisions`, { cause: 'leaving' })
    const { items } = await maren.ok<{ items: { revision: number; author: string; cause: string }[] }>('GET', `entries/${entry.id}/revisions`)
    expect(items.map(({ revision, author }) => [revision, author.split(' ')[0]])).toEqual([
      [1, 'Maren'],
      [2, 'Teo'],
    ])
    const old = await maren.ok<{ content: unknown }>('GET', `entries/${entry.id}/revisions/1`)
    expect(JSON.stringify(old.content)).toContain('from Maren')
  })
})

describe('rights', () => {
  test('who is no member is told the same as if there were no such thing', async () => {
    const entry = await newEntry('Private')
    const unknown = '00000000-0000-4000-8000-000000000000'
    for (const path of [`entries/${entry.id}`, `entries/${entry.id}/content`, `notebooks/${notebook.id}`]) {
      const hidden = await farid.call<{ detail: string }>('GET', path)
      const absent = await farid.call<{ detail: string }>('GET', path.replace(/[0-9a-f-]{36}/, unknown))
      expect([hidden.status, hidden.json.detail]).toEqual([404, absent.json.detail])
    }
  })

  test('nobody is raised by being added to a notebook', async () => {
    const { items } = await maren.ok<{ items: Person[] }>('GET', 'people')
    const id = items.find((person) => person.login === 'teo')?.id
    expect((await maren.call('PUT', `notebooks/${notebook.id}/members/${id}`, { role: 'supervisor' })).status).toBe(403)
  })

  test('a token can record but neither sign nor appoint', async () => {
    const { secret } = await maren.ok<{ secret: string }>('POST', 'tokens', { name: 'acquisition', scopes: ['read', 'record'] })
    const bearer = { authorization: `Bearer ${secret}` }
    const create = await fetch(`${url}/api/v1/notebooks/${notebook.id}/entries`, {
      method: 'POST',
      headers: { ...bearer, 'content-type': 'application/json' },
      body: JSON.stringify({ title: 'From a script' }),
    })
    expect(create.status).toBe(201)
    const entry = (await create.json()) as Entry
    const record = await fetch(`${url}/api/v1/entries/${entry.id}/signing-record?meaning=authorship`, { headers: bearer })
    expect(record.status).toBe(403)
    const appoint = await fetch(`${url}/api/v1/tokens`, { method: 'POST', headers: { ...bearer, 'content-type': 'application/json' }, body: '{}' })
    expect(appoint.status).toBe(403)
  })
})
