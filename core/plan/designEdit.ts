/**
 * The plan with another thruster design: what opening a candidate of a sizing, or moving the plan on its map, changes.
 */
import { compileProgramme } from '../pulse'
import { programmeMoments, scaledProgramme } from '../thruster'
import { setThruster } from './edit'
import type { Plan } from './types'

/** A design at one duty point. */
export interface PlannedDesign {
  /** Exit diameter [m]. */
  readonly diameter: number
  /** Stroke over exit diameter. */
  readonly strokeRatio: number
  readonly count: number
  /** Pulses a second. */
  readonly frequency: number
  /** Of the stroke [s]. */
  readonly duration: number
  /** Share of the period that ejects; absent: the plan's own is kept. */
  readonly ejectShare?: number
}

/**
 * Set a design: the nozzle keeps its proportions, plunger and length with it, and the programme its shape and the shares of its ramps,
 * as every design of a sizing does.
 *
 * @throws {DomainError} on a nozzle or programme that is refused
 */
export function setDesign(plan: Plan, design: PlannedDesign): Plan {
  const { nozzle, programme } = plan
  const grown = design.diameter / nozzle.diameter
  const moments = programmeMoments(compileProgramme(programme), programme)
  const pulses = plan.train?.pulses ?? 1
  const next: Plan = {
    ...plan,
    nozzle: {
      ...nozzle,
      diameter: design.diameter,
      pistonDiameter: nozzle.pistonDiameter * grown,
      length: nozzle.length * grown,
    },
    programme: scaledProgramme(programme, moments, design.strokeRatio * design.diameter, design.duration),
    train: { pulses, period: 1 / design.frequency },
  }
  if (plan.thruster === null) return next
  const { actuator } = plan.thruster
  const ejectShare = design.ejectShare ?? actuator.ejectShare
  return setThruster(next, { count: design.count, actuator: { ...actuator, ejectShare } })
}
