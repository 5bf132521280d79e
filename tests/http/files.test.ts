import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { beforeAll, describe, expect, inject, test } from 'vitest'
import type { Entry } from '../../server/contract/entries.ts'
import type { RawFile, Reading } from '../../server/contract/files.ts'
import type { Notebook } from '../../server/contract/notebooks.ts'
import type { ProblemBody } from '../../server/contract/problems.ts'
import { referencePath } from '../support/reference.ts'
import { signIn, type PersonClient } from '../support/session.ts'

const url = inject('url')
const heralded = readFileSync(referencePath('tags/heralded.csv'))
const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest()

let maren: PersonClient
let notebook: Notebook
let entry: Entry

function form(name: string, bytes: Uint8Array): FormData {
  const data = new FormData()
  data.set('file', new Blob([new Uint8Array(bytes)]), name)
  return data
}

async function ready(id: string): Promise<RawFile> {
  for (let attempt = 0; attempt < 100; attempt++) {
    const file = await maren.ok<RawFile>('GET', `files/${id}`)
    if (file.reading.status !== 'pending') return file
    await new Promise((resolve) => setTimeout(resolve, 100))
  }
  throw new Error('the file was not read in ten seconds')
}

beforeAll(async () => {
  maren = await signIn(url, 'maren')
  notebook = await maren.ok<Notebook>('POST', 'notebooks', { title: 'Files under test' })
  entry = await maren.ok<Entry>('POST', `notebooks/${notebook.id}/entries`, { title: 'Files' })
})

describe('upload', () => {
  test('keeps the bytes as they are, with their digest, and reads them', async () => {
    const file = await maren.ok<RawFile>('POST', `entries/${entry.id}/files`, form('Lauf µ 7.csv', heralded))
    expect(file).toMatchObject({ name: 'Lauf µ 7.csv', size: heralded.length, sha256: sha256(heralded).toString('hex'), state: 'verified' })
    const content = await maren.call('GET', `files/${file.id}/content`)
    expect(Buffer.compare(content.bytes, heralded)).toBe(0)
    expect(content.headers.get('repr-digest')).toBe(`sha-256=:${sha256(heralded).toString('base64')}:`)
    expect(content.headers.get('content-security-policy')).toContain('sandbox')
    const read = await ready(file.id)
    // expected.json: the independent program's count of the same record
    const expected = JSON.parse(readFileSync(referencePath('tags/expected.json'), 'utf8')).heralded
    expect(read.reading).toMatchObject({ status: 'ready', kind: 'tags', tags: expected.tags, firstPs: expected.firstPs, lastPs: expected.lastPs })
  })

  test('a range is served as RFC 9110 says', async () => {
    const file = await maren.ok<RawFile>('POST', `entries/${entry.id}/files`, form('range.csv', heralded))
    const part = await maren.call('GET', `files/${file.id}/content`, undefined, { range: 'bytes=10-18' })
    expect([part.status, part.bytes.length, part.headers.get('content-range')]).toEqual([206, 9, `bytes 10-18/${heralded.length}`])
    expect(Buffer.compare(part.bytes, heralded.subarray(10, 19))).toBe(0)
    const tail = await maren.call('GET', `files/${file.id}/content`, undefined, { range: 'bytes=-5' })
    expect(Buffer.compare(tail.bytes, heralded.subarray(-5))).toBe(0)
    expect((await maren.call('GET', `files/${file.id}/content`, undefined, { range: `bytes=${heralded.length}-` })).status).toBe(416)
  })

  test('an empty, a changed and a cut upload are refused with what is safe, and leave nothing', async () => {
    const before = (await maren.ok<Entry>('GET', `entries/${entry.id}`)).files.length
    const target = `entries/${entry.id}/files`
    const empty = await maren.call<ProblemBody>('POST', target, form('empty.csv', new Uint8Array()))
    const changed = await maren.call<ProblemBody>('POST', target, form('changed.csv', heralded), {
      'repr-digest': `sha-256=:${sha256(Buffer.from('something else')).toString('base64')}:`,
    })
    const cut = await maren.call<ProblemBody>('POST', target, form('cut.csv', heralded.subarray(0, 1000)), { 'x-file-size': String(heralded.length) })
    for (const refused of [empty, changed, cut]) {
      expect(refused.status).toBe(422)
      expect(refused.json.detail).toMatch(/Nothing was kept/)
    }
    expect((await maren.ok<Entry>('GET', `entries/${entry.id}`)).files.length).toBe(before)
  })

  test('names from outside cannot leave their place', async () => {
    const file = await maren.ok<RawFile>('POST', `entries/${entry.id}/files`, form('../../etc/pass\u202ewd".csv', Buffer.from('time_ps,channel\n1,1\n5,2\n')))
    expect(file.name).toBe('passwd".csv')
    const content = await maren.call('GET', `files/${file.id}/content`)
    expect(content.headers.get('content-disposition')).toBe(`attachment; filename="passwd_.csv"; filename*=UTF-8''passwd%22.csv`)
  })
})

describe('reading', () => {
  test('a file without tags says so and can be kept; another reading can be chosen', async () => {
    const words = await maren.ok<RawFile>('POST', `entries/${entry.id}/files`, form('notes.bin', Buffer.from([0, 1, 2, 0, 255, 254])))
    expect((await ready(words.id)).reading.kind).toBe('other')
    const ns = await maren.ok<RawFile>('POST', `entries/${entry.id}/files`, form('two-columns.txt', Buffer.from('1 1000\n2 2500\n1 4000\n')))
    await ready(ns.id)
    const reading = await maren.ok<Reading>('PUT', `files/${ns.id}/reading`, {
      format: 'delimited',
      options: { time: 'col2', channel: 'col1', unit: 'ns', header: false },
    })
    expect(reading).toMatchObject({ status: 'ready', kind: 'tags', tags: 3, firstPs: 1_000_000, lastPs: 4_000_000 })
  })

  test('an unreadable way of reading is refused and the file is safe', async () => {
    const file = await maren.ok<RawFile>('POST', `entries/${entry.id}/files`, form('again.csv', heralded))
    await ready(file.id)
    const refused = await maren.call<ProblemBody>('PUT', `files/${file.id}/reading`, {
      format: 'delimited',
      options: { time: 'no such column', channel: 'channel', unit: 'ps' },
    })
    expect(refused.status).toBe(422)
    const unknown = await maren.call<ProblemBody>('PUT', `files/${file.id}/reading`, { format: 'nothing', options: {} })
    expect([unknown.status, unknown.json.errors?.[0]?.pointer]).toEqual([422, '/format'])
  })
})
