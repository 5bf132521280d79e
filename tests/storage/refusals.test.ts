import { createHash, randomBytes } from 'node:crypto'
import { createServer, request as httpRequest } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { parseXml } from '../../storage-fake/xml.ts'
import { bytesOf, clientOf, filesUnder, sendRaw, startedStorage, type RawRequest } from './support.ts'

let storage: Awaited<ReturnType<typeof startedStorage>>
beforeAll(async () => {
  storage = await startedStorage()
  await storage.client.makeBucket('box')
})
afterAll(() => storage.end())

const send = (raw: RawRequest) => sendRaw(storage.port, raw)
const put = (more: Partial<RawRequest>) => send({ method: 'PUT', target: '/box/x', body: 'hello', ...more })
const md5 = (text: string) => createHash('md5').update(text).digest('base64')

/** Nothing of a refused request may stay: no key, no temporary file. */
async function leavesNothing(task: () => Promise<unknown>): Promise<void> {
  const before = await filesUnder(storage.folder)
  await task()
  expect((await filesUnder(storage.folder)).sort()).toEqual(before.sort())
}

describe('a body that changed on the way', () => {
  it('is refused with the real client behind a proxy that flips one bit', async () => {
    const proxy = createServer((incoming, outgoing) => {
      void bytesOf(incoming).then((body) => {
        if (body.length > 0) body[0]! ^= 1
        const headers = { ...incoming.headers }
        const options = {
          host: '127.0.0.1',
          port: storage.port,
          method: incoming.method,
          path: incoming.url,
          headers,
        }
        httpRequest(options, (answer) => {
          outgoing.writeHead(answer.statusCode ?? 500, answer.headers)
          answer.pipe(outgoing)
        }).end(body)
      })
    })
    await new Promise<void>((resolve) => proxy.listen(0, '127.0.0.1', resolve))
    const client = clientOf((proxy.address() as AddressInfo).port)
    await leavesNothing(async () => {
      const refused = client.putObject('box', 'changed', randomBytes(100_000))
      await expect(refused).rejects.toMatchObject({ code: 'XAmzContentSHA256Mismatch' })
    })
    proxy.closeAllConnections()
    proxy.close()
  })

  it('is refused by either digest', async () => {
    const empty = createHash('sha256').digest('hex')
    await leavesNothing(async () => {
      expect((await put({ payloadHash: empty })).code).toBe('XAmzContentSHA256Mismatch')
      expect((await put({ headers: { 'content-md5': md5('other') } })).code).toBe('BadDigest')
      expect((await put({ headers: { 'content-md5': 'no digest' } })).code).toBe('InvalidDigest')
    })
  })

  it('is taken unsigned when the client says so', async () => {
    expect(
      (await put({ payloadHash: 'UNSIGNED-PAYLOAD', headers: { 'content-md5': md5('hello') } })).status,
    ).toBe(200)
  })
})

describe('a connection that breaks', () => {
  it('leaves nothing behind', async () => {
    await leavesNothing(async () => {
      const body = randomBytes(300_000)
      const hash = createHash('sha256').update(body).digest('hex')
      const headers = { 'content-length': '1000000' }
      const upload = { method: 'PUT', target: '/box/broken', body, payloadHash: hash, headers, cut: true }
      await expect(send(upload)).rejects.toThrow('cut')
      await expect
        .poll(async () => (await filesUnder(storage.folder)).filter((f) => f.startsWith('temp')))
        .toEqual([])
    })
  })
})

