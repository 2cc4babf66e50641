/**
 * Closed form of the thrust of one thruster against frequency and stroke, to be turned round.
 *
 * With t the time of the stroke, slug and start give the impulse (a L^2 + b L) / t whatever the frequency, so that
 *
 *     thrust = f ((a L^2 + b L) / t - m L),   t = ejectShare / f - valveLag,   m = rho A V (1 - recovered share)
 *
 * is a quadratic in f at a given stroke and a quadratic in L at a given frequency.
 */
import { isQuickStart } from '../pulse'
import type { BudgetSetting } from './budget'
import type { StrokeMoments } from './shapeMoments'

export interface StrokeTiming {
  readonly ejectShare: number
  /** [s] */
  readonly valveLag: number
}

/** Terms of one exit at one speed of the vehicle. */
export interface StrokeForce {
  /** Of the slug, along the way of the vehicle: a [kg/m] */
  readonly slug: number
  /** Of the start beyond the slug: b [kg] */
  readonly start: number
  /** Of the intake: m [kg/s] */
  readonly intake: number
  /** Longest stroke whose start is quick, where the start counts only then [m]. */
  readonly quickUpTo: number
}

/**
 * @param shape moments of any stroke of the shape
 * @param setting exit factors, basis of the over-pressure, cant and recovered share are read
 * @param computedStart impulse of a computed jet beyond its slug over rho D^3 U, read for that basis
 * @param diameter of the exit [m]
 * @param speed of the vehicle [m/s]
 */
export function strokeForce(
  shape: StrokeMoments,
  setting: BudgetSetting,
  computedStart: number,
  diameter: number,
  speed: number,
): StrokeForce {
  const { density } = setting
  const mass = density * (Math.PI / 4) * diameter * diameter
  const direction = Math.cos(setting.cant)
  const square = (shape.integralSpeedSquared * shape.duration) / (shape.stroke * shape.stroke)
  const peak = (shape.peakSpeed * shape.duration) / shape.stroke
  const cube = density * diameter ** 3 * peak * direction
  const start = setting.overPressure === 'quick-start' ? cube / 6 : cube * computedStart
  return {
    slug: mass * square * setting.impulseFactor * direction,
    start: setting.overPressure === 'off' ? 0 : start,
    intake: mass * speed * (1 - setting.recoveredShare),
    quickUpTo: setting.overPressure === 'quick-start' ? longestQuick(shape, diameter, peak) : Number.POSITIVE_INFINITY,
  }
}

/** Start formation time grows with the stroke: peak x 95 % share x L / D. */
function longestQuick(shape: StrokeMoments, diameter: number, peak: number): number {
  const perStroke = (peak * (shape.timeTo95PercentOfPeak / shape.duration)) / diameter
  return perStroke > 0 ? 1 / perStroke : Number.POSITIVE_INFINITY
}

function isQuick(force: StrokeForce, stroke: number): boolean {
  // One rule for what is quick, also at its very limit.
  return isQuickStart(stroke / force.quickUpTo)
}

/**
 * Frequency that gives a thrust with a stroke.
 *
 * @param thrust of one thruster [N], > 0
 * @returns [1/s]; Infinity where no frequency gives it
 */
export function frequencyFor(force: StrokeForce, thrust: number, stroke: number, timing: StrokeTiming): number {
  const { ejectShare, valveLag } = timing
  const jet = (force.slug * stroke + (isQuick(force, stroke) ? force.start : 0)) * stroke
  const intake = force.intake * stroke
  // (jet + intake lag) f^2 + (thrust lag - intake share) f - thrust share = 0
  const root = positiveRoot(jet + intake * valveLag, thrust * valveLag - intake * ejectShare, thrust * ejectShare)
  return jet > 0 ? root : Number.POSITIVE_INFINITY
}

/**
 * Stroke that gives a thrust at a frequency.
 *
 * @param thrust of one thruster [N], > 0
 * @returns [m]; Infinity where no stroke gives it
 */
export function strokeFor(force: StrokeForce, thrust: number, frequency: number, timing: StrokeTiming): number {
  const time = timing.ejectShare / frequency - timing.valveLag
  if (!(time > 0) || !(force.slug > 0)) return Number.POSITIVE_INFINITY
  const withStart = positiveRoot(force.slug / time, force.start / time - force.intake, thrust / frequency)
  if (force.quickUpTo === Number.POSITIVE_INFINITY) return withStart
  const without = positiveRoot(force.slug / time, -force.intake, thrust / frequency)
  // The start only adds: a stroke that is quick without it stays quick with it.
  return isQuick(force, without) ? withStart : without
}

/** The root above 0 of a x^2 + b x - c with a, c > 0, without cancellation. */
function positiveRoot(a: number, b: number, c: number): number {
  const root = Math.sqrt(b * b + 4 * a * c)
  return b > 0 ? (2 * c) / (b + root) : (root - b) / (2 * a)
}
