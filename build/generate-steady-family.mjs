/**
 * Writes core/ring/steadyFamilyTable.ts and steadyOutlineTable.ts: solves the steady family anew (about half a minute) and
 * prints the rows as they are done.
 *
 * Usage: npm run generate
 */
import { writeFile } from 'node:fs/promises'
import { fileURLToPath } from 'node:url'
import { format, resolveConfig } from 'prettier'
import { runnerImport } from 'vite'

const root = fileURLToPath(new URL('..', import.meta.url))
const style = fileURLToPath(new URL('./prettier.json', import.meta.url))
const entry = fileURLToPath(new URL('./steady-family-table.ts', import.meta.url))

const { module } = await runnerImport(entry, { root, configFile: false, logLevel: 'error' })
const texts = module.steadyFamilyModules(
  (/** @type {number} */ done, /** @type {number} */ of, /** @type {number} */ coreRatio) => {
    console.log(`${done} of ${of}: core ratio ${coreRatio.toFixed(6)}`)
  },
)
await write('steadyFamilyTable.ts', texts.family)
await write('steadyOutlineTable.ts', texts.outline)

/** @param {string} name @param {string} text */
async function write(name, text) {
  const target = fileURLToPath(new URL(`../core/ring/${name}`, import.meta.url))
  const options = await resolveConfig(target, { config: style })
  await writeFile(target, await format(text, { ...options, parser: 'typescript' }))
  console.log(`wrote core/ring/${name}`)
}
