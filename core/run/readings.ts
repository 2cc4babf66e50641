/** The readings of a plan against its prediction. */
import { READINGS_DEFAULTS, type Plan } from '../plan'
import type { ComputedJet, PulseResult } from '../pulse'
import { tankWalls, type FieldResult, type ReadingsInput } from '../tank'
import type { ThrusterResult } from '../thruster'
import type { WaterProperties } from '../water'
import { pulseInputOf } from './pulse'

/** What stands beside the plan. */
export interface ReadingsBeside {
  readonly water: WaterProperties
  /** What the computed jet hands on, where the plan adopts it; null else. */
  readonly jet: ComputedJet | null
  /** Of the plan's own pulse with that jet, where it is at hand. */
  readonly pulse: PulseResult | null
  /** Where the thruster was computed. */
  readonly thruster: ThrusterResult | null
  readonly fields: FieldResult | null
}

/** Whether a plan holds anything that can be compared. */
export function holdsReadings({ readings }: Plan): boolean {
  if (readings === null) return false
  const { rows, force, piston, fields } = readings
  return rows.length > 0 || force.time.length > 0 || piston.length > 0 || fields !== null
}

/** What the comparison takes from a plan. @throws {DomainError} on tankRun.tank… */
export function readingsInputOf(plan: Plan, beside: ReadingsBeside): ReadingsInput {
  const { tankRun, train } = plan
  return {
    section: plan.readings ?? READINGS_DEFAULTS,
    pulse: pulseInputOf(plan, beside.water, beside.jet),
    ...(beside.pulse === null ? {} : { computed: beside.pulse }),
    ageing: plan.wake?.ageing ?? 'auto',
    walls: tankRun === null ? null : tankWalls(tankRun, plan.nozzle.diameter),
    water: plan.water,
    train: train === null ? null : { period: train.period, pulses: train.pulses },
    meanThrust: beside.thruster?.meanThrust ?? null,
    leak: tankRun?.drive.leak ?? 0,
    fields: beside.fields,
  }
}
