// @vitest-environment jsdom
import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { cleanup, configure, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import {
  createCipheriv,
  createHash,
  createPublicKey,
  generateKeyPairSync,
  randomBytes,
  scryptSync,
  verify,
} from 'node:crypto'
import { MemoryRouter } from 'react-router-dom'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { Entry } from '../../server/contract/entries.ts'
import { SignAct } from '../../src/features/signatures/components/sign-act.tsx'
import { UiRoot } from '../../src/ui/ui-root.tsx'
import { authorRecord, certificate, content, entryOnScreen, laboratory, maren } from './signing-fixture.ts'

// The derivation by OpenSSL instead of JavaScript, for speed; that both give the same is told in tests/ledger.
vi.mock('@noble/hashes/scrypt.js', () => ({
  scryptAsync: async (
    password: Uint8Array,
    ownSalt: Uint8Array,
    { N, r, p, dkLen }: { N: number; r: number; p: number; dkLen: number },
  ) => new Uint8Array(scryptSync(password, ownSalt, dkLen, { N, r, p, maxmem: 2 ** 29 })),
}))

/*
 * The whole act against a server that is not ours: node:crypto derives, wraps and verifies, so that what the browser does
 * must agree with OpenSSL (shapes 5).
 */
const passphrase = 'fourteen grey herons wade'
const salt = randomBytes(16)
const derived = scryptSync(passphrase, salt, 64, { N: 2 ** 17, r: 8, p: 1, maxmem: 2 ** 29 })
const proof = derived.subarray(32).toString('base64')
const pair = generateKeyPairSync('ed25519')
const iv = randomBytes(12)
const cipher = createCipheriv('aes-256-gcm', derived.subarray(0, 32), iv)
const sealed = Buffer.concat([
  cipher.update(pair.privateKey.export({ format: 'der', type: 'pkcs8' })),
  cipher.final(),
])
const wrappedKey = Buffer.concat([sealed, cipher.getAuthTag()]).toString('base64')

const json = (body: unknown, status = 200) =>
  new Response(JSON.stringify(body), { status, headers: { 'Content-Type': 'application/json' } })
const problem = (code: string, status: number, more: object = {}) =>
  json(
    { type: `urn:halfsilver:problem:${code}`, code, title: code, status, detail: 'In words.', ...more },
    status,
  )

interface Server {
  entry: Entry
  record: Uint8Array
  wrongProofs: number
  signed: { meaning: string; recordSha256: string; signature: string }[]
}
let server: Server

async function answer(input: string | URL | Request, init?: RequestInit): Promise<Response> {
  const { pathname } = new URL(String(input), 'http://127.0.0.1')
  const body = typeof init?.body === 'string' ? (JSON.parse(init.body) as Record<string, string>) : {}
  if (pathname.endsWith('/me/signing-key')) {
    const kdf = { name: 'scrypt', n: 2 ** 17, r: 8, p: 1, salt: salt.toString('base64') }
    const enrolmentSha256 = 'd'.repeat(64)
    return json({
      status: 'active',
      publicKey: null,
      certificate,
      kdf,
      enrolmentSha256,
      lockedUntil: null,
      expiresAt: null,
    })
  }
  if (pathname.endsWith('/unlock')) {
    if (body.proof === proof) return json({ wrappedKey, iv: iv.toString('base64') })
    server.wrongProofs += 1
    return server.wrongProofs < 5
      ? problem('wrong-passphrase', 403, { attemptsLeft: 5 - server.wrongProofs })
      : problem('signing-locked', 423, { until: '2026-11-12T15:35:00.000Z' })
  }
  if (pathname.endsWith('/signing-record')) {
    const digest = createHash('sha256').update(server.record).digest('base64')
    return new Response(server.record.slice(), { headers: { 'Repr-Digest': `sha-256=:${digest}:` } })
  }
  if (pathname.endsWith('/signatures')) {
    server.signed.push(body as Server['signed'][number])
    const timeStamp = { status: 'pending', time: null, authority: null, independent: false }
    const signer = { personId: maren.id, name: maren.name, role: 'experimentalist' }
    const { meaning, recordSha256 } = body
    return json(
      {
        id: maren.id,
        meaning,
        statement: 's',
        signer,
        time: '2026-11-12T15:20:01.000Z',
        recordSha256,
        timeStamp,
        voided: false,
      },
      201,
    )
  }
  return json(server.entry)
}

beforeEach(() => {
  server = { entry: entryOnScreen(), record: authorRecord().bytes, wrongProofs: 0, signed: [] }
  vi.stubGlobal('fetch', vi.fn(answer))
})
// Other work may share the processor.
configure({ asyncUtilTimeout: 15_000 })
afterEach(() => {
  cleanup()
  vi.unstubAllGlobals()
})

async function opened(shown: unknown = content) {
  const user = userEvent.setup()
  const onSigned = vi.fn()
  const save = vi.fn(async () => {})
  render(
    <QueryClientProvider client={new QueryClient()}>
      <MemoryRouter>
        <UiRoot>
          <SignAct
            sheet={{
              entry: server.entry,
              me: maren,
              laboratoryId: laboratory.id,
              shownContent: () => shown,
              save,
            }}
            onSigned={onSigned}
          />
        </UiRoot>
      </MemoryRouter>
    </QueryClientProvider>,
  )
  await user.click(screen.getByRole('button', { name: 'Sign and submit' }))
  const dialog = await screen.findByRole('dialog', { name: 'Sign and submit N-07/042' })
  return { user, dialog, onSigned, save }
}

describe('sign and submit', () => {
  it('shows what is signed, then signs exactly those bytes with the key that the passphrase opens', async () => {
    const { user, dialog, onSigned, save } = await opened()
    await within(dialog).findByText(/I wrote revision 17 of entry N-07\/042/)
    expect(save).toHaveBeenCalledOnce()
    expect(within(dialog).getByText('emitter.csv')).toBeTruthy()
    expect(within(dialog).getByText('0.083 ± 0.011')).toBeTruthy()
    await user.click(within(dialog).getByLabelText(/Signing passphrase/))
    await user.paste(passphrase)
    await user.click(within(dialog).getByRole('button', { name: 'Sign and submit' }))
    await screen.findByText('Signed and submitted.')
    const [given] = server.signed
    expect(given).toMatchObject({
      meaning: 'authorship',
      recordSha256: createHash('sha256').update(server.record).digest('hex'),
    })
    const publicKey = createPublicKey(pair.privateKey)
    expect(verify(null, server.record, publicKey, Buffer.from(given!.signature, 'base64'))).toBe(true)
    expect(onSigned).toHaveBeenCalledOnce()
    expect(JSON.stringify(vi.mocked(fetch).mock.calls)).not.toContain(passphrase)
  }, 40_000)

  it('says how many attempts are left, then until when signing is locked; nothing is signed', async () => {
    const { user, dialog } = await opened()
    const field = await within(dialog).findByLabelText(/Signing passphrase/)
    const act = () => within(dialog).getByRole('button', { name: 'Sign and submit' })
    await user.type(field, 'not this one at all')
    await user.click(act())
    await within(dialog).findByText(/4 attempts are left/)
    server.wrongProofs = 4
    await user.click(act())
    await within(dialog).findByText(/Signing is locked until/)
    expect(server.signed).toEqual([])
  }, 60_000)

  it('does not offer to sign bytes that say something else than the screen', async () => {
    const { dialog } = await opened({ type: 'doc', content: [] })
    await within(dialog).findByText(/not the text on the screen/)
    expect(within(dialog).queryByLabelText(/Signing passphrase/)).toBeNull()
    expect(within(dialog).queryByRole('button', { name: 'Sign and submit' })).toBeNull()
  })

  it('does not take bytes that did not come whole', async () => {
    const bytes = server.record
    vi.stubGlobal(
      'fetch',
      vi.fn(async (input: string, init?: RequestInit) =>
        String(input).includes('signing-record')
          ? new Response(bytes.slice(), { headers: { 'Repr-Digest': 'sha-256=:AAAA:' } })
          : answer(input, init),
      ),
    )
    const { dialog } = await opened()
    await within(dialog).findByText(/did not (come whole|arrive)/)
    expect(within(dialog).queryByLabelText(/Signing passphrase/)).toBeNull()
  })

  it('lists what stands in the way instead', async () => {
    server.entry = {
      ...server.entry,
      blocks: [{ code: 'calculation-stale', detail: 'C1 was computed from another reading.', pointer: null }],
    }
    const { dialog } = await opened()
    await within(dialog).findByText('C1 was computed from another reading.')
    expect(within(dialog).queryByLabelText(/Signing passphrase/)).toBeNull()
    expect(vi.mocked(fetch).mock.calls.some(([url]) => String(url).includes('signing-record'))).toBe(false)
  })

  it('Esc leaves all as it is', async () => {
    const { user, dialog } = await opened()
    await within(dialog).findByLabelText(/Signing passphrase/)
    await user.keyboard('{Escape}')
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull())
    expect(server.signed).toEqual([])
  })
})
