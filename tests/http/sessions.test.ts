import { afterAll, beforeAll, beforeEach, describe, expect, inject, test } from 'vitest'
import { endpoints } from '../../server/contract/endpoints.ts'
import { route } from '../../server/platform/http/route.ts'
import { endSession } from '../../server/platform/identity/session.ts'
import { signIn, type PersonClient } from '../support/session.ts'
import { startSmallApp, type SmallApp } from '../support/small-app.ts'

// Limits of rulings.md 18 to 21: 12 h whatever happens, 30 min without a sign of the person.

let app: SmallApp
let maren: PersonClient
const signedInAt = new Date('2030-01-15T09:00:00.000Z')
const after = (minutes: number, seconds = 0) =>
  app.clock.set(new Date(signedInAt.getTime() + minutes * 60_000 + seconds * 1000))
const active = { 'x-person-active': '1' }

beforeAll(async () => {
  app = await startSmallApp(inject('environment'), ({ config }) => [
    route(endpoints.listTokens, async () => ({ items: [], nextCursor: null })),
    route(endpoints.revokeToken, async () => undefined),
    route(endpoints.uploadToEntry, async ({ res }) => {
      res.status(204).end()
      return undefined as never
    }),
    route(endpoints.endSession, async ({ req, res }) => endSession(req, res, config)),
  ])
})
afterAll(() => app.close())
beforeEach(async () => {
  app.clock.set(signedInAt)
  maren = await signIn(app.url, 'maren')
})

const ask = (headers: Record<string, string> = {}) =>
  maren.call('GET', 'tokens', undefined, headers).then(({ status }) => status)
const change = () =>
  maren.call('DELETE', 'tokens/7f0c6f6a-53b8-4a6e-a9a7-1a1f0d3c2b11').then(({ status }) => status)

describe('idle', () => {
  test.each([
    [29, 59, 200],
    [30, 0, 200],
    [30, 1, 401],
  ])('after %i min %i s without a sign: %i', async (minutes, seconds, expected) => {
    after(minutes, seconds)
    expect(await ask()).toBe(expected)
  })

  test('polling without the header does not keep a session alive', async () => {
    after(20)
    expect(await ask()).toBe(200)
    after(30, 1)
    expect(await ask()).toBe(401)
  })

  test('the header of real input and a change do', async () => {
    after(20)
    expect(await ask(active)).toBe(200)
    after(49)
    expect(await change()).toBe(204)
    after(78)
    expect(await ask()).toBe(200)
    after(79, 1)
    expect(await ask()).toBe(401)
  })

  test('an upload does not: it runs by itself', async () => {
    after(20)
    const form = new FormData()
    form.set('file', new Blob(['1']), 'a.csv')
    await maren.call('POST', 'entries/7f0c6f6a-53b8-4a6e-a9a7-1a1f0d3c2b11/files', form)
    after(30, 1)
    expect(await ask()).toBe(401)
  })

  test('an ended session stays ended when the clock is set back', async () => {
    after(31)
    expect(await ask()).toBe(401)
    after(1)
    expect(await ask()).toBe(401)
  })
})

describe('twelve hours', () => {
  async function staysActiveUntil(minutes: number) {
    for (let at = 25; at < minutes; at += 25) {
      after(at)
      expect(await ask(active)).toBe(200)
    }
  }

  test.each([
    [719, 59, 200],
    [720, 1, 401],
  ])('a session that is always active: after %i min %i s %i', async (minutes, seconds, expected) => {
    await staysActiveUntil(minutes)
    after(minutes, seconds)
    expect(await ask(active)).toBe(expected)
  })
})

describe('the cookie', () => {
  test('is of this port alone, Secure, HttpOnly, Lax, without Domain', async () => {
    const answer = await fetch(`${app.url}/auth/github`, { redirect: 'manual' })
    const [cookie = ''] = answer.headers.getSetCookie()
    expect(cookie).toMatch(new RegExp(`^__Host-hs-${new URL(app.url).port}=`))
    expect(cookie.split('; ').slice(1).sort()).toEqual(['HttpOnly', 'Path=/', 'SameSite=Lax', 'Secure'])
  })

  test('is worth nothing after signing out, also a copy of it', async () => {
    const stolen = maren.cookies()
    expect((await maren.call('DELETE', 'session')).status).toBe(204)
    const answer = await fetch(`${app.url}/api/v1/tokens`, { headers: { cookie: stolen } })
    expect(answer.status).toBe(401)
  })

  test('changes at sign-in: an id known before opens nothing', async () => {
    const before = await fetch(`${app.url}/auth/github`, { redirect: 'manual' })
    const [planted = ''] = before.headers.getSetCookie().map((line) => line.split(';')[0] ?? '')
    const toHost = new URL(before.headers.get('location') ?? '')
    toHost.searchParams.set('login', 'maren')
    const back = await fetch(toHost, { redirect: 'manual' })
    const done = await fetch(back.headers.get('location') ?? '', {
      redirect: 'manual',
      headers: { cookie: planted },
    })
    expect(done.headers.get('location')).toBe('/')
    const [own = ''] = done.headers.getSetCookie().map((line) => line.split(';')[0] ?? '')
    expect(own).not.toBe(planted)
    expect((await fetch(`${app.url}/api/v1/tokens`, { headers: { cookie: planted } })).status).toBe(401)
    expect((await fetch(`${app.url}/api/v1/tokens`, { headers: { cookie: own } })).status).toBe(200)
  })
})

test('rights are read afresh: a closed account is out at its next call', async () => {
  const { db } = app.services
  await db.run(`update work.people set active = false where login = 'maren'`)
  try {
    expect(await ask()).toBe(401)
  } finally {
    await db.run(`update work.people set active = true where login = 'maren'`)
  }
  expect(await ask()).toBe(200)
})
