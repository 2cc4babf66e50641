/**
 * The commands as a user runs them: processes of their own, from a folder that is not the project's, against what is built.
 */
import { spawn, type ChildProcess } from 'node:child_process'
import { mkdtemp, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Browser } from 'playwright-core'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { inProject } from '../../build/scripts/root.mjs'
import { describeInChromium, launchChromium } from '../support/chromium'
import { documentOf } from '../support/plans'

interface Running {
  readonly child: ChildProcess
  /** Both streams so far. */
  readonly out: () => string
  readonly err: () => string
  readonly ended: Promise<number | null>
}

let folder = ''
const started: Running[] = []

function run(script: string, list: readonly string[]): Running {
  const child = spawn(process.execPath, [inProject('build', script), ...list], {
    cwd: folder,
    env: { ...process.env, INIT_CWD: folder, DISPLAY: '', WAYLAND_DISPLAY: '' },
  })
  let out = ''
  let err = ''
  child.stdout.on('data', (data: Buffer) => (out += data.toString()))
  child.stderr.on('data', (data: Buffer) => (err += data.toString()))
  const ended = new Promise<number | null>((resolve) => child.once('close', resolve))
  const running = { child, out: () => out, err: () => err, ended }
  started.push(running)
  return running
}

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright commands '))
})
afterEach(async () => {
  for (const { child, ended } of started.splice(0)) {
    child.kill('SIGKILL')
    await ended
  }
})
afterAll(() => rm(folder, { recursive: true, force: true }))

describe('npm run batch', () => {
  it('writes files where the caller stands, one line each on standard output, and exits 0', async () => {
    await writeFile(path.join(folder, 'plan.json'), JSON.stringify(documentOf()))
    const batch = run('batch.mjs', ['plan.json', '--out', 'results'])
    expect(await batch.ended).toBe(0)
    expect(batch.out()).toBe(
      ['pulse.csv', 'report.html', 'summary.json'].map((name) => `${path.join('results', name)}\n`).join(''),
    )
    expect(batch.err()).toBe('')
    expect((await readdir(path.join(folder, 'results'))).toSorted()).toEqual([
      'pulse.csv',
      'report.html',
      'summary.json',
    ])
  })

  it('exits 2 with the reason on standard error', async () => {
    const batch = run('batch.mjs', ['missing.json', '--out', 'nothing'])
    expect(await batch.ended).toBe(2)
    expect(batch.out()).toBe('')
    expect(batch.err()).toMatch(/^“missing\.json” could not be opened because/)
  })

  it('reads a plan from standard input', async () => {
    const batch = run('batch.mjs', ['-', '--out', 'piped', '--only', 'water'])
    batch.child.stdin?.end(JSON.stringify(documentOf()))
    expect(await batch.ended).toBe(0)
    expect(batch.out()).toBe(`${path.join('piped', 'summary.json')}\n`)
  })

  it('exits 130 when it is interrupted, also while it waits for standard input', async () => {
    const batch = run('batch.mjs', ['-', '--out', 'interrupted'])
    // More than a pipe holds: once it is all taken the runner is reading, and waits for more.
    await new Promise((resolve) => batch.child.stdin?.write(' '.repeat(1024 * 1024), resolve))
    batch.child.kill('SIGINT')
    expect(await batch.ended).toBe(130)
    expect(batch.err()).toMatch(/interrupted/)
    expect(await readdir(folder)).not.toContain('interrupted')
  })
})

describe('npm start', () => {
  it('refuses an argument it does not know with exit code 2', async () => {
    const start = run('start.mjs', ['--fast'])
    expect(await start.ended).toBe(2)
    expect(start.err()).toMatch(/^--fast is not an argument of npm start\./)
  })
})

describeInChromium('npm start without a display', () => {
  let browser: Browser
  beforeAll(async () => {
    browser = await launchChromium()
  })
  afterAll(() => browser.close())

  it('says why there is no window, serves the working program, prints its address and ends cleanly', async () => {
    const start = run('start.mjs', ['--no-open'])
    await expect
      .poll(start.out, { timeout: 60_000 })
      .toMatch(/^Ringwright is at http:\/\/127\.0\.0\.1:\d+\/ \(Ctrl\+C ends it\)\.\n$/)
    expect(start.err()).toMatch(
      /^The desktop window cannot be opened because .*, so the program opens in the browser\.$/m,
    )

    const page = await browser.newPage()
    const errors: string[] = []
    page.on('pageerror', (error) => errors.push(error.message))
    page.on('console', (message) => {
      if (message.type() === 'error') errors.push(message.text())
    })
    await page.goto(/http:\S+/.exec(start.out())?.[0] ?? '')
    await page.locator('h1').waitFor()
    await expect.poll(() => page.title()).toMatch(/ – Ringwright$/)
    expect(await page.evaluate(() => globalThis.crossOriginIsolated)).toBe(true)
    expect(errors).toEqual([])
    await page.close()

    start.child.kill('SIGINT')
    expect(await start.ended).toBe(0)
  })
})
