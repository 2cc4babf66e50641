/** Finding a Chromium for the browser tests. */
import { accessSync, constants, existsSync } from 'node:fs'
import path from 'node:path'
import { runCommand } from './commands.mjs'
import { tell } from './root.mjs'

const NAMES = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'chrome']

const MAC_PLACES = [
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
]

/**
 * @param {{ platform: string, env: Readonly<Record<string, string | undefined>> }} [surroundings]
 * @returns {string | null} path of the executable
 */
export function findChromium({ platform, env } = process) {
  const named = env['CHROMIUM_PATH']
  if (named !== undefined && named !== '') return existsSync(named) ? named : null
  return candidates(platform, env).find(isExecutable) ?? null
}

/** @param {string} platform @param {Readonly<Record<string, string | undefined>>} env @returns {string[]} */
function candidates(platform, env) {
  if (platform === 'darwin') return MAC_PLACES
  if (platform === 'win32') {
    const folders = [env['PROGRAMFILES'], env['PROGRAMFILES(X86)'], env['LOCALAPPDATA']].filter(
      (folder) => folder !== undefined,
    )
    return folders.flatMap((folder) => [
      path.join(folder, 'Chromium', 'Application', 'chrome.exe'),
      path.join(folder, 'Google', 'Chrome', 'Application', 'chrome.exe'),
      path.join(folder, 'Microsoft', 'Edge', 'Application', 'msedge.exe'),
    ])
  }
  const folders = (env['PATH'] ?? '').split(path.delimiter).filter((folder) => folder !== '')
  return NAMES.flatMap((name) => folders.map((folder) => path.join(folder, name)))
}

/** @param {string} file */
function isExecutable(file) {
  try {
    accessSync(file, constants.X_OK)
    return true
  } catch {
    return false
  }
}

/**
 * A Chromium, installed from Debian's packages where none is found and that may be done: in continuous integration, or
 * for the superuser. Where it may not, says what to run.
 *
 * @returns {Promise<string | null>}
 */
export async function ensureChromium() {
  const found = findChromium()
  if (found !== null) return found
  const root = process.getuid?.() === 0
  const debian = process.platform === 'linux' && existsSync('/usr/bin/apt-get')
  const ci = process.env['CI'] !== undefined && !['', '0', 'false'].includes(process.env['CI'])
  if (debian && (root || ci)) {
    tell('No Chromium was found: installing Debian’s …')
    const before = root ? [] : ['sudo', '-n']
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
    for (const list of [
      ['apt-get', 'update', '-q'],
      ['apt-get', 'install', '-q', '-y', '--no-install-recommends', 'chromium'],
    ]) {
      const [program = '', ...rest] = [...before, ...list]
      await runCommand(program, rest, { show: true, env })
    }
  }
  const installed = findChromium()
  if (installed === null) {
    const line = debian ? 'sudo apt-get install chromium' : 'CHROMIUM_PATH=/path/to/chromium npm test'
    tell(`No Chromium was found, so the browser tests do not run. To run them: ${line}`)
  }
  return installed
}
