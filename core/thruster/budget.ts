/**
 * The budget of a thruster: every mean figure of pulses in a row, in closed form from the moments of one stroke.
 *
 * A design costs about a microsecond, so the full analysis and a search over many designs call the same function.
 *
 * Conventions. U exit speed in the vehicle's frame, L stroke, A exit area, f pulses a second, V speed of the vehicle, s share of
 * the momentum of the water taken in that is not lost, c = cos(cant). One thruster gives
 *
 *     thrust = f (I c - rho A L V (1 - s))
 *
 * with I the impulse of one pulse: the jet pushes along its own axis, the intake holds back along the way of the vehicle. With
 * E the energy of one pulse in the vehicle's frame the balance
 *
 *     thrust V + wake = f E + (2 s - 1) f rho A L V^2 / 2
 *
 * holds exactly, wake being the kinetic energy left behind in still water. Its right side is what the Froude efficiency divides by:
 * 2 V / (U + V) at constant speed with s = 0, and 2 U V / (U^2 + V^2) with s = 1 (textbook laws).
 */
import { isQuickStart, quickStartTerms, type OverPressureBasis } from '../pulse'
import type { StrokeMoments } from './shapeMoments'

/** Everything but the stroke itself. */
export interface BudgetSetting {
  /** rho [kg/m3] */
  readonly density: number
  /** Exit diameter of equal area [m]. */
  readonly diameter: number
  /** Of the plunger [m]. */
  readonly pistonDiameter: number
  /** Of the water column in the nozzle [m]. */
  readonly nozzleLength: number
  /** K: pressure loss of the nozzle over 1/2 rho U^2. */
  readonly lossCoefficient: number
  /** Exit factors on impulse and energy, 1 for a parallel uniform jet. */
  readonly impulseFactor: number
  readonly energyFactor: number
  /** What the adopted impulse holds beyond the slug. */
  readonly overPressure: OverPressureBasis
  /** Impulse [N s] and energy [J] of a computed jet beyond its slug; read for the basis 'computed' only. */
  readonly computedBeyondSlug: { readonly impulse: number; readonly energy: number } | null
  /** Of the vehicle, V [m/s], >= 0. */
  readonly speed: number
  /** Pulses a second of each thruster, f [1/s]. */
  readonly frequency: number
  /** Thrusters. */
  readonly count: number
  /** Between the axes of neighbours [m]; null: far apart. */
  readonly spacing: number | null
  /** Angle between each jet and the way of the vehicle [rad]. */
  readonly cant: number
  /** Share of the period in which the water is pushed out, one valve lag included. */
  readonly ejectShare: number
  /** Dead time at each of the two turns of the valve in a period [s]. */
  readonly valveLag: number
  /** Work on the water over work put in. */
  readonly efficiency: number
  /** Opening that refills the cavity [m2]; null: the exit itself. */
  readonly intakeArea: number | null
  /** s, 0 to 1. */
  readonly recoveredShare: number
  /** K_i: pressure loss over the dynamic pressure in the opening. */
  readonly intakeLossCoefficient: number
}

/** Means over the period of all thrusters together [W]. */
export interface ThrusterPower {
  /** Kinetic energy of the jets in the vehicle's frame. */
  readonly jet: number
  /** K times the dynamic pressure of the exit. */
  readonly nozzleLoss: number
  /** Dynamic head and loss of the intake opening; nothing of the stream's head is counted on. */
  readonly refill: number
  /** To set the water in the nozzle going, every pulse; braking gives nothing back. */
  readonly column: number
  /**
   * max(0, 2 s - 1) times the kinetic energy of the water taken in at the speed of the vehicle: momentum that is kept has its energy too,
   * and beyond s = 1/2 the water no longer brings it along. With it no overall efficiency is above the Froude efficiency.
   */
  readonly carried: number
  /** The five together over the actuator's efficiency. */
  readonly total: number
}

