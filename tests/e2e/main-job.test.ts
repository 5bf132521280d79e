import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, inject, test } from 'vitest'
import { referencePath } from '../support/reference.ts'
import { openBrowser, picture, signInByHand, type Person } from './browser.ts'

/*
 * The main job once, by hand: maren writes a sheet from a raw record and signs, farid witnesses, noor exports, and the
 * bundle is checked offline; with one byte changed it is refused.
 */

const url = inject('url')
const root = resolve(import.meta.dirname, '../..')
const passphrase = 'ridgeway-demo-passphrase'
const title = 'Single emitter, browser run'

let browser: Browser
let maren: Person
let farid: Person
let noor: Person
let sheetAddress: string
let bundle: string

beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(async () => {
  await browser.close()
})

test('maren starts a sheet and types', async () => {
  maren = await signInByHand(browser, url, 'Maren Adeyemi')
  const { page } = maren
  await picture(page, '1-bench')
  await page.getByRole('button', { name: /Single-photon purity/ }).click()
  const dialog = page.getByRole('dialog', { name: 'Start a sheet' })
  await dialog.getByLabel('Title').fill(title)
  await dialog.getByRole('button', { name: 'Start', exact: true }).click()
  await page.waitForURL(/\/entries\/[0-9a-f-]{36}/)
  sheetAddress = page.url()
  const text = page.getByRole('textbox', { name: /^Text of/ })
  await text.click()
  await page.keyboard.press('Control+End')
  await page.keyboard.type('One emitter under continuous drive, split onto two detectors.')
  await page.keyboard.press('Enter')
  await page.getByText(/^saved \d\d:\d\d:\d\d/i).first().waitFor()
})

test('a dropped record becomes a file with its tags, and one click computes', async () => {
  const { page } = maren
  const bytes = readFileSync(referencePath('tags/emitter-cw.csv')).toString('base64')
  const transfer = await page.evaluateHandle((data) => {
    const made = new DataTransfer()
    const raw = Uint8Array.from(atob(data), (letter) => letter.charCodeAt(0))
    made.items.add(new File([raw], 'emitter-cw.csv', { type: 'text/csv' }))
    return made
  }, bytes)
  const text = page.getByRole('textbox', { name: /^Text of/ })
  await text.dispatchEvent('dragenter', { dataTransfer: transfer })
  await text.dispatchEvent('dragover', { dataTransfer: transfer })
  await text.dispatchEvent('drop', { dataTransfer: transfer })
  await page.getByText(/263 k time stamps/).waitFor()
  await page.getByRole('button', { name: 'Singles, coincidences, correlation' }).click()
  await page.getByText('C3', { exact: true }).first().waitFor()
  await expect.poll(() => page.getByText('Done', { exact: true }).count(), { timeout: 60_000 }).toBe(3)
  await page.getByRole('img', { name: /correlation/i }).first().waitFor()
})

test('a figure is quoted in the text and follows a changed parameter', async () => {
  const { page } = maren
  const text = page.getByRole('textbox', { name: /^Text of/ })
  await text.click()
  await page.keyboard.press('Control+End')
  await page.keyboard.press('Enter')
  await page.keyboard.type('The recovery time is =t1')
  await page.getByRole('option', { name: /t1|t₁|t_1/ }).first().waitFor()
  await page.keyboard.press('Enter')
  await page.keyboard.type('.')
  const quoted = page.locator('.hs-quoted').last()
  await quoted.waitFor()
  const before = await quoted.innerText()
  expect(before).toMatch(/\d ± \d/)
  const bin = page.getByLabel('Bin', { exact: true }).last()
  await bin.click()
  await page.keyboard.press('Control+A')
  await page.keyboard.type('1000 ps')
  await page.keyboard.press('Enter')
  await expect.poll(() => quoted.innerText(), { timeout: 60_000 }).not.toBe(before)
  await expect.poll(() => quoted.innerText(), { timeout: 60_000 }).toMatch(/\d ± \d/)
  await expect.poll(() => page.getByText('Done', { exact: true }).count(), { timeout: 60_000 }).toBe(3)
  await picture(page, '2-sheet')
})

