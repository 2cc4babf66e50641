/**
 * npm test: everything that must hold before a commit. Installs what is missing; then format, lint, types, build and all
 * tests. The last line is the runner's count; every other check that fails adds one to `failed`.
 */
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { build } from './scripts/bundle.mjs'
import { PAGE_BUDGET, pageWeightLine, startWeight } from './scripts/pageWeight.mjs'
import { ensureChromium } from './scripts/chromium.mjs'
import { runCommand } from './scripts/commands.mjs'
import { ensureInstalled } from './scripts/install.mjs'
import { inProject, tell } from './scripts/root.mjs'
import { runSteps, STYLE_STEPS, TYPE_STEPS } from './scripts/steps.mjs'
import { tallyLine, tallyOf } from './scripts/tally.mjs'

try {
  await ensureInstalled()
  const chromium = await ensureChromium()
  let failedChecks = await runSteps([...STYLE_STEPS, ...TYPE_STEPS])
  failedChecks += await buildAll()
  const tests = await runTests(chromium)
  const tally = { ...tests, failed: tests.failed + failedChecks }
  process.stdout.write(`${tallyLine(tally)}\n`)
  process.exitCode = tally.failed === 0 ? 0 : 1
} catch (error) {
  tell(error instanceof Error ? error.message : String(error))
  process.stdout.write(`${tallyLine({ passed: 0, failed: 1, skipped: 0 })}\n`)
  process.exitCode = 1
}

/** @returns {Promise<number>} how many of the build's checks failed */
async function buildAll() {
  try {
    await build('app')
    await build('renderer')
  } catch (error) {
    tell(`FAILED  build\n${error instanceof Error ? error.message : String(error)}`)
    return 1
  }
  const light = startWeight() <= PAGE_BUDGET
  tell(`${light ? 'ok     ' : 'FAILED '} build. ${pageWeightLine()}`)
  return light ? 0 : 1
}

/** @param {string | null} chromium @returns {Promise<import('./scripts/tally.mjs').Tally>} */
async function runTests(chromium) {
  const folder = mkdtempSync(path.join(tmpdir(), 'ringwright-test-'))
  const report = path.join(folder, 'report.json')
  try {
    const { code } = await runCommand(
      process.execPath,
      [
        inProject('node_modules', 'vitest', 'vitest.mjs'),
        'run',
        '--config',
        'build/vitest.config.ts',
        '--reporter=default',
        '--reporter=json',
        `--outputFile.json=${report}`,
      ],
      // A build in this process leaves NODE_ENV at production, under which components are tested without what tests read.
      { show: true, env: { ...process.env, NODE_ENV: 'test', CHROMIUM_PATH: chromium ?? '' } },
    )
    const tally = tallyOf(readText(report)) ?? { passed: 0, failed: 1, skipped: 0 }
    // The runner may fail for a reason that is no test's: an error outside any of them, or nothing to run.
    return code !== 0 && tally.failed === 0 ? { ...tally, failed: 1 } : tally
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

/** @param {string} file */
function readText(file) {
  try {
    return readFileSync(file, 'utf8')
  } catch {
    return ''
  }
}
