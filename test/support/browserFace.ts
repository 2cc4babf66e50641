/** The browser face as a user meets it: the built page from the built loopback server. */
import type { Browser, BrowserContext, Page } from 'playwright-core'
import { inProject } from '../../build/scripts/root.mjs'

interface LoopbackServer {
  readonly address: string
  close(): Promise<void>
}

/** Start the built server on a free port. */
export async function startBrowserFace(): Promise<LoopbackServer> {
  const module: { startServer(request: { root: string; port: number }): Promise<LoopbackServer> } = await import(
    inProject('dist', 'app', 'serve.mjs')
  )
  return module.startServer({ root: inProject('dist', 'renderer'), port: 0 })
}

export interface OpenedPage {
  readonly context: BrowserContext
  readonly page: Page
  /** Errors of page and console, and requests that left the server. */
  readonly complaints: string[]
}

/** Open the page in a context of its own and wait for its first results. */
export async function openBrowserFace(
  browser: Browser,
  address: string,
  options: Parameters<Browser['newContext']>[0] = {},
): Promise<OpenedPage> {
  const context = await browser.newContext({
    viewport: { width: 1440, height: 900 },
    acceptDownloads: true,
    ...options,
  })
  const page = await context.newPage()
  const complaints: string[] = []
  page.on('pageerror', (error) => complaints.push(error.message))
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning') complaints.push(message.text())
  })
  page.on('request', (request) => {
    const url = request.url()
    if (!url.startsWith(address) && !url.startsWith('blob:') && !url.startsWith('data:'))
      complaints.push(`asked for ${url}`)
  })
  await page.goto(address)
  await page.getByText('results current').first().waitFor()
  return { context, page, complaints }
}

/** Open an example through its dialog. */
export async function openExample(page: Page, title: string): Promise<void> {
  await page
    .getByRole('button', { name: /^Examples/ })
    .first()
    .click()
  await page.locator('dialog[open]').getByText(title).first().click()
  await page.locator('h1', { hasText: title }).waitFor()
  await page.getByText('results current').first().waitFor()
}
