/**
 * The notices of a built page, in one file beside it: the program's own licence, those of the packages bundled into it, and that
 * of the measured data it holds. The window shows the file, and packages carry a copy where people look for it.
 */
import { readFileSync } from 'node:fs'
import path from 'node:path'
import { runnerImport } from 'vite'
import { inProject, ROOT } from './root.mjs'

export const NOTICES_FILE = 'notices.txt'
/** Stands above the title of each part; the window takes the file apart at it (renderer/model/about.ts). */
export const RULE = '='.repeat(72)
/** Where the bundler's own list goes before it is read here. */
export const LICENCE_LIST = 'licences.json'

/** The room of the measured numbers; what is said of them goes where they go. */
const MEASURED = 'core/plan/measuredPulse.ts'

/**
 * @typedef {{ readonly name: string, readonly version: string, readonly identifier?: string, readonly text?: string }} Licence
 * @typedef {{ readonly source: string, readonly paper: string, readonly licence: readonly string[] }} Measured
 */

/** @returns {import('vite').Plugin} */
export function noticesFile() {
  return {
    name: 'ringwright:notices',
    apply: 'build',
    generateBundle: {
      // After the bundler has listed the licences of what is in the bundle.
      order: 'post',
      async handler(_options, bundle) {
        const list = bundle[LICENCE_LIST]
        if (list?.type !== 'asset') throw new Error('The bundler does not list the licences as it did.')
        const licences = JSON.parse(list.source.toString())
        delete bundle[LICENCE_LIST]
        const isMeasured = Object.values(bundle).some((part) => part.type === 'chunk' && holdsMeasured(part.moduleIds))
        const measured = isMeasured ? await readMeasured() : null
        this.emitFile({ type: 'asset', fileName: NOTICES_FILE, source: noticesText(licences, measured) })
      },
    },
  }
}

/**
 * @param {readonly Licence[]} licences of the bundled packages @param {Measured | null} measured
 * @returns {string} plain text: what it is, then a rule, a title and the terms of each part
 * @throws {Error} for a package without a licence's name or text, since its notice must go with it
 */
export function noticesText(licences, measured) {
  const { version } = JSON.parse(readFileSync(inProject('package.json'), 'utf8'))
  const parts = [part(`Ringwright ${version} (MIT)`, readFileSync(inProject('LICENSE'), 'utf8'))]
  for (const { name, version: release, identifier, text = '' } of licences) {
    if (identifier === undefined || text.trim() === '')
      throw new Error(`${name} ${release} is bundled and cannot be told of: it has no licence's name or no text of it.`)
    parts.push(part(`${name} ${release} (${identifier})`, text))
  }
  if (measured !== null) {
    const origin = `Transcribed from ${measured.source}. Described in ${measured.paper}.`
    parts.push(part('Numbers of a measured pulse (MIT)', [origin, ...measured.licence].join('\n\n')))
  }
  return ['What this program holds, and the terms of each.', ...parts].join('\n\n')
}

/** @param {string} title @param {string} text */
function part(title, text) {
  return `${RULE}\n${title}\n\n${text.replaceAll('\r\n', '\n').trim()}\n`
}

/** @param {readonly string[]} moduleIds */
function holdsMeasured(moduleIds) {
  return moduleIds.some((id) => path.relative(ROOT, id).split(path.sep).join('/') === MEASURED)
}

/** @returns {Promise<Measured>} */
async function readMeasured() {
  const { module } = await runnerImport(inProject(MEASURED), { root: ROOT, configFile: false, logLevel: 'error' })
  const { MEASURED_PULSE } = /** @type {{ MEASURED_PULSE: Measured }} */ (module)
  return MEASURED_PULSE
}
