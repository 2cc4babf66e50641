/**
 * Whether what was built still matches its sources: names, sizes and times of the files a part is made from. A few
 * milliseconds, so that it can be asked at every start.
 */
import { createHash } from 'node:crypto'
import { mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { DIST, inProject, ROOT } from './root.mjs'

/** @typedef {'app' | 'renderer'} Part */

/** Folders and files each part is made from. @type {Readonly<Record<Part, readonly string[]>>} */
const SOURCES = {
  app: ['core', 'app', 'build', 'package.json', 'package-lock.json'],
  renderer: ['core', 'renderer', 'app/contract.ts', 'build', 'LICENSE', 'package.json', 'package-lock.json'],
}

/** A file each part is not complete without. @type {Readonly<Record<Part, string>>} */
const PROOF = { app: 'app/batch.mjs', renderer: 'renderer/index.html' }

/** @param {Part} part @returns {string} */
function stampFile(part) {
  return path.join(DIST, `.${part}-stamp`)
}

/** What the sources of a part look like now. @param {Part} part @returns {string} */
export function fingerprint(part) {
  const hash = createHash('sha256')
  for (const source of SOURCES[part]) addTo(hash, inProject(source))
  return hash.digest('hex')
}

/** @param {Part} part @returns {boolean} */
export function isStale(part) {
  try {
    statSync(path.join(DIST, PROOF[part]))
    return readFileSync(stampFile(part), 'utf8') !== fingerprint(part)
  } catch {
    return true
  }
}

/** Before building: a build that breaks off leaves the part stale. @param {Part} part */
export function forget(part) {
  rmSync(stampFile(part), { force: true })
}

/** @param {Part} part @param {string} print taken before the build, so that an edit during it counts as newer */
export function remember(part, print) {
  mkdirSync(DIST, { recursive: true })
  writeFileSync(stampFile(part), print)
}

/** @param {import('node:crypto').Hash} hash @param {string} place */
function addTo(hash, place) {
  const found = statSync(place, { throwIfNoEntry: false })
  if (found === undefined) return
  if (!found.isDirectory()) {
    hash.update(`${path.relative(ROOT, place)}\0${found.size}\0${found.mtimeMs}\n`)
    return
  }
  for (const name of readdirSync(place).sort()) if (!name.startsWith('.')) addTo(hash, path.join(place, name))
}
