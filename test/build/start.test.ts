import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { mkdtemp, mkdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { createInterface } from 'node:readline'
import { pathToFileURL } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { electronExecutable } from '../../build/scripts/electronRuntime.mjs'
import { obstacleSentence, obstacleToWindow, openCommand } from '../../build/scripts/face.mjs'
import { matchesLock } from '../../build/scripts/install.mjs'
import { inProject } from '../../build/scripts/root.mjs'
import { readStartArguments, USUAL_PORT } from '../../build/scripts/startArguments.mjs'

describe('the command line of npm start', () => {
  it('asks for the window and opens it, unless told otherwise', () => {
    expect(readStartArguments([])).toEqual({ ok: true, request: { browser: false, open: true, port: USUAL_PORT } })
    expect(readStartArguments(['--browser', '--no-open'])).toEqual({
      ok: true,
      request: { browser: true, open: false, port: USUAL_PORT },
    })
    expect(readStartArguments(['--port', '8080'])).toMatchObject({ request: { browser: true, port: 8080 } })
    expect(readStartArguments(['--port=0'])).toMatchObject({ request: { port: 0 } })
  })

  it.each([
    [['--fast'], /^--fast is not an argument of npm start\. Use: npm start -- \[--browser\]/],
    [['plan.json'], /^plan\.json is not an argument/],
    [['--port'], /got nothing/],
    [['--port', '65536'], /from 0 to 65535.*got 65536/],
    [['--port', '-1'], /got -1/],
    [['--port', '80.5'], /got 80\.5/],
  ])('refuses %j in a sentence', (list, message) => {
    const reading = readStartArguments(list)
    expect(reading.ok ? '' : reading.message).toMatch(message)
  })
})

describe('which face is shown', () => {
  const linux = { platform: 'linux', env: { DISPLAY: ':0' }, root: false }

  it.each([
    ['a Linux desktop', linux, null],
    ['Wayland', { ...linux, env: { WAYLAND_DISPLAY: 'wayland-0' } }, null],
    ['macOS', { platform: 'darwin', env: {}, root: false }, null],
    ['Windows', { platform: 'win32', env: {}, root: false }, null],
    ['no display', { ...linux, env: {} }, /no display/],
    ['an empty display', { ...linux, env: { DISPLAY: '' } }, /no display/],
    ['the superuser on Linux', { ...linux, root: true }, /sandbox/],
  ])('%s', (_what, surroundings, obstacle) => {
    const found = obstacleToWindow(surroundings)
    if (obstacle === null) expect(found).toBeNull()
    else expect(found).toMatch(obstacle)
  })

  it('says why in one sentence', () => {
    const sentence = obstacleSentence(obstacleToWindow({ ...linux, env: {} }) ?? '')
    expect(sentence).toMatch(/^The desktop window cannot be opened because .* so the program opens in the browser\.$/)
    expect(sentence.split('. ')).toHaveLength(1)
  })

  it('opens an address with what each platform has for it, and nothing where nothing could show it', () => {
    expect(openCommand(linux, 'http://x/')).toEqual({ program: 'xdg-open', list: ['http://x/'] })
    expect(openCommand({ ...linux, platform: 'darwin' }, 'http://x/')?.program).toBe('open')
    expect(openCommand({ ...linux, platform: 'win32' }, 'http://x/')?.list).toContain('http://x/')
    expect(openCommand({ ...linux, env: {} }, 'http://x/')).toBeNull()
  })
})

describe('the desktop runtime', () => {
  let folder = ''
  beforeAll(async () => {
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright-runtime-'))
    await mkdir(path.join(folder, 'whole', 'dist'), { recursive: true })
    await writeFile(path.join(folder, 'whole', 'path.txt'), 'electron')
    await writeFile(path.join(folder, 'whole', 'dist', 'electron'), '')
    await mkdir(path.join(folder, 'broken'))
    await writeFile(path.join(folder, 'broken', 'path.txt'), 'electron')
  })
  afterAll(() => rm(folder, { recursive: true, force: true }))

  it('is there when its executable is', () => {
    expect(electronExecutable(path.join(folder, 'whole'))).toBe(path.join(folder, 'whole', 'dist', 'electron'))
  })

  it('is not there when only its name is, or nothing', () => {
    expect(electronExecutable(path.join(folder, 'broken'))).toBeNull()
    expect(electronExecutable(path.join(folder, 'missing'))).toBeNull()
  })
})

describe('whether the installed packages are those of the lock', () => {
  const lock = (packages: object) => JSON.stringify({ packages })
  const wanted = lock({
    '': {},
    'node_modules/a': { version: '1.0.0' },
    'node_modules/other-system': { version: '2.0.0', optional: true },
  })

  it.each([
    ['the same', lock({ 'node_modules/a': { version: '1.0.0' } }), true],
    ['another version', lock({ 'node_modules/a': { version: '1.0.1' } }), false],
    ['one missing', lock({}), false],
    [
      'another version of an optional one',
      lock({ 'node_modules/a': { version: '1.0.0' }, 'node_modules/other-system': { version: '1.0.0' } }),
      false,
    ],
    ['a broken file', '{', false],
    ['a file without packages', '{}', false],
  ])('%s', (_what, installed, matches) => {
    expect(matchesLock(wanted, installed)).toBe(matches)
  })
})

// npm on Windows is a command file that no signal reaches.
describe.skipIf(process.platform === 'win32')('a program that npm started', () => {
  let folder = ''
  beforeAll(async () => {
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright-npm-'))
    const parent = pathToFileURL(inProject('build', 'scripts', 'parent.mjs')).href
    // As the server does: it runs until it is told to end, and tells its number first.
    const program = `
      import { endWithParent } from ${JSON.stringify(parent)}
      endWithParent()
      for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => process.exit(0))
      setInterval(() => {}, 1000)
      console.log('pid ' + process.pid)`
    await writeFile(path.join(folder, 'program.mjs'), program)
    await writeFile(path.join(folder, 'package.json'), JSON.stringify({ scripts: { start: 'node program.mjs' } }))
  })
  afterAll(() => rm(folder, { recursive: true, force: true }))

  // A terminal sends Ctrl+C to all of them; npm told alone to end ends its shell and no more.
  it.each([
    ['npm alone gets SIGTERM', 'SIGTERM', 1],
    ['Ctrl+C is pressed', 'SIGINT', -1],
  ] as const)('ends when %s', async (_when, signal, group) => {
    const npm = spawn('npm', ['start'], { cwd: folder, detached: true, stdio: ['ignore', 'pipe', 'ignore'] })
    const pid = await numberTold(npm.stdout)
    try {
      expect(runs(pid)).toBe(true)
      process.kill(group * (npm.pid ?? Number.NaN), signal)
      await expect.poll(() => runs(pid), { timeout: 5000 }).toBe(false)
    } finally {
      if (runs(pid)) process.kill(pid, 'SIGKILL')
    }
  })

  it('is left alone when it was started by hand and its starter leaves', async () => {
    const env = { ...process.env, npm_lifecycle_event: undefined }
    const shell = spawn('sh', ['-c', 'node program.mjs & wait'], {
      cwd: folder,
      env,
      stdio: ['ignore', 'pipe', 'ignore'],
    })
    const pid = await numberTold(shell.stdout)
    try {
      shell.kill('SIGTERM')
      await once(shell, 'exit')
      // More than two looks for the parent.
      await new Promise((resolve) => setTimeout(resolve, 800))
      expect(runs(pid)).toBe(true)
    } finally {
      process.kill(pid, 'SIGKILL')
    }
  })
})

async function numberTold(output: NodeJS.ReadableStream): Promise<number> {
  for await (const line of createInterface({ input: output })) {
    const found = /^pid (\d+)$/.exec(line)
    if (found !== null) return Number(found[1])
  }
  throw new Error('the program ended before it told its number')
}

function runs(pid: number): boolean {
  try {
    return process.kill(pid, 0)
  } catch {
    return false
  }
}
