import { createHash, randomBytes, randomUUID } from 'node:crypto'
import { PassThrough, Readable } from 'node:stream'
import { beforeAll, expect, inject, test } from 'vitest'
import { readConfig } from '../../server/platform/config.ts'
import { openObjectStore, type ObjectStore } from '../../server/platform/storage/object-store.ts'

let store: ObjectStore
const hex = (name: string, bytes: Buffer) => createHash(name).update(bytes).digest('hex')
const key = () => `test/${randomUUID()}`

beforeAll(async () => {
  store = openObjectStore(readConfig(inject('environment')).storage)
  await store.ensureBucket()
})

test.each([1, 1000, 16 * 2 ** 20, 16 * 2 ** 20 + 1, 40 * 2 ** 20])(
  'a stream of %i bytes is stored and hashed on the way',
  async (size) => {
    const bytes = randomBytes(size)
    const at = key()
    const chunks = Array.from({ length: Math.ceil(size / 65_536) }, (_, i) =>
      bytes.subarray(i * 65_536, (i + 1) * 65_536),
    )
    const stored = await store.putStream(at, Readable.from(chunks))
    expect(stored).toMatchObject({ size, sha256: hex('sha256', bytes), sha512: hex('sha512', bytes) })
    expect(hex('sha256', await store.getBytes(at, stored.versionId))).toBe(stored.sha256)
    expect(await store.stat(at)).toMatchObject({ size })
  },
)

test('bytes, and parts of them', async () => {
  const at = key()
  const { versionId, sha256 } = await store.putBytes(at, Buffer.from('0123456789'))
  expect(sha256).toBe(hex('sha256', Buffer.from('0123456789')))
  expect((await store.getBytes(at, versionId, { offset: 2, length: 3 })).toString()).toBe('234')
  expect((await store.getBytes(at, null, { offset: 7 })).toString()).toBe('789')
})

test('a stream that breaks gives its error and leaves nothing', async () => {
  const at = key()
  const stream = new PassThrough()
  const put = store.putStream(at, stream)
  stream.write(randomBytes(20 * 2 ** 20))
  setTimeout(() => stream.destroy(new Error('the sender is gone')), 200)
  await expect(put).rejects.toThrow('the sender is gone')
  expect(await store.stat(at)).toBeNull()
})

test('a stream that is closed before its end is broken too', async () => {
  const at = key()
  const stream = new PassThrough()
  const put = store.putStream(at, stream)
  stream.write('half')
  setTimeout(() => stream.destroy(), 100)
  await expect(put).rejects.toThrow('before it was complete')
  expect(await store.stat(at)).toBeNull()
})

test('an upload can be stopped', async () => {
  const at = key()
  const stop = new AbortController()
  const put = store.putStream(at, new PassThrough(), { signal: stop.signal })
  setTimeout(() => stop.abort(new Error('enough')), 100)
  await expect(put).rejects.toThrow('enough')
  expect(await store.stat(at)).toBeNull()
})

test('what is not there', async () => {
  expect(await store.stat(key())).toBeNull()
  await expect(store.getBytes(key())).rejects.toThrow()
})

test('a locked version cannot be removed', async () => {
  const at = key()
  const { versionId } = await store.putBytes(at, Buffer.from('kept'))
  await store.lock(at, versionId, new Date(Date.now() + 3_600_000))
  await expect(store.remove(at, versionId)).rejects.toThrow()
  expect((await store.getBytes(at, versionId)).toString()).toBe('kept')
})

test('an object can be removed', async () => {
  const at = key()
  await store.putBytes(at, Buffer.from('gone'))
  await store.remove(at)
  expect(await store.stat(at)).toBeNull()
})