describe('the signature', () => {
  it('holds for a quarter of an hour either way', async () => {
    const at = (minutes: number) => put({ signedAt: new Date(Date.now() + minutes * 60_000) })
    expect((await at(-14)).status).toBe(200)
    expect((await at(14)).status).toBe(200)
    expect((await at(-16)).code).toBe('RequestTimeTooSkewed')
    expect((await at(16)).code).toBe('RequestTimeTooSkewed')
  })

  it('covers method, path, query and headers', async () => {
    const changes: ((headers: Record<string, string>) => void)[] = [
      (h) => (h['x-amz-meta-run'] = '8'),
      (h) => (h.authorization = h.authorization!.replace(/.$/, (c) => (c === '0' ? '1' : '0'))),
      (h) => (h.host = '127.0.0.1:1'),
    ]
    for (const tamper of changes) {
      expect((await put({ headers: { 'x-amz-meta-run': '7' }, tamper })).code).toBe('SignatureDoesNotMatch')
    }
  })

  it('must cover every x-amz header', async () => {
    const answer = await put({ tamper: (h) => (h['x-amz-meta-late'] = '1') })
    expect([answer.status, answer.code]).toEqual([403, 'AccessDenied'])
  })

  it('is of this region, of S3, and of the day it says', async () => {
    expect((await put({ service: 'ec2' })).code).toBe('AuthorizationHeaderMalformed')
    expect((await put({ region: 'eu-west-1' })).code).toBe('AuthorizationHeaderMalformed')
    expect((await put({ tamper: (h) => (h.authorization = 'AWS me:abc') })).code).toBe('InvalidRequest')
    expect((await put({ tamper: (h) => (h.authorization = 'AWS4-HMAC-SHA256 Credential=a') })).code).toBe(
      'AuthorizationHeaderMalformed',
    )
  })
})

describe('what is not implemented', () => {
  it.each([
    ['GET', '/box?acl'],
    ['GET', '/box?lifecycle'],
    ['PUT', '/box?policy'],
    ['GET', '/box'],
    ['GET', '/box?list-type=3'],
    ['PUT', '/box/x?tagging'],
    ['POST', '/box/x?restore'],
    ['GET', '/box/x?torrent'],
    ['PATCH', '/box/x'],
    ['POST', '/'],
  ])('%s %s is refused and says so', async (method, target) => {
    const answer = await send({ method, target })
    expect([answer.status, answer.code]).toEqual([501, 'NotImplemented'])
  })

  it.each([
    'x-amz-copy-source',
    'x-amz-server-side-encryption',
    'x-amz-acl',
    'x-amz-tagging',
    'if-none-match',
  ])('header %s', async (name) => {
    expect((await put({ headers: { [name]: 'x' } })).code).toBe('NotImplemented')
  })

  it('a body signed in chunks', async () => {
    expect((await put({ payloadHash: 'STREAMING-AWS4-HMAC-SHA256-PAYLOAD' })).code).toBe('NotImplemented')
  })
})

describe('limits and forms', () => {
  it('name what is wrong', async () => {
    const codes = async (requests: RawRequest[]) => {
      const answers = []
      for (const request of requests) answers.push((await send(request)).code)
      return answers
    }
    const body = 'x'
    expect(
      await codes([
        { method: 'PUT', target: `/box/${'k'.repeat(1025)}`, body },
        { method: 'PUT', target: '/box/meta', body, headers: { 'x-amz-meta-long': 'v'.repeat(2049) } },
        { method: 'PUT', target: '/Box' },
        { method: 'PUT', target: '/a..b' },
        { method: 'GET', target: '/box?list-type=2&max-keys=-1' },
        { method: 'GET', target: '/box/x', body: 'surplus' },
        {
          method: 'POST',
          target: '/box?delete',
          body: '<Delete/>',
          headers: { 'content-md5': md5('<Delete/>') },
        },
        { method: 'PUT', target: '/box/x?partNumber=1&uploadId=no', body },
      ]),
    ).toEqual([
      'KeyTooLongError',
      'MetadataTooLarge',
      'InvalidBucketName',
      'InvalidBucketName',
      'InvalidArgument',
      'UnexpectedContent',
      'MalformedXML',
      'NoSuchUpload',
    ])
  })

  it('refuse more than 5 GiB by its declared length', async () => {
    const headers = { 'content-length': String(5 * 1024 ** 3 + 1) }
    const request = httpRequest({
      host: '127.0.0.1',
      port: storage.port,
      method: 'PUT',
      path: '/box/huge',
      headers: (await import('./support.ts')).signedHeaders(storage.port, {
        method: 'PUT',
        target: '/box/huge',
        headers,
      }),
    })
    const body = new Promise<string>((resolve, reject) => {
      request.on('response', (response) => void bytesOf(response).then((bytes) => resolve(bytes.toString())))
      request.on('error', reject)
    })
    // Beyond what the server reads of a refused upload before it answers.
    for (let sent = 0; sent < 65; sent++) request.write(Buffer.alloc(1 << 20))
    expect(await body).toContain('<Code>EntityTooLarge</Code>')
    request.destroy()
  })
})

