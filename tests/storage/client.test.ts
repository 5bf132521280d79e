import { createHash, randomBytes } from 'node:crypto'
import { Readable } from 'node:stream'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { startStorageFake } from '../../storage-fake/server.ts'
import { bytesOf, clientOf, filesUnder, keys, sendRaw, startedStorage } from './support.ts'

// What is outside the project here is the client: the published minio package, end to end.
let storage: Awaited<ReturnType<typeof startedStorage>>
beforeAll(async () => {
  storage = await startedStorage()
  await storage.client.makeBucket('records', keys.region, { ObjectLocking: true })
})
afterAll(() => storage.end())

const md5 = (bytes: Buffer) => createHash('md5').update(bytes).digest('hex')
const read = async (key: string, options = {}) =>
  bytesOf(await storage.client.getObject('records', key, options))

async function listed(prefix: string, recursive: boolean, client = storage.client) {
  const items: { name?: string; prefix?: string; size: number }[] = []
  for await (const item of client.listObjectsV2('records', prefix, recursive))
    items.push(item as (typeof items)[number])
  return items
}

describe('buckets', () => {
  it('are made once, found, listed and removed when empty', async () => {
    const { client } = storage
    expect(await client.bucketExists('absent')).toBe(false)
    await client.makeBucket('second')
    expect(await client.bucketExists('second')).toBe(true)
    await expect(client.makeBucket('second')).rejects.toMatchObject({ code: 'BucketAlreadyOwnedByYou' })
    expect((await client.listBuckets()).map((b) => b.name)).toEqual(['records', 'second'])
    await client.putObject('second', 'x', 'y')
    await expect(client.removeBucket('second')).rejects.toMatchObject({ code: 'BucketNotEmpty' })
    const { versionId } = await client.statObject('second', 'x')
    await client.removeObject('second', 'x', { versionId: versionId! })
    await client.removeBucket('second')
    expect(await client.bucketExists('second')).toBe(false)
  })

  it('are found by a client that has to ask for the region', async () => {
    const client = clientOf(storage.port, { region: undefined })
    expect(await client.bucketExists('absent')).toBe(false)
    expect(await client.bucketExists('records')).toBe(true)
  })
})

describe('objects', () => {
  it('come back as they were put, with type and metadata', async () => {
    const bytes = randomBytes(1 << 20)
    const put = await storage.client.putObject('records', 'raw/one', bytes, bytes.length, {
      'Content-Type': 'text/csv',
      run: '7',
    })
    expect(put.etag).toBe(md5(bytes))
    expect((await read('raw/one')).equals(bytes)).toBe(true)
    const stat = await storage.client.statObject('records', 'raw/one')
    expect(stat).toMatchObject({ size: bytes.length, etag: md5(bytes), versionId: put.versionId })
    expect(stat.metaData).toMatchObject({ 'content-type': 'text/csv', run: '7' })
  })

  it('take keys with blanks, signs, dots and letters of any alphabet', async () => {
    for (const key of ["a b+c=d&e?f#g%h'(!)*", 'μ/τ²/光.bin', 'dots/../kept/./here', 'x//y', 'ends/']) {
      await storage.client.putObject('records', `odd/${key}`, key)
      expect((await read(`odd/${key}`)).toString()).toBe(key)
    }
    expect((await listed('odd/', true)).map((i) => i.name)).toContain('odd/μ/τ²/光.bin')
  })

  it('may be empty', async () => {
    await storage.client.putObject('records', 'empty', Buffer.alloc(0))
    expect((await read('empty')).length).toBe(0)
    await expect(storage.client.getPartialObject('records', 'empty', 0, 1)).rejects.toMatchObject({
      code: 'InvalidRange',
    })
  })

  it('are read in part', async () => {
    const bytes = randomBytes(1000)
    await storage.client.putObject('records', 'part', bytes)
    const part = await bytesOf(await storage.client.getPartialObject('records', 'part', 100, 50))
    expect(part.equals(bytes.subarray(100, 150))).toBe(true)
    const rest = await bytesOf(await storage.client.getPartialObject('records', 'part', 990))
    expect(rest.equals(bytes.subarray(990))).toBe(true)
    await expect(storage.client.getPartialObject('records', 'part', 1000, 5)).rejects.toMatchObject({
      code: 'InvalidRange',
    })
  })

  it('are streamed in parts when the size is unknown, whose numbers start at 2', async () => {
    const bytes = randomBytes(20 << 20)
    const stream = Readable.from(Array.from({ length: 20 }, (_, i) => bytes.subarray(i << 20, (i + 1) << 20)))
    const put = await storage.client.putObject('records', 'stream', stream)
    const parts = [bytes.subarray(0, 8 << 20), bytes.subarray(8 << 20, 16 << 20), bytes.subarray(16 << 20)]
    // ETag of a multipart object: MD5 of the MD5s of the parts, and their number (common practice).
    expect(put.etag).toBe(`${md5(Buffer.concat(parts.map((p) => Buffer.from(md5(p), 'hex'))))}-3`)
    expect((await read('stream')).equals(bytes)).toBe(true)
    expect((await filesUnder(storage.folder)).filter((f) => /uploads|temp/.test(f))).toEqual([])
  })

  it('are not there: NoSuchKey, NoSuchVersion, NoSuchBucket', async () => {
    const { client } = storage
    await expect(client.getObject('records', 'never')).rejects.toMatchObject({ code: 'NoSuchKey' })
    await expect(client.statObject('records', 'never')).rejects.toMatchObject({ code: 'NotFound' })
    await expect(client.getObject('records', 'raw/one', { versionId: 'x' })).rejects.toMatchObject({
      code: 'NoSuchVersion',
    })
    await expect(client.putObject('absent', 'x', 'y')).rejects.toMatchObject({ code: 'NoSuchBucket' })
  })
})

