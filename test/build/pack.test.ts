/**
 * The packages, as far as they can be made without a network: a dry run with a stub in the runtime's place goes through packing,
 * asar, integrity and fuses; what comes out is read back.
 */
import { spawn } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { mkdtemp, rm } from 'node:fs/promises'
import { homedir, tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { PROGRAM_ID } from '../../app/program'
import { APP_ID, FUSES, PACKAGING } from '../../build/electron-builder.config.mjs'
import { bundlePart } from '../../build/scripts/bundle.mjs'
import { readPackArguments } from '../../build/scripts/packArguments.mjs'
import { inProject, ROOT } from '../../build/scripts/root.mjs'
import { fingerprint } from '../../build/scripts/stale.mjs'
import { makeStubRuntime, SHIPPED_FUSES } from '../support/stubRuntime'

describe('the command line of npm run pack', () => {
  const read = (list: readonly string[], platform = 'linux') =>
    readPackArguments(list, { platform, folder: path.resolve('/caller') })

  it('packs for the system it runs on, unless told otherwise', () => {
    expect(read([])).toEqual({
      ok: true,
      request: { system: 'linux', unpacked: false, runtime: null, out: null },
    })
    expect(read([], 'darwin')).toMatchObject({ request: { system: 'mac' } })
    expect(read(['--for', 'windows'])).toMatchObject({ request: { system: 'windows' } })
    expect(read(['--unpacked', '--runtime=stub', '--out', 'there'])).toMatchObject({
      request: { unpacked: true, runtime: path.resolve('/caller/stub'), out: path.resolve('/caller/there') },
    })
  })

  it.each([
    [['--fast'], /^--fast is not an argument of npm run pack\. Use: npm run pack -- \[--for/],
    [['--for', 'beos'], /^--for must be linux, mac or windows, got beos\.$/],
    [['--out'], /^--out needs a value\.$/],
    [['--runtime', '--unpacked'], /^--runtime needs a value\.$/],
  ])('refuses %j in a sentence', (list, message) => {
    const reading = read(list)
    expect(reading.ok ? '' : reading.message).toMatch(message)
  })
})

const isInstalled = existsSync(inProject('node_modules', 'electron-builder', 'package.json'))
const withBuilder = isInstalled ? '' : ' (skipped: electron-builder is not installed)'

describe.skipIf(!isInstalled)(`how packages are made${withBuilder}`, () => {
  it('is written in words that electron-builder knows', async () => {
    const { validateConfiguration } = await import('app-builder-lib/out/util/config/config.js')
    const logger = { isEnabled: false, add: () => undefined }
    const words = { ...PACKAGING, afterPack: null }
    await validateConfiguration(structuredClone(words), Object(logger))
    const misspelt = { ...structuredClone(words), electronFuse: {} }
    await expect(validateConfiguration(misspelt, Object(logger))).rejects.toThrow(/electronFuse/)
  })

  it('names the program as the program names itself, and files that exist', () => {
    expect(APP_ID).toBe(PROGRAM_ID)
    const { linux, mac, win, nsis } = PACKAGING
    for (const file of [linux?.icon, mac?.icon, win?.icon, nsis?.include])
      expect(existsSync(inProject(String(file))), String(file)).toBe(true)
  })
})

/** Run a script of the project; what it says where it fails, '' where it does not. */
function runScript(list: readonly string[]): Promise<string> {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, [...list], { cwd: ROOT })
    let output = ''
    for (const stream of [child.stdout, child.stderr]) stream.on('data', (data: Buffer) => (output += data.toString()))
    child.once('close', (code) => resolve(code === 0 ? '' : `exit code ${code}: ${output}`))
  })
}

/** Files of a folder at any depth, with forward slashes. */
function filesOf(folder: string): readonly string[] {
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.relative(folder, path.join(entry.parentPath, entry.name)).split(path.sep).join('/'))
    .toSorted()
}

function digest(content: Uint8Array): string {
  return createHash('sha256').update(content).digest('hex')
}

function digests(folder: string): Readonly<Record<string, string>> {
  return Object.fromEntries(filesOf(folder).map((name) => [name, digest(readFileSync(path.join(folder, name)))]))
}

