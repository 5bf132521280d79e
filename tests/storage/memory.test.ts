import { spawn } from 'node:child_process'
import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { mkdtemp, rm } from 'node:fs/promises'
import { request as httpRequest } from 'node:http'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { bytesOf, clientOf, keys, signedHeaders } from './support.ts'

const megabyte = 1 << 20
const size = 300 * megabyte
const partsSize = 100 * megabyte
const chunk = Buffer.alloc(megabyte, 'photon')
let server: ReturnType<typeof spawn>
let folder = ''
let port = 0

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'storage-'))
  server = spawn(
    process.execPath,
    ['--import', 'tsx', join(import.meta.dirname, '../../storage-fake/main.ts')],
    {
      env: {
        ...process.env,
        STORAGE_FOLDER: folder,
        STORAGE_PORT: '0',
        STORAGE_ACCESS_KEY: keys.accessKey,
        STORAGE_SECRET_KEY: keys.secretKey,
        STORAGE_REGION: keys.region,
      },
      stdio: ['ignore', 'pipe', 'inherit'],
    },
  )
  for await (const line of server.stdout!) {
    port = Number(/^storage on (\d+)\n$/.exec(String(line))?.[1])
    break
  }
})
afterAll(async () => {
  const ended = new Promise((resolve) => server.once('exit', resolve))
  server.kill('SIGTERM')
  await ended
  await rm(folder, { recursive: true, force: true })
})

/** Resident memory of the server in MB, now or at its highest (Linux). */
function memory(field: 'VmRSS' | 'VmHWM'): number {
  const status = readFileSync(`/proc/${server.pid}/status`, 'utf8')
  return Number(new RegExp(`${field}:\\s+(\\d+) kB`).exec(status)![1]) / 1024
}

function* chunks(bytes: number) {
  for (let sent = 0; sent < bytes; sent += megabyte) yield chunk
}

async function digestOf(stream: Iterable<Buffer> | AsyncIterable<Buffer>): Promise<string> {
  const hash = createHash('sha256')
  for await (const bytes of stream) hash.update(bytes)
  return hash.digest('hex')
}

async function putWhole(target: string): Promise<void> {
  const raw = {
    method: 'PUT',
    target,
    payloadHash: 'UNSIGNED-PAYLOAD',
    headers: { 'content-length': String(size) },
  }
  const request = httpRequest({
    host: '127.0.0.1',
    port,
    method: 'PUT',
    path: target,
    headers: signedHeaders(port, raw),
  })
  const answered = new Promise<number>((resolve, reject) => {
    request.on('error', reject).on('response', (r) => void bytesOf(r).then(() => resolve(r.statusCode ?? 0)))
  })
  await pipeline(Readable.from(chunks(size)), request)
  expect(await answered).toBe(200)
}

it('300 MB in one PUT, 100 MB in parts, and back out need no more memory than a small file', async () => {
  const client = clientOf(port)
  await client.makeBucket('large')
  await client.putObject('large', 'warm', 'up')
  const before = memory('VmRSS')
  await putWhole('/large/whole')
  await client.putObject('large', 'parts', Readable.from(chunks(partsSize)))
  expect(await digestOf(await client.getObject('large', 'whole'))).toBe(await digestOf(chunks(size)))
  expect(await digestOf(await client.getObject('large', 'parts'))).toBe(await digestOf(chunks(partsSize)))
  // Streams hold a few buffers of 64 KiB; the rest is the collector's slack. A body in memory would be 300 MB.
  expect(memory('VmHWM') - before).toBeLessThan(120)
}, 60_000)
