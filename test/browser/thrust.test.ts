/**
 * Thrusters in the browser face: two vehicles of our own sized from the page with the result of the headless runner, a candidate opened
 * and taken back by keyboard alone, a long search cancelled, and no violation of the accessibility rules in either theme.
 */
import { spawnSync } from 'node:child_process'
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { inProject } from '../../build/scripts/root.mjs'
import { violations } from '../support/accessibility'
import { openBrowserFace, openExample, startBrowserFace } from '../support/browserFace'
import { describeInChromium, launchChromium } from '../support/chromium'
import { documentOf } from '../support/plans'

const ACTUATOR = { efficiency: 0.7, ejectShare: 0.5, valveLag: 0.01 }

/** A 2 m hull at 1 m/s and a vehicle of 0.3 m at 0.3 m/s, both invented. */
const VEHICLES = {
  'two metres at 1 m/s': documentOf({
    title: 'Two metre hull',
    water: { kind: 'sea', temperatureCelsius: 10, salinity: 35, depth: 10 },
    nozzle: { shape: 'converging', diameter: 0.08, pistonDiameter: 0.16, length: 0.08, lossCoefficient: 0.1 },
    programme: { shape: 'sine-squared', stroke: 0.3, peakSpeed: 2.4 },
    train: { pulses: 10, period: 0.6 },
    thruster: {
      count: 2,
      spacing: 0.4,
      vehicle: {
        speed: null,
        mass: 120,
        addedMass: 15,
        length: 2,
        drag: { kind: 'hull', wettedArea: 1.9, formFactor: 0.25 },
      },
      actuator: { ...ACTUATOR, maxForce: 600, maxSpeed: 1.2, maxPower: 400, maxTravel: 0.12 },
      intake: { area: 0.012, recoveredShare: 0.2, lossCoefficient: 0.4 },
      bay: { length: 0.6, diameter: 0.2 },
      target: { speed: 1 },
      search: { diameter: [0.04, 0.12], strokeRatio: [1.5, 6], frequency: [0.5, 4], count: [1, 4], seed: 3 },
    },
  }),
  '0.3 m at 0.3 m/s': documentOf({
    title: 'Small vehicle',
    nozzle: { shape: 'tube', diameter: 0.02, pistonDiameter: 0.03, length: 0.02, lossCoefficient: 0.1 },
    programme: { shape: 'trapezoid', stroke: 0.05, peakSpeed: 0.6, riseTime: 0.02, fallTime: 0.02 },
    train: { pulses: 10, period: 0.3 },
    thruster: {
      count: 1,
      vehicle: { speed: null, mass: 2, addedMass: 0.4, length: 0.3, drag: { kind: 'area', dragArea: 0.002 } },
      actuator: { ...ACTUATOR, maxForce: 12, maxPower: 5, maxTravel: 0.05 },
      intake: { area: 0.0006, recoveredShare: 0, lossCoefficient: 0.5 },
      bay: { length: 0.12, diameter: 0.06 },
      target: { speed: 0.3 },
      search: {
        diameter: [0.01, 0.05],
        strokeRatio: [1, 6],
        frequency: [0.5, 6],
        count: [1, 2],
        ejectShare: [0.3, 0.6],
      },
    },
  }),
} as const

async function openThrust(page: Page): Promise<void> {
  await page.getByRole('navigation').getByText('Thrust', { exact: true }).click()
  await page.getByRole('main', { name: 'Thrust' }).waitFor()
}

async function openFile(page: Page, file: string): Promise<void> {
  const choosing = page.waitForEvent('filechooser')
  await page.getByRole('button', { name: 'Open', exact: true }).click()
  await (await choosing).setFiles(file)
}

/** Press Size and wait for what it finds. */
async function size(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Size', exact: true }).click()
  await page.getByText(/^Done: \d+ candidate/).waitFor({ timeout: 60_000 })
}

/** Cells of the exported candidates, numbers as they are. */
async function candidatesOf(page: Page, folder: string): Promise<readonly (readonly number[])[]> {
  await page
    .getByRole('button', { name: /^Export/ })
    .first()
    .click()
  const waiting = page.waitForEvent('download')
  await page.getByRole('button', { name: 'Candidates as CSV' }).click()
  const file = path.join(folder, 'candidates.csv')
  await (await waiting).saveAs(file)
  await page.keyboard.press('Escape')
  const [, ...rows] = (await readFile(file, 'utf8')).trimEnd().split('\r\n')
  return rows.map((row) => row.split(',').slice(0, 11).map(Number))
}

