/**
 * Rings in motion in the browser face: a leapfrogging pair placed by hand, run, scrubbed, its events followed, exported, and
 * compared with the headless runner; a long run cancelled with its part kept.
 */
import { spawnSync } from 'node:child_process'
import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Browser, Download, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { inProject } from '../../build/scripts/root.mjs'
import { violations } from '../support/accessibility'
import { openBrowserFace, startBrowserFace } from '../support/browserFace'
import { describeInChromium, launchChromium } from '../support/chromium'

/** Two equal rings a radius apart, without viscosity: they pass through one another again and again. */
const PAIR = [
  'Circulation (cm²/s)\tRadius (mm)\tCore radius (mm)\tCore\tx (mm)',
  '100\t20\t2\tuniform\t0',
  '100\t20\t2\tuniform\t20',
].join('\n')

/** Rings that share no axis: long enough to be cancelled on the way. */
const MANY = [
  'circulation (cm²/s);radius (mm);core radius (mm);x (mm);y (mm);direction y',
  ...Array.from({ length: 10 }, (_, k) => `100;20;3;${60 * k};${5 * (k % 3)};0,0${k % 4}`),
].join('\n')

async function openWake(page: Page): Promise<void> {
  await page.getByRole('navigation').getByText('Wake', { exact: true }).click()
  await page.getByRole('button', { name: 'Place rings by hand' }).click()
  await page.getByRole('button', { name: 'Rings (2)' }).click()
}

/** Paste into the focused cell, as a person does from a spreadsheet. */
async function paste(page: Page, text: string): Promise<void> {
  await page.getByRole('grid', { name: 'Rings' }).getByRole('gridcell').first().focus()
  await page.evaluate((cells) => {
    const clipboardData = new DataTransfer()
    clipboardData.setData('text/plain', cells)
    document.activeElement?.dispatchEvent(
      new ClipboardEvent('paste', { clipboardData, bubbles: true, cancelable: true }),
    )
  }, text)
  await page.getByRole('button', { name: 'Replace all rings' }).click()
}

async function fill(page: Page, label: string, text: string): Promise<void> {
  const field = page.getByRole('textbox', { name: label, exact: true })
  await field.fill(text)
  await field.press('Enter')
}

async function runAndWait(page: Page): Promise<void> {
  await page.keyboard.press('Control+Enter')
  await page.locator('.wake-run').getByText('Results are for this plan.').waitFor()
  // The picture and its timeline follow what is said of the run after a frame has been painted.
  await page.evaluate(async () => {
    for (let frame = 0; frame < 4; frame++) await new Promise((next) => requestAnimationFrame(next))
    await new Promise((next) => setTimeout(next, 100))
  })
}

async function save(page: Page, folder: string, press: () => Promise<unknown>): Promise<string> {
  const waiting: Promise<Download> = page.waitForEvent('download')
  await press()
  const download = await waiting
  const file = path.join(folder, download.suggestedFilename())
  await download.saveAs(file)
  return file
}

async function cellsOf(file: string): Promise<readonly (readonly string[])[]> {
  const text = await readFile(file, 'utf8')
  return text
    .trimEnd()
    .split('\r\n')
    .map((line) => line.split(','))
}

