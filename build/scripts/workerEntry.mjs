/**
 * Makes the workers further entries of the page's own build, so that what both compute with is stored and sent once.
 *
 * Left alone, Vite bundles a worker by itself, with a copy of everything it shares with the page. The development server
 * serves modules one by one and needs none of this.
 */
import path from 'node:path'
import { inProject, ROOT } from './root.mjs'

/** How a worker is started, with the address of its module. */
const START = /(?<=new Worker\()new URL\('(\.[^']+)', import\.meta\.url\)/g
const OURS = inProject('renderer') + path.sep

/** Rooms a worker may load from: none of them touches a document. */
const ROOMS = ['core/', 'renderer/worker/']
/** Pure packages that core computes and reads tables with, and what they load. */
const PACKAGES = [
  'papaparse',
  'ml-levenberg-marquardt',
  'ml-matrix',
  'is-any-array',
  'ml-array-max',
  'ml-array-min',
  'ml-array-rescale',
]

/** @returns {import('vite').Plugin} */
export function workerEntries() {
  /** What the bundler calls the entries. @type {Set<string>} */
  const entries = new Set()
  return {
    name: 'ringwright:worker-entries',
    apply: 'build',
    enforce: 'pre',
    transform(code, id) {
      if (!path.normalize(id).startsWith(OURS)) return null
      const starts = [...code.matchAll(START)]
      if (starts.length !== code.split('new Worker(').length - 1)
        throw new Error(`${id} must start a worker by new Worker(new URL('./name.ts', import.meta.url), ...).`)
      if (starts.length === 0) return null
      const changed = code.replace(START, (_, /** @type {string} */ place) => {
        const entry = this.emitFile({ type: 'chunk', id: path.resolve(path.dirname(id), place), name: 'worker' })
        entries.add(entry)
        return `import.meta.ROLLUP_FILE_URL_${entry}`
      })
      return { code: changed, map: null }
    },
    generateBundle(_options, bundle) {
      for (const entry of entries) {
        const foreign = loadedModules(this.getFileName(entry), bundle).filter(isForeign)
        if (foreign.length > 0) throw new Error(`A worker must not load ${foreign.join(', ')}.`)
      }
    },
  }
}

/**
 * Modules of a chunk and of every chunk that it imports, at once or later.
 *
 * @param {string} first name of the chunk
 * @param {Readonly<Record<string, Loaded | { readonly type: 'asset' }>>} bundle
 * @returns {readonly string[]}
 *
 * @typedef {object} Loaded
 * @property {'chunk'} type
 * @property {readonly string[]} moduleIds
 * @property {readonly string[]} imports
 * @property {readonly string[]} dynamicImports
 */
export function loadedModules(first, bundle) {
  const files = new Set([first])
  /** @type {Set<string>} */
  const modules = new Set()
  // A set gives what is added to it while it is gone through.
  for (const file of files) {
    const part = bundle[file]
    if (part?.type !== 'chunk') continue
    for (const module of part.moduleIds) modules.add(module)
    for (const next of [...part.imports, ...part.dynamicImports]) files.add(next)
  }
  return [...modules]
}

/** Whether a module is not one for a worker. @param {string} id */
export function isForeign(id) {
  // The bundler's own helpers for modules, and Vite's for imports on demand: with module preload off it only passes them on.
  if (id.startsWith('\0rolldown/') || id === '\0vite/preload-helper.js') return false
  const place = path.relative(ROOT, id).split(path.sep).join('/')
  const allowed = [...ROOMS, ...PACKAGES.map((name) => `node_modules/${name}/`)]
  return !allowed.some((start) => place.startsWith(start))
}
