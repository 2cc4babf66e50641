/**
 * One period of a thruster: what exit, plunger and actuator do, and the thrust of all thrusters together.
 *
 * The period begins with one dead time of the valve; the stroke follows, a second dead time, and the refill over all that is left,
 * as half a sine of plunger speed (our choice: it starts and ends at rest). The thrust is the flux of momentum through exit and
 * intake. The forces that water and plunger exchange inside the vehicle come back within the period and are left out. Over-pressure
 * is spread over the stroke in proportion to the slug's own flux: its course in time is not known here.
 */
import { at, equallySpaced } from '../base'
import { exitPerPiston, type NozzleInput, type SpeedProgramme } from '../pulse'
import { cavityCoefficients, type Budget, type BudgetSetting } from './budget'

/** Equal times of the history, both ends included; corners come on top, each twice: just before and just after. */
export const CYCLE_TIMES = 201
/** A corner is read this share of the stroke before and after it. */
const BESIDE = 1e-6
/** Half the distance over which a slope is taken, likewise. */
const SLOPE = 2e-7
/** Corners of the other thrusters' strokes are marked in a common period up to this many. */
const MOST_CORNERS = 12
/** Sections of a search between two times: to 1e-6 of their distance, where a smooth top is good to 1e-12. */
const GOLDEN_STEPS = 28
const GOLDEN = (Math.sqrt(5) - 1) / 2

/** One period at rising times; every array has one length. Single thruster unless said otherwise. */
export interface CycleHistory {
  /** From the valve's first move [s]. */
  readonly time: readonly number[]
  readonly exitSpeed: readonly number[]
  /** 0 at rest with the cavity full, the plunger's travel at the end of the stroke [m]. */
  readonly plungerPosition: readonly number[]
  /** Positive while it pushes [m/s]. */
  readonly plungerSpeed: readonly number[]
  readonly plungerAcceleration: readonly number[]
  /** Over that outside [Pa]: flow loading only. */
  readonly cavityPressure: readonly number[]
  /** Positive while it pushes, negative while it draws [N]. */
  readonly plungerForce: readonly number[]
  /** Put into the actuator [W]. */
  readonly power: readonly number[]
  /** Along the way of the vehicle [N]. */
  readonly thrust: readonly number[]
  /** Of all thrusters, fired together or in turn [N]. */
  readonly totalThrust: readonly number[]
}

export interface Cycle {
  readonly history: CycleHistory
  /** Highest and lowest total thrust in the period [N]. */
  readonly peakThrust: number
  readonly lowestThrust: number
  /** (highest - lowest) / mean total thrust; null where the mean is not above 0. */
  readonly ripple: number | null
}

/** Course of one thruster through its period, read at any time in it. */
export interface CycleCourse {
  readonly period: number
  readonly strokeStart: number
  readonly strokeEnd: number
  readonly refillStart: number
  /** Impulse along the way of the vehicle from the period's start to a time [N s], the intake's share left out. */
  readonly jetImpulseTo: (time: number) => number
  /** Volume taken in from the period's start to a time [m3]. */
  readonly intakeVolumeTo: (time: number) => number
}

/** @param budget of the same setting, with a refill time above 0 */
export function cycleCourse(programme: SpeedProgramme, setting: BudgetSetting, budget: Budget): CycleCourse {
  const strokeStart = setting.valveLag
  const strokeEnd = strokeStart + programme.duration
  const refillStart = strokeEnd + setting.valveLag
  const perSquare = (budget.impulse * Math.cos(setting.cant)) / programme.moments.square
  return {
    period: 1 / setting.frequency,
    strokeStart,
    strokeEnd,
    refillStart,
    jetImpulseTo: (time) => perSquare * programme.momentsAt(time - strokeStart).square,
    intakeVolumeTo: (time) => {
      const share = Math.min(1, Math.max(0, (time - refillStart) / budget.refillTime))
      return (budget.cavityVolume * (1 - Math.cos(Math.PI * share))) / 2
    },
  }
}

/**
 * History of one period.
 *
 * @param inTurn the thrusters fire one after another, a period over their number apart
 */
