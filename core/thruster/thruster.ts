/**
 * One thruster design on its vehicle, or on a bench: every figure of `thruster` in the summary and what stands beside it.
 *
 * Under way the vehicle's speed is the flow past the nozzle. It moves the formation number, so the ring, its core pressure and its
 * share of the pulse; thrust and power follow from the slug at any speed.
 */
import { DomainError, requireRange, STANDARD_GRAVITY } from '../base'
import { compileProgramme, computePulse, exitFactors, type PulseInput } from '../pulse'
import { vehicleBudget, type Budget, type BudgetSetting } from './budget'
import { cavitation } from './cavitation'
import { requireFit, requireThruster } from './checkThruster'
import { findCruise, type Cruise } from './cruise'
import { cycleCourse, thrusterCycle } from './cycle'
import { compileDrag, type DragLaw } from './drag'
import { above, atLeast, mechanicalLimits } from './limits'
import type { Duty, ThrusterInput, ThrusterResult } from './resultTypes'
import { ringImpulsePerWork, ringShare } from './ringShare'
import { budgetSetting } from './setting'
import { programmeMoments, type StrokeMoments } from './shapeMoments'
import { marchStartUp, type StartUp } from './startUp'
import { thrusterNotes } from './thrusterNotes'
import type { Limit, VehicleInput } from './types'
import { ringSpacing, turningMoments } from './vectoring'

/**
 * Everything about a thruster.
 *
 * @throws {DomainError} with the plan path of what is missing or outside its range: thruster.…, train.period where the pulse does not
 * fit, thruster.vehicle.drag where a speed is to be found without a drag or beyond the end of its table, and those of `computePulse`
 */
export function analyseThruster(input: ThrusterInput): ThrusterResult {
  const { section, frequency } = input
  requireThruster(section)
  requireRange('train.period', 1 / frequency, { above: 0, unit: 's' })
  if (input.vapourPressure !== null) requireRange('water.vapourPressure', input.vapourPressure, { min: 0, unit: 'Pa' })
  const programme = compileProgramme(input.pulse.programme)
  requireFit(programme.duration, frequency, section.actuator.valveLag)
  const moments = programmeMoments(programme, input.pulse.programme)
  // The nozzle is checked by the pulse at rest before anything is divided by its areas.
  const still = computePulse(input.pulse)
  const setting = budgetSetting(section, input.pulse, frequency, 0, exitFactors(input.pulse.nozzle))

  const { vehicle } = section
  const travel = vehicle === null ? BENCH : travelOf(vehicle, moments, setting, input.pulse)
  const { speed, drag, cruise } = travel
  const atSpeed = { ...setting, speed }
  const budget = vehicleBudget(moments, atSpeed)
  const stream = vehicle === null ? input.pulse.axialFlow : speed
  const pulse = stream === input.pulse.axialFlow ? still : computePulse({ ...input.pulse, axialFlow: stream })

  const { nozzle, density } = input.pulse
  const cycle = thrusterCycle(programme, nozzle, atSpeed, budget, section.inTurn)
  const dragAtSpeed = drag === null ? null : drag.dragAt(speed)
  const boiling = cavitation(
    density,
    input.absolutePressure,
    input.vapourPressure,
    pulse.corePressureDrop,
    budget.intakeSuction,
    { exit: moments.peakSpeed, intake: budget.intakeSpeed },
  )
  const duties = dutiesOf(input, moments, setting, drag)
  const startUp = startUpOf(input, programme, atSpeed, budget, travel)
  const { adopted } = pulse.formationNumber
  const underWay = speed > 0
  const endurance = section.energyStore === null ? null : section.energyStore / budget.power.total
  const mass = vehicle?.mass ?? null
  const weight = mass === null ? null : mass * STANDARD_GRAVITY
  const result: Omit<ThrusterResult, 'notes'> = {
    thrustPerPulse: budget.thrustPerPulse,
    meanThrust: budget.meanThrust,
    meanThrustRange: [budget.meanThrustLow, budget.meanThrustHigh],
    peakThrust: cycle.peakThrust,
    steadyJetThrust: budget.steadyJetThrust,
    thrustRatio: budget.thrustRatio,
    power: budget.power,
    froudeEfficiency: budget.froudeEfficiency,
    overallEfficiency: budget.overallEfficiency,
    speed,
    dragAtSpeed,
    costOfTransport: weight !== null && underWay ? budget.power.total / (weight * speed) : null,
    endurance,
    corePressure: boiling.corePressure,
    cavitationMargin: boiling.margin,
    limits: [
      ...mechanicalLimits(budget, { ...nozzle, duration: moments.duration }, section.actuator, section.bay),
      ...above('core cavitation', boiling.corePressure, input.vapourPressure),
      ...above('intake cavitation', boiling.intakePressure, input.vapourPressure),
      ...thrustLimits(budget, vehicle, dragAtSpeed, duties),
    ],
    frequency,
    period: 1 / frequency,
    duty: moments.duration * frequency,
    flow: section.count * budget.flow,
    quickStart: budget.quickStart,
    ripple: cycle.ripple,
    proximityLoss: budget.proximityLoss,
    energyPerDistance: underWay ? budget.power.total / speed : null,
    range: endurance !== null && underWay ? endurance * speed : null,
    excessThrust: dragAtSpeed === null ? null : budget.meanThrust - dragAtSpeed,
    cruise,
    duties,
    startUp,
    plunger: {
      travel: budget.plungerTravel,
      speed: budget.plungerSpeed,
      acceleration: budget.plungerAcceleration,
      force: budget.plungerForce,
      peakPower: budget.peakPower,
    },
    ejectTimeAllowed: budget.ejectTimeAllowed,
    refillTime: budget.refillTime,
    intakeSpeed: budget.intakeSpeed,
    cavity: {
      volume: budget.cavityVolume,
      length: budget.cavityLength,
      pressureHigh: budget.cavityPressureHigh,
      pressureLow: budget.cavityPressureLow,
    },
    cavitation: boiling,
    ringShare: ringShare(programme, pulse.formationNumber, nozzle.diameter),
    ringImpulsePerWork: adopted === null ? null : ringImpulsePerWork(input.pulse, atSpeed, adopted),
    ringSpacing: pulse.ring === null ? null : ringSpacing(pulse.ring, stream, frequency),
    turning: section.arm === null ? null : turningMoments(frequency * budget.impulse, section.arm, section.cant),
    pulse,
    cycle: cycle.history,
  }
  return { ...result, notes: thrusterNotes(input, result, moments) }
}

