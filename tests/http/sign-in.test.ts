import { afterAll, beforeAll, expect, inject, test } from 'vitest'
import { startSmallApp, type SmallApp } from '../support/small-app.ts'
import { signIn } from '../support/session.ts'

// OAuth 2.0 web flow: RFC 6749 section 4.1 with state (10.12) and PKCE (RFC 7636).

let app: SmallApp
beforeAll(async () => {
  app = await startSmallApp(inject('environment'), () => [])
})
afterAll(() => app.close())

const go = (url: string | URL, cookie = '') => fetch(url, { redirect: 'manual', headers: { cookie } })
const cookieOf = (answer: Response) =>
  answer.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ')
const locationOf = (answer: Response) => new URL(answer.headers.get('location') ?? '', app.url)

async function begun(login: string) {
  const first = await go(`${app.url}/auth/github`)
  const authorise = locationOf(first)
  authorise.searchParams.set('login', login)
  return { cookie: cookieOf(first), authorise, back: locationOf(await go(authorise)) }
}

test('asks the code host with state and an S256 challenge', async () => {
  const { authorise } = await begun('maren')
  expect(authorise.origin).not.toBe(app.url)
  expect(authorise.searchParams.get('state')?.length).toBeGreaterThan(15)
  expect(authorise.searchParams.get('code_challenge_method')).toBe('S256')
  expect(authorise.searchParams.get('redirect_uri')).toBe(`${app.url}/auth/github/callback`)
})

test('a forged state is refused', async () => {
  const { cookie, back } = await begun('maren')
  back.searchParams.set('state', 'forged')
  expect(locationOf(await go(back, cookie)).search).toBe('?failed=not-completed')
})

test('an answer of the code host is worth nothing in another browser', async () => {
  const { back } = await begun('maren')
  const other = await begun('farid')
  expect(locationOf(await go(back, other.cookie)).search).toBe('?failed=not-completed')
})

test('a code works once', async () => {
  const { cookie, back } = await begun('maren')
  expect(locationOf(await go(back, cookie)).pathname).toBe('/')
  expect(locationOf(await go(back, cookie)).search).toBe('?failed=not-completed')
})

test('whoever declines at the code host comes back unsigned', async () => {
  const { cookie, back } = await begun('nobody-of-that-name')
  expect(back.searchParams.get('error')).toBe('access_denied')
  expect(locationOf(await go(back, cookie)).search).toBe('?failed=not-completed')
})

test('the account id decides, never the login: a login that changed hands opens nothing (ruling 25)', async () => {
  const { db } = app.services
  await db.run(`update work.people set provider_account_id = '999999' where login = 'teo'`)
  try {
    expect((await signIn(app.url, 'teo')).landed).toBe('/sign-in?failed=unknown-account')
  } finally {
    await db.run(`update work.people set provider_account_id = '410002' where login = 'teo'`)
  }
  expect((await signIn(app.url, 'teo')).landed).toBe('/')
})

test.each([
  ['/entries/7?tab=history#note', '/entries/7?tab=history#note'],
  ['//evil.example/', '/'],
  ['/\\evil.example/', '/'],
  ['https://evil.example/', '/'],
  ['/auth/github', '/'],
])('returnTo=%s leads to %s', async (asked, expected) => {
  const { landed } = await signIn(app.url, 'maren', `/auth/github?returnTo=${encodeURIComponent(asked)}`)
  expect(landed).toBe(expected.replace(/#.*/, ''))
})
