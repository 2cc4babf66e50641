/** Builds the parts that are asked for into `dist`. */
import { runCommand } from './commands.mjs'
import { oneAtATime } from './lock.mjs'
import { DIST, inProject, tell } from './root.mjs'
import { fingerprint, forget, isStale, remember } from './stale.mjs'

/** @typedef {import('./stale.mjs').Part} Part */

/** Build those of the parts that are stale. @param {readonly Part[]} parts @returns {Promise<readonly Part[]>} what was built */
export async function ensureBuilt(parts) {
  if (!parts.some(isStale)) return []
  return oneAtATime(async () => {
    // Another process may have built it meanwhile.
    const stale = parts.filter(isStale)
    for (const part of stale) await buildPart(part)
    return stale
  })
}

/** Build a part whether or not it is stale. @param {Part} part */
export async function build(part) {
  await oneAtATime(() => buildPart(part))
}

/** @param {Part} part */
async function buildPart(part) {
  const print = fingerprint(part)
  forget(part)
  await bundlePart(part, DIST)
  remember(part, print)
}

/**
 * Bundle a part in a process of its own.
 *
 * @param {Part} part @param {string} folder gets a folder of the part's name; one that is there is replaced
 * @throws {Error} with what the bundler says
 */
export async function bundlePart(part, folder) {
  const { code, output } = await runCommand(process.execPath, [
    inProject('build', 'scripts', 'bundlePart.mjs'),
    part,
    folder,
  ])
  if (code !== 0) throw new Error(output.trim())
  if (output.trim() !== '') tell(output.trim())
}
