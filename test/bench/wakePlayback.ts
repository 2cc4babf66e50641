/** Playback of many rings in real Chromium on software WebGL: frames a second, and memory after it has gone on for a while. */
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import vue from '@vitejs/plugin-vue'
import type { Page } from 'playwright-core'
import { build } from 'vite'
import { inProject } from '../../build/scripts/root.mjs'
import { constants } from '../../build/vite.app.mjs'
import { launchChromium } from '../support/chromium'
import { median, type Figure } from './measure'

const ORIGIN = 'https://playback.test'
const RUNS = 5
const RUN_SECONDS = 4
/** How long memory is watched; RINGWRIGHT_PLAYBACK_SECONDS asks for longer, the five minutes of the goal for instance. */
const WATCHED_SECONDS = Number(process.env['RINGWRIGHT_PLAYBACK_SECONDS'] ?? '30')
/** Growth within this is the noise of the collector and of compiled code [MB]. */
const MOST_GROWTH = 2
const TYPES: Readonly<Record<string, string>> = {
  '.html': 'text/html',
  '.js': 'text/javascript',
  '.css': 'text/css',
}

/** The rows of the performance list about the drawing of rings. */
export async function wakePlaybackFigures(): Promise<readonly Figure[]> {
  const folder = mkdtempSync(path.join(tmpdir(), 'ringwright-playback-'))
  await build({
    configFile: false,
    root: inProject('test', 'bench', 'wakePage'),
    base: './',
    logLevel: 'error',
    publicDir: false,
    plugins: [vue()],
    define: { ...constants(), __VUE_OPTIONS_API__: 'false' },
    build: { target: 'es2023', outDir: folder, emptyOutDir: true, chunkSizeWarningLimit: 4000 },
  })
  const browser = await launchChromium()
  try {
    const page = await browser.newPage({ viewport: { width: 850, height: 500 } })
    await page.route(`${ORIGIN}/**`, (route) => {
      const { pathname } = new URL(route.request().url())
      const file = pathname === '/' ? '/index.html' : pathname
      return route.fulfill({
        body: readFileSync(path.join(folder, file)),
        contentType: TYPES[path.extname(file)] ?? 'application/octet-stream',
      })
    })
    await page.goto(`${ORIGIN}/`)
    await page.waitForFunction(() => Reflect.has(window, 'playback'))
    await play(page, 1)
    const rates: number[] = []
    for (let run = 0; run < RUNS; run += 1) rates.push(await play(page, RUN_SECONDS))
    const session = await page.context().newCDPSession(page)
    const held = async (): Promise<number> => {
      await session.send('HeapProfiler.collectGarbage')
      const { usedSize } = await session.send('Runtime.getHeapUsage')
      return usedSize / 1e6
    }
    const before = await held()
    await play(page, WATCHED_SECONDS)
    const growth = (await held()) - before
    return [
      {
        name: '20 rings x 256 segments played back, software rendering',
        value: median(rates),
        unit: '1/s',
        n: RUNS,
        goal: { atLeast: 30 },
      },
      {
        name: `memory grown in ${WATCHED_SECONDS} s of playback`,
        value: growth,
        unit: 'MB',
        n: 1,
        goal: { atMost: MOST_GROWTH },
      },
    ]
  } finally {
    await browser.close()
    rmSync(folder, { recursive: true })
  }
}

/** Frames a second over a time. */
async function play(page: Page, seconds: number): Promise<number> {
  return page.evaluate(async (asked) => {
    const playback: { play(seconds: number): Promise<number> } = Reflect.get(window, 'playback')
    return playback.play(asked)
  }, seconds)
}
