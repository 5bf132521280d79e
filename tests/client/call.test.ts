import { afterEach, describe, expect, test, vi } from 'vitest'
import { problemTable } from '../../server/contract/problems.ts'
import { ApiProblem, mayPass, problemFrom } from '../../src/lib/api-problem.ts'
import { call, callForAnswer } from '../../src/lib/call.ts'
import { isWaitingForSignIn, letWaitingGo, noteSession } from '../../src/lib/session-gate.ts'
import { urlOf } from '../../src/lib/url-of.ts'

const id = '00000000-0000-4000-8000-00000000000a'
const content = { type: 'doc' as const, content: [] }
const saved = { revision: 1, save: 2, savedAt: '2026-11-12T13:58:31.000Z' }

function answers(...responses: (Response | Error)[]) {
  const fetch = vi.fn<typeof globalThis.fetch>(async () => {
    const next = responses.shift()
    if (next instanceof Error) throw next
    return next ?? new Response(null, { status: 204 })
  })
  vi.stubGlobal('fetch', fetch)
  return fetch
}

const json = (body: unknown, status = 200, headers: Record<string, string> = {}) =>
  new Response(JSON.stringify(body), { status, headers: { 'Content-Type': 'application/json', ...headers } })
const problem = (code: keyof typeof problemTable, more: object = {}) =>
  json(
    { type: `urn:halfsilver:problem:${code}`, code, ...problemTable[code], detail: 'In words.', ...more },
    problemTable[code].status,
  )

afterEach(() => void vi.unstubAllGlobals())

describe('addresses', () => {
  test('path parameters are filled in and encoded, queries appended, absent ones left out', () => {
    expect(urlOf('getRevision', { id, n: 3 })).toBe(`/api/v1/entries/${id}/revisions/3`)
    expect(urlOf('getEntry', { id: 'a/b' })).toBe('/api/v1/entries/a%2Fb')
    expect(urlOf('listEntries', { id }, { limit: 20, cursor: undefined })).toBe(
      `/api/v1/notebooks/${id}/entries?limit=20`,
    )
    expect(() => urlOf('getEntry')).toThrow('id')
  })
})

describe('calls', () => {
  test('a write carries If-Match and JSON; the ETag comes back', async () => {
    const fetch = answers(json(saved, 200, { ETag: '"2-ab"' }))
    const answer = await callForAnswer('putContent', { params: { id }, body: content, ifMatch: '"1-aa"' })
    expect(answer).toEqual({ reply: saved, etag: '"2-ab"' })
    const [, init] = fetch.mock.calls[0]!
    expect(init).toMatchObject({ method: 'PUT', body: JSON.stringify(content), credentials: 'same-origin' })
    expect(init?.headers).toMatchObject({ 'If-Match': '"1-aa"', 'Content-Type': 'application/json' })
  })

  test('an answer that is not of the agreed form is not passed on', async () => {
    answers(json({ revision: 'one' }))
    await expect(call('putContent', { params: { id }, body: content, ifMatch: '*' })).rejects.toThrow()
  })

  test('nothing to answer is nothing', async () => {
    answers(new Response(null, { status: 204 }))
    await expect(call('endSession', {})).resolves.toBeUndefined()
  })
})

describe('problems', () => {
  test('code, words, fields and members of the code are kept (RFC 9457)', async () => {
    answers(problem('wrong-passphrase', { attemptsLeft: 3, errors: [{ pointer: '/proof', detail: 'no' }] }))
    const error = await call('unlockSigningKey', { body: { proof: 'AAAA' } }).catch(
      (thrown: unknown) => thrown,
    )
    expect(error).toBeInstanceOf(ApiProblem)
    expect(error).toMatchObject({
      code: 'wrong-passphrase',
      status: 403,
      detail: 'In words.',
      errors: [{ pointer: '/proof', detail: 'no' }],
      extra: { attemptsLeft: 3 },
    })
  })

  test('a page of a proxy becomes a sentence, not a parse error', async () => {
    answers(new Response('<html>Bad gateway</html>', { status: 502 }))
    await expect(call('getEntry', { params: { id } })).rejects.toMatchObject({
      status: 502,
      code: 'service-unavailable',
    })
  })

  test('no answer at all is `unreachable`, and only such problems may pass by waiting', async () => {
    answers(new TypeError('Failed to fetch'))
    const error = await call('getEntry', { params: { id } }).catch((thrown: unknown) => thrown)
    expect(error).toMatchObject({ status: 0, code: 'unreachable' })
    expect(mayPass(error)).toBe(true)
    expect([412, 409, 422, 403].map((status) => mayPass(problemFrom(status, null)))).toEqual([
      false,
      false,
      false,
      false,
    ])
  })

  test('before anyone has signed in a 401 is thrown at once', async () => {
    answers(problem('not-signed-in'))
    await expect(call('getEntry', { params: { id } })).rejects.toMatchObject({ status: 401 })
    expect(isWaitingForSignIn()).toBe(false)
  })

  test('a call that meets the end of the session waits for a sign-in and is made again', async () => {
    noteSession()
    const fetch = answers(problem('not-signed-in'), json(saved))
    const answer = call('putContent', { params: { id }, body: content, ifMatch: '*' })
    await vi.waitFor(() => expect(isWaitingForSignIn()).toBe(true))
    letWaitingGo()
    await expect(answer).resolves.toEqual(saved)
    expect(fetch).toHaveBeenCalledTimes(2)
    expect(isWaitingForSignIn()).toBe(false)
  })

  test('where asked, the end of the session is thrown', async () => {
    answers(problem('not-signed-in'))
    await expect(call('getSession', { signedOut: 'throw' })).rejects.toMatchObject({ status: 401 })
  })
})
