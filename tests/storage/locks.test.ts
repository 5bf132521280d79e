import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { bytesOf, clientOf, keys, sendRaw, startedStorage } from './support.ts'

// Rules: S3 user guide, "Locking objects with Object Lock" (read at second hand; see the design paper on standards, B10).
const start = Date.parse('2026-03-02T09:00:00.000Z')
const hour = 3_600_000
let skip = 0
const clock = () => Date.now() + skip
let storage: Awaited<ReturnType<typeof startedStorage>>
beforeAll(async () => {
  storage = await startedStorage({ clock })
  await storage.client.makeBucket('locked', keys.region, { ObjectLocking: true })
  await storage.client.makeBucket('open')
})
afterAll(() => storage.end())

const inHours = (hours: number) => new Date(Date.now() + hours * hour).toISOString()

async function locked(key: string, mode: string, hours: number): Promise<string> {
  const { versionId } = await storage.client.putObject('locked', key, 'bytes')
  await retain(key, versionId!, mode, inHours(hours))
  return versionId!
}

const retain = (key: string, versionId: string, mode: string, retainUntilDate: string) =>
  storage.client.putObjectRetention('locked', key, { mode, retainUntilDate, versionId } as never)

const remove = (key: string, versionId: string) => storage.client.removeObject('locked', key, { versionId })

/** Signs for the skewed clock too, which the client library cannot. */
function raw(method: string, target: string, body = '', headers: Record<string, string> = {}) {
  const md5 = createHash('md5').update(body).digest('base64')
  const signedAt = new Date(clock())
  return sendRaw(storage.port, {
    method,
    target,
    body,
    headers: { 'content-md5': md5, ...headers },
    signedAt,
  })
}

const denied = { code: 'AccessDenied' }

describe('retention', () => {
  it('forbids deleting the version, not hiding the key', async () => {
    const id = await locked('a', 'GOVERNANCE', 1)
    await expect(remove('a', id)).rejects.toMatchObject(denied)
    await storage.client.removeObject('locked', 'a')
    await expect(storage.client.getObject('locked', 'a')).rejects.toMatchObject({ code: 'NoSuchKey' })
    const kept = await storage.client.getObject('locked', 'a', { versionId: id })
    expect((await bytesOf(kept)).toString()).toBe('bytes')
  })

  it('leaves a new version of the same key free', async () => {
    const id = await locked('b', 'COMPLIANCE', 1)
    const { versionId } = await storage.client.putObject('locked', 'b', 'new')
    await remove('b', versionId!)
    await expect(remove('b', id)).rejects.toMatchObject(denied)
  })

  it('is read back, and told in the headers', async () => {
    const id = await locked('c', 'COMPLIANCE', 2)
    const info = (await storage.client.getObjectRetention('locked', 'c', {
      versionId: id,
    } as never)) as unknown as { mode: string }
    expect(info.mode).toBe('COMPLIANCE')
    const head = await raw('HEAD', `/locked/c?versionId=${id}`, '', {})
    expect(head.headers['x-amz-object-lock-mode']).toBe('COMPLIANCE')
  })

  it.each(['GOVERNANCE', 'COMPLIANCE'])('%s may be extended, never shortened or removed', async (mode) => {
    const id = await locked(`d/${mode}`, mode, 2)
    await retain(`d/${mode}`, id, mode, inHours(3))
    await expect(retain(`d/${mode}`, id, mode, inHours(1))).rejects.toMatchObject(denied)
    const removed = await raw('PUT', `/locked/d/${mode}?retention&versionId=${id}`, '<Retention></Retention>')
    expect([removed.status, removed.code]).toEqual([403, 'AccessDenied'])
  })

  it('of compliance cannot become governance; governance may become compliance', async () => {
    const strict = await locked('e', 'COMPLIANCE', 1)
    await expect(retain('e', strict, 'GOVERNANCE', inHours(9))).rejects.toMatchObject(denied)
    const mild = await locked('f', 'GOVERNANCE', 1)
    await retain('f', mild, 'COMPLIANCE', inHours(2))
    await expect(retain('f', mild, 'GOVERNANCE', inHours(3))).rejects.toMatchObject(denied)
  })

  it('needs a date to come, a known mode, and a bucket made with lock', async () => {
    const { versionId } = await storage.client.putObject('locked', 'g', 'x')
    await expect(
      retain('g', versionId!, 'GOVERNANCE', new Date(start - hour).toISOString()),
    ).rejects.toMatchObject({
      code: 'InvalidArgument',
    })
    const until = inHours(1)
    const put = (bucket: string, mode: string) =>
      raw(
        'PUT',
        `/${bucket}/g?retention`,
        `<Retention><Mode>${mode}</Mode><RetainUntilDate>${until}</RetainUntilDate></Retention>`,
      )
    expect((await put('locked', 'FOREVER')).code).toBe('MalformedXML')
    await storage.client.putObject('open', 'g', 'x')
    expect((await put('open', 'GOVERNANCE')).code).toBe('InvalidRequest')
  })

  it('ends on its date', async () => {
    const id = await locked('h', 'COMPLIANCE', 1)
    const target = `/locked/h?versionId=${id}`
    skip = hour - 60_000
    expect((await raw('DELETE', target)).status).toBe(403)
    skip = hour + 60_000
    expect((await raw('DELETE', target)).status).toBe(204)
    skip = 0
  })
})

