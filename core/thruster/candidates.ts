/**
 * A design told in full: figures at every duty point, how it stands to its limits, what holds it back, and its spread.
 */
import { at } from '../base'
import { computePulse, type StrokeMargin } from '../pulse'
import type { ThrusterPower } from './budget'
import type { CompiledDesigns } from './design'
import { pulseOfDesign } from './designInput'
import { BINDING_SLACK, MET_BY_CONSTRUCTION, slackOf, type LimitScales } from './designLimits'
import type { Design, DesignField, DesignFigures, PointFigures } from './designTypes'
import { above } from './limits'
import { sensitivitiesAt, thrustSpreadAt, type Sensitivity, type ThrustSpread } from './sensitivity'
import type { Limit, LimitName } from './types'

/** One duty point of a candidate. */
export interface CandidatePoint {
  /** Of the vehicle [m/s]; 0 standing. */
  readonly speed: number
  /** [N]; null where most thrust is searched. */
  readonly thrustAsked: number | null
  /** Weight in the mean power. */
  readonly share: number
  readonly frequency: number
  /** Used here: the full stroke or less. */
  readonly strokeRatio: number
  readonly peakSpeed: number
  /** Of the stroke [s]. */
  readonly duration: number
  readonly thrust: number
  /** From slug and close neighbours to slug and start over-pressure [N]. */
  readonly thrustRange: readonly [number, number]
  readonly power: ThrusterPower
  readonly froudeEfficiency: number | null
  readonly overallEfficiency: number | null
  readonly limits: readonly Limit[]
  /** Stroke left before pinch-off in the stream of the vehicle's speed, in diameters, over every estimate; not a limit unless asked for. */
  readonly formationMargin: StrokeMargin | null
  readonly spread: ThrustSpread
  readonly sensitivities: readonly Sensitivity[]
}

/** The limit with the least room, where that is less than one per cent. */
export interface Binding {
  readonly name: LimitName
  /** Index of the duty point. */
  readonly point: number
  /** Room over the limit; negative where it is broken. */
  readonly slack: number
}

/** A field that stands at the end of what the search may try: a wider range may give a better design. */
export interface RangeEnd {
  readonly field: DesignField
  readonly end: 'low' | 'high'
}

export interface Candidate {
  readonly design: Design
  readonly pistonDiameter: number
  /** Full slug length and plunger travel [m]. */
  readonly stroke: number
  readonly plungerTravel: number
  /** Mean of the duty points by their shares [W]. */
  readonly power: number
  /** At the first duty point [N]. */
  readonly thrust: number
  /** Of all thrusters at the full stroke [m3]. */
  readonly sweptVolume: number
  readonly points: readonly CandidatePoint[]
  /** null: no limit binds; then an end of a range, or the physics, does. */
  readonly binding: Binding | null
  readonly rangeEnds: readonly RangeEnd[]
  /** Limits nearer than the spread of manufacture at any duty point: check by test before relying on the design. */
  readonly withinSpread: readonly LimitName[]
  /** True where every limit holds. */
  readonly feasible: boolean
}

/** A design in full, with the pulse of every duty point computed for its ring. */
export function describeDesign(designs: CompiledDesigns, design: Design): Candidate {
  const figures = designs.evaluate(design)
  const points = figures.points.map((point, i) => describePoint(designs, point, at(designs.demands, i).share))
  const stroke = design.strokeRatio * design.diameter
  const pistonDiameter = figures.points[0]?.held.pistonDiameter ?? design.diameter
  return {
    design,
    pistonDiameter,
    stroke,
    plungerTravel: stroke * (design.diameter / pistonDiameter) ** 2,
    power: figures.power,
    thrust: figures.thrust,
    sweptVolume: figures.sweptVolume,
    points,
    binding: bindingOf(designs, points),
    rangeEnds: rangeEndsOf(designs, figures),
    withinSpread: [...new Set(points.flatMap(({ spread }) => spread.limitsWithin))],
    feasible: points.every(({ limits }) => limits.every(({ ok }) => ok)),
  }
}

function describePoint(designs: CompiledDesigns, found: PointFigures, share: number): CandidatePoint {
  const point = designs.evaluateHeld(found.held, found.speed, found.thrustAsked)
  const { budget, held } = point
  const pulse = computePulse(pulseOfDesign(designs, point))
  const scales = limitScales(designs, held.frequency)
  return {
    speed: point.speed,
    thrustAsked: point.thrustAsked,
    share,
    frequency: held.frequency,
    strokeRatio: held.stroke / held.diameter,
    peakSpeed: point.peakSpeed,
    duration: point.duration,
    thrust: budget.meanThrust,
    thrustRange: [budget.meanThrustLow, budget.meanThrustHigh],
    power: budget.power,
    froudeEfficiency: budget.froudeEfficiency,
    overallEfficiency: budget.overallEfficiency,
    limits: exactLimits(designs, point, pulse.corePressureDrop),
    formationMargin: pulse.margin,
    spread: thrustSpreadAt(designs, point, designs.problem.section.manufacture, scales),
    sensitivities: sensitivitiesAt(designs, point),
  }
}

/** The limits of the search with the ring's own core pressure in the place of the tabulated one. */
function exactLimits({ problem }: CompiledDesigns, point: PointFigures, drop: number | null): readonly Limit[] {
  const pressure = drop === null ? null : problem.absolutePressure - drop
  return point.limits.flatMap((limit) =>
    limit.name === 'core cavitation' ? above('core cavitation', pressure, problem.vapourPressure) : [limit],
  )
}

export function limitScales({ problem }: CompiledDesigns, frequency: number): LimitScales {
  return { period: 1 / frequency, pressure: problem.absolutePressure - (problem.vapourPressure ?? 0) }
}

function bindingOf(designs: CompiledDesigns, points: readonly CandidatePoint[]): Binding | null {
  let least: Binding | null = null
  points.forEach(({ limits, frequency }, point) => {
    for (const limit of limits) {
      if (limit.ok && MET_BY_CONSTRUCTION.has(limit.name)) continue
      const slack = slackOf(limit, limitScales(designs, frequency))
      if (slack < BINDING_SLACK && (least === null || slack < least.slack)) least = { name: limit.name, point, slack }
    }
  })
  return least
}

/** Relative distance from an end that counts as standing on it. */
const AT_END = 1e-4

function rangeEndsOf({ problem }: CompiledDesigns, { design, points }: DesignFigures): RangeEnd[] {
  const { search, actuator } = problem.section
  if (search === null) return []
  const ejectShare = search.ejectShare ?? [actuator.ejectShare, actuator.ejectShare]
  const frequencies = points.map(({ held }) => held.frequency)
  return [
    ...endOf('diameter', [design.diameter], search.diameter),
    ...endOf('strokeRatio', [design.strokeRatio], search.strokeRatio),
    ...endOf('count', [design.count], search.count),
    ...endOf('ejectShare', [design.ejectShare], ejectShare),
    ...endOf('frequency', frequencies, search.frequency),
  ]
}

function endOf(field: DesignField, values: readonly number[], [low, high]: readonly [number, number]): RangeEnd[] {
  // A range of one value holds nothing back that could be widened by mistake.
  if (!(high > low)) return []
  const ends: RangeEnd[] = []
  if (values.some((value) => value <= low * (1 + AT_END))) ends.push({ field, end: 'low' })
  if (values.some((value) => value >= high * (1 - AT_END))) ends.push({ field, end: 'high' })
  return ends
}
