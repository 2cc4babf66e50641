import { mkdtemp, mkdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { electronExecutable } from '../../build/scripts/electronRuntime.mjs'
import { obstacleSentence, obstacleToWindow, openCommand } from '../../build/scripts/face.mjs'
import { matchesLock } from '../../build/scripts/install.mjs'
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
