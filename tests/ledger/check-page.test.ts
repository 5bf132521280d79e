import { createHash } from 'node:crypto'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { JSDOM } from 'jsdom'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { build } from 'vite'

let folder: string
let page: string

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'checker-'))
  const configFile = join(import.meta.dirname, '../../vite.checker.config.ts')
  await build({ configFile, logLevel: 'error', build: { outDir: folder, emptyOutDir: false } })
  page = readFileSync(join(folder, 'check.html'), 'utf8')
}, 120_000)
afterAll(() => rmSync(folder, { recursive: true }))

describe('check.html', () => {
  it('is one file with one classic inline script and no address to load from', () => {
    const { document } = new JSDOM(page).window
    expect([...document.querySelectorAll('script')].map((script) => script.attributes.length)).toEqual([0])
    expect(document.querySelectorAll('[src], [href], link, iframe, object')).toHaveLength(0)
  })

  it('allows only its own script and style, and no network', () => {
    const { document } = new JSDOM(page).window
    const policy =
      document.querySelector('meta[http-equiv="Content-Security-Policy"]')?.getAttribute('content') ?? ''
    const hash = (text: string) => `'sha256-${createHash('sha256').update(text).digest('base64')}'`
    expect(policy.split('; ').sort()).toEqual(
      [
        "base-uri 'none'",
        "default-src 'none'",
        "form-action 'none'",
        `script-src ${hash(document.querySelector('script')?.textContent ?? '')}`,
        `style-src ${hash(document.querySelector('style')?.textContent ?? '')}`,
      ].sort(),
    )
  })

  it('checks a bundle in a page', { timeout: 60_000 }, async () => {
    const { window } = new JSDOM(page, { runScripts: 'outside-only' })
    const { document } = window
    const golden = (name: string) => new Uint8Array(readFileSync(join(import.meta.dirname, 'golden', name)))
    choose(window, 'bundle', golden('bundle.zip'))
    choose(window, 'anchors', golden('anchors.json'))
    window.eval(document.querySelector('script')?.textContent ?? '')
    document.querySelector('form')?.dispatchEvent(new window.Event('submit', { cancelable: true }))
    await expect
      .poll(() => document.getElementById('progress')?.textContent, { timeout: 50_000 })
      .toBe('Checked.')
    expect(document.getElementById('verdict')?.textContent).toBe('Everything holds')
    expect(document.querySelector('.anchors')?.textContent).toContain('The anchors match')
  })
})

/** Gives a file to an input as a person would choose it; the page reads it in pieces. */
function choose(window: JSDOM['window'], id: string, bytes: Uint8Array): void {
  const blob = (part: Uint8Array): object => ({
    name: id,
    size: part.length,
    slice: (from: number, to: number) => blob(part.subarray(from, to)),
    arrayBuffer: () => Promise.resolve(part.slice().buffer),
  })
  Object.defineProperty(window.document.getElementById(id), 'files', { value: [blob(bytes)] })
}