describeInChromium('the wake in the browser', () => {
  let browser: Browser
  let folder = ''
  let face: Awaited<ReturnType<typeof startBrowserFace>>
  beforeAll(async () => {
    browser = await launchChromium()
    face = await startBrowserFace()
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright-wake-'))
  })
  afterAll(async () => {
    await browser.close()
    await face.close()
    await rm(folder, { recursive: true, force: true })
  })

  it('takes a leapfrogging pair from a table to a run whose exports agree with the headless runner', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address)
    await openWake(page)
    await paste(page, PAIR)
    await page.getByRole('checkbox', { name: 'Viscous' }).uncheck()
    await fill(page, 'Duration', '6 s')
    await fill(page, 'Output step', '20 ms')
    await runAndWait(page)

    // The pair passes more than once, and the answer names the one that comes from behind.
    const events = page.getByRole('list').filter({ has: page.getByRole('button', { name: /Rings 1 and 2 pass/ }) })
    expect(await events.getByRole('button', { name: /pass/ }).count()).toBeGreaterThanOrEqual(2)
    expect(await page.getByText(/^Ring 1 catches and passes ring 2 at/).count()).toBe(1)

    // Scrub by keyboard, then let an event take the scene to its time.
    const slider = page.getByRole('slider', { name: 'Time shown' })
    // The picture follows what is said of the run by a frame or two.
    await expect.poll(() => slider.getAttribute('aria-valuetext')).toMatch(/of 6\.00\ss$/)
    await slider.focus()
    await page.keyboard.press('End')
    expect(await slider.getAttribute('aria-valuetext')).toMatch(/^6\.00\ss of 6\.00\ss$/)
    await page.keyboard.press('Home')
    for (let i = 0; i < 3; i++) await page.keyboard.press('ArrowRight')
    expect(await slider.getAttribute('aria-valuetext')).toMatch(/^0\.06\ss/)
    await page.getByRole('combobox', { name: 'Picked ring' }).selectOption('ring 2')
    const numbers = page.locator('.figures')
    const before = await numbers.innerText()
    const first = events.getByRole('button').first()
    const eventTime = Number.parseFloat((await first.locator('.when').innerText()).replace(',', '.'))
    await first.click()
    const shown = Number.parseFloat((await slider.getAttribute('aria-valuetext')) ?? '')
    expect(Math.abs(shown - eventTime)).toBeLessThanOrEqual(0.0101)
    expect(await numbers.innerText()).not.toBe(before)

    // Play moves the time on, and pause holds it.
    await page.getByRole('button', { name: 'Play', exact: true }).click()
    await expect
      .poll(async () => Number.parseFloat((await slider.getAttribute('aria-valuetext')) ?? ''))
      .toBeGreaterThan(shown)
    await page.getByRole('button', { name: 'Pause', exact: true }).click()

    const planFile = await save(page, folder, () => page.getByRole('button', { name: 'Save', exact: true }).click())
    await page
      .getByRole('button', { name: /^Export/ })
      .first()
      .click()
    const press = (name: string) => () => page.getByRole('button', { name }).click()
    const trajectory = await cellsOf(await save(page, folder, press('Trajectories as CSV')))
    const eventTable = await cellsOf(await save(page, folder, press('Events as CSV')))
    const shape = await readFile(
      await save(page, folder, () => page.getByRole('button', { name: /^Rings at .* as VTP$/ }).click()),
      'utf8',
    )
    expect(shape).toMatch(/<VTKFile type="PolyData"/)
    const scene = await readFile(
      await save(page, folder, () => page.getByRole('button', { name: /^Rings at .* as GLTF$/ }).click()),
      'utf8',
    )
    expect(JSON.parse(scene)).toMatchObject({ asset: { version: '2.0' } })
    const picture = await readFile(await save(page, folder, press('Picture as PNG')))
    expect(picture.subarray(1, 4).toString('latin1')).toBe('PNG')
    await page.keyboard.press('Escape')

    const batch = spawnSync(
      process.execPath,
      [inProject('build', 'batch.mjs'), planFile, '--out', 'out', '--only', 'wake'],
      {
        cwd: folder,
        env: { ...process.env, INIT_CWD: folder },
        encoding: 'utf8',
      },
    )
    expect(batch.status, batch.stderr).toBe(0)
    const headless = await cellsOf(path.join(folder, 'out', 'trajectory.csv'))
    expect(trajectory[0]).toEqual(headless[0])
    expect(trajectory.length).toBe(headless.length)
    // Time-integrated: engines differ in the last digit of exp and log, which a march amplifies; 1e-6 relative is the contract's.
    // A place near 0 is compared on the scale of a radius.
    const scale = 0.02
    for (const [i, row] of headless.slice(1).entries())
      for (const [j, cell] of row.entries()) {
        const [got, expected] = [Number(trajectory[i + 1]?.[j]), Number(cell)]
        const allowed = 1e-6 * Math.max(Math.abs(expected), scale)
        expect(Math.abs(got - expected), `row ${i + 1}, column ${j + 1}: ${got} and ${expected}`).toBeLessThanOrEqual(
          allowed,
        )
      }
    const headlessEvents = await cellsOf(path.join(folder, 'out', 'events.csv'))
    expect(eventTable.map((row) => row.slice(1, 3))).toEqual(headlessEvents.map((row) => row.slice(1, 3)))
    expect(complaints).toEqual([])
    await context.close()
  })

  it('edits the table by keyboard, each change a step that can be undone, and says in place what is wrong', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address)
    await openWake(page)
    const grid = page.getByRole('grid', { name: 'Rings' })
    const radius = grid.locator('[data-cell="1 2"]')
    const before = await radius.innerText()
    await grid.getByRole('gridcell').first().focus()
    await page.keyboard.press('ArrowDown')
    await page.keyboard.press('ArrowRight')
    await page.keyboard.press('F2')
    await page.keyboard.type('3 cm')
    await page.keyboard.press('Enter')
    expect(await radius.innerText()).toBe('30')
    await page.keyboard.type('12 mL')
    await page.keyboard.press('Enter')
    expect(await radius.innerText()).toBe('12 mL')
    expect(await radius.getAttribute('aria-invalid')).toBe('true')
    expect(await page.getByText(/Ring 2: Radius needs a length/).count()).toBe(1)
    await page.keyboard.press('Escape')
    expect(await radius.innerText()).toBe('30')
    await page.getByRole('button', { name: 'Undo radius of ring 2' }).click()
    expect(await radius.innerText()).toBe(before)

    // A core thicker than any ring is refused by the march, at its cell.
    const core = grid.locator('[data-cell="0 3"]')
    await core.focus()
    await page.keyboard.type('50')
    await page.keyboard.press('Enter')
    await page
      .getByText(/Core radius of ring 1 must be at most/)
      .first()
      .waitFor()
    expect(await core.getAttribute('aria-invalid')).toBe('true')
    await page.keyboard.press('Control+z')

    // Rows skipped by a paste are told; the paste is one step.
    await grid.getByRole('gridcell').first().focus()
    await page.evaluate(() => {
      const clipboardData = new DataTransfer()
      clipboardData.setData('text/plain', '100\t20\t2\n100\twide\t2\n90\t20\t2\n')
      document.activeElement?.dispatchEvent(new ClipboardEvent('paste', { clipboardData, bubbles: true }))
    })
    expect(await page.locator('dialog[open]').innerText()).toMatch(
      /2 rings read from the clipboard; 1 of 3 rows skipped:\s+Line 2: Radius/,
    )
    await page.getByRole('button', { name: 'Add after the last' }).click()
    expect(await grid.getByRole('row').count()).toBe(5)
    await page.keyboard.press('Control+z')
    expect(await grid.getByRole('row').count()).toBe(3)
    expect(complaints).toEqual([])
    await context.close()
  })

  it('cancels a long run at once and keeps what was finished, marked', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address)
    await openWake(page)
    await paste(page, MANY)
    await fill(page, 'Duration', '1000 s')
    await fill(page, 'Output step', '50 ms')
    await page.getByRole('button', { name: 'Run', exact: true }).click()
    const progress = page.getByRole('progressbar', { name: 'March of the rings' })
    await progress.waitFor()
    // Some outputs have to be there to be kept.
    await page.waitForFunction(() => (document.querySelector('progress')?.value ?? 0) > 0.0202, null, {
      timeout: 60_000,
    })
    const took = await page.evaluate(async () => {
      const cancel = [...document.querySelectorAll('button')].find((button) => button.textContent?.trim() === 'Cancel')
      const from = performance.now()
      cancel?.click()
      while (document.querySelector('progress') !== null) await new Promise((next) => setTimeout(next, 2))
      return performance.now() - from
    })
    // The 0.2 s that are promised are measured by the bench on a quiet machine; here, that it does not wait for the run.
    expect(took).toBeLessThan(3000)
    expect(await page.locator('.wake-run').innerText()).toContain('Cancelled: only the part computed by then is shown.')
    await page
      .getByRole('complementary', { name: 'Results' })
      .getByText(/Cancelled at t = /)
      .first()
      .waitFor()
    expect(await page.getByRole('slider', { name: 'Time shown' }).isEnabled()).toBe(true)
    await page.getByText('part of the results').waitFor()
    // A change marks what is shown as old.
    await fill(page, 'Duration', '900 s')
    await page.getByText('Results are for the previous plan.').first().waitFor()
    expect(complaints).toEqual([])
    await context.close()
  })

  it('carries dye and draws a field when they are asked for, in step with the rings', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address)
    await openWake(page)
    await fill(page, 'Duration', '1 s')
    await runAndWait(page)
    for (const name of ['Dye', 'Speed', 'Stream']) {
      const toggle = page.getByRole('button', { name, exact: true })
      await toggle.click()
      expect(await toggle.getAttribute('aria-pressed')).toBe('true')
      await expect.poll(() => page.locator('.scene-working').count(), { timeout: 60_000 }).toBe(0)
    }
    // The scale of the field is named with its unit.
    await page.getByText(/^stream function \(cm³\/s\)$/).waitFor()
    await page.getByRole('button', { name: 'Play', exact: true }).click()
    expect(complaints).toEqual([])
    await context.close()
  })

  it.each(['light', 'dark'] as const)(
    'has no violation with results, while playing and in its table in %s',
    async (colorScheme) => {
      const { page, context, complaints } = await openBrowserFace(browser, face.address, { colorScheme })
      await openWake(page)
      await fill(page, 'Duration', '2 s')
      await page.getByRole('button', { name: 'Add a station' }).click()
      await runAndWait(page)
      expect(await violations(page), 'table').toEqual([])
      await page.getByRole('button', { name: 'Plots', exact: true }).click()
      await page.getByRole('button', { name: 'Play', exact: true }).click()
      expect(await violations(page), 'playing').toEqual([])
      expect(complaints).toEqual([])
      await context.close()
    },
  )

  it.each([
    [1024, 640],
    [1440, 900],
    [1920, 1080],
    [640, 480],
  ])('does not scroll sideways at %i x %i, with plots or table', async (width, height) => {
    const { page, context } = await openBrowserFace(browser, face.address, { viewport: { width, height } })
    await openWake(page)
    for (const name of ['Rings (2)', 'Plots']) {
      await page.getByRole('button', { name, exact: true }).click()
      const overflow = await page.evaluate(() =>
        [document.documentElement, ...document.querySelectorAll('.column')].map(
          (element) => element.scrollWidth - element.clientWidth,
        ),
      )
      expect(Math.max(...overflow), name).toBeLessThanOrEqual(0)
    }
    await context.close()
  })

  it('does not move by itself, and works in forced colours with reduced motion', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address, {
      forcedColors: 'active',
      reducedMotion: 'reduce',
    })
    await openWake(page)
    await runAndWait(page)
    const slider = page.getByRole('slider', { name: 'Time shown' })
    const before = await slider.getAttribute('aria-valuetext')
    await page.waitForTimeout(300)
    expect(await slider.getAttribute('aria-valuetext')).toBe(before)
    expect(await page.getByRole('button', { name: 'Play', exact: true }).isEnabled()).toBe(true)
    expect(complaints).toEqual([])
    await context.close()
  })
})
