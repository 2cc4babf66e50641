/**
 * How far the prediction moves with what may not have been as planned: the model run again at a small change of each.
 */
import { DomainError } from '../../base'
import type { ProgrammeInput, ProgrammeRow, PulseInput } from '../../pulse'
import { waterProperties, type WaterInput } from '../../water'
import { COMPARED, predictionOf, type ComparedQuantity, type PredictionInput } from './predicted'

export type Cause = 'stroke' | 'leak' | 'temperature' | 'diameter'

/** Change of each compared quantity over the change of a cause, both relative; of the temperature a kelvin. */
export interface Sensitivity {
  readonly cause: Cause
  readonly change: Readonly<Partial<Record<ComparedQuantity, number>>>
}

const RELATIVE_STEP = 0.005
const TEMPERATURE_STEP = 0.5

/** @param water of the plan; null or given water: the temperature is no cause */
export function sensitivitiesOf(input: PredictionInput, water: WaterInput | null): readonly Sensitivity[] {
  const { pulse, ageing, walls, seen, period } = input
  // Without the planned result and the thrust computed for it, which do not hold for a changed plan.
  const plain: PredictionInput = { pulse, ageing, walls, seen, period, meanForce: null }
  const stroke = (factor: number): PulseInput => ({ ...pulse, programme: scaled(pulse.programme, factor) })
  const bore = (factor: number): PulseInput => ({
    ...pulse,
    // The piston gives the same flow, so that a wider exit slows the slug by its area.
    programme: scaled(pulse.programme, 1 / (factor * factor)),
    nozzle: { ...pulse.nozzle, diameter: pulse.nozzle.diameter * factor },
  })
  const found: Sensitivity[] = []
  const take = (cause: Cause, change: (by: number) => PulseInput, step: number, relative = 1): void => {
    const moved = slopes(plain, change, step)
    if (moved !== null)
      found.push({
        cause,
        change: Object.fromEntries(Object.entries(moved).map(([name, value]) => [name, relative * value])),
      })
  }
  take('stroke', (by) => stroke(1 + by), RELATIVE_STEP)
  take('leak', (by) => stroke(1 - by), RELATIVE_STEP)
  take('diameter', (by) => bore(1 + by), RELATIVE_STEP)
  if (water !== null && water.kind !== 'given') take('temperature', (by) => warmed(pulse, water, by), TEMPERATURE_STEP)
  return found
}

/** Stroke and speeds alike: the piston, or what of it comes to the exit, moves so much further in the same time. */
function scaled(programme: ProgrammeInput, factor: number): ProgrammeInput {
  return {
    ...programme,
    stroke: programme.stroke * factor,
    peakSpeed: programme.peakSpeed * factor,
    rows: programme.rows.map((row): ProgrammeRow =>
      'speed' in row
        ? { time: row.time, speed: row.speed * factor }
        : { time: row.time, position: row.position * factor },
    ),
  }
}

function warmed(pulse: PulseInput, water: WaterInput, by: number): PulseInput {
  const { density, kinematicViscosity } = waterProperties({
    ...water,
    temperatureCelsius: water.temperatureCelsius + by,
  })
  return { ...pulse, density, kinematicViscosity }
}

/** Relative slopes by central differences; null where a changed plan leaves the range of the model. */
function slopes(
  input: PredictionInput,
  change: (by: number) => PulseInput,
  step: number,
): Partial<Record<ComparedQuantity, number>> | null {
  try {
    const at = (by: number) => predictionOf({ ...input, pulse: change(by) }).prediction
    const [before, after] = [at(-step), at(step)]
    const found: Partial<Record<ComparedQuantity, number>> = {}
    for (const name of COMPARED) {
      const [low, high] = [before[name]?.value, after[name]?.value]
      if (low !== undefined && high !== undefined && low > 0 && high > 0)
        found[name] = Math.log(high / low) / (2 * step)
    }
    return found
  } catch (error) {
    if (error instanceof DomainError) return null
    throw error
  }
}
