import type { Browser, HTTPRequest, Page } from 'puppeteer-core'

export interface PrintedPage {
  readonly pdf: Uint8Array
  /** Addresses that the page asked for and did not get. */
  readonly refused: readonly string[]
}

/**
 * Prints one page of HTML as a tagged PDF with bookmarks, in a new tab with scripts off and nothing to load from:
 * every request is refused, whether for the network or for a file.
 *
 * @throws when the tab or the browser ends, or printing fails
 */
export async function printPage(browser: Browser, html: string): Promise<PrintedPage> {
  const page = await browser.newPage()
  try {
    const refused = await isolate(page)
    const pdf = await Promise.race([crash(page), load(page, html).then(() => toPdf(page))])
    return { pdf, refused }
  } finally {
    // The tab of a browser that has ended is gone already.
    await page.close().catch(() => undefined)
  }
}

/** Cuts the page off, and returns the growing list of what it asked for. */
async function isolate(page: Page): Promise<readonly string[]> {
  const refused: string[] = []
  page.on('request', (request) => refuse(request, refused))
  await Promise.all([
    page.setJavaScriptEnabled(false),
    page.setRequestInterception(true),
    page.setOfflineMode(true),
  ])
  return refused
}

function refuse(request: HTTPRequest, refused: string[]): void {
  // What is written in the page itself, such as its fonts, is not a request to anyone.
  if (request.url().startsWith('data:')) return void settled(request.continue())
  refused.push(request.url())
  // `aborted` leaves the page as it is; other reasons would put an error page in its place when it tries to leave.
  settled(request.abort('aborted'))
}

/** A page that is closing can no longer be told; then nothing is loaded either. */
function settled(answer: Promise<void>): void {
  answer.catch(() => undefined)
}

async function load(page: Page, html: string): Promise<void> {
  await page.setContent(html, { waitUntil: 'load', timeout: 0 })
}

function toPdf(page: Page): Promise<Uint8Array> {
  return page.pdf({ preferCSSPageSize: true, tagged: true, outline: true, printBackground: true, timeout: 0 })
}

function crash(page: Page): Promise<never> {
  return new Promise((_, reject) => {
    page.once('error', (error: Error) => reject(error))
    page.once('close', () => reject(new Error('the browser has ended')))
  })
}