export interface Budget {
  /** Impulse along the way of the vehicle from one pulse of one thruster, less the intake's share [N s]. */
  readonly thrustPerPulse: number
  /** Mean of all thrusters along the way of the vehicle [N]. */
  readonly meanThrust: number
  /** From the slug alone, with the loss of close neighbours, to the slug with the start over-pressure of a quick start [N]. */
  readonly meanThrustLow: number
  readonly meanThrustHigh: number
  /** rho A (f L)^2 of every thruster together: steady jets of equal mean flow through the same exits, at rest [N]. */
  readonly steadyJetThrust: number
  /** Mean thrust over that. */
  readonly thrustRatio: number
  /** Share of thrust that close neighbours may cost. */
  readonly proximityLoss: number
  readonly power: ThrusterPower
  /** thrust V over the energy balance above; null at rest and where there is no thrust. */
  readonly froudeEfficiency: number | null
  /** thrust V over the actuators' power; null likewise. */
  readonly overallEfficiency: number | null
  /** Impulse [N s] and energy [J] of one pulse by the adopted basis, the exit factors in them. */
  readonly impulse: number
  readonly energy: number
  /** Impulse of the slug alone [N s]. */
  readonly slugImpulse: number
  readonly quickStart: boolean
  /** Mean flow of one thruster [m3/s]. */
  readonly flow: number
  /** Longest stroke the eject share leaves [s]: ejectShare / f - valveLag. */
  readonly ejectTimeAllowed: number
  /** Left to refill the cavity [s]: period less stroke and two valve lags; 0 or below: the pulse does not fit. */
  readonly refillTime: number
  /** Of one plunger [m]. */
  readonly plungerTravel: number
  /** Highest of one plunger, in stroke and refill [m/s], [m/s2], [N]; Infinity where the speed jumps. */
  readonly plungerSpeed: number
  readonly plungerAcceleration: number
  readonly plungerForce: number
  /** Highest power put into one actuator at any time [W]; Infinity where the speed jumps up with water in the nozzle. */
  readonly peakPower: number
  /** Highest cavity pressure over, and lowest under, that outside [Pa]: flow loading only. */
  readonly cavityPressureHigh: number
  readonly cavityPressureLow: number
  /** Peak speed in the intake opening [m/s] and the suction behind it [Pa]. */
  readonly intakeSpeed: number
  readonly intakeSuction: number
  /** All swept: stroke times exit area [m3]. */
  readonly cavityVolume: number
  /** Plunger travel and nozzle together [m]. */
  readonly cavityLength: number
}

/**
 * Thrust that two nozzles cost each other: T = T_alone (1 - 2.04 (spacing/D)^-6), measured to 10 % (Athanassiadis & Hart 2016,
 * arXiv 1604.05382; the law from its abstract, the spacing taken between axes). Told as the low end of a range, never the mean.
 */
const PROXIMITY_COEFFICIENT = 2.04
export const LARGEST_PROXIMITY_LOSS = 0.1

/**
 * The refill is half a sine of plunger speed, our choice: peak over mean speed pi/2, mean cube over cube of the mean pi^2/6, steepest
 * slope pi^2/2 travel over time squared.
 */
const REFILL_PEAK = Math.PI / 2
const REFILL_CUBE = Math.PI ** 2 / 6
const REFILL_SLOPE = Math.PI ** 2 / 2

/**
 * Every mean figure and every peak that a limit is set to.
 *
 * @param moments of one stroke, from `shapeMoments` or `programmeMoments`
 * @param setting finite; checked by the callers' doors, not here
 * @returns figures as they come: `refillTime` below 0 means the pulse does not fit its period, and refill power is Infinity then
 */
