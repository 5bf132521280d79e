import { mkdirSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core'

/** Debian's Chromium, without anything that looks for a network. */
export function openBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  })
}

export interface Person {
  context: BrowserContext
  page: Page
  /** What the page's console reported as an error, and exceptions that nobody caught. */
  faults: string[]
}

/** A browser of its own for a person, signed in by clicking through the sign-in page and the code host's stand-in. */
export async function signInByHand(browser: Browser, url: string, name: string): Promise<Person> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 1000 }, acceptDownloads: true })
  context.setDefaultTimeout(30_000)
  const page = await context.newPage()
  const faults: string[] = []
  // A refused call (4xx) is told in the page; the browser's own line about it is no fault of the program.
  page.on('console', (message) => {
    if (message.type() === 'error' && !/Failed to load resource/.test(message.text())) faults.push(message.text())
  })
  page.on('pageerror', (error) => faults.push(error.message))
  await page.goto(`${url}/sign-in`)
  await page.getByRole('link', { name: 'Sign in with the code host' }).or(page.getByRole('button', { name: 'Sign in with the code host' })).click()
  await page.getByRole('link', { name }).click()
  await page.getByRole('heading', { name: 'Bench', exact: true }).waitFor()
  return { context, page, faults }
}

const pictures = resolve(import.meta.dirname, '../../.data/pictures')

/** A picture of the whole page for people to look at, under `.data/pictures`. */
export async function picture(page: Page, name: string): Promise<Buffer> {
  mkdirSync(pictures, { recursive: true })
  return page.screenshot({ path: join(pictures, `${name}.png`), fullPage: true })
}
