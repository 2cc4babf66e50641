/** Whole processes and the page as a user waits for them: wall clock, medians. */
import { spawn, spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { startWeight, wholeWeight } from '../../build/scripts/pageWeight.mjs'
import { inProject } from '../../build/scripts/root.mjs'
import { launchChromium } from '../support/chromium'
import { documentOf } from '../support/plans'
import { median, type Figure } from './measure'

const BATCH_RUNS = 9
const START_RUNS = 5
const DRAG_STEPS = 60
const CANCELS = 5

/** Rows of the performance list about commands, page and ruler. The programs must be built. */
export async function commandFigures(): Promise<readonly Figure[]> {
  const batch = batchTimes()
  const browser = await launchChromium()
  try {
    const starts = await startTimes(browser)
    const drags = await dragTimes(browser)
    const cancels = await cancelTimes(browser)
    return [
      {
        name: 'batch, one pulse, whole process',
        value: median(batch),
        unit: 's',
        n: batch.length,
        goal: { atMost: 0.6 },
      },
      {
        name: 'page ready from npm start, built',
        value: median(starts),
        unit: 's',
        n: starts.length,
        goal: { atMost: 1.5 },
      },
      {
        name: 'ruler drag to updated numbers',
        value: median(drags),
        unit: 'ms',
        n: drags.length,
        goal: { atMost: 30 },
      },
      {
        name: 'cancel of a long march takes effect',
        value: median(cancels),
        unit: 's',
        n: cancels.length,
        goal: { atMost: 0.2 },
      },
      {
        name: 'renderer bundle at the start, gzip',
        value: startWeight() / 1000,
        unit: 'kB',
        n: 1,
        goal: { atMost: 450 },
      },
      {
        name: 'renderer bundle, every part, gzip',
        value: wholeWeight() / 1000,
        unit: 'kB',
        n: 1,
        goal: { atMost: 450 },
      },
    ]
  } finally {
    await browser.close()
  }
}

function batchTimes(): number[] {
  const folder = mkdtempSync(path.join(tmpdir(), 'ringwright-bench-'))
  writeFileSync(path.join(folder, 'plan.json'), JSON.stringify(documentOf()))
  const once = (): number => {
    const start = performance.now()
    const { status, stderr } = spawnSync(
      'npm',
      ['run', '--silent', 'batch', '--', path.join(folder, 'plan.json'), '--out', path.join(folder, 'out')],
      {
        cwd: inProject('.'),
        encoding: 'utf8',
      },
    )
    if (status !== 0) throw new Error(stderr)
    return (performance.now() - start) / 1000
  }
  once()
  const times = Array.from({ length: BATCH_RUNS }, once)
  rmSync(folder, { recursive: true })
  return times
}

async function startTimes(browser: Browser): Promise<number[]> {
  const times: number[] = []
  // The first start warms the disk cache and the browser, and is not counted.
  for (let i = 0; i <= START_RUNS; i++) {
    const context = await browser.newContext({ viewport: { width: 1440, height: 900 } })
    const page = await context.newPage()
    const start = performance.now()
    const { address, stop } = await startProgram()
    await page.goto(address)
    await page.getByText('results current').first().waitFor()
    if (i > 0) times.push((performance.now() - start) / 1000)
    await context.close()
    await stop()
  }
  return times
}

interface Started {
  readonly address: string
  readonly stop: () => Promise<void>
}

function startProgram(): Promise<Started> {
  const child = spawn('npm', ['start', '--silent', '--', '--browser', '--no-open'], {
    cwd: inProject('.'),
    detached: true,
  })
  return new Promise((resolve, reject) => {
    let out = ''
    child.once('error', reject)
    child.stdout.on('data', (data: Buffer) => {
      out += data.toString()
      const address = /http:\/\/127\.0\.0\.1:\d+\//.exec(out)?.[0]
      if (address === undefined) return
      const stop = (): Promise<void> =>
        new Promise((done) => {
          child.once('close', () => done())
          // The whole group: npm, its shell and the server.
          process.kill(-(child.pid ?? 0), 'SIGINT')
        })
      resolve({ address, stop })
    })
  })
}

async function dragTimes(browser: Browser): Promise<readonly number[]> {
  const { address, stop } = await startProgram()
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } })
  await page.goto(address)
  await page.getByText('results current').first().waitFor()
  await page.waitForTimeout(1000)
  const times = await measureDrag(page)
  await page.close()
  await stop()
  return times
}