/** How fast the vehicle goes, and against what. */
interface Travel {
  readonly speed: number
  readonly drag: DragLaw | null
  readonly cruise: Cruise | null
}

const BENCH: Travel = { speed: 0, drag: null, cruise: null }

function travelOf(vehicle: VehicleInput, moments: StrokeMoments, setting: BudgetSetting, pulse: PulseInput): Travel {
  if (vehicle.drag === null) return { speed: vehicle.speed ?? 0, drag: null, cruise: null }
  const drag = compileDrag(vehicle.drag, pulse.density, pulse.kinematicViscosity, vehicle.length)
  const cruise = cruiseOf(moments, setting, drag)
  if (vehicle.speed !== null) return { speed: vehicle.speed, drag, cruise }
  if (cruise.fromRest === null)
    throw new DomainError(
      'thruster.vehicle.drag',
      `thruster.vehicle.drag must reach the speed where drag meets thrust: at its last row, ${cruise.searchedTo} m/s, the thrust is still ${cruise.excessThere} N larger`,
    )
  return { speed: cruise.fromRest, drag, cruise }
}

/**
 * Cruise speeds of a design.
 *
 * @param setting its speed is not read
 */
export function cruiseOf(moments: StrokeMoments, setting: BudgetSetting, drag: DragLaw): Cruise {
  const rest = vehicleBudget(moments, { ...setting, speed: 0 }).meanThrust
  // The thrust falls in a straight line with speed, so two budgets tell it at any.
  const fall = rest - vehicleBudget(moments, { ...setting, speed: 1 }).meanThrust
  return findCruise((speed) => rest - fall * speed, drag, fall > 0 ? rest / fall : Infinity)
}

function dutiesOf(input: ThrusterInput, moments: StrokeMoments, setting: BudgetSetting, drag: DragLaw | null): Duty[] {
  return input.section.target.map((duty) => {
    const speed = 'speed' in duty ? duty.speed : null
    const { meanThrust: thrust } = vehicleBudget(moments, { ...setting, speed: speed ?? 0 })
    const needed = 'thrust' in duty ? duty.thrust : (drag?.dragAt(duty.speed) ?? 0)
    // As for the limit: sums that should meet exactly may differ in their last digits.
    const met = atLeast('thrust', thrust, needed).every(({ ok }) => ok)
    return { speed, thrust, needed, shortfall: met ? 0 : needed - thrust }
  })
}

function thrustLimits(
  budget: Budget,
  vehicle: VehicleInput | null,
  dragAtSpeed: number | null,
  duties: readonly Duty[],
): Limit[] {
  const held = vehicle !== null && vehicle.speed !== null && dragAtSpeed !== null
  return [
    ...(held ? atLeast('thrust', budget.meanThrust, dragAtSpeed) : []),
    ...duties.flatMap(({ thrust, needed }) => atLeast('thrust', thrust, needed)),
  ]
}

function startUpOf(
  { section, pulse }: ThrusterInput,
  programme: Parameters<typeof cycleCourse>[0],
  setting: BudgetSetting,
  budget: Budget,
  { drag, cruise }: Travel,
): StartUp | null {
  const mass = section.vehicle?.mass ?? null
  const cruiseSpeed = cruise?.fromRest ?? 0
  if (mass === null || drag === null || !(cruiseSpeed > 0)) return null
  return marchStartUp({
    course: cycleCourse(programme, setting, budget),
    count: section.count,
    inTurn: section.inTurn,
    movedMass: mass + (section.vehicle?.addedMass ?? 0),
    drag,
    cruiseSpeed,
    intakeDensity: pulse.density * (1 - section.intake.recoveredShare),
  })
}
