import { execFileSync } from 'node:child_process'
import { createHash, randomBytes } from 'node:crypto'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { createTimeStampAuthority, type TimeStampAuthority } from '../../server/fakes/time-stamp-authority.ts'
import { requestTimeStamp, rootDigests } from '../../server/platform/timestamps/time-stamp.ts'

// RFC 3161 and RFC 5816; the outside reader is `openssl ts`.

const now = new Date('2026-03-02T09:15:00.750Z')
let folder: string, other: string
let authority: TimeStampAuthority, stranger: TimeStampAuthority
let chain: string
beforeAll(async () => {
  ;[folder, other] = [mkdtempSync(path.join(tmpdir(), 'tsa-')), mkdtempSync(path.join(tmpdir(), 'tsa-'))]
  const clock = { now: () => now }
  authority = await createTimeStampAuthority({ folder, clock })
  stranger = await createTimeStampAuthority({ folder: other, clock })
  chain = readFileSync(authority.chainFile, 'utf8')
})
afterAll(() => [folder, other].forEach((name) => rmSync(name, { recursive: true })))

const data = randomBytes(64)

test('a stamp under an injected clock is one that openssl verifies at its own time', async () => {
  const stamp = await requestTimeStamp(data, authority.respond, chain)
  expect(stamp.genTime.toISOString()).toBe('2026-03-02T09:15:00.000Z')
  const [dataFile, stampFile] = [path.join(folder, 'data'), path.join(folder, 'stamp.tsr')]
  writeFileSync(dataFile, data)
  writeFileSync(stampFile, stamp.response)
  const attime = String(stamp.genTime.getTime() / 1000)
  const verify = [
    'ts',
    '-verify',
    '-data',
    dataFile,
    '-in',
    stampFile,
    '-CAfile',
    authority.chainFile,
    '-attime',
    attime,
  ]
  expect(execFileSync('openssl', verify, { stdio: ['ignore', 'pipe', 'ignore'] }).toString()).toContain(
    'Verification: OK',
  )
  // Nothing but the stamp may be in it: a serial number of the wrong length once carried memory of the process.
  expect(stamp.response.length).toBeLessThan(1000)
})

test('the root that openssl reads first in the chain file is the one that the anchors name', () => {
  const der = execFileSync('openssl', ['x509', '-in', authority.chainFile, '-outform', 'DER'])
  expect(rootDigests(chain)).toEqual([createHash('sha256').update(der).digest('hex')])
})

test('answers of another authority, over other data, to another request, or refusals are not believed', async () => {
  const refused: [string, () => Promise<unknown>, RegExp][] = [
    ['another authority', () => requestTimeStamp(data, stranger.respond, chain), /does not verify/],
    ['no root', () => requestTimeStamp(data, authority.respond, ''), /hold no root/],
    [
      'a refusal',
      () => requestTimeStamp(data, (request) => authority.respond(request.slice(0, -1)), chain),
      /refused: status 2/,
    ],
  ]
  let earlier: Uint8Array = new Uint8Array()
  await requestTimeStamp(data, async (request) => (earlier = await authority.respond(request)), chain)
  refused.push([
    'a replayed answer',
    () => requestTimeStamp(data, () => Promise.resolve(earlier), chain),
    /another request/,
  ])
  refused.push([
    'other data',
    () => requestTimeStamp(randomBytes(64), () => Promise.resolve(earlier), chain),
    /something else/,
  ])
  for (const [what, work, words] of refused) await expect(work(), what).rejects.toThrow(words)
  for (let at = 20; at < earlier.length; at += 37) {
    const forged = Uint8Array.from(earlier)
    forged[at] = (forged[at] ?? 0) ^ 1
    await expect(
      requestTimeStamp(data, () => Promise.resolve(forged), chain),
      `byte ${at}`,
    ).rejects.toThrow()
  }
})
