/**
 * From the sections of a plan to the setting of a budget.
 */
import { exitFactors, type Invariants, type PulseInput } from '../pulse'
import type { BudgetSetting } from './budget'
import type { ThrusterSection } from './types'

/**
 * Setting of the budget for a thruster of a plan.
 *
 * @param factors exit factors; those of the nozzle where they are not given
 */
export function budgetSetting(
  section: ThrusterSection,
  pulse: PulseInput,
  frequency: number,
  speed: number,
  factors: Invariants = exitFactors(pulse.nozzle),
): BudgetSetting {
  const { nozzle, jet } = pulse
  const { actuator, intake } = section
  return {
    density: pulse.density,
    diameter: nozzle.diameter,
    pistonDiameter: nozzle.pistonDiameter,
    nozzleLength: nozzle.length,
    lossCoefficient: nozzle.lossCoefficient,
    impulseFactor: factors.impulse,
    energyFactor: factors.energy,
    overPressure: pulse.overPressure,
    computedBeyondSlug: jet === null ? null : { impulse: jet.impulseBeyondSlug, energy: jet.energyBeyondSlug },
    speed,
    frequency,
    count: section.count,
    spacing: section.spacing,
    cant: section.cant,
    ejectShare: actuator.ejectShare,
    valveLag: actuator.valveLag,
    efficiency: actuator.efficiency,
    intakeArea: intake.area,
    recoveredShare: intake.recoveredShare,
    intakeLossCoefficient: intake.lossCoefficient,
  }
}
