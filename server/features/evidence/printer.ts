import type { Browser, Page } from 'playwright-core'

/*
 * One browser for the whole process with one page kept open: starting costs a second, printing a fraction of it. The page
 * runs no script and makes no request; everything it shows is inside the HTML it is given (threat B16).
 */

const switches = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]
const PRINT_TIMEOUT_MS = 60_000

let browser: Browser | null = null
let page: Page | null = null
let queue: Promise<unknown> = Promise.resolve()

/** A4 PDF, tagged, of a self-contained HTML page. Prints come one after another. */
export function printPdf(html: string): Promise<Buffer> {
  const print = queue.then(() => printNow(html))
  queue = print.catch(() => undefined)
  return print
}

/** Starts the browser ahead of the first print; a failure shows when something is printed. */
export function warmPrinter(): void {
  queue = queue.then(openPage).catch(() => undefined)
}

/** Ends the browser; a later print starts another. */
export async function closePrinter(): Promise<void> {
  const open = browser
  browser = null
  page = null
  await open?.close()
}

async function printNow(html: string): Promise<Buffer> {
  try {
    const paper = await openPage()
    await paper.setContent(html, { waitUntil: 'load', timeout: PRINT_TIMEOUT_MS })
    return await paper.pdf({ tagged: true, outline: true, preferCSSPageSize: true, printBackground: true })
  } catch (error) {
    await closePrinter().catch(() => undefined)
    throw error
  }
}

async function openPage(): Promise<Page> {
  if (browser?.isConnected() && page && !page.isClosed()) return page
  // Loaded with the first print: it is large, and the start of the process does not wait for it.
  const { chromium } = await import('playwright-core')
  browser = await chromium.launch({
    executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
    args: switches,
    timeout: PRINT_TIMEOUT_MS,
  })
  const context = await browser.newContext({
    javaScriptEnabled: false,
    offline: true,
    acceptDownloads: false,
  })
  await context.route('**', (route) => route.abort())
  page = await context.newPage()
  return page
}
