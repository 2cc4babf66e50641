/**
 * The sheet without its tube: what is conserved then, and by how much the computation misses it.
 */
import type { Kernel } from '../../kernel'
import { JetFlow } from './jetFlow'
import { StepMemory, stepSheet } from './jetStep'
import type { Sheet } from './sheet'
import { sheetSums } from './sheetSums'

export interface FreeFlightOptions {
  readonly kernel: Kernel
  readonly delta: number
  readonly deltaGrowth: number
  /** Time at which the tube is taken away; the smoothing stays what it is then. */
  readonly time: number
  readonly duration: number
  readonly timeStep: number
  readonly stop: () => Promise<boolean>
}

/**
 * March a sheet without tube, stream and core growth; the sheet is changed.
 *
 * @returns largest relative strays of impulse and energy at the ends of steps, or null where it was stopped or went wrong
 */
export async function freeFlight(
  sheet: Sheet,
  options: FreeFlightOptions,
): Promise<{ readonly impulse: number; readonly energy: number } | null> {
  const { kernel, delta, deltaGrowth, time, timeStep } = options
  const flow = new JetFlow({ kernel, delta, deltaGrowth, stream: 0, wall: null })
  // The clock of the smoothing stands still.
  flow.holdTime(time)
  const memory = new StepMemory()
  const sums = () => sheetSums(sheet, (i) => flow.deltaSquaredOf(sheet, i, time), kernel, -Infinity).total
  sheet.weigh()
  const start = sums()
  const steps = Math.ceil(options.duration / timeStep - 1e-9)
  const drift = { impulse: 0, energy: 0 }
  const looks = Math.max(1, Math.floor(steps / 8))
  for (let k = 1; k <= steps; k++) {
    if (await options.stop()) return null
    if (!stepSheet(sheet, flow, memory, { time, length: timeStep, speedBefore: 0, speedAfter: 0 }, false)) return null
    sheet.tend()
    if (k % looks !== 0 && k !== steps) continue
    const now = sums()
    drift.impulse = Math.max(drift.impulse, Math.abs(now.impulse / start.impulse - 1))
    drift.energy = Math.max(drift.energy, Math.abs(now.energy / start.energy - 1))
  }
  return drift
}