export function vehicleBudget(moments: StrokeMoments, setting: BudgetSetting): Budget {
  const { density, diameter, frequency, count, speed } = setting
  const area = (Math.PI / 4) * diameter * diameter
  const plungerArea = (Math.PI / 4) * setting.pistonDiameter * setting.pistonDiameter
  const volume = area * moments.stroke

  const slugImpulse = density * area * moments.integralSpeedSquared * setting.impulseFactor
  const slugEnergy = 0.5 * density * area * moments.integralSpeedCubed * setting.energyFactor
  const quickStart = isQuickStart((moments.peakSpeed * moments.timeTo95PercentOfPeak) / diameter)
  const start = quickStartTerms(moments.peakSpeed, density, diameter)
  let impulse = slugImpulse
  let energy = slugEnergy
  if (setting.overPressure === 'quick-start' && quickStart) {
    impulse += start.impulse
    energy += start.energy
  } else if (setting.overPressure === 'computed' && setting.computedBeyondSlug !== null) {
    impulse += setting.computedBeyondSlug.impulse
    // A computed jet's energy beyond the slug may be below zero from its smoothing: no pulse costs less than its slug.
    energy += Math.max(0, setting.computedBeyondSlug.energy)
  }

  const direction = Math.cos(setting.cant)
  const intakeLoss = density * volume * speed * (1 - setting.recoveredShare)
  const thrustPerPulse = impulse * direction - intakeLoss
  const meanThrust = count * frequency * thrustPerPulse
  const proximity = proximityLoss(count, setting.spacing, diameter)
  const lowest = Math.min(slugImpulse, impulse) * (1 - proximity)
  const highest = Math.max(impulse, quickStart ? slugImpulse + start.impulse : slugImpulse)
  const flow = frequency * volume
  const steadyJetThrust = (count * density * flow * flow) / area

  const refillTime = 1 / frequency - moments.duration - 2 * setting.valveLag
  const intakeArea = setting.intakeArea ?? area
  const fits = refillTime > 0
  const intakeMean = fits ? volume / (intakeArea * refillTime) : Infinity
  const intakeHead = 0.5 * density * (1 + setting.intakeLossCoefficient)
  const intakeSpeed = REFILL_PEAK * intakeMean
  const intakeSuction = intakeHead * intakeSpeed * intakeSpeed

  const pulses = count * frequency
  const jet = pulses * energy
  const nozzleLoss = pulses * setting.lossCoefficient * 0.5 * density * area * moments.integralSpeedCubed
  const refill = pulses * volume * intakeHead * REFILL_CUBE * intakeMean * intakeMean
  const column = pulses * 0.5 * density * area * setting.nozzleLength * moments.risenSpeedSquared
  const carriedHead = Math.max(0, 2 * setting.recoveredShare - 1) * 0.5 * density * speed * speed
  const carried = count * flow * carriedHead
  const total = (jet + nozzleLoss + refill + column + carried) / setting.efficiency

  const useful = meanThrust * speed
  const balance = jet + (2 * setting.recoveredShare - 1) * 0.5 * density * count * flow * speed * speed
  const moves = useful > 0

  const travel = volume / plungerArea
  const refillSlope = fits ? (REFILL_SLOPE * travel) / (refillTime * refillTime) : Infinity
  const plungerPerExit = area / plungerArea
  const peaks = peaksOfStroke(moments, setting, area, plungerPerExit, energy / slugEnergy)
  // The water is carried along from the moment it is taken in.
  const carriedPeak = carriedHead > 0 ? intakeArea * intakeSpeed * carriedHead : 0
  const refillPower = intakeArea * intakeHead * intakeSpeed ** 3 + carriedPeak
  return {
    thrustPerPulse,
    meanThrust,
    meanThrustLow: pulses * (lowest * direction - intakeLoss),
    meanThrustHigh: pulses * (highest * direction - intakeLoss),
    steadyJetThrust,
    thrustRatio: meanThrust / steadyJetThrust,
    proximityLoss: proximity,
    power: { jet, nozzleLoss, refill, column, carried, total },
    froudeEfficiency: moves && balance > 0 ? useful / balance : null,
    overallEfficiency: moves ? useful / total : null,
    impulse,
    energy,
    slugImpulse,
    quickStart,
    flow,
    ejectTimeAllowed: setting.ejectShare / frequency - setting.valveLag,
    refillTime,
    plungerTravel: travel,
    plungerSpeed: Math.max(moments.peakSpeed * plungerPerExit, (intakeSpeed * intakeArea) / plungerArea),
    plungerAcceleration: Math.max(moments.peakAcceleration * plungerPerExit, refillSlope),
    plungerForce: plungerArea * Math.max(peaks.pressureHigh, -peaks.pressureLow, intakeSuction),
    peakPower: Math.max(peaks.power, refillPower) / setting.efficiency,
    cavityPressureHigh: peaks.pressureHigh,
    cavityPressureLow: Math.min(peaks.pressureLow, -intakeSuction),
    intakeSpeed,
    intakeSuction,
    cavityVolume: volume,
    cavityLength: travel + setting.nozzleLength,
  }
}

