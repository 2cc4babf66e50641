/** WCAG 2.2 AA by axe-core on every page, in both themes, and at the smallest size nothing scrolls sideways. */
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { violations } from '../support/accessibility'
import { openBrowserFace, openExample, startBrowserFace } from '../support/browserFace'
import { describeInChromium, launchChromium } from '../support/chromium'

const PAGES = ['Stroke', 'Thrust', 'Wake', 'Tank run', 'Readings']

describeInChromium('the window', () => {
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

  it.each(['light', 'dark'] as const)('has no violation on any page in %s', async (colorScheme) => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address, { colorScheme })
    expect(await violations(page), 'start').toEqual([])
    await openExample(page, 'Long stroke past pinch-off')
    for (const name of PAGES) {
      await page.getByRole('navigation').getByText(name, { exact: true }).click()
      expect(await violations(page), name).toEqual([])
    }
    expect(complaints).toEqual([])
    await context.close()
  })

  it.each(['light', 'dark'] as const)(
    'has none in its dialogs, a refused field and an open “why?” in %s',
    async (colorScheme) => {
      const { page, context } = await openBrowserFace(browser, face.address, { colorScheme })
      for (const name of [/^Examples/, /^Export/, /^Units/, /^Keys/, /^About/]) {
        await page.getByRole('button', { name }).first().click()
        await page.locator('dialog[open]').waitFor()
        expect(await violations(page), String(name)).toEqual([])
        await page.keyboard.press('Escape')
      }
      await page.getByRole('textbox', { name: 'Exit diameter' }).fill('12 mL')
      await page.keyboard.press('Enter')
      expect(await violations(page), 'refused').toEqual([])
      await page.keyboard.press('Escape')
      await page
        .getByRole('button', { name: /^Ring speed/ })
        .first()
        .click()
      expect(await violations(page), 'why').toEqual([])
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
    const { page, context } = await openBrowserFace(browser, face.address, { viewport: { width, height } })
    const overflow = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    )
    expect(overflow).toBeLessThanOrEqual(0)
    await context.close()
  })

  it('works in forced colours and with reduced motion', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address, {
      forcedColors: 'active',
      reducedMotion: 'reduce',
    })
    expect(await page.getByRole('slider', { name: 'End of the stroke' }).isVisible()).toBe(true)
    expect(complaints).toEqual([])
    await context.close()
  })
})
