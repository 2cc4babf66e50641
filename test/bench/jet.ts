/** The starting jet at L/D 8: one smoothing length, and the ensemble of three. */
import { startingJet, startingJetEnsemble, type StartingJetInput } from '../../core/coaxial'
import { loadKernel } from '../../core/kernel'
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

/** CPU time of the starting jet. @throws {Error} where a jet did not pinch off: the time would mean nothing. */
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
  ]
}
