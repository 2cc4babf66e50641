/** Forming the jet in the browser face: run by key, scrubbed along the ruler, seen in both ways, exported, and without a breach of WCAG. */
import { readFile } from 'node:fs/promises'
import type { Browser, Locator, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { violations } from '../support/accessibility'
import { openBrowserFace, openExample, startBrowserFace } from '../support/browserFace'
import { describeInChromium, launchChromium } from '../support/chromium'

/** A coarse jet of one smoothing length: a fraction of a second even on a busy machine. */
async function form(page: Page): Promise<void> {
  await openExample(page, 'Long stroke past pinch-off')
  await page.getByRole('checkbox', { name: 'In this plan' }).check()
  await page.getByRole('checkbox', { name: 'Three smoothing lengths' }).uncheck()
  const delta = page.getByRole('textbox', { name: 'Smoothing length' })
  await delta.fill('0.15')
  await delta.press('Enter')
  await page.getByRole('button', { name: 'Form it' }).click()
  await page.keyboard.press('Control+Enter')
  await page.locator('.jet-run').getByText('For this plan.').waitFor()
}

/** How many colours a canvas shows: one for an empty picture. */
async function coloursOn(page: Page, canvas: Locator): Promise<number> {
  const picture = await canvas.screenshot()
  return page.evaluate(async (bytes) => {
    const image = await createImageBitmap(new Blob([Uint8Array.from(bytes)], { type: 'image/png' }))
    const copy = new OffscreenCanvas(image.width, image.height)
    const context = copy.getContext('2d')
    context?.drawImage(image, 0, 0)
    const data = context?.getImageData(0, 0, image.width, image.height).data ?? new Uint8ClampedArray(0)
    const found = new Set<number>()
    for (let i = 0; i < data.length; i += 4)
      found.add((((data[i] ?? 0) >> 4) << 8) | (((data[i + 1] ?? 0) >> 4) << 4) | ((data[i + 2] ?? 0) >> 4))
    return found.size
  }, Array.from(picture))
}

describeInChromium('the starting jet in the browser', () => {
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

  it('is formed by key, scrubbed along the ruler to its moments, seen in section and in space, and exported', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address)
    await form(page)
    // The computed number stands on the ruler with the other estimates.
    await expect
      .poll(() => page.locator('.ruler .estimate text').allTextContents())
      .toContainEqual(expect.stringMatching(/^computed \d\.\d$/))

    const head = page.getByRole('slider', { name: 'Time of the jet shown' })
    await head.focus()
    await page.keyboard.press('Home')
    const slider = page.getByRole('slider', { name: 'Time shown' })
    expect(await slider.getAttribute('aria-valuetext')).toMatch(/^formation time 0\.05, .*: forming$/)
    const moments = page.getByRole('group', { name: 'Moments' })
    await moments.getByRole('button', { name: /^stroke ends/ }).click()
    expect(await head.getAttribute('aria-valuenow')).toBe('8')
    await moments.getByRole('button', { name: 'pinch-off' }).click()
    expect(await slider.getAttribute('aria-valuetext')).toMatch(/: pinched off$/)
    expect(Number(await head.getAttribute('aria-valuenow'))).toBeGreaterThan(4)

    // Dragged back along the ruler, the sheet is younger again.
    const box = await head.boundingBox()
    if (box === null) throw new Error('the handle is not on the page')
    const [x, y] = [box.x + box.width / 2, box.y + box.height / 2]
    await page.mouse.move(x, y)
    await page.mouse.down()
    await page.mouse.move(x - 200, y, { steps: 5 })
    await page.mouse.up()
    const dragged = Number(await head.getAttribute('aria-valuenow'))
    await moments.getByRole('button', { name: 'pinch-off' }).click()
    expect(Number(await head.getAttribute('aria-valuenow'))).toBeGreaterThan(dragged + 1)

    const canvas = page.getByRole('img', { name: /^Section through the starting jet/ })
    expect(await coloursOn(page, canvas)).toBeGreaterThan(8)
    await page.getByRole('button', { name: 'In space' }).click()
    await expect.poll(() => coloursOn(page, canvas)).toBeGreaterThan(16)

    await page
      .getByRole('button', { name: /^Export/ })
      .first()
      .click()
    const waiting = page.waitForEvent('download')
    await page.getByRole('button', { name: 'Starting jet over time as CSV' }).click()
    const file = await (await waiting).path()
    const lines = (await readFile(file, 'utf8')).trimEnd().split('\r\n')
    expect(lines[0]).toContain('formation time,time (s),total circulation (m2/s),ring circulation (m2/s)')
    expect(
      lines
        .at(-1)
        ?.split(',')
        .every((cell) => Number.isFinite(Number(cell))),
    ).toBe(true)
    expect(complaints).toEqual([])
    await context.close()
  })

  it.each(['light', 'dark'] as const)(
    'has no violation before and after a run, in both views, in %s',
    async (theme) => {
      const { page, context } = await openBrowserFace(browser, face.address, { colorScheme: theme })
      await page.getByRole('button', { name: 'Form it' }).click()
      expect(await violations(page), 'before').toEqual([])
      await form(page)
      for (const view of ['Section', 'In space']) {
        await page.getByRole('button', { name: view, exact: true }).click()
        expect(await violations(page), view).toEqual([])
      }
      await context.close()
    },
  )

  it.each([
    [1024, 640],
    [640, 480],
  ])('does not scroll sideways at %i x %i', async (width, height) => {
    const { page, context } = await openBrowserFace(browser, face.address, { viewport: { width, height } })
    await form(page)
    const overflow = await page.evaluate(
      () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
    )
    expect(overflow).toBeLessThanOrEqual(0)
    await context.close()
  })
})
