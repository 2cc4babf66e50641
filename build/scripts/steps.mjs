/** Checks that are one program each: what they are, and running them two at a time. */
import { nodeCommand, runCommand } from './commands.mjs'
import { inProject, tell } from './root.mjs'

/** @typedef {{ readonly name: string, readonly program: string, readonly list: readonly string[] }} Step */

/** @param {string} name @param {string} script @param {readonly string[]} list @returns {Step} */
function step(name, script, list) {
  return { name, ...nodeCommand(inProject('node_modules', script), list) }
}

/** @type {readonly Step[]} */
export const TYPE_STEPS = [
  // Where components are imported their types come from vue-tsc.
  ...['renderer', 'test'].map((room) =>
    step(`types of ${room}`, 'vue-tsc/bin/vue-tsc.js', ['-p', `${room}/tsconfig.json`]),
  ),
  ...['core', 'app', 'renderer/worker', 'build'].map((room) =>
    step(`types of ${room}`, 'typescript/bin/tsc', ['-p', `${room}/tsconfig.json`]),
  ),
]

/** @type {readonly Step[]} */
export const STYLE_STEPS = [
  step('lint', 'eslint/bin/eslint.js', ['-c', 'build/eslint.config.js', '--max-warnings=0', '.']),
  step('format', 'prettier/bin/prettier.cjs', [
    '--config',
    'build/prettier.json',
    '--ignore-path',
    '.gitignore',
    '--ignore-path',
    'build/prettier.ignore',
    '--check',
    '.',
  ]),
]

/**
 * Run steps two at a time, in their order; one line each, with its output where it failed.
 *
 * @param {readonly Step[]} steps @returns {Promise<number>} how many failed
 */
export async function runSteps(steps) {
  const waiting = [...steps]
  let failed = 0
  const work = async () => {
    for (let next = waiting.shift(); next !== undefined; next = waiting.shift()) {
      const started = Date.now()
      const { code, output } = await runCommand(next.program, next.list)
      tell(`${code === 0 ? 'ok     ' : 'FAILED '} ${next.name} (${((Date.now() - started) / 1000).toFixed(1)} s)`)
      if (code !== 0) {
        failed += 1
        tell(output.trimEnd())
      }
    }
  }
  await Promise.all([work(), work()])
  return failed
}
