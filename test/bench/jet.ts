/** The starting jet at L/D 8: one smoothing length, and the ensemble of three. */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { pathToFileURL } from 'node:url'
import { inProject } from '../../build/scripts/root.mjs'
import { startingJet, startingJetEnsemble, type StartingJetInput } from '../../core/coaxial'
import { loadKernel } from '../../core/kernel'
import { documentOf } from '../support/plans'
import { median, type Figure } from './measure'

const RUNS = 3

const JET: StartingJetInput = {
  density: 998.2,
  kinematicViscosity: 1.0034e-6,
  diameter: 0.02,
  programme: { shape: 'rectangular', stroke: 0.16, peakSpeed: 0.5, riseTime: 0, fallTime: 0, rows: [] },
  axialFlow: 0,
  coreGrowth: true,
  delta: 0.1,
}

/** CPU seconds that a job takes. */
async function cpuSeconds(job: () => Promise<unknown>): Promise<number> {
  const start = process.cpuUsage()
  await job()
  const { user, system } = process.cpuUsage(start)
  return (user + system) / 1e6
}

/** Most memory the runner's process ever held on a plan with a jet of three smoothing lengths [MB]. The runner must be built. */
function runnerMemory(): number {
  const folder = mkdtempSync(path.join(tmpdir(), 'ringwright-bench-'))
  const plan = documentOf({ programme: { shape: 'rectangular', stroke: 0.24, peakSpeed: 0.2 }, jet: {} })
  writeFileSync(path.join(folder, 'plan.json'), JSON.stringify(plan))
  const runner = pathToFileURL(inProject('dist/app/batch.mjs')).href
  const words = [path.join(folder, 'plan.json'), '--out', path.join(folder, 'out')]
  const script = `const { main } = await import(${JSON.stringify(runner)})
const code = await main(${JSON.stringify(words)})
console.log('kB ' + process.resourceUsage().maxRSS)
process.exit(code)`
  const { status, stdout, stderr } = spawnSync(process.execPath, ['--input-type=module', '--eval', script], {
    encoding: 'utf8',
  })
  rmSync(folder, { recursive: true })
  const kilobytes = Number(/^kB (\d+)$/m.exec(stdout)?.[1])
  if (status !== 0 || !Number.isFinite(kilobytes)) throw new Error(`the runner failed: ${stderr}`)
  return kilobytes / 1000
}

/** CPU time and memory of the starting jet. @throws {Error} where a jet did not pinch off: the time would mean nothing. */
export async function jetFigures(): Promise<readonly Figure[]> {
  const kernel = await loadKernel()
  const one: number[] = []
  for (let i = 0; i < RUNS; i++)
    one.push(
      await cpuSeconds(async () => {
        const run = await startingJet(JET, { kernel })
        if (run.pinchOff === null) throw new Error(`the jet did not pinch off: ${run.message}`)
      }),
    )
  const three = await cpuSeconds(async () => {
    const jet = await startingJetEnsemble({ ...JET, delta: null, ensemble: true }, { kernel })
    if (jet.formationNumber === null) throw new Error(`the ensemble gave no formation number: ${jet.message}`)
  })
  return [
    { name: 'starting jet, L/D 8, one delta', value: median(one), unit: 's', n: RUNS, goal: { atMost: 2 } },
    { name: 'starting jet, L/D 8, ensemble of three', value: three, unit: 's', n: 1, goal: { atMost: 6 } },
    {
      name: 'runner on a plan with a jet, peak memory',
      value: runnerMemory(),
      unit: 'MB',
      n: 1,
      goal: { atMost: 500 },
    },
  ]
}