describe('parts of an upload', () => {
  const part = Buffer.alloc(5 << 20, 7)
  const complete = (id: string, parts: [number, string][]) => {
    const items = parts
      .map(([n, etag]) => `<Part><PartNumber>${n}</PartNumber><ETag>${etag}</ETag></Part>`)
      .join('')
    const body = `<CompleteMultipartUpload>${items}</CompleteMultipartUpload>`
    return send({ method: 'POST', target: `/box/multi?uploadId=${id}`, body })
  }
  const putPart = async (id: string, number: number, body: Buffer) => {
    const answer = await send({
      method: 'PUT',
      target: `/box/multi?partNumber=${number}&uploadId=${id}`,
      body,
    })
    return String(answer.headers.etag)
  }

  it('are checked one by one and joined in order; a repeated part replaces the earlier', async () => {
    const id = await storage.client.initiateNewMultipartUpload('box', 'multi', {})
    const old = await putPart(id, 9, Buffer.from('old end'))
    const end = await putPart(id, 9, Buffer.from('end'))
    const start = await putPart(id, 2, part)
    const small = await putPart(id, 5, Buffer.from('small'))
    expect((await complete(id, [[9, old]])).code).toBe('InvalidPart')
    expect((await complete(id, [[3, start]])).code).toBe('InvalidPart')
    expect(
      (
        await complete(id, [
          [9, end],
          [2, start],
        ])
      ).code,
    ).toBe('InvalidPartOrder')
    expect(
      (
        await complete(id, [
          [5, small],
          [9, end],
        ])
      ).code,
    ).toBe('EntityTooSmall')
    expect((await complete(id, [])).code).toBe('MalformedXML')
    const listed = await send({ method: 'GET', target: `/box/multi?uploadId=${id}&max-parts=2` })
    expect([...listed.body.matchAll(/<PartNumber>(\d+)</g)].map((m) => m[1])).toEqual(['2', '5'])
    expect(listed.body).toContain('<IsTruncated>true</IsTruncated>')
    expect(
      (
        await complete(id, [
          [2, start],
          [9, end],
        ])
      ).status,
    ).toBe(200)
    expect(
      (
        await complete(id, [
          [2, start],
          [9, end],
        ])
      ).code,
    ).toBe('NoSuchUpload')
    const got = await bytesOf(await storage.client.getObject('box', 'multi'))
    expect(got.equals(Buffer.concat([part, Buffer.from('end')]))).toBe(true)
  })
})

describe('request documents', () => {
  it.each([
    '<a>',
    '<a></b>',
    '<a/><b/>',
    'text',
    '<!DOCTYPE a [<!ENTITY e "x">]><a>&e;</a>',
    '<a>&unknown;</a>',
    '<a><![CDATA[x]]></a>',
    '<a b=c/>',
    '',
  ])('%s is malformed', (source) => {
    expect(() => parseXml(source)).toThrow('not well formed')
  })

  it('are read with attributes and character references', () => {
    const root = parseXml('<?xml version="1.0"?>\n<a xmlns="urn:x"> <b>1 &lt; 2 &#x3bc;&#956;</b><c/></a>\n')
    expect(root.children.map((c) => [c.name, c.text])).toEqual([
      ['b', '1 < 2 μμ'],
      ['c', ''],
    ])
  })
})
