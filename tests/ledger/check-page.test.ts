// @vitest-environment jsdom
import { execFileSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

const root = resolve(import.meta.dirname, '../..')
let folder: string
let page: string

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'checker-'))
  const vite = join(root, 'node_modules/vite/bin/vite.js')
  const options = ['build', '--config', 'vite.checker.config.ts', '--outDir', folder, '--logLevel', 'error']
  execFileSync(process.execPath, [vite, ...options], { cwd: root })
  page = readFileSync(join(folder, 'check.html'), 'utf8')
}, 120_000)
afterAll(() => rmSync(folder, { recursive: true }))

const parsed = () => new DOMParser().parseFromString(page, 'text/html')

describe('check.html', () => {
  it('is one file with one classic inline script and no address to load from', () => {
    const scripts = [...parsed().querySelectorAll('script')]
    expect(scripts.map((script) => script.attributes.length)).toEqual([0])
    expect(parsed().querySelectorAll('[src], [href], link, iframe, object')).toHaveLength(0)
  })

  it('allows only its own script and style, and no network', () => {
    const policy =
      parsed().querySelector('meta[http-equiv="Content-Security-Policy"]')?.getAttribute('content') ?? ''
    const hash = (selector: string) => {
      const text = parsed().querySelector(selector)?.textContent ?? ''
      return `'sha256-${createHash('sha256').update(text).digest('base64')}'`
    }
    const due = [`script-src ${hash('script')}`, `style-src ${hash('style')}`]
    expect(policy.split('; ').sort()).toEqual(
      ["base-uri 'none'", "default-src 'none'", "form-action 'none'", ...due].sort(),
    )
  })

  it('checks a bundle in a page', { timeout: 60_000 }, async () => {
    document.body.innerHTML = parsed().body.innerHTML
    choose('bundle', golden('bundle.zip'))
    choose('anchors', golden('anchors.json'))
    window.eval(parsed().querySelector('script')?.textContent ?? '')
    document.querySelector('form')?.dispatchEvent(new Event('submit', { cancelable: true }))
    await expect
      .poll(() => document.getElementById('progress')?.textContent, { timeout: 50_000 })
      .toBe('Checked.')
    expect(document.getElementById('verdict')?.textContent).toBe('Everything holds')
    expect(document.querySelector('.anchors')?.textContent).toContain('The anchors match')
  })
})

const golden = (name: string) => new Uint8Array(readFileSync(join(import.meta.dirname, 'golden', name)))

/** Gives a file to an input as a person would choose it; the page reads it in pieces. */
function choose(id: string, bytes: Uint8Array): void {
  const blob = (part: Uint8Array): object => ({
    name: id,
    size: part.length,
    slice: (from: number, to: number) => blob(part.subarray(from, to)),
    arrayBuffer: () => Promise.resolve(part.slice().buffer),
  })
  Object.defineProperty(document.getElementById(id), 'files', { value: [blob(bytes)] })
}
