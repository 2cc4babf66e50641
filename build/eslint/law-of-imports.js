/**
 * The law of imports as a lint rule: which room may import which, and what from outside the tree.
 *
 * - `core` imports only `core`, and inside it only the rooms above in CORE_ORDER, each through its `index.ts`;
 *   outside packages only through the named adapter file.
 * - `app` imports itself and core's `run`, `plan`, `report`, `base`; only main.ts and preload.ts import `electron`.
 * - `renderer` imports itself, `core` (through indexes) and, of `app`, only `contract.ts`; never Node or Electron.
 */
import path from 'node:path'
import { fileURLToPath } from 'node:url'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))

/** Rooms of core, lowest first: a room may import those before it. */
export const CORE_ORDER = [
  'base',
  'quantity',
  'water',
  'ring',
  'pulse',
  'kernel',
  'coaxial',
  'filament',
  'thruster',
  'tank',
  'plan',
  'report',
  'run',
]

/** Packages core may use, each behind one adapter file. */
export const CORE_PACKAGES = {
  papaparse: 'core/plan/csvReader.ts',
  'ml-levenberg-marquardt': 'core/tank/readings/leastSquares.ts',
}

const RENDERER_PACKAGES = ['vue', 'three', 'chart.js']
const APP_CORE_ROOMS = ['base', 'plan', 'report', 'run']
const ELECTRON_FILES = ['app/main.ts', 'app/preload.ts']

/** @param {string} from repository path of the importing file @param {string} specifier as written @returns {string | null} */
export function breach(from, specifier) {
  const room = from.split('/')[0] ?? ''
  if (!specifier.startsWith('.')) return packageBreach(room, from, specifier)
  const target = path.posix.normalize(path.posix.join(path.posix.dirname(from), specifier.replace(/\?.*$/, '')))
  const [targetTop = '', targetRoom = ''] = target.split('/')
  if (room === 'core') return coreBreach(from, target)
  if (room === 'app') {
    if (targetTop === 'app') return null
    if (targetTop !== 'core') return `app may not import from ${targetTop}`
    if (!APP_CORE_ROOMS.includes(targetRoom)) return `app may import only core/${APP_CORE_ROOMS.join(', core/')}`
    return throughIndex(target)
  }
  if (room === 'renderer') {
    if (targetTop === 'renderer') return null
    if (targetTop === 'core') return throughIndex(target)
    if (/^app\/contract(\.ts)?$/.test(target)) return null
    return `renderer may not import ${target}: of app only contract.ts is shared`
  }
  return null
}

/** @param {string} room @param {string} from @param {string} specifier @returns {string | null} */
function packageBreach(room, from, specifier) {
  const name = specifier
    .split('/')
    .slice(0, specifier.startsWith('@') ? 2 : 1)
    .join('/')
  if (name === 'electron' && !ELECTRON_FILES.includes(from))
    return 'only app/main.ts and app/preload.ts import electron'
  if (room === 'core') {
    const adapter = /** @type {Record<string, string>} */ (CORE_PACKAGES)[name]
    if (adapter === undefined) return `core imports only core: ${name} is not on the allow-list`
    return adapter === from ? null : `${name} may be imported only in ${adapter}`
  }
  if (room === 'renderer' && !RENDERER_PACKAGES.includes(name)) return `renderer may not import ${name}`
  if (room === 'app' && name !== 'electron' && !name.startsWith('node:')) return `app may not import ${name}`
  return null
}

/** @param {string} from @param {string} target @returns {string | null} */
function coreBreach(from, target) {
  const [top = '', targetRoom = ''] = target.split('/')
  if (top !== 'core') return 'core imports only core'
  const fromRoom = from.split('/')[1] ?? ''
  if (fromRoom === targetRoom) return null
  const order = CORE_ORDER.indexOf(targetRoom)
  if (order < 0) return `core/${targetRoom} is not a room of core`
  if (order > CORE_ORDER.indexOf(fromRoom)) return `core/${fromRoom} may not import upward from core/${targetRoom}`
  return throughIndex(target)
}

/** @param {string} target @returns {string | null} */
function throughIndex(target) {
  const parts = target.split('/')
  const rest = parts.slice(2).join('/')
  return rest === '' || rest === 'index' || rest === 'index.ts'
    ? null
    : `reach core/${parts[1]} through its index, not ${target}`
}

/** @type {import('eslint').Rule.RuleModule} */
export const lawOfImports = {
  meta: { type: 'problem', schema: [], messages: { breach: '{{why}}' } },
  create(context) {
    const from = path.relative(ROOT, context.filename).split(path.sep).join('/')
    /** @param {any} node */
    const check = (node) => {
      const specifier = node.source?.value
      if (typeof specifier !== 'string') return
      const why = breach(from, specifier)
      if (why !== null) context.report({ node, messageId: 'breach', data: { why } })
    }
    return {
      ImportDeclaration: check,
      ExportNamedDeclaration: check,
      ExportAllDeclaration: check,
      ImportExpression: check,
    }
  },
}