describe('versions', () => {
  it('are all kept; a deletion hides, reading by version still works', async () => {
    const { client } = storage
    const first = await client.putObject('records', 'versioned', 'one')
    const second = await client.putObject('records', 'versioned', 'two')
    expect(first.versionId).not.toBe(second.versionId)
    expect((await read('versioned')).toString()).toBe('two')
    expect((await read('versioned', { versionId: first.versionId })).toString()).toBe('one')
    await client.removeObject('records', 'versioned')
    await expect(client.getObject('records', 'versioned')).rejects.toMatchObject({ code: 'NoSuchKey' })
    expect((await read('versioned', { versionId: first.versionId })).toString()).toBe('one')
    expect(await listed('versioned', true)).toEqual([])
    await client.removeObject('records', 'versioned', { versionId: second.versionId! })
    await expect(
      client.getObject('records', 'versioned', { versionId: second.versionId! }),
    ).rejects.toMatchObject({
      code: 'NoSuchVersion',
    })
  })

  it('are listed, newest first, with delete markers', async () => {
    const { client } = storage
    const ids: (string | null)[] = []
    for (const text of ['a', 'b', 'c'])
      ids.unshift((await client.putObject('records', 'history', text)).versionId)
    await client.removeObject('records', 'history')
    const items: { name: string; versionId: string; isLatest: string | boolean; isDeleteMarker: boolean }[] =
      []
    for await (const item of client.listObjects('records', 'history', true, { IncludeVersion: true }))
      items.push(item as never)
    expect(items.filter((i) => !i.isDeleteMarker).map((i) => i.versionId)).toEqual(ids)
    expect(items.filter((i) => i.isDeleteMarker)).toHaveLength(1)
  })
})

describe('lists', () => {
  it('give keys in order, by prefix and by folder, page by page', async () => {
    const { client } = storage
    for (const n of [3, 1, 2])
      for (const folder of ['p', 'q']) await client.putObject('records', `tree/${folder}/${n}`, 'x')
    await client.putObject('records', 'tree/top', 'xyz')
    expect((await listed('tree/', true)).map((i) => i.name)).toEqual([
      'tree/p/1',
      'tree/p/2',
      'tree/p/3',
      'tree/q/1',
      'tree/q/2',
      'tree/q/3',
      'tree/top',
    ])
    const top = await listed('tree/', false)
    expect(top.flatMap((i) => i.prefix ?? [])).toEqual(['tree/p/', 'tree/q/'])
    expect(top.flatMap((i) => i.name ?? [])).toEqual(['tree/top'])
  })

  it('go on page by page, keys and folders counted alike', async () => {
    const names = Array.from({ length: 7 }, (_, i) => `many/${i}`)
    for (const name of [...names, 'many/3/a', 'many/3/b', 'many/μ'])
      await storage.client.putObject('records', name, 'x')
    const seen: string[] = []
    let token = ''
    do {
      const target = `/records?list-type=2&max-keys=2&delimiter=%2F&encoding-type=url&prefix=many%2F${token}`
      const { body } = await sendRaw(storage.port, { method: 'GET', target })
      const found = [...body.matchAll(/<(?:Key|CommonPrefixes><Prefix)>(.*?)</g)].map((m) =>
        decodeURIComponent(m[1]!),
      )
      // Keys and folders stand apart in the answer; page order is that of the names.
      expect(found.length).toBeLessThanOrEqual(2)
      seen.push(...found.sort())
      const next = /<NextContinuationToken>(.*?)</.exec(body)?.[1]
      token = next === undefined ? '' : `&continuation-token=${encodeURIComponent(next)}`
    } while (token !== '' && seen.length < 20)
    expect(seen).toEqual([...names.slice(0, 4), 'many/3/', ...names.slice(4), 'many/μ'])
  })

  it('shrink by many deletions at once', async () => {
    const names = Array.from({ length: 5 }, (_, i) => `gone/${i} & <more>`)
    for (const name of names) await storage.client.putObject('records', name, 'x')
    await storage.client.removeObjects('records', names.slice(1))
    expect((await listed('gone/', true)).map((i) => i.name)).toEqual(names.slice(0, 1))
  })
})

