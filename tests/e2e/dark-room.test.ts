import { inflateSync } from 'node:zlib'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, inject, test } from 'vitest'
import { openBrowser, picture, signInByHand, type Person } from './browser.ts'

/* In the dark room the screen emits from the red primary alone: green and blue of every pixel are zero (look, section 3). */

const url = inject('url')
let browser: Browser
let maren: Person

beforeAll(async () => {
  browser = await openBrowser()
  maren = await signInByHand(browser, url, 'Maren Adeyemi')
  await maren.page.getByRole('button', { name: 'Dark-room' }).or(maren.page.getByRole('radio', { name: 'Dark-room' })).first().click()
})
afterAll(() => browser.close())

/** Largest green and blue value of a PNG as Chromium writes it: 8 bits, RGB or RGBA, not interlaced. */
function brightestGreenOrBlue(png: Buffer): number {
  const [width, height, channels] = [png.readUInt32BE(16), png.readUInt32BE(20), png[25] === 6 ? 4 : 3]
  const parts: Buffer[] = []
  for (let at = 8; at < png.length; ) {
    const length = png.readUInt32BE(at)
    if (png.toString('latin1', at + 4, at + 8) === 'IDAT') parts.push(png.subarray(at + 8, at + 8 + length))
    at += 12 + length
  }
  const raw = inflateSync(Buffer.concat(parts))
  const stride = width * channels
  let before = new Uint8Array(stride)
  let brightest = 0
  for (let y = 0; y < height; y++) {
    const filter = raw[y * (stride + 1)]
    const line = new Uint8Array(raw.subarray(y * (stride + 1) + 1, (y + 1) * (stride + 1)))
    for (let x = 0; x < stride; x++) line[x] = (line[x] as number) + predicted(filter, line, before, x, channels)
    for (let x = 0; x < stride; x += channels) brightest = Math.max(brightest, line[x + 1] as number, line[x + 2] as number)
    before = line
  }
  return brightest
}

/** PNG filters (ISO/IEC 15948, section 9). */
function predicted(filter: number | undefined, line: Uint8Array, before: Uint8Array, x: number, channels: number): number {
  const left = x >= channels ? (line[x - channels] as number) : 0
  const up = before[x] as number
  const upLeft = x >= channels ? (before[x - channels] as number) : 0
  if (filter === 1) return left
  if (filter === 2) return up
  if (filter === 3) return (left + up) >> 1
  if (filter !== 4) return 0
  const [a, b, c] = [Math.abs(up - upLeft), Math.abs(left - upLeft), Math.abs(left + up - 2 * upLeft)]
  return a <= b && a <= c ? left : b <= c ? up : upLeft
}

test.each(['/', '/notebooks', '/ledger'])('%s emits red only', async (path) => {
  await maren.page.goto(url + path)
  await maren.page.waitForLoadState('networkidle')
  expect(brightestGreenOrBlue(await picture(maren.page, `dark-room${path.replace('/', '-')}`))).toBe(0)
})

test('a sheet with its plots emits red only', async () => {
  const { page } = maren
  await page.goto(`${url}/notebooks`)
  const id = await page.evaluate(async () => {
    const { items } = (await (await fetch('/api/v1/entries?limit=100')).json()) as { items: { id: string; title: string }[] }
    return items.find((entry) => entry.title.startsWith('Purity of dot 31b'))?.id
  })
  await page.goto(`${url}/entries/${id}`)
  await page.getByRole('img', { name: /correlation/i }).first().waitFor()
  expect(brightestGreenOrBlue(await picture(page, 'dark-room-sheet'))).toBe(0)
})