test('maren signs: the sheet waits for its witness', async () => {
  const { page } = maren
  await page.getByText(/^saved \d\d:\d\d:\d\d/i).first().waitFor()
  await page.getByRole('button', { name: 'Sign and submit' }).first().click()
  const dialog = page.getByRole('dialog')
  await dialog.getByLabel(/passphrase/i).fill(passphrase)
  await picture(page, '3-sign')
  await dialog.getByRole('button', { name: 'Sign and submit' }).click()
  await dialog.getByText('Signed and submitted.').waitFor({ timeout: 60_000 })
  await dialog.getByRole('button', { name: 'Close' }).first().click()
  await page.getByText('With witness').first().waitFor()
})

test('farid reads, opens everything and countersigns', async () => {
  farid = await signInByHand(browser, url, 'Dr Farid Shirvani')
  const { page } = farid
  await page.getByRole('link', { name: /Witness desk/ }).first().click()
  await page.getByRole('heading', { name: 'Witness desk' }).waitFor()
  await page.getByText(title).first().waitFor()
  await picture(page, '4-witness-desk')
  await page.goto(`${sheetAddress}/review`)
  const panel = page.getByRole('region', { name: 'Your review' })
  await panel.waitFor()
  for (const name of ['emitter-cw.csv', 'C1', 'C2', 'C3']) {
    const open = panel.getByRole('button', { name: new RegExp(name) }).first()
    if ((await open.count()) === 0) continue
    await open.click()
    await page.getByRole('dialog').getByRole('button', { name: 'Close' }).last().click()
  }
  for (const box of await panel.getByRole('checkbox').all()) await box.click()
  await picture(page, '5-review')
  await panel.getByRole('button', { name: 'Countersign' }).click()
  const dialog = page.getByRole('dialog')
  await dialog.getByLabel(/passphrase/i).fill(passphrase)
  await dialog.getByRole('button', { name: 'Countersign' }).click()
  await dialog.getByText(/Countersigned/).first().waitFor({ timeout: 60_000 })
  await maren.page.goto(sheetAddress)
  await maren.page.getByText('Sealed', { exact: true }).first().waitFor()
  await picture(maren.page, '6-sealed')
})

test('noor verifies the chain and exports the sheet', async () => {
  noor = await signInByHand(browser, url, 'Noor El-Amrani')
  const { page } = noor
  await page.goto(`${url}/ledger`)
  await page.getByRole('heading', { name: 'The chain holds' }).waitFor({ timeout: 60_000 })
  await picture(page, '7-ledger')
  await page.goto(sheetAddress)
  await page.getByRole('button', { name: 'Export' }).first().click()
  await page.getByRole('dialog').getByRole('button', { name: 'Export and sign' }).click()
  const link = page.getByRole('dialog').getByRole('link', { name: 'Download bundle' })
  await link.waitFor({ timeout: 90_000 })
  const [download] = await Promise.all([page.waitForEvent('download'), link.click()])
  bundle = join(mkdtempSync(join(tmpdir(), 'halfsilver-e2e-')), 'bundle.zip')
  await download.saveAs(bundle)
})

function verify(file: string) {
  return spawnSync('npm', ['run', '-s', 'verify', '--', file], { cwd: root, encoding: 'utf8' })
}

test('the bundle verifies offline, and not with one byte changed', () => {
  const good = verify(bundle)
  expect(good.status, good.stdout + good.stderr).toBe(0)
  const bytes = readFileSync(bundle)
  const record = bytes.indexOf('One emitter under continuous drive')
  expect(record).toBeGreaterThan(0)
  bytes[record] = (bytes[record] as number) ^ 1
  const changed = bundle.replace('bundle.zip', 'changed.zip')
  writeFileSync(changed, bytes)
  const bad = verify(changed)
  expect(bad.status, bad.stdout + bad.stderr).toBe(1)
  expect(bad.stdout + bad.stderr).toMatch(/record\.json|entry\.html/)
}, 60_000)

test('no page reported a fault', () => {
  expect([...maren.faults, ...farid.faults, ...noor.faults]).toEqual([])
})
