/** The Tank run page in a real browser: drawing, panes, spread, target and the run sheet on paper. */
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { violations } from '../support/accessibility'
import { openBrowserFace, openExample, startBrowserFace } from '../support/browserFace'
import { describeInChromium, launchChromium } from '../support/chromium'

const PANES = ['Plots', 'Tables', 'Run matrix', 'Piston profile', 'Target']

describeInChromium('the Tank run page', () => {
  let browser: Browser
  let face: Awaited<ReturnType<typeof startBrowserFace>>
  beforeAll(async () => {
    browser = await launchChromium()
    face = await startBrowserFace()
  })
  afterAll(async () => {
    await browser.close()
    await face.close()
  })

  async function openDay(options: NonNullable<Parameters<typeof openBrowserFace>[2]> = {}) {
    const opened = await openBrowserFace(browser, face.address, options)
    await openExample(opened.page, 'Rings across a glass tank')
    await opened.page.getByRole('navigation').getByText('Tank run', { exact: true }).click()
    await opened.page.locator('.tank-drawing svg').waitFor()
    return opened
  }

  function pane(page: Page, name: string) {
    return page.getByRole('group', { name: 'Under the drawing' }).getByRole('button', { name, exact: true })
  }

  async function sideways(page: Page): Promise<number> {
    return page.evaluate(() =>
      Math.max(
        ...[document.documentElement, ...document.querySelectorAll('.column')].map(
          (element) => element.scrollWidth - element.clientWidth,
        ),
      ),
    )
  }

  it.each(['light', 'dark'] as const)(
    'has no violation on any pane, empty or in print preview, in %s',
    async (scheme) => {
      const { page, context, complaints } = await openBrowserFace(browser, face.address, { colorScheme: scheme })
      await page.getByRole('navigation').getByText('Tank run', { exact: true }).click()
      await page.getByRole('button', { name: 'Begin a tank run' }).waitFor()
      expect(await violations(page), 'empty').toEqual([])
      await page.getByRole('button', { name: 'Open a finished day' }).click()
      await page.locator('.tank-drawing svg').waitFor()
      for (const name of PANES) {
        await pane(page, name).click()
        expect(await violations(page), name).toEqual([])
      }
      await page.getByRole('button', { name: 'Run sheet…' }).click()
      await page.locator('.print-document h1').waitFor()
      expect(await violations(page), 'print').toEqual([])
      expect(complaints).toEqual([])
      await context.close()
    },
  )

  it.each([
    [1024, 640],
    [1440, 900],
    [1920, 1080],
    // 1280 wide at 200 % zoom.
    [640, 480],
  ])('does not scroll sideways at %i x %i', async (width, height) => {
    const { page, context } = await openDay({ viewport: { width, height } })
    for (const name of PANES) {
      await pane(page, name).click()
      expect(await sideways(page), name).toBeLessThanOrEqual(0)
    }
    await context.close()
  })

  it('follows the ruler: a longer stroke moves the arrivals and the drawing', async () => {
    const { page, context } = await openDay()
    const first = page.locator('.column.results .result .number').first()
    const before = await first.textContent()
    const drawn = await page.locator('.tank-drawing svg').innerHTML()
    await page.getByRole('slider', { name: 'End of the stroke' }).focus()
    await page.keyboard.press('PageUp')
    await expect.poll(() => first.textContent()).not.toBe(before)
    await expect.poll(() => page.locator('.tank-drawing svg').innerHTML()).not.toBe(drawn)
    await context.close()
  })

  it('draws a spread with progress that can be cancelled, and lays its band on the plot', async () => {
    const { page, context } = await openDay()
    await page.getByLabel('Add', { exact: true }).selectOption('programme.peakSpeed')
    const samples = page.getByRole('textbox', { name: 'Samples' })
    await samples.fill('20000')
    await samples.press('Enter')
    await page.getByRole('button', { name: 'Draw', exact: true }).click()
    await page.getByRole('progressbar', { name: 'Spread' }).waitFor()
    await page.getByText(/^sample \d/).waitFor()
    await page.getByRole('button', { name: 'Cancel', exact: true }).click()
    await page
      .getByText(/Cancelled: the spread is that of \d+ of 20000 samples/)
      .first()
      .waitFor()
    await page.getByText('scatter about it, 5 to 95 %').first().waitFor()
    expect(await page.getByRole('img', { name: /^Place of the ring/ }).getAttribute('aria-label')).toContain('95 %:')
    await context.close()
  })

  it('finds the strokes for a wanted speed and adopts one, by keyboard alone', async () => {
    const { page, context } = await openDay()
    await page.getByLabel('Wanted', { exact: true }).selectOption('speed')
    await page.getByText(/strokes give a ring speed of/).waitFor()
    await page.getByRole('button', { name: 'Adopt a stroke of 75 mm' }).focus()
    await page.keyboard.press('Enter')
    await page.getByText('75 mm in').waitFor()
    expect(await page.getByRole('button', { name: 'Undo stroke and speed of the target' }).isVisible()).toBe(true)
    await context.close()
  })

  it('prints the run sheet alone, on the paper that was chosen', async () => {
    const { page, context, complaints } = await openDay()
    await page.getByRole('button', { name: 'Run sheet…' }).click()
    await page.locator('.print-document h1').waitFor()
    await page.getByLabel('Paper').selectOption('A4')
    const a4 = await page.pdf({ preferCSSPageSize: true })
    await page.getByLabel('Paper').selectOption('Letter')
    const letter = await page.pdf({ preferCSSPageSize: true })
    // Points: 210 x 297 mm, and 8.5 x 11 inches.
    const boxes = (pdf: Buffer) => [...pdf.toString('latin1').matchAll(/\/MediaBox \[0 0 ([\d.]+) ([\d.]+)\]/gu)]
    expect(boxes(a4).length).toBeGreaterThan(3)
    for (const [, width, height] of boxes(a4)) {
      expect(Math.abs(Number(width) - 595.3)).toBeLessThan(1)
      expect(Math.abs(Number(height) - 841.9)).toBeLessThan(1)
    }
    expect(boxes(letter).map(([, width, height]) => [Number(width), Number(height)])).toEqual(
      boxes(letter).map(() => [612, 792]),
    )
    await page.emulateMedia({ media: 'print' })
    await page.evaluate(() => window.dispatchEvent(new Event('beforeprint')))
    expect(await page.locator('body > .printed').isVisible()).toBe(true)
    expect(await page.locator('#app').isVisible()).toBe(false)
    await page.evaluate(() => window.dispatchEvent(new Event('afterprint')))
    expect(complaints).toEqual([])
    await context.close()
  })
})
