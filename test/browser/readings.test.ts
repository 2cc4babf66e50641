/**
 * Readings in the browser face: an invented day looked at, tracks and velocity fields imported from files, a factor carried back, and the
 * page without accessibility faults in both themes.
 */
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { violations } from '../support/accessibility'
import { openBrowserFace, startBrowserFace } from '../support/browserFace'
import { describeInChromium, launchChromium } from '../support/chromium'
import { INVENTED_TIMES, inventedFrame } from '../support/inventedFields'

const TRACKS = [
  'Run;Zeit (s);Position (mm);Radius (mm)',
  ...Array.from(
    { length: 8 },
    (_, k) => `1;${(0.9 + 0.4 * k).toFixed(1).replace('.', ',')};${38 + 16 * k};17,${5 + (k % 3)}`,
  ),
  '1;bad;12;17',
].join('\r\n')

async function importFiles(page: Page, files: readonly string[]): Promise<void> {
  const chooser = page.waitForEvent('filechooser')
  await page.getByRole('button', { name: 'Import files…' }).click()
  await (await chooser).setFiles([...files])
  await page.getByRole('dialog', { name: 'Import readings' }).waitFor()
}

describeInChromium('readings in the browser', () => {
  let browser: Browser
  let folder = ''
  let face: Awaited<ReturnType<typeof startBrowserFace>>
  beforeAll(async () => {
    browser = await launchChromium()
    face = await startBrowserFace()
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright-readings-'))
    await writeFile(path.join(folder, 'tracks.csv'), TRACKS)
    for (let k = 0; k < 5; k++) await writeFile(path.join(folder, `frame-${k}.csv`), inventedFrame(k))
  })
  afterAll(async () => {
    await browser.close()
    await face.close()
    await rm(folder, { recursive: true, force: true })
  })

  it('reads tracks and fields from files, compares, carries back, and stays without faults', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address)
    await page.getByRole('navigation').getByText('Readings', { exact: true }).click()
    await page.getByRole('heading', { name: 'Was the plan right?' }).waitFor()
    expect(await violations(page)).toEqual([])

    // A column in another language is named once; the row that is no row is told of.
    await importFiles(page, [path.join(folder, 'tracks.csv')])
    await page.getByLabel('What Zeit (s) is').selectOption('time')
    await page.getByText('8 rows in 1 run; 1 of 9 rows skipped:').waitFor()
    expect(await violations(page)).toEqual([])
    await page.getByRole('button', { name: 'Take as tracks' }).click()
    await page.getByRole('heading', { name: 'Fitted to all runs' }).waitFor()

    // Five frames, analysed in the worker one after another.
    await importFiles(
      page,
      [0, 1, 2, 3, 4].map((k) => path.join(folder, `frame-${k}.csv`)),
    )
    await page.getByRole('textbox', { name: 'First frame at' }).fill(`${INVENTED_TIMES.first} s`)
    await page.getByRole('textbox', { name: 'From frame to frame' }).fill(`${INVENTED_TIMES.step} s`)
    await page.getByRole('button', { name: 'Read 5 files' }).click()
    const slider = page.getByRole('slider', { name: 'Frame shown' })
    await slider.waitFor()
    await expect.poll(() => slider.getAttribute('aria-valuetext')).toMatch(/^frame 5 of 5, 1\.1/)
    await slider.focus()
    await page.keyboard.press('Home')
    expect(await slider.getAttribute('aria-valuetext')).toMatch(/^frame 1 of 5, 0\.1/)
    await page.getByRole('heading', { name: 'From the velocity fields' }).waitFor()
    expect(await violations(page)).toEqual([])

    await page.getByRole('button', { name: 'Take over stroke factor' }).click()
    await page.getByRole('button', { name: 'Undo stroke factor' }).click()
    await page.emulateMedia({ colorScheme: 'dark' })
    await page.getByRole('button', { name: 'Tracks', exact: true }).click()
    expect(await violations(page)).toEqual([])
    // Nothing scrolls sideways, also in the smallest window.
    await page.setViewportSize({ width: 1024, height: 640 })
    const sideways = (): Promise<readonly string[]> =>
      page.evaluate(() =>
        [...document.querySelectorAll('.column, .frame')]
          .filter((one) => one.scrollWidth > one.clientWidth + 1)
          .map((one) => `${one.className} ${one.scrollWidth} > ${one.clientWidth}`),
      )
    // The plots follow the window a frame later.
    await expect.poll(sideways).toEqual([])
    expect(complaints).toEqual([])
    await context.close()
  }, 60_000)
})
