import { describe, expect, test } from 'vitest'
import { ConfigError, readConfig } from '../../server/platform/config.ts'
import { environmentSchema, examples } from '../../server/platform/config-variables.ts'

const whole = {
  PUBLIC_ORIGIN: 'http://127.0.0.1:4310',
  DATABASE_URL: 'postgres://hs_app:x@127.0.0.1:5432/halfsilver',
  DATABASE_OWNER_URL: 'postgres://hs_owner:x@127.0.0.1:5432/halfsilver',
  DATABASE_WORKER_URL: 'postgres://hs_worker:x@127.0.0.1:5432/halfsilver',
  SESSION_SECRET: 's'.repeat(32),
  HALFSILVER_SECRET: 'h'.repeat(32),
  STORAGE_ENDPOINT: 'http://127.0.0.1:9000',
  STORAGE_ACCESS_KEY: 'a',
  STORAGE_SECRET_KEY: 'b',
  OAUTH_CLIENT_ID: 'c',
  OAUTH_CLIENT_SECRET: 'd',
  OAUTH_AUTHORIZE_URL: 'http://127.0.0.1:1/login/oauth/authorize',
  OAUTH_TOKEN_URL: 'http://127.0.0.1:1/login/oauth/access_token',
  OAUTH_PROFILE_URL: 'http://127.0.0.1:1/user',
  OAUTH_EMAILS_URL: 'http://127.0.0.1:1/user/emails',
  SMTP_URL: 'smtp://127.0.0.1:25',
  TSA_URL: 'http://127.0.0.1:2/',
  TSA_CHAIN_FILE: 'chain.pem',
}

function faultsOf(environment: Record<string, string | undefined>, kind: 'api' | 'worker' | 'cli' = 'api') {
  try {
    readConfig(environment, kind)
    return []
  } catch (error) {
    if (error instanceof ConfigError) return error.faults
    throw error
  }
}

test('a whole environment is taken, with the usual values for what is left out', () => {
  expect(readConfig(whole)).toMatchObject({
    port: 4310,
    origin: 'http://127.0.0.1:4310',
    demo: false,
    laboratory: { zone: 'Europe/Berlin' },
    storage: { bucket: 'halfsilver', region: 'us-east-1' },
  })
})

test('every fault is named at once, with an example', () => {
  const faults = faultsOf({
    ...whole,
    DATABASE_URL: undefined,
    PORT: '99999',
    STORAGE_ENDPOINT: 'objects',
    LABORATORY_ZONE: 'Europe/Nowhere',
  })
  expect(faults.map(({ variable }) => variable).sort()).toEqual([
    'DATABASE_URL',
    'LABORATORY_ZONE',
    'PORT',
    'STORAGE_ENDPOINT',
  ])
  expect(faults.find(({ variable }) => variable === 'DATABASE_URL')?.detail).toBe(
    `is missing; an example: DATABASE_URL=${examples.DATABASE_URL}`,
  )
  expect(faults.find(({ variable }) => variable === 'STORAGE_ENDPOINT')?.detail).toContain(
    'must be a URL that begins with http:// or https://',
  )
})

test.each(['SESSION_SECRET', 'HALFSILVER_SECRET'])('%s must be long', (name) => {
  expect(faultsOf({ ...whole, [name]: 'short' })).toMatchObject([{ variable: name }])
})

test('no message repeats a secret', () => {
  const error = new ConfigError(
    faultsOf({ ...whole, SESSION_SECRET: 'too-short-secret', DATABASE_URL: 'hs_app:hidden@db' }),
  )
  expect(error.message).not.toContain('too-short-secret')
  expect(error.message).not.toContain('hidden')
})

test('each process needs its own database role', () => {
  expect(faultsOf({ ...whole, DATABASE_OWNER_URL: undefined }, 'cli')).toMatchObject([
    { variable: 'DATABASE_OWNER_URL' },
  ])
  expect(faultsOf({ ...whole, DATABASE_WORKER_URL: undefined }, 'worker')).toMatchObject([
    { variable: 'DATABASE_WORKER_URL' },
  ])
})

test('a worker starts without the secrets of the application, and never holds them (threat B9)', () => {
  const { SESSION_SECRET, HALFSILVER_SECRET, DATABASE_URL, OAUTH_CLIENT_SECRET, SMTP_URL, ...rest } = whole
  expect(faultsOf(rest, 'worker')).toEqual([])
  const config = readConfig(
    { ...rest, SESSION_SECRET, HALFSILVER_SECRET, DATABASE_URL, OAUTH_CLIENT_SECRET, SMTP_URL },
    'worker',
  )
  const held = JSON.stringify(config)
  for (const secret of [SESSION_SECRET, HALFSILVER_SECRET, DATABASE_URL]) expect(held).not.toContain(secret)
})

describe('plain http (ruling 21)', () => {
  test.each([
    ['http://127.0.0.1:4310', true],
    ['http://localhost:4310', true],
    ['https://notebook.example.org', true],
    ['http://notebook.example.org', false],
    ['http://192.168.1.7:4310', false],
    ['http://127.0.0.1.example.org', false],
    ['https://notebook.example.org/path', false],
  ])('%s: %s', (origin, taken) => {
    expect(faultsOf({ ...whole, PUBLIC_ORIGIN: origin }).length === 0).toBe(taken)
  })
})

describe('a demonstration (ruling 23)', () => {
  const demo = { ...whole, HALFSILVER_DEMO: '1' }

  test('runs on loopback with the stand-ins', () => {
    expect(readConfig(demo).demo).toBe(true)
  })

  test.each([
    ['PUBLIC_ORIGIN', 'https://notebook.example.org'],
    ['STORAGE_ENDPOINT', 'https://objects.example.org'],
    ['OAUTH_AUTHORIZE_URL', 'https://code.example.org/login/oauth/authorize'],
    ['OAUTH_TOKEN_URL', 'https://code.example.org/login/oauth/access_token'],
    ['SMTP_URL', 'smtps://mail.example.org'],
    ['TSA_URL', 'https://stamps.example.org'],
    ['DATABASE_URL', 'postgres://hs_app:x@db.example.org/halfsilver'],
  ])('is refused with %s=%s', (name, value) => {
    expect(faultsOf({ ...demo, [name]: value }).map(({ variable }) => variable)).toContain('HALFSILVER_DEMO')
  })
})

test('every variable has an example and stands in docs/deploy.md', async () => {
  const { readFile } = await import('node:fs/promises')
  const page = await readFile(new URL('../../docs/deploy.md', import.meta.url), 'utf8')
  for (const name of Object.keys(environmentSchema.shape)) {
    expect(examples).toHaveProperty(name)
    expect(page).toContain(`\`${name}\``)
  }
})
