/** Builds the parts that are asked for into `dist`. */
import { readdirSync, readFileSync, rmSync } from 'node:fs'
import path from 'node:path'
import { gzipSync } from 'node:zlib'
import { oneAtATime } from './lock.mjs'
import { DIST } from './root.mjs'
import { fingerprint, forget, isStale, remember } from './stale.mjs'

/** @typedef {import('./stale.mjs').Part} Part */

/** Most the page may weigh when sent [bytes, gzip]. */
export const PAGE_BUDGET = 450 * 1000

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
  const { build: bundle } = await import('vite')
  if (part === 'app') {
    const { APP_ENTRIES, appConfig } = await import('../vite.app.mjs')
    rmSync(path.join(DIST, 'app'), { recursive: true, force: true })
    for (const entry of APP_ENTRIES) await bundle(appConfig(entry))
  } else {
    const { rendererConfig } = await import('../vite.renderer.mjs')
    await bundle(rendererConfig())
  }
  remember(part, print)
}

/** What the page weighs when sent: every script, style and page, each compressed. @returns {number} bytes */
export function pageWeight() {
  const folder = path.join(DIST, 'renderer')
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(js|css|html|wasm|svg)$/.test(entry.name))
    .reduce((sum, entry) => sum + gzipSync(readFileSync(path.join(entry.parentPath, entry.name))).byteLength, 0)
}

/** @returns {string} a line that says what the page weighs and whether that is within its budget */
export function pageWeightLine() {
  const weight = pageWeight()
  const words = weight <= PAGE_BUDGET ? 'within' : 'OVER'
  return `Page: ${(weight / 1000).toFixed(1)} kB gzip, ${words} its budget of ${PAGE_BUDGET / 1000} kB.`
}
