/** What the page weighs: all of it, and what is loaded before the window can be used. */
import { readdirSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { gzipSync } from 'node:zlib'
import { DIST } from './root.mjs'

/** Most that may be loaded before the window can be used [bytes, gzip]. */
export const PAGE_BUDGET = 450 * 1000

const LIST = path.join(DIST, '.renderer-start.json')

/**
 * Notes which files are loaded at the start: the page, its worker, and all that either imports without being asked.
 *
 * @returns {import('vite').Plugin}
 */
export function startList() {
  return {
    name: 'ringwright:start-list',
    apply: 'build',
    writeBundle(_options, bundle) {
      const files = new Set(
        Object.values(bundle)
          .filter((part) => part.type === 'chunk' && isStart(part))
          .map((part) => part.fileName),
      )
      // A set gives what is added to it while it is gone through.
      for (const name of files) {
        const part = bundle[name]
        if (part?.type !== 'chunk') continue
        for (const next of [...part.imports, ...(part.viteMetadata?.importedCss ?? [])]) files.add(next)
      }
      writeFileSync(LIST, JSON.stringify(['index.html', ...files]))
    },
  }
}

/** The page's own entry and the workers it starts. @param {{ isEntry: boolean, name: string }} chunk */
function isStart({ isEntry, name }) {
  return isEntry || name === 'worker'
}

/** Everything that can ever be loaded, each file compressed. @returns {number} bytes */
export function wholeWeight() {
  const folder = path.join(DIST, 'renderer')
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(js|css|html|wasm|svg)$/.test(entry.name))
    .reduce((sum, entry) => sum + sent(path.join(entry.parentPath, entry.name)), 0)
}

/** What is loaded before the window can be used, its worker included. @returns {number} bytes */
export function startWeight() {
  /** @type {readonly string[]} */
  const files = JSON.parse(readFileSync(LIST, 'utf8'))
  return files.reduce((sum, name) => sum + sent(path.join(DIST, 'renderer', name)), 0)
}

/** @param {string} file */
function sent(file) {
  return gzipSync(readFileSync(file)).byteLength
}

/** @returns {string} a line that says what the page weighs and whether that is within its budget */
export function pageWeightLine() {
  const start = startWeight()
  const words = start <= PAGE_BUDGET ? 'within' : 'OVER'
  const kilobytes = (/** @type {number} */ bytes) => (bytes / 1000).toFixed(1)
  return `Page: ${kilobytes(start)} kB gzip at the start, ${words} its budget of ${PAGE_BUDGET / 1000} kB; ${kilobytes(wholeWeight())} kB with every part that is loaded when it is asked for.`
}