describe('bypass of governance', () => {
  it('is refused to the key of the application', async () => {
    const id = await locked('i', 'GOVERNANCE', 1)
    const options = { versionId: id, governanceBypass: true }
    await expect(storage.client.removeObject('locked', 'i', options)).rejects.toMatchObject(denied)
  })

  it('works with the right, against governance alone', async () => {
    const granted = await startedStorage({ mayBypassGovernance: true })
    const client = clientOf(granted.port)
    await client.makeBucket('locked', keys.region, { ObjectLocking: true })
    for (const mode of ['GOVERNANCE', 'COMPLIANCE']) {
      const { versionId } = await client.putObject('locked', mode, 'x')
      await client.putObjectRetention('locked', mode, {
        mode,
        retainUntilDate: inHours(1),
        versionId,
      } as never)
      await expect(client.removeObject('locked', mode, { versionId: versionId! })).rejects.toMatchObject(
        denied,
      )
      const bypass = client.removeObject('locked', mode, { versionId: versionId!, governanceBypass: true })
      if (mode === 'GOVERNANCE') await bypass
      else await expect(bypass).rejects.toMatchObject(denied)
    }
    await granted.end()
  })
})

describe('legal hold', () => {
  it('forbids deletion until it is lifted, whatever the retention', async () => {
    const { versionId } = await storage.client.putObject('locked', 'j', 'x')
    const set = (status: 'ON' | 'OFF') =>
      storage.client.setObjectLegalHold('locked', 'j', { status, versionId: versionId! })
    await set('ON')
    const told = await storage.client.getObjectLegalHold('locked', 'j', { versionId: versionId! } as never)
    expect(told).toMatchObject({ Status: 'ON' })
    await expect(remove('j', versionId!)).rejects.toMatchObject(denied)
    await set('OFF')
    await remove('j', versionId!)
  })
})

describe('lock of the bucket', () => {
  it('gives new versions its default retention', async () => {
    const { client } = storage
    await client.makeBucket('default', keys.region, { ObjectLocking: true })
    await client.setObjectLockConfig('default', { mode: 'GOVERNANCE', unit: 'Days', validity: 3 } as never)
    expect(await client.getObjectLockConfig('default')).toMatchObject({
      mode: 'GOVERNANCE',
      unit: 'Days',
      validity: 3,
    })
    const { versionId } = await client.putObject('default', 'x', 'y')
    await expect(client.removeObject('default', 'x', { versionId: versionId! })).rejects.toMatchObject(denied)
  })

  it('cannot be switched on later, nor versions switched off', async () => {
    const config = { mode: 'GOVERNANCE', unit: 'Days', validity: 3 } as never
    await expect(storage.client.setObjectLockConfig('open', config)).rejects.toMatchObject({
      code: 'InvalidBucketState',
    })
    const suspend = storage.client.setBucketVersioning('locked', { Status: 'Suspended' } as never)
    await expect(suspend).rejects.toMatchObject({ code: 'InvalidBucketState' })
  })

  it('in the headers of a PUT needs Content-MD5', async () => {
    const headers = {
      'x-amz-object-lock-mode': 'GOVERNANCE',
      'x-amz-object-lock-retain-until-date': inHours(1),
    }
    const without = await sendRaw(storage.port, { method: 'PUT', target: '/locked/k', body: 'x', headers })
    expect([without.status, without.code]).toEqual([400, 'InvalidRequest'])
    const put = await raw('PUT', '/locked/k', 'x', headers)
    expect(put.status).toBe(200)
    const id = String(put.headers['x-amz-version-id'])
    expect((await raw('DELETE', `/locked/k?versionId=${id}`)).code).toBe('AccessDenied')
  })
})
