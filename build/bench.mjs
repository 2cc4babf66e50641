/**
 * npm run bench: figures of the performance list as JSON lines {name, value, unit, n}, then a short table with the goals.
 *
 * Usage: npm run bench [-- GROUP...]. Timing on a shared machine is noise around a truth: read ratios and medians, repeat.
 */
import { runnerImport } from 'vite'
import { ensureBuilt } from './scripts/bundle.mjs'
import { ensureInstalled } from './scripts/install.mjs'
import { inProject, ROOT, tell } from './scripts/root.mjs'

/** @typedef {import('../test/bench/measure').Figure} Figure */

await ensureInstalled()
await ensureBuilt(['app', 'renderer'])
const { module } = await runnerImport(inProject('test', 'bench', 'index.ts'), {
  root: ROOT,
  configFile: false,
  logLevel: 'error',
})
const groups = /** @type {Record<string, () => Promise<readonly Figure[]>>} */ (module.GROUPS)
const wanted = process.argv.slice(2)
const unknown = wanted.find((name) => !(name in groups))
if (unknown !== undefined) {
  tell(`${unknown} is not a group of figures: choose among ${Object.keys(groups).join(', ')}.`)
  process.exit(2)
}
/** @type {Figure[]} */
const figures = []
for (const [name, measure] of Object.entries(groups)) {
  if (wanted.length > 0 && !wanted.includes(name)) continue
  for (const figure of await measure()) {
    figures.push(figure)
    const { name: what, value, unit, n } = figure
    process.stdout.write(`${JSON.stringify({ name: what, value, unit, n })}\n`)
  }
}
const width = Math.max(...figures.map((figure) => figure.name.length))
process.stdout.write('\n')
for (const { name, value, unit, goal } of figures) {
  const met = goal === null ? '' : 'atMost' in goal ? `at most ${goal.atMost}` : `at least ${goal.atLeast}`
  const missed = goal !== null && ('atMost' in goal ? value > goal.atMost : value < goal.atLeast)
  process.stdout.write(
    `${name.padEnd(width)}  ${value.toPrecision(4).padStart(9)} ${unit.padEnd(5)} ${met}${missed ? '  MISSED' : ''}\n`,
  )
}