describe.skipIf(!isInstalled)(`a dry run of the packages${withBuilder}`, () => {
  let folder = ''
  let packed = ''
  let asar = ''
  let sources: readonly string[] = []
  const fingerprints = () => [fingerprint('app'), fingerprint('renderer')]
  let archive: typeof import('@electron/asar')
  const inAsar = (name: string): Buffer => archive.extractFile(asar, path.join(...name.split('/')))
  const namesInAsar = (): readonly string[] =>
    archive
      .listPackage(asar, { isPack: false })
      .map((name) => name.split(path.sep).join('/').replace(/^\//, ''))
      .filter((name) => !('files' in archive.statFile(asar, path.join(...name.split('/')))))
      .toSorted()
  const pack = (out: string): Promise<string> =>
    runScript([
      inProject('build', 'pack.mjs'),
      ...['--for', 'linux', '--unpacked'],
      ...['--runtime', path.join(folder, 'runtime'), '--out', path.join(folder, out)],
    ])

  beforeAll(async () => {
    archive = await import('@electron/asar')
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright-pack-'))
    await makeStubRuntime(path.join(folder, 'runtime'), String(PACKAGING.electronVersion))
    sources = fingerprints()
    expect(await pack('first')).toBe('')
    packed = path.join(folder, 'first', 'linux-unpacked')
    asar = path.join(packed, 'resources', 'app.asar')
  }, 120_000)
  afterAll(() => rm(folder, { recursive: true, force: true }))

  it('puts the terms of everything beside the program, and one language', () => {
    expect(filesOf(packed)).toEqual([
      'LICENSE.electron.txt',
      'LICENSE.ringwright.txt',
      'LICENSES.chromium.html',
      'NOTICES.txt',
      'locales/en-US.pak',
      'resources/app.asar',
      'ringwright',
      'version',
    ])
    const notices = readFileSync(path.join(packed, 'NOTICES.txt'), 'utf8')
    for (const holder of [
      'the Ringwright authors',
      'Yuxi (Evan) You',
      'three.js authors',
      'Chart.js Contributors',
      'Matthew Holt',
    ])
      expect(notices).toContain(holder)
  })

  it('packs exactly the window: its page, its main, its preload', () => {
    const page = filesOf(inProject('dist', 'renderer')).map((name) => `dist/renderer/${name}`)
    expect(page).toEqual(expect.arrayContaining(['dist/renderer/index.html', 'dist/renderer/notices.txt']))
    const kinds = page.filter(
      (name) => !/^dist\/renderer\/(index\.html|notices\.txt|assets\/[\w.-]+\.(js|css|svg|wasm))$/.test(name),
    )
    expect(kinds).toEqual([])
    expect(namesInAsar()).toEqual(['dist/app/main.mjs', 'dist/app/preload.cjs', ...page, 'package.json'].toSorted())
  })

  it('describes the program without what only a clone needs', () => {
    const described: unknown = JSON.parse(inAsar('package.json').toString())
    expect(described).toMatchObject({
      name: 'ringwright',
      main: 'dist/app/main.mjs',
      desktopName: 'ringwright.desktop',
    })
    expect(Object.keys(Object(described))).not.toContain('scripts')
    expect(Object.keys(Object(described)).filter((key) => /dependencies/i.test(key))).toEqual([])
  })

  it('needs no packages: main and preload import Electron and Node alone, and nothing of others is bundled into them', () => {
    for (const name of ['dist/app/main.mjs', 'dist/app/preload.cjs']) {
      const text = inAsar(name).toString()
      const imports = [...text.matchAll(/(?:\bfrom|^import|\brequire\()\s*["']([^"']+)["']/gm)].map(([, from]) => from)
      expect(imports.length).toBeGreaterThan(0)
      expect(imports.filter((from) => from !== 'electron' && from?.startsWith('node:') !== true)).toEqual([])
      expect(text).not.toContain('node_modules')
    }
  })

  it('closes the switches of the runtime, and leaves those it does not know', async () => {
    const { FuseV1Options, getCurrentFuseWire } = await import('@electron/fuses')
    const wire = await getCurrentFuseWire(path.join(packed, 'ringwright'))
    const isOn = (index: number): boolean => String.fromCharCode(Number(Object(wire)[index])) === '1'
    expect({
      runAsNode: isOn(FuseV1Options.RunAsNode),
      enableCookieEncryption: isOn(FuseV1Options.EnableCookieEncryption),
      enableNodeOptionsEnvironmentVariable: isOn(FuseV1Options.EnableNodeOptionsEnvironmentVariable),
      enableNodeCliInspectArguments: isOn(FuseV1Options.EnableNodeCliInspectArguments),
      enableEmbeddedAsarIntegrityValidation: isOn(FuseV1Options.EnableEmbeddedAsarIntegrityValidation),
      onlyLoadAppFromAsar: isOn(FuseV1Options.OnlyLoadAppFromAsar),
      loadBrowserProcessSpecificV8Snapshot: isOn(FuseV1Options.LoadBrowserProcessSpecificV8Snapshot),
      grantFileProtocolExtraPrivileges: isOn(FuseV1Options.GrantFileProtocolExtraPrivileges),
    }).toEqual(FUSES)
    expect(FUSES).toMatchObject({ runAsNode: false, enableNodeCliInspectArguments: false, onlyLoadAppFromAsar: true })
    expect(isOn(8)).toBe(SHIPPED_FUSES[8] === '1')
  })

  it('holds no source map and no path of the machine it was made on', () => {
    const secrets = [ROOT, homedir(), folder].filter((place) => place.length > 3)
    for (const name of namesInAsar()) {
      const text = inAsar(name).toString('latin1')
      expect(name.endsWith('.map') || /[#@]\s*sourceMappingURL=/.test(text), name).toBe(false)
      for (const place of secrets) expect(text.includes(place), `${name} holds ${place}`).toBe(false)
    }
  })

  it('comes out with the same bytes when it is built and packed once more', async () => {
    const again = path.join(folder, 'again')
    await bundlePart('app', again)
    await bundlePart('renderer', again)
    const changed = 'the sources were changed while the test ran, so it tells nothing: run it again'
    expect(fingerprints(), changed).toEqual(sources)
    const bundles = namesInAsar().filter((name) => name.startsWith('dist/'))
    const made = (name: string): string => path.join(again, ...name.split('/').slice(1))
    expect(Object.fromEntries(bundles.map((name) => [name, digest(readFileSync(made(name)))]))).toEqual(
      Object.fromEntries(bundles.map((name) => [name, digest(inAsar(name))])),
    )
    expect(await pack('second')).toBe('')
    expect(digests(path.join(folder, 'second', 'linux-unpacked'))).toEqual(digests(packed))
  }, 120_000)
})
