/** One at a time: installing and building are done by one process while others that want the same wait for it. */
import { mkdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { DIST } from './root.mjs'

const LOCK = path.join(DIST, '.lock')

/** A lock without a process behind it is taken over at this age [ms]: its owner may not have written its name yet. */
const NAMELESS_AGE = 5000

/** @template T @param {() => Promise<T>} work @param {string} [folder] the lock @returns {Promise<T>} */
export async function oneAtATime(work, folder = LOCK) {
  mkdirSync(path.dirname(folder), { recursive: true })
  while (!take(folder)) {
    if (isAbandoned(folder)) rmSync(folder, { recursive: true, force: true })
    else await wait(100)
  }
  try {
    return await work()
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

/** @param {string} folder @returns {boolean} */
function take(folder) {
  try {
    mkdirSync(folder)
    writeFileSync(path.join(folder, 'process'), String(process.pid))
    return true
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'EEXIST') return false
    throw error
  }
}

/** @param {string} folder @returns {boolean} */
function isAbandoned(folder) {
  const owner = Number(readOwner(folder))
  if (owner > 0) return !isRunning(owner)
  const found = statSync(folder, { throwIfNoEntry: false })
  return found !== undefined && Date.now() - found.mtimeMs > NAMELESS_AGE
}

/** @param {string} folder */
function readOwner(folder) {
  try {
    return readFileSync(path.join(folder, 'process'), 'utf8')
  } catch {
    return ''
  }
}

/** @param {number} owner */
function isRunning(owner) {
  try {
    process.kill(owner, 0)
    return true
  } catch (error) {
    // Another user's process may not be asked, and is there.
    return error instanceof Error && 'code' in error && error.code === 'EPERM'
  }
}