/** From a pointer move on the handle to the change of the ring's speed in the document, one move at a time. */
async function measureDrag(page: Page): Promise<readonly number[]> {
  return page.evaluate(async (steps) => {
    const handle = document.querySelector('[role="slider"]')
    const column = document.querySelector('.result')?.parentElement
    if (handle === null || column === null || column === undefined) throw new Error('ruler or results are missing')
    const box = handle.getBoundingClientRect()
    const y = box.top + box.height / 2
    const x = box.left + box.width / 2
    const send = (type: string, clientX: number): void => {
      handle.dispatchEvent(
        new PointerEvent(type, {
          clientX,
          clientY: y,
          pointerId: 1,
          button: 0,
          buttons: type === 'pointerup' ? 0 : 1,
          bubbles: true,
          isPrimary: true,
        }),
      )
    }
    const changed = (): Promise<void> =>
      new Promise((resolve, reject) => {
        const timer = setTimeout(() => reject(new Error('the numbers did not follow the handle')), 5000)
        const observer = new MutationObserver(() => {
          observer.disconnect()
          clearTimeout(timer)
          resolve()
        })
        observer.observe(column, { subtree: true, characterData: true, childList: true })
      })
    // A pointer made by script cannot be captured; the handle's own code must not stop at that.
    Element.prototype.setPointerCapture = () => undefined
    Element.prototype.releasePointerCapture = () => undefined
    send('pointerdown', x)
    const times: number[] = []
    for (let i = 1; i <= steps; i++) {
      const next = changed()
      const start = performance.now()
      send('pointermove', x - 3 * (i <= steps / 2 ? i : steps - i + 0.5))
      await next
      times.push(performance.now() - start)
      // A hand moves about as fast as frames come.
      await new Promise((resolve) => requestAnimationFrame(resolve))
    }
    send('pointerup', x)
    return times
  }, DRAG_STEPS)
}

/** From the press of Cancel to the end of the run on the screen, for ten rings in space. */
async function cancelTimes(browser: Browser): Promise<readonly number[]> {
  const { address, stop } = await startProgram()
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } })
  await page.goto(address)
  const rings = Array.from({ length: 10 }, (_, k) => ({
    circulation: 0.01,
    radius: 0.02,
    coreRadius: 0.003,
    centre: [0.06 * k, 0.005 * (k % 3), 0],
    direction: [1, 0.04 * (k % 4), 0],
  }))
  const plan = documentOf({ title: 'Long march', wake: { rings, duration: 1000, outputStep: 0.05 } })
  const choosing = page.waitForEvent('filechooser')
  await page.getByRole('button', { name: 'Open', exact: true }).click()
  const file = { name: 'long.ringwright.json', mimeType: 'application/json', buffer: Buffer.from(JSON.stringify(plan)) }
  await (await choosing).setFiles(file)
  await page.locator('h1', { hasText: 'Long march' }).waitFor()
  await page.getByRole('navigation').getByText('Wake', { exact: true }).click()
  const times: number[] = []
  for (let i = 0; i < CANCELS; i++) {
    await page.getByRole('button', { name: 'Run', exact: true }).click()
    await page.locator('progress').waitFor()
    await page.waitForTimeout(1500)
    times.push(
      await page.evaluate(async () => {
        const cancel = [...document.querySelectorAll('button')].find(
          (button) => button.textContent?.trim() === 'Cancel',
        )
        const from = performance.now()
        cancel?.click()
        while (document.querySelector('progress') !== null) await new Promise((next) => setTimeout(next, 2))
        return (performance.now() - from) / 1000
      }),
    )
  }
  await page.close()
  await stop()
  return times
}
