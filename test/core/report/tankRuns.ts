/** Tank runs for the tests of drawing, plots and run sheet. */
import { examplePlan, setTankRun, shownUnits, type Plan } from '../../../core/plan'
import { run, type RunData } from '../../../core/run'
import { tankScene, type TankSceneModel } from '../../../core/report'
import type { TankRunResult, TankRunSection } from '../../../core/tank'

export const UNITS = shownUnits({})

export interface TankCase {
  readonly plan: Plan
  readonly data: RunData
  readonly result: TankRunResult
  readonly scene: TankSceneModel
}

/** The example's day with parts of its section changed. */
export async function tankCase(change: Partial<TankRunSection> = {}): Promise<TankCase> {
  const plan = setTankRun(examplePlan('tank-day'), change)
  const { data, message } = await run(plan, { sections: ['pulse', 'tankRun'] })
  const section = plan.tankRun
  if (data === null || data.tankRun === null || section === null) throw new Error(message)
  const scene = tankScene({ section, nozzle: plan.nozzle, stroke: plan.programme.stroke, result: data.tankRun }, UNITS)
  return { plan, data, result: data.tankRun, scene }
}

export const CASES: Readonly<Record<string, Partial<TankRunSection>>> = {
  'the example': {},
  'a tank of sizes not given': { tank: { length: null, width: null, depth: null, bore: null }, nozzleDepth: null },
  'a round tank': { tank: { length: 0.8, width: null, depth: null, bore: 0.2 }, nozzleDepth: null },
  'a tight tank with many stations': {
    tank: { length: 0.5, width: 0.2, depth: 0.25, bore: null },
    nozzleDepth: 0.08,
    stations: [0.05, 0.1, 0.12, 0.2, 0.3, 0.32, 0.45],
  },
  'a station behind the far wall': { tank: { length: 0.25, width: 0.4, depth: 0.5, bore: null } },
  'no stations': { stations: [] },
}
