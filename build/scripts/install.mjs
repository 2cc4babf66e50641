/** Installs the packages when they are missing or not those of the lock. */
import { createHash } from 'node:crypto'
import { readFileSync, writeFileSync } from 'node:fs'
import { npmCommand, runCommand } from './commands.mjs'
import { oneAtATime } from './lock.mjs'
import { inProject, tell } from './root.mjs'

/** Remembers which lock the installed packages were last found to match. */
const RECORD = inProject('node_modules', '.ringwright-lock')

/** @returns {Promise<void>} @throws {Error} with a sentence when the packages cannot be installed */
export async function ensureInstalled() {
  if (isInstalled()) return
  await oneAtATime(async () => {
    // Another process may have installed them meanwhile.
    if (isInstalled()) return
    await install()
    if (!isInstalled()) throw new Error('The packages were installed but are not those of package-lock.json.')
  })
}

/** Remembers a match, so that the next question takes a millisecond. @returns {boolean} */
function isInstalled() {
  const lock = readText(inProject('package-lock.json'))
  if (lock === null) throw new Error('package-lock.json is missing: the project is not complete.')
  const hash = createHash('sha256').update(lock).digest('hex')
  const installed = readText(inProject('node_modules', '.package-lock.json'))
  if (installed === null) return false
  if (readText(RECORD) === hash) return true
  if (!matchesLock(lock, installed)) return false
  try {
    writeFileSync(RECORD, hash)
  } catch {
    // A folder that may not be written to: the question is asked in full each time.
  }
  return true
}

async function install() {
  tell('Installing the packages of the lock file …')
  const npm = npmCommand(['ci', '--include=dev', '--ignore-scripts', '--no-audit', '--no-fund', '--loglevel=error'])
  const { code } = await runCommand(npm.program, npm.list, { show: true, shell: npm.shell })
  if (code !== 0) throw new Error('The packages could not be installed: npm ci failed, its reason stands above.')
}

/**
 * True when every package of the lock is installed in its version; optional ones may be absent, they are for other systems.
 *
 * @param {string} lockText package-lock.json @param {string} installedText node_modules/.package-lock.json
 */
export function matchesLock(lockText, installedText) {
  const wanted = packagesOf(lockText)
  const installed = packagesOf(installedText)
  if (wanted === null || installed === null) return false
  return Object.entries(wanted).every(([place, entry]) => {
    if (place === '') return true
    const found = installed[place]
    return found === undefined ? entry.optional === true : found.version === entry.version
  })
}

/** @param {string} text @returns {Record<string, { version?: string, optional?: boolean }> | null} */
function packagesOf(text) {
  try {
    const { packages } = JSON.parse(text)
    return typeof packages === 'object' ? packages : null
  } catch {
    return null
  }
}

/** @param {string} file @returns {string | null} */
function readText(file) {
  try {
    return readFileSync(file, 'utf8')
  } catch {
    return null
  }
}