describe('unfinished uploads', () => {
  it('are listed, continued and removed', async () => {
    const { client } = storage
    const uploadId = await client.initiateNewMultipartUpload('records', 'half', {})
    const found: string[] = []
    for await (const item of client.listIncompleteUploads('records', 'half', true))
      found.push((item as { key: string }).key)
    expect(found).toEqual(['half'])
    expect(await client.findUploadId('records', 'half')).toBe(uploadId)
    await client.removeIncompleteUpload('records', 'half')
    await expect(client.abortMultipartUpload('records', 'half', uploadId)).rejects.toMatchObject({
      code: 'NoSuchUpload',
    })
  })
})

describe('presigned addresses', () => {
  it('get and put without a header, until they expire', async () => {
    const { client } = storage
    const put = await fetch(await client.presignedPutObject('records', 'pre signed', 60), {
      method: 'PUT',
      body: 'by address',
    })
    expect(put.status).toBe(200)
    const address = await client.presignedGetObject('records', 'pre signed', 60, {
      'response-content-disposition': 'attachment; filename="x.csv"',
    })
    const got = await fetch(address)
    expect(await got.text()).toBe('by address')
    expect(got.headers.get('content-disposition')).toBe('attachment; filename="x.csv"')
    expect((await fetch(address.replace('X-Amz-Expires=60', 'X-Amz-Expires=61'))).status).toBe(403)
    expect((await fetch(address, { method: 'DELETE' })).status).toBe(403)
    const past = await client.presignedGetObject(
      'records',
      'pre signed',
      60,
      {},
      new Date(Date.now() - 61_000),
    )
    expect(await (await fetch(past)).text()).toContain(
      '<Code>AccessDenied</Code><Message>Request has expired.',
    )
  })
})

describe('wrong credentials', () => {
  it('are refused with the code that says which part is wrong', async () => {
    const refused = (more: object) => clientOf(storage.port, more).putObject('records', 'x', 'y')
    await expect(refused({ secretKey: 'wrong' })).rejects.toMatchObject({ code: 'SignatureDoesNotMatch' })
    await expect(refused({ accessKey: 'someone' })).rejects.toMatchObject({ code: 'InvalidAccessKeyId' })
    await expect(refused({ region: 'eu-west-1' })).rejects.toMatchObject({
      code: 'AuthorizationHeaderMalformed',
    })
    const anonymous = await fetch(`http://127.0.0.1:${storage.port}/records/raw/one`)
    expect(anonymous.status).toBe(403)
    expect(await anonymous.text()).toContain('<Code>AccessDenied</Code>')
  })
})

describe('restart', () => {
  it('keeps objects, versions, locks and unfinished uploads', async () => {
    const { client, server, folder, end } = await startedStorage()
    await client.makeBucket('kept', keys.region, { ObjectLocking: true })
    const { versionId } = await client.putObject('kept', 'a', 'one', 3, { note: 'n' })
    await client.putObject('kept', 'a', 'two')
    const until = new Date(Date.now() + 3_600_000).toISOString()
    await client.putObjectRetention('kept', 'a', {
      mode: 'COMPLIANCE',
      retainUntilDate: until,
      versionId: versionId!,
    } as never)
    const uploadId = await client.initiateNewMultipartUpload('kept', 'half', {})
    await server.close()
    const again = await startStorageFake({ folder, ...keys })
    const next = clientOf(again.port)
    expect((await bytesOf(await next.getObject('kept', 'a', { versionId: versionId! }))).toString()).toBe(
      'one',
    )
    expect((await bytesOf(await next.getObject('kept', 'a'))).toString()).toBe('two')
    await expect(next.removeObject('kept', 'a', { versionId: versionId! })).rejects.toMatchObject({
      code: 'AccessDenied',
    })
    expect(await next.findUploadId('kept', 'half')).toBe(uploadId)
    await again.close()
    await end()
  })
})
