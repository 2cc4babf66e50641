/**
 * A map over two fields of a design: what every choice costs, whether it holds its limits, and which one stands in its way.
 */
import { DomainError, at, equallySpaced, requireRange } from '../base'
import { limitScales } from './candidates'
import type { CompiledDesigns } from './design'
import { BINDING_SLACK, MET_BY_CONSTRUCTION, slackOf } from './designLimits'
import type { Design, DesignField, DesignFigures } from './designTypes'
import { MapRooms } from './mapRooms'
import type { LimitName, Span } from './types'

/** One axis of a map. */
export interface MapAxis {
  readonly field: DesignField
  readonly span: Span
  readonly count: number
}

/** Cells go along x first: cell j x.length + i is at x[i], y[j]. */
export interface DesignMap {
  readonly xField: DesignField
  readonly yField: DesignField
  readonly x: readonly number[]
  readonly y: readonly number[]
  /** Mean power by the shares of the duty points [W]. */
  readonly power: Float64Array
  /** At the first duty point [N]. */
  readonly thrust: Float64Array
  /** Pulses a second, and the vehicle's speed, at the first duty point [1/s], [m/s]. */
  readonly frequency: Float64Array
  readonly speed: Float64Array
  /** At the first duty point; NaN where there is none. */
  readonly froudeEfficiency: Float64Array
  readonly overallEfficiency: Float64Array
  /** Room to each limit that is asked, over the limit: negative where it is broken at any duty point. */
  readonly rooms: ReadonlyMap<LimitName, Float64Array>
  /** 1 where every limit holds. */
  readonly feasible: Uint8Array
  /** The limit broken most, or the one that has less than one per cent of room; null: none. */
  readonly limit: readonly (LimitName | null)[]
}

const DEFAULT_COUNT = 60
const MOST_CELLS = 250_000

/**
 * The map around a design: two fields are varied, the others kept.
 *
 * @param xAxis and yAxis: by default diameter and stroke ratio over the ranges of the search, 60 x 60
 * @throws {DomainError} on an axis without room, two axes of one field, or a frequency where the duty points set it
 */
export function designMap(
  designs: CompiledDesigns,
  around: Design,
  xAxis: MapAxis = defaultAxis(designs, around, 'diameter'),
  yAxis: MapAxis = defaultAxis(designs, around, 'strokeRatio'),
): DesignMap {
  requireAxes(xAxis, yAxis, around)
  const x = valuesOf(xAxis)
  const y = valuesOf(yAxis)
  const cells = x.length * y.length
  const power = new Float64Array(cells)
  const thrust = new Float64Array(cells)
  const frequency = new Float64Array(cells)
  const speed = new Float64Array(cells)
  const froudeEfficiency = new Float64Array(cells)
  const overallEfficiency = new Float64Array(cells)
  const rooms = new MapRooms(designs, cells, around.frequency === null)
  const feasible = new Uint8Array(cells)
  const limit: (LimitName | null)[] = []
  for (let j = 0; j < y.length; j++) {
    for (let i = 0; i < x.length; i++) {
      const figures = designs.evaluate({ ...around, [xAxis.field]: at(x, i), [yAxis.field]: at(y, j) })
      const cell = j * x.length + i
      power[cell] = figures.power
      thrust[cell] = figures.thrust
      const [first] = figures.points
      frequency[cell] = first?.held.frequency ?? NaN
      speed[cell] = first?.speed ?? NaN
      froudeEfficiency[cell] = first?.budget.froudeEfficiency ?? NaN
      overallEfficiency[cell] = first?.budget.overallEfficiency ?? NaN
      rooms.add(cell, figures)
      feasible[cell] = figures.violation === 0 ? 1 : 0
      limit.push(limitInTheWay(designs, figures))
    }
  }
  return {
    xField: xAxis.field,
    yField: yAxis.field,
    x,
    y,
    power,
    thrust,
    frequency,
    speed,
    froudeEfficiency,
    overallEfficiency,
    rooms: rooms.rooms,
    feasible,
    limit,
  }
}

/** The limit with the least room, where it is broken or has less than one per cent left. */
function limitInTheWay(designs: CompiledDesigns, { points }: DesignFigures): LimitName | null {
  let name: LimitName | null = null
  let least = BINDING_SLACK
  for (const { limits, held } of points) {
    const scales = limitScales(designs, held.frequency)
    for (const limit of limits) {
      if (limit.ok && MET_BY_CONSTRUCTION.has(limit.name)) continue
      const slack = slackOf(limit, scales)
      if (slack >= least) continue
      least = slack
      name = limit.name
    }
  }
  return name
}

function defaultAxis({ problem }: CompiledDesigns, around: Design, field: 'diameter' | 'strokeRatio'): MapAxis {
  // Without a search: half to twice the design.
  const span = problem.section.search?.[field] ?? [around[field] / 2, around[field] * 2]
  return { field, span, count: DEFAULT_COUNT }
}

function valuesOf({ field, span, count }: MapAxis): number[] {
  if (field !== 'count') return equallySpaced(span[0], span[1], count)
  const low = Math.ceil(span[0])
  return Array.from({ length: Math.floor(span[1]) - low + 1 }, (_, i) => low + i)
}

function requireAxes(x: MapAxis, y: MapAxis, around: Design): void {
  if (x.field === y.field)
    throw new DomainError('map', `the two axes of a map must be different fields, got ${x.field} twice`)
  if (x.count * y.count > MOST_CELLS)
    throw new DomainError('map', `a map must have at most ${MOST_CELLS} cells, got ${x.count} x ${y.count}`)
  for (const { field, span, count } of [x, y]) {
    if (field === 'frequency' && around.frequency === null)
      throw new DomainError(
        'map',
        'the frequency cannot be an axis of the map where the duty points set it; choose another field',
      )
    requireRange(`map.${field}`, span[0], { above: 0 })
    requireRange(`map.${field}`, span[1], { min: span[0] })
    requireRange(`map.${field}.count`, count, { min: 2 })
  }
}