/** Share of thrust that neighbours may cost each other: 0 for one thruster or thrusters far apart, at most 0.1. */
export function proximityLoss(count: number, spacing: number | null, diameter: number): number {
  if (count <= 1 || spacing === null) return 0
  return Math.min(LARGEST_PROXIMITY_LOSS, PROXIMITY_COEFFICIENT * (diameter / spacing) ** 6)
}

interface StrokePeaks {
  readonly pressureHigh: number
  readonly pressureLow: number
  readonly power: number
}

/** Peaks of cavity pressure over that outside [Pa] and of power on the water of one thruster [W] within the stroke. */
function peaksOfStroke(
  moments: StrokeMoments,
  setting: BudgetSetting,
  area: number,
  plungerPerExit: number,
  energyShare: number,
): StrokePeaks {
  const { course, smoothCourse } = moments
  const coefficients = cavityCoefficients(setting, plungerPerExit, energyShare)
  const inert = setting.density * setting.nozzleLength
  const square = coefficients.pressure * moments.peakSpeed ** 2
  const slope = (inert * moments.peakSpeed) / moments.duration
  const cube = area * coefficients.power * moments.peakSpeed ** 3
  const rising = area * slope * moments.peakSpeed
  const high = highest(course, smoothCourse, square, 0, slope, false)
  const low = -highest(course, smoothCourse, -square, 0, -slope, false)
  const power = highest(course, smoothCourse, 0, cube, rising, true)
  const spike = inert > 0
  return {
    pressureHigh: spike && moments.jumpUp ? Infinity : high,
    pressureLow: spike && moments.jumpDown ? -Infinity : low,
    power: spike && moments.jumpUp ? Infinity : power,
  }
}

/**
 * Cavity pressure is `pressure` U^2 + rho l dU/dt, and power on the water `power` A U^3 + rho A l U dU/dt while the speed rises.
 *
 * The pressure is that of a steady stream from the plunger's own speed: 1/2 rho (energy factor + K - (A/A_c)^2). The power leaves
 * the last term out: the water in the cavity has been brought to that speed as well.
 *
 * @param energyShare energy of the adopted pulse over that of its slug: over-pressure is spread over the stroke
 */
export function cavityCoefficients(
  setting: Pick<BudgetSetting, 'density' | 'energyFactor' | 'lossCoefficient'>,
  plungerPerExit: number,
  energyShare: number,
): { readonly pressure: number; readonly power: number } {
  const head = 0.5 * setting.density
  return {
    pressure: head * (setting.energyFactor + setting.lossCoefficient - plungerPerExit * plungerPerExit),
    power: head * (setting.energyFactor * energyShare + setting.lossCoefficient),
  }
}

/**
 * Highest of square u^2 + cube u^3 + slope w along a course of pairs u, dU/dt; w is dU/dt, or u dU/dt while that is above 0 for the
 * power. Of a smooth course, the top of the parabola through the three around the highest.
 */
function highest(
  course: Float64Array,
  smooth: boolean,
  square: number,
  cube: number,
  slope: number,
  power: boolean,
): number {
  let best = -Infinity
  let where = 0
  for (let i = 0; i < course.length; i += 2) {
    const value = onCourse(course, i, square, cube, slope, power)
    if (value > best) {
      best = value
      where = i
    }
  }
  if (!smooth || where === 0 || where === course.length - 2) return best
  const left = onCourse(course, where - 2, square, cube, slope, power)
  const right = onCourse(course, where + 2, square, cube, slope, power)
  const bend = left - 2 * best + right
  return bend < 0 ? best - (right - left) ** 2 / (8 * bend) : best
}

function onCourse(
  course: Float64Array,
  i: number,
  square: number,
  cube: number,
  slope: number,
  power: boolean,
): number {
  const u = course[i] ?? 0
  const steepness = course[i + 1] ?? 0
  const weight = power ? u * Math.max(0, steepness) : steepness
  return u * u * (square + cube * u) + slope * weight
}
