/** A plan computed many times: Monte Carlo samples, rows of a sweep. */
import { run, sweepOf } from '../../core/run'
import { planOf } from '../support/plans'
import { median, type Figure } from './measure'

const RUNS = 3
const SAMPLES = 2000

const SPREAD = {
  relative: { 'nozzle.diameter': 0.002, 'programme.stroke': 0.01, 'programme.peakSpeed': 0.01 },
  absolute: { 'water.temperatureCelsius': 0.5 },
  samples: SAMPLES,
  seed: 1,
}

const SWEEP = {
  fields: [
    { path: 'nozzle.diameter', from: 0.02, to: 0.04, count: 25 },
    { path: 'programme.stroke', from: 0.04, to: 0.12, count: 20 },
  ],
}
const ROWS = 500

/** CPU seconds that a job takes. */
async function cpuSeconds(job: () => Promise<unknown>): Promise<number> {
  const start = process.cpuUsage()
  await job()
  const { user, system } = process.cpuUsage(start)
  return (user + system) / 1e6
}

/** CPU time of a spread and of a sweep of a pulse. @throws {Error} where one of them did not come to its end */
export async function varietyFigures(): Promise<readonly Figure[]> {
  const spreads: number[] = []
  const sweeps: number[] = []
  for (let i = 0; i < RUNS; i++) {
    spreads.push(
      await cpuSeconds(async () => {
        const { data, message } = await run(planOf({ spread: SPREAD }), { sections: ['spread'] })
        if (data?.spread?.used !== SAMPLES) throw new Error(`not every sample was computed: ${message}`)
      }),
    )
    sweeps.push(
      await cpuSeconds(async () => {
        const { rows, message } = await sweepOf(planOf({ sweep: SWEEP }))
        if (rows.length !== ROWS) throw new Error(`not every row was computed: ${message}`)
      }),
    )
  }
  return [
    {
      name: `${SAMPLES} Monte Carlo samples of a pulse`,
      value: median(spreads),
      unit: 's',
      n: RUNS,
      goal: { atMost: 2 },
    },
    { name: 'one row of a sweep of a pulse', value: (1000 * median(sweeps)) / ROWS, unit: 'ms', n: RUNS, goal: null },
  ]
}
