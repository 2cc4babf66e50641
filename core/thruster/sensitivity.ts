/**
 * How thrust and power of a design answer to small changes, and what the tolerances of manufacture make of the thrust.
 */
import { at } from '../base'
import type { CompiledDesigns } from './design'
import { MET_BY_CONSTRUCTION, slackOf, type LimitScales } from './designLimits'
import type { HeldPoint, PointFigures } from './designTypes'
import type { LimitName, ThrusterSection } from './types'

/**
 * What is varied, all else held: `diameter` nozzle and plunger together, `bore` the exit alone with plunger and travel kept, so
 * that the same volume leaves through it; `stroke` the slug length at a given exit, so the travel.
 */
export const SENSITIVITY_FIELDS = ['diameter', 'bore', 'stroke', 'frequency', 'ejectShare'] as const
export type SensitivityField = (typeof SENSITIVITY_FIELDS)[number]

/** Change in per cent for one per cent of the field; null where the figure is not above 0. */
export interface Sensitivity {
  readonly field: SensitivityField
  readonly thrust: number | null
  readonly power: number | null
}

/** What tolerances make of the thrust, to first order. */
export interface ThrustSpread {
  /** Relative standard deviation; null where there is no thrust. */
  readonly relative: number | null
  /** Two standard deviations about the thrust [N]. */
  readonly low: number
  readonly high: number
  /** Limits nearer than two of their own standard deviations: to be checked by test before the design is relied on. */
  readonly limitsWithin: readonly LimitName[]
}

/** Relative step of the central differences: their error is of its square. */
const STEP = 1e-4
/** Standard deviations that count as the spread: about 95 % of a normal scatter. */
export const SPREAD_WIDTH = 2

/** Central differences d ln thrust / d ln field and d ln power / d ln field at a duty point. */
export function sensitivitiesAt(designs: CompiledDesigns, point: PointFigures): Sensitivity[] {
  return SENSITIVITY_FIELDS.map((field) => {
    const [low, high] = [variedBy(designs, point, field, -STEP), variedBy(designs, point, field, STEP)]
    return {
      field,
      thrust: logSlope(low.budget.meanThrust, high.budget.meanThrust),
      power: logSlope(low.budget.power.total, high.budget.power.total),
    }
  })
}

/**
 * Spread of the thrust of one duty point, its frequency and the vehicle's speed held.
 *
 * @param manufacture relative standard deviations, taken as independent
 */
export function thrustSpreadAt(
  designs: CompiledDesigns,
  point: PointFigures,
  manufacture: ThrusterSection['manufacture'],
  scales: LimitScales,
): ThrustSpread {
  const scatter = [
    ['bore', manufacture.diameter],
    ['stroke', manufacture.stroke],
    ['frequency', manufacture.frequency],
  ] as const
  let square = 0
  const slackSquares = point.limits.map(() => 0)
  for (const [field, deviation] of scatter) {
    const [low, high] = [variedBy(designs, point, field, -STEP), variedBy(designs, point, field, STEP)]
    square += (((high.budget.meanThrust - low.budget.meanThrust) / (2 * STEP)) * deviation) ** 2
    point.limits.forEach((limit, i) => {
      const [below, above] = [low.limits[i], high.limits[i]]
      if (below?.name !== limit.name || above?.name !== limit.name) return
      const slope = (slackOf(above, scales) - slackOf(below, scales)) / (2 * STEP)
      slackSquares[i] = at(slackSquares, i) + (slope * deviation) ** 2
    })
  }
  const deviation = Math.sqrt(square)
  const thrust = point.budget.meanThrust
  const within = point.limits.filter(
    (limit, i) =>
      !MET_BY_CONSTRUCTION.has(limit.name) &&
      Math.abs(slackOf(limit, scales)) < SPREAD_WIDTH * Math.sqrt(at(slackSquares, i)),
  )
  return {
    relative: thrust > 0 ? deviation / thrust : null,
    low: thrust - SPREAD_WIDTH * deviation,
    high: thrust + SPREAD_WIDTH * deviation,
    limitsWithin: within.map(({ name }) => name),
  }
}

/** The duty point with one field changed in proportion, e to the step. */
function variedBy(designs: CompiledDesigns, point: PointFigures, field: SensitivityField, step: number): PointFigures {
  return designs.evaluateHeld(varied(point.held, field, Math.exp(step)), point.speed, point.thrustAsked)
}

/** A thruster with one field times a factor. */
export function varied(held: HeldPoint, field: SensitivityField, factor: number): HeldPoint {
  switch (field) {
    case 'diameter':
      return { ...held, diameter: held.diameter * factor, pistonDiameter: held.pistonDiameter * factor }
    case 'bore':
      return { ...held, diameter: held.diameter * factor, stroke: held.stroke / factor ** 2 }
    case 'stroke':
      return { ...held, stroke: held.stroke * factor }
    case 'frequency':
      return { ...held, frequency: held.frequency * factor }
    case 'ejectShare':
      return { ...held, ejectShare: held.ejectShare * factor }
  }
}

function logSlope(low: number, high: number): number | null {
  const slope = low > 0 && high > 0 ? Math.log(high / low) / (2 * STEP) : Number.NaN
  return Number.isFinite(slope) ? slope : null
}
