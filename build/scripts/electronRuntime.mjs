/**
 * The Electron runtime: where it is, and fetching it when it is not there. Its package has no installation step; its own
 * install script downloads the runtime. That is given up when nothing arrives for a while.
 */
import { spawn } from 'node:child_process'
import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { DIST, inProject, tell } from './root.mjs'

/** No byte for this long ends the attempt [ms]. */
const STALL_LIMIT = 10_000
/** The whole attempt may take this long [ms]. */
const FETCH_LIMIT = 300_000
/** After an attempt that failed, the next starts do without one for this long [ms]. */
const RETRY_AFTER = 3_600_000

const FAILURE_RECORD = path.join(DIST, '.electron-failed')

/** @param {string} [packageFolder] @returns {string | null} the executable, null when it is not there */
export function electronExecutable(packageFolder = inProject('node_modules', 'electron')) {
  const named = nameOfExecutable(packageFolder)
  // The runtime's own variable for a copy of it that lies elsewhere.
  const elsewhere = process.env['ELECTRON_OVERRIDE_DIST_PATH']
  const executable =
    elsewhere === undefined
      ? named && path.join(packageFolder, 'dist', named)
      : path.join(elsewhere, named ?? 'electron')
  return executable !== null && existsSync(executable) ? executable : null
}

/** @param {string} packageFolder @returns {string | null} */
function nameOfExecutable(packageFolder) {
  try {
    return readFileSync(path.join(packageFolder, 'path.txt'), 'utf8').trim()
  } catch {
    return null
  }
}

/** Fetch the runtime unless that failed a short while ago. @returns {Promise<string | null>} the executable, or null */
export async function fetchElectron() {
  const script = inProject('node_modules', 'electron', 'install.js')
  if (!existsSync(script) || failedLately()) return null
  tell('Fetching the desktop runtime, once (npm start -- --browser goes without it) …')
  try {
    await runInstallScript(script)
    const executable = electronExecutable()
    mkdirSync(DIST, { recursive: true })
    if (executable === null) writeFileSync(FAILURE_RECORD, '')
    else rmSync(FAILURE_RECORD, { force: true })
    return executable
  } catch {
    // No place to put it: the program does without.
    return null
  }
}

function failedLately() {
  const record = statSync(FAILURE_RECORD, { throwIfNoEntry: false })
  return record !== undefined && Date.now() - record.mtimeMs < RETRY_AFTER
}

/**
 * Run the script with a temporary folder of its own: how much lies in it tells whether anything still arrives.
 *
 * @param {string} script @returns {Promise<void>}
 */
async function runInstallScript(script) {
  const folder = mkdtempSync(path.join(tmpdir(), 'ringwright-runtime-'))
  const env = { ...process.env, TMPDIR: folder, TEMP: folder, TMP: folder }
  const child = spawn(process.execPath, [script], { env, stdio: 'ignore' })
  const started = Date.now()
  let seen = -1
  let lastChange = started
  const watch = setInterval(() => {
    const size = sizeOf(folder)
    if (size !== seen) {
      seen = size
      lastChange = Date.now()
    }
    // Unpacking comes after the last byte and takes some seconds: the stall limit is longer than that.
    if (Date.now() - lastChange > STALL_LIMIT || Date.now() - started > FETCH_LIMIT) child.kill()
  }, 500)
  await new Promise((resolve) => {
    child.once('error', resolve)
    child.once('close', resolve)
  })
  clearInterval(watch)
  rmSync(folder, { recursive: true, force: true })
}

/** @param {string} folder @returns {number} bytes in it, at any depth */
function sizeOf(folder) {
  try {
    return readdirSync(folder, { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile())
      .reduce(
        (sum, entry) => sum + (statSync(path.join(entry.parentPath, entry.name), { throwIfNoEntry: false })?.size ?? 0),
        0,
      )
  } catch {
    return 0
  }
}