interface Summary {
  readonly thruster: {
    readonly meanThrust: number
    readonly candidates: readonly {
      readonly design: { readonly diameter: number; readonly strokeRatio: number; readonly count: number }
      readonly pistonDiameter: number
      readonly power: number
      readonly thrust: number
      readonly sweptVolume: number
      readonly points: readonly { readonly frequency: number; readonly overallEfficiency: number }[]
    }[]
  }
}

describeInChromium('thrusters in the browser', () => {
  let browser: Browser
  let folder = ''
  let face: Awaited<ReturnType<typeof startBrowserFace>>
  beforeAll(async () => {
    browser = await launchChromium()
    face = await startBrowserFace()
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright-thrust-'))
  })
  afterAll(async () => {
    await browser.close()
    await face.close()
    await rm(folder, { recursive: true, force: true })
  })

  it.each(Object.entries(VEHICLES))(
    'sizes a vehicle of %s with the result of the headless runner',
    async (name, plan) => {
      const { page, context, complaints } = await openBrowserFace(browser, face.address)
      const file = path.join(folder, `${name.replace(/\W+/gu, '-')}.ringwright.json`)
      await writeFile(file, JSON.stringify(plan))
      await openFile(page, file)
      await openThrust(page)
      await size(page)
      const found = await candidatesOf(page, folder)
      const batch = spawnSync(
        process.execPath,
        [inProject('build', 'batch.mjs'), file, '--out', path.join(folder, 'out'), '--only', 'thruster'],
        { encoding: 'utf8' },
      )
      expect(batch.status, batch.stderr).toBe(0)
      const summary: Summary = JSON.parse(await readFile(path.join(folder, 'out', 'summary.json'), 'utf8'))
      const expected = summary.thruster.candidates.map(
        ({ design, pistonDiameter, power, thrust, sweptVolume, points }, i) => [
          i + 1,
          power,
          thrust,
          design.count,
          design.diameter,
          pistonDiameter,
          // Both vehicles have nozzles as long as they are wide, and a sizing keeps that.
          design.diameter,
          design.strokeRatio,
          points[0]?.frequency ?? NaN,
          points[0]?.overallEfficiency ?? NaN,
          sweptVolume,
        ],
      )
      expect(found.length).toBe(expected.length)
      expect(found.length).toBeGreaterThan(0)
      // Engines differ in the last digit of sin and pow, and at a flat least a design is known to the square root of rounding only, some
      // 1e-8. The power of the best is then known to rounding again; that of the others, which stand at their distance from the best,
      // follows their design.
      for (const [i, row] of expected.entries())
        for (const [j, value] of row.entries()) {
          const got = found[i]?.[j] ?? NaN
          const flat = i === 0 && (j === 1 || j === 2)
          const allowed = (flat ? 1e-10 : 1e-6) * Math.abs(value)
          expect(Math.abs(got - value), `candidate ${i + 1}, column ${j + 1}: ${got} and ${value}`).toBeLessThanOrEqual(
            allowed,
          )
        }
      expect(complaints).toEqual([])
      await context.close()
    },
    120_000,
  )

  it('opens an example, sizes it, opens a candidate and takes it back by keyboard alone', async () => {
    const { page, context, complaints } = await openBrowserFace(browser, face.address)
    await openExample(page, 'Survey vehicle')
    await page.goto(`${page.url().split('#')[0]}#thrust`)
    await page.getByRole('slider', { name: 'This plan on the map' }).waitFor()
    await page.keyboard.press('Control+Enter')
    await page.getByText(/^Done: \d+ candidate/).waitFor({ timeout: 60_000 })
    await page.getByRole('button', { name: /^Candidates \(\d\)$/ }).focus()
    await page.keyboard.press('Enter')
    await page.getByRole('button', { name: 'Swept (mL)' }).focus()
    await page.keyboard.press('Enter')
    expect(await page.locator('th[aria-sort=ascending]').innerText()).toContain('Swept')
    const diameter = page.getByRole('textbox', { name: 'Exit diameter', exact: true })
    const before = await diameter.inputValue()
    await page.locator('.candidates').getByRole('button', { name: 'Open candidate 1', exact: true }).focus()
    await page.keyboard.press('Enter')
    await page.getByRole('button', { name: 'Undo open candidate 1' }).waitFor()
    expect(await diameter.inputValue()).toBe('40\u00A0mm')
    // Opening a candidate leaves the candidates current.
    expect(await page.getByText(/^Done: \d+ candidate/).count()).toBe(1)
    // The plan's own handle: one step of the map, then back together with the candidate.
    await page.getByRole('slider', { name: 'This plan on the map' }).focus()
    await page.keyboard.press('ArrowRight')
    await expect.poll(() => diameter.inputValue()).not.toBe('40\u00A0mm')
    await page.keyboard.press('Control+z')
    await expect.poll(() => diameter.inputValue()).toBe('40\u00A0mm')
    await page.keyboard.press('Control+z')
    await expect.poll(() => diameter.inputValue()).toBe(before)
    expect(complaints).toEqual([])
    await context.close()
  }, 120_000)

  it('drags the plan on its map as one step, and gives a map as PNG', async () => {
    const { page, context } = await openBrowserFace(browser, face.address)
    await openExample(page, 'Survey vehicle')
    await openThrust(page)
    const handle = page.getByRole('slider', { name: 'This plan on the map' })
    const box = await handle.boundingBox()
    if (box === null) throw new Error('no handle')
    const [x, y] = [box.x + box.width / 2, box.y + box.height / 2]
    await page.mouse.move(x, y)
    await page.mouse.down()
    await page.mouse.move(x + 60, y - 20, { steps: 5 })
    await page.mouse.up()
    await page.getByRole('button', { name: 'Undo design on the map' }).click()
    const diameter = page.getByRole('textbox', { name: 'Exit diameter', exact: true })
    await expect.poll(() => diameter.inputValue()).toBe('50\u00A0mm')
    await page
      .getByRole('button', { name: /^Export/ })
      .first()
      .click()
    const waiting = page.waitForEvent('download')
    await page.getByRole('button', { name: /^Map.* as PNG$/ }).click()
    const file = path.join(folder, 'map.png')
    await (await waiting).saveAs(file)
    expect((await readFile(file)).subarray(1, 4).toString('latin1')).toBe('PNG')
    await context.close()
  })

  it('cancels a search within a moment and keeps the window alive', async () => {
    const { page, context } = await openBrowserFace(browser, face.address)
    // Many duty points make a search that is long enough to be stopped.
    const many = VEHICLES['0.3 m at 0.3 m/s']
    const target = Array.from({ length: 12 }, (_, i) => ({ speed: 0.2 + 0.01 * i, share: 1 }))
    const file = path.join(folder, 'many.ringwright.json')
    await writeFile(file, JSON.stringify({ ...many, thruster: { ...Object(many['thruster']), target } }))
    await openFile(page, file)
    await openThrust(page)
    await page.getByRole('button', { name: 'Size', exact: true }).click()
    await page.getByRole('progressbar', { name: 'Sizing' }).waitFor()
    expect(await page.getByRole('button', { name: 'Cancel' }).count()).toBe(1)
    await page.keyboard.press('Escape')
    await page
      .getByText(/[Cc]ancelled/)
      .first()
      .waitFor()
    await page.getByRole('textbox', { name: 'Efficiency' }).fill('0.5')
    await page.keyboard.press('Enter')
    await page.getByText('results current').first().waitFor()
    await context.close()
  })

  it.each(['light', 'dark'] as const)(
    'has no violation before and after a sizing in %s',
    async (colorScheme) => {
      const { page, context } = await openBrowserFace(browser, face.address, { colorScheme })
      await openThrust(page)
      expect(await violations(page), 'empty').toEqual([])
      await openExample(page, 'Survey vehicle')
      await openThrust(page)
      await size(page)
      await page.getByRole('button', { name: /^Candidates/ }).click()
      expect(await violations(page), 'sized').toEqual([])
      await page.getByRole('button', { name: 'Thrust and speed' }).click()
      await page.getByRole('button', { name: 'Hold this design' }).click()
      expect(await violations(page), 'plots').toEqual([])
      await page.getByRole('button', { name: 'Table', exact: true }).first().click()
      expect(await violations(page), 'table of the map').toEqual([])
      await context.close()
    },
    120_000,
  )
})
