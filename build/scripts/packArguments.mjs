/** The command line of npm run pack. */
import path from 'node:path'

/** @typedef {'linux' | 'mac' | 'windows'} System */

/**
 * @typedef {object} PackRequest
 * @property {System} system what the packages are for
 * @property {boolean} unpacked only the folder that packages are made from
 * @property {string | null} runtime folder with an unpacked runtime; null: it is fetched
 * @property {string | null} out folder for what is made; null: `release`
 *
 * @typedef {{ readonly ok: true, readonly request: PackRequest } | { readonly ok: false, readonly message: string }} PackReading
 */

export const PACK_USAGE = 'npm run pack -- [--for linux|mac|windows] [--unpacked] [--runtime FOLDER] [--out FOLDER]'

/** @type {Readonly<Record<string, System>>} */
const HOSTS = { linux: 'linux', darwin: 'mac', win32: 'windows' }

/**
 * @param {readonly string[]} list
 * @param {{ readonly platform: string, readonly folder: string }} caller as process.platform; where paths are from
 * @returns {PackReading}
 */
export function readPackArguments(list, { platform, folder }) {
  /** @type {PackRequest} */
  let request = { system: HOSTS[platform] ?? 'linux', unpacked: false, runtime: null, out: null }
  const rest = [...list]
  for (let word = rest.shift(); word !== undefined; word = rest.shift()) {
    if (word === '--unpacked') {
      request = { ...request, unpacked: true }
      continue
    }
    const [name = '', joined] = splitOnce(word)
    if (name !== '--for' && name !== '--runtime' && name !== '--out')
      return refuse(`${word} is not an argument of npm run pack. Use: ${PACK_USAGE}`)
    const value = joined ?? rest.shift() ?? ''
    if (value === '' || (joined === undefined && value.startsWith('--'))) return refuse(`${name} needs a value.`)
    if (name === '--for') {
      const system = Object.values(HOSTS).find((known) => known === value)
      if (system === undefined) return refuse(`--for must be linux, mac or windows, got ${value}.`)
      request = { ...request, system }
    } else request = { ...request, [name.slice(2)]: path.resolve(folder, value) }
  }
  return { ok: true, request }
}

/** @param {string} word @returns {readonly [string, string?]} */
function splitOnce(word) {
  const at = word.indexOf('=')
  return at < 0 ? [word] : [word.slice(0, at), word.slice(at + 1)]
}

/** @param {string} message @returns {PackReading} */
function refuse(message) {
  return { ok: false, message }
}
