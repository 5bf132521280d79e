// @vitest-environment jsdom
import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { cleanup, configure, render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { BundleExport } from '../../server/contract/exports.ts'
import { bundleTitle, verifyCommand } from '../../src/features/exports/export-words.ts'
import { ExportForm } from '../../src/features/exports/index.ts'
import { UiRoot } from '../../src/ui/ui-root.tsx'

const uuid = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`
const time = '2026-11-13T09:00:00.000Z'
const json = (body: unknown, status = 200) =>
  new Response(JSON.stringify(body), { status, headers: { 'Content-Type': 'application/json' } })

const notebook = (allowed: string[]) => ({
  id: uuid(50),
  number: 'N-07',
  title: 'Nanobeam dots',
  witnessesRequired: 1,
  createdAt: time,
  entries: 2,
  members: [],
  allowed,
})
const entry = (n: number, state: 'sealed' | 'draft') => ({
  id: uuid(n),
  notebookId: uuid(50),
  number: `N-07/00${n}`,
  title: `Sheet ${n}`,
  experiment: 'hbt',
  state,
  phase: state === 'sealed' ? 'sealed' : 'writing',
  important: false,
  authors: [],
  createdAt: time,
  updatedAt: time,
  submittedAt: null,
})
const bundle = (over: Partial<BundleExport>): BundleExport => ({
  id: uuid(90),
  status: 'queued',
  entries: [{ id: uuid(1), number: 'N-07/001' }],
  notebookId: uuid(50),
  name: 'ridgeway-N-07-2026-11-13',
  size: null,
  sha256: null,
  error: null,
  createdAt: time,
  expiresAt: time,
  ...over,
})

let allowed: string[]
let states: BundleExport[]
let started: unknown[]
beforeEach(() => {
  allowed = ['export']
  states = [
    bundle({ status: 'waiting-for-time-stamp' }),
    bundle({ status: 'done', size: 1_900_000, sha256: 'a'.repeat(64) }),
  ]
  started = []
  vi.stubGlobal(
    'fetch',
    vi.fn(async (url: string, init?: RequestInit) => {
      if (init?.method === 'POST') {
        started.push(JSON.parse(String(init.body)))
        return json(bundle({}), 202)
      }
      if (url.includes('/exports/')) return json(states.length > 1 ? states.shift() : states[0])
      if (url.includes('/entries'))
        return json({ items: [entry(1, 'sealed'), entry(2, 'draft')], nextCursor: null })
      return json({ items: url.includes('/notebooks') ? [notebook(allowed)] : [], nextCursor: null })
    }),
  )
})
// Other work may share the processor.
configure({ asyncUtilTimeout: 15_000 })
afterEach(() => {
  cleanup()
  vi.unstubAllGlobals()
})

function form() {
  render(
    <QueryClientProvider client={new QueryClient()}>
      <UiRoot>
        <ExportForm />
      </UiRoot>
    </QueryClientProvider>,
  )
  return userEvent.setup()
}

describe('export of a notebook', () => {
  it('starts one with the choice made, tells what it waits for, then gives bundle, digest and the command that checks it', async () => {
    const user = form()
    await screen.findByText(/One entry is not sealed/)
    await user.click(screen.getByRole('checkbox', { name: 'Raw files' }))
    await user.click(screen.getByRole('button', { name: 'Export and sign' }))
    await screen.findByText(/Waits for a time stamp/)
    expect(started).toEqual([{ notebookId: uuid(50), withoutRaw: true }])
    const link = await screen.findByRole('link', { name: 'Download bundle' })
    expect(link.getAttribute('href')).toBe(`/api/v1/exports/${uuid(90)}/bundle`)
    expect(link.getAttribute('download')).toBe('ridgeway-N-07-2026-11-13.zip')
    expect(
      screen.getByText('npm run verify -- ridgeway-N-07-2026-11-13.zip --anchors anchors.json'),
    ).toBeTruthy()
  })

  it('says what failed and that nothing was changed', async () => {
    const error = { type: 'urn:x', code: 'internal', title: 'x', status: 500, detail: 'The worker ended.' }
    states = [bundle({ status: 'failed', error })]
    const user = form()
    await screen.findByText(/One entry is not sealed/)
    await user.click(screen.getByRole('button', { name: 'Export and sign' }))
    const alert = await screen.findByText(/The worker ended/)
    expect(alert.textContent).toContain('Nothing in the notebook was changed')
  })

  it('offers nothing to whoever may not export', async () => {
    allowed = []
    form()
    await screen.findByText(/You may export from no notebook/)
    expect(screen.queryByRole('button', { name: 'Export and sign' })).toBeNull()
  })
})

describe('words', () => {
  it('names a bundle by what is in it', () => {
    expect(bundleTitle(bundle({}))).toBe('N-07, whole')
    expect(bundleTitle(bundle({ notebookId: null }))).toBe('N-07/001')
    const two = [...bundle({}).entries, { id: uuid(2), number: 'N-07/002' }]
    expect(bundleTitle(bundle({ notebookId: null, entries: two }))).toBe('N-07, 2 entries')
    expect(verifyCommand('b.zip')).toBe('npm run verify -- b.zip --anchors anchors.json')
  })
})