export function thrusterCycle(
  programme: SpeedProgramme,
  nozzle: NozzleInput,
  setting: BudgetSetting,
  budget: Budget,
  inTurn: boolean,
): Cycle {
  const course = cycleCourse(programme, setting, budget)
  const { period, strokeStart, strokeEnd, refillStart } = course
  const { density, count } = setting
  const { duration } = programme
  const area = (Math.PI / 4) * nozzle.diameter ** 2
  const plungerArea = (Math.PI / 4) * nozzle.pistonDiameter ** 2
  const plungerPerExit = 1 / exitPerPiston(nozzle)
  const slugEnergy = 0.5 * density * area * programme.moments.cube * setting.energyFactor
  const coefficients = cavityCoefficients(setting, plungerPerExit, budget.energy / slugEnergy)
  const inert = density * nozzle.length
  const perSpeedSquared = (budget.impulse * Math.cos(setting.cant)) / programme.moments.square
  const intakeArea = setting.intakeArea ?? area
  const intakeHead = 0.5 * density * (1 + setting.intakeLossCoefficient)
  const carriedHead = Math.max(0, 2 * setting.recoveredShare - 1) * 0.5 * density * setting.speed ** 2
  const intakeMomentum = density * setting.speed * (1 - setting.recoveredShare)

  const exitSpeedAt = (time: number) => programme.speedAt(time - strokeStart)
  const slopeAt = (time: number) => {
    const t = Math.min(duration * (1 - SLOPE), Math.max(duration * SLOPE, time - strokeStart))
    const h = SLOPE * duration
    return (programme.speedAt(t + h) - programme.speedAt(t - h)) / (2 * h)
  }
  const refillRate = Math.PI / budget.refillTime
  const inflowAt = (time: number) =>
    time < refillStart || time > period
      ? 0
      : (budget.cavityVolume / 2) * refillRate * Math.sin(refillRate * (time - refillStart))
  const thrustAt = (time: number) => perSpeedSquared * exitSpeedAt(time) ** 2 - intakeMomentum * inflowAt(time)
  const totalAt = (time: number) => {
    if (!inTurn || count === 1) return count * thrustAt(time)
    let sum = 0
    for (let k = 0; k < count; k++) sum += thrustAt(wrapped(time - (k * period) / count, period))
    return sum
  }

  const own = [...programme.corners, programme.timeOfPeak].map((time) => strokeStart + time)
  const corners = [...own, refillStart, refillStart + budget.refillTime / 2]
  if (inTurn && corners.length <= MOST_CORNERS)
    for (let k = 1; k < count; k++) corners.push(...own.map((time) => wrapped(time + (k * period) / count, period)))
  const time = cycleTimes(period, corners, BESIDE * duration)

  const history = {
    exitSpeed: new Array<number>(),
    plungerPosition: new Array<number>(),
    plungerSpeed: new Array<number>(),
    plungerAcceleration: new Array<number>(),
    cavityPressure: new Array<number>(),
    plungerForce: new Array<number>(),
    power: new Array<number>(),
    thrust: new Array<number>(),
    totalThrust: new Array<number>(),
  }
  for (const t of time) {
    const u = exitSpeedAt(t)
    const pushing = t >= strokeStart && t <= strokeEnd
    const slope = pushing ? slopeAt(t) : 0
    const inflow = inflowAt(t)
    const head = intakeHead * (inflow / intakeArea) ** 2
    const pressure = pushing ? coefficients.pressure * u * u + inert * slope : -head
    const refillTurn = t >= refillStart && t <= period ? Math.cos(refillRate * (t - refillStart)) : 0
    const work =
      area * u * (coefficients.power * u * u + inert * Math.max(0, slope)) + inflow * head + inflow * carriedHead
    history.exitSpeed.push(u)
    history.plungerPosition.push(
      (area * programme.momentsAt(t - strokeStart).displacement - course.intakeVolumeTo(t)) / plungerArea,
    )
    history.plungerSpeed.push((area * u - inflow) / plungerArea)
    history.plungerAcceleration.push(
      plungerPerExit * slope - ((budget.cavityVolume / 2) * refillRate ** 2 * refillTurn) / plungerArea,
    )
    history.cavityPressure.push(pressure)
    history.plungerForce.push(pressure * plungerArea)
    history.power.push(work / setting.efficiency)
    history.thrust.push(thrustAt(t))
    history.totalThrust.push(totalAt(t))
  }
  // Corners hold the extremes of one thruster; of several in turn they may lie anywhere, also between two times.
  const between = inTurn && count > 1 ? { time, at: totalAt } : null
  const peakThrust = highestOf(history.totalThrust, 1, between)
  const lowestThrust = -highestOf(history.totalThrust, -1, between)
  return {
    history: { time, ...history },
    peakThrust,
    lowestThrust,
    ripple: budget.meanThrust > 0 ? (peakThrust - lowestThrust) / budget.meanThrust : null,
  }
}

/** Largest of sign times the values; with a curve, also between the times beside the largest, by golden sections. */
function highestOf(
  values: readonly number[],
  sign: number,
  between: { readonly time: readonly number[]; readonly at: (time: number) => number } | null,
): number {
  const signed = values.map((value) => sign * value)
  const highest = Math.max(...signed)
  if (between === null) return highest
  const where = signed.indexOf(highest)
  let low = at(between.time, Math.max(0, where - 1))
  let high = at(between.time, Math.min(values.length - 1, where + 1))
  let best = highest
  for (let k = 0; k < GOLDEN_STEPS; k++) {
    const inner = GOLDEN * (high - low)
    const [left, right] = [high - inner, low + inner]
    const [onLeft, onRight] = [sign * between.at(left), sign * between.at(right)]
    best = Math.max(best, onLeft, onRight)
    if (onLeft > onRight) high = right
    else low = left
  }
  return best
}

/** Time folded into 0..period. */
function wrapped(time: number, period: number): number {
  return time - period * Math.floor(time / period)
}

/** Equal times, and each corner just before and just after; equal times that fall between the two give way. */
function cycleTimes(period: number, corners: readonly number[], beside: number): number[] {
  const pairs = corners
    .flatMap((corner) => [corner - beside, corner + beside])
    .filter((time) => time > 0 && time < period)
  const near = (time: number) => corners.some((corner) => Math.abs(time - corner) < 2 * beside)
  const equal = equallySpaced(0, period, CYCLE_TIMES).filter((t, i) => i === 0 || i === CYCLE_TIMES - 1 || !near(t))
  const rising = [...equal, ...pairs].sort((a, b) => a - b)
  return rising.filter((time, i) => i === 0 || time > at(rising, i - 1))
}
