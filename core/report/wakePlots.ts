/**
 * The plots of a wake against time: where the rings are, how wide they are, how far apart, and what their sums do.
 */
import { at } from '../base'
import type { Wake, WakeRing } from '../filament'
import { fromBase } from '../quantity'
import type { PlotAxis, PlotModel, PlotSeries, SeriesRole } from './types'
import { nearestPair, neighbourSeparations, totalImpulse, type WakeSeries } from './wakeSeries'

export interface WakePlotUnits {
  /** Of x, R and separations, for instance `mm`. */
  readonly length: string
  readonly time: string
  readonly impulse: string
}

export interface WakePlotOptions {
  readonly units: WakePlotUnits
  /** [kg/m3], for the impulse. */
  readonly density: number
  /** End of the time axis [s]. */
  readonly duration: number
  /** Number of the ring that is picked out, from 1; null: none. */
  readonly selected: number | null
}

/** Rings drawn as lines of their own; of more, evenly spaced ones are. */
export const MOST_LINES = 40
/** Rings named at their lines; of more, evenly spaced ones and the picked one are. */
export const MOST_NAMES = 6
/** Pairs of neighbours drawn as lines of their own; with more, the nearest pair is. */
export const MOST_PAIRS = 8

/**
 * Plot models of a wake in the shown units, every output time in them: thin them for drawing.
 *
 * @param rings the rings the march began with
 */
export function wakePlots(wake: Wake, rings: readonly WakeRing[], options: WakePlotOptions): readonly PlotModel[] {
  const separation = separationPlot(wake, options)
  return [
    positionPlot(wake, options),
    radiusPlot(wake, options),
    // A lone ring has no neighbour.
    ...(separation.series.length > 0 ? [separation] : []),
    impulsePlot(wake, rings, options),
  ]
}

/** Lines that differ without colour; consecutive rings never look the same. */
const LOOKS: readonly (readonly [SeriesRole, PlotSeries['line']])[] = [
  ['primary', 'solid'],
  ['secondary', 'dashed'],
  ['reference', 'solid'],
  ['primary', 'dashed'],
  ['secondary', 'solid'],
  ['reference', 'dotted'],
]

function lookOf(index: number, selected: boolean | null): readonly [SeriesRole, PlotSeries['line']] {
  if (selected === true) return ['primary', 'solid']
  const [role, line] = at(LOOKS, index % LOOKS.length)
  return selected === false ? ['secondary', line] : [role, line]
}

function timeAxis({ units, duration }: WakePlotOptions): PlotAxis {
  // A little room on the right for the names of the lines.
  return { title: 'Time', unit: units.time, min: 0, max: fromBase(duration, units.time) * 1.06 }
}

function lineOf(
  id: string,
  name: string,
  { time, values }: WakeSeries,
  unit: string,
  [role, line]: readonly [SeriesRole, PlotSeries['line']],
  timeUnit: string,
): PlotSeries {
  return {
    id,
    name,
    x: Array.from(time, (value) => fromBase(value, timeUnit)),
    y: Array.from(values, (value) => fromBase(value, unit)),
    role,
    line,
    filled: false,
  }
}

/** Indices of the rings drawn, all of them up to MOST_LINES. */
function drawnRings(wake: Wake, selected: number | null): readonly number[] {
  const living = wake.trajectories.flatMap(({ time }, i) => (time.length > 0 ? [i] : []))
  const step = Math.ceil(living.length / MOST_LINES)
  return living.filter((ring, i) => i % step === 0 || ring + 1 === selected)
}

function ringPlot(
  wake: Wake,
  options: WakePlotOptions,
  plot: { readonly id: string; readonly title: string; readonly column: 'x' | 'radius'; readonly min?: number },
): PlotModel {
  const { units, selected } = options
  const rings = drawnRings(wake, selected)
  const step = Math.ceil(rings.length / MOST_NAMES)
  const all = wake.trajectories.filter(({ time }) => time.length > 0).length
  return {
    id: plot.id,
    title: rings.length < all ? `${plot.title} of ${rings.length} of ${all} rings` : plot.title,
    x: timeAxis(options),
    y: { title: plot.title, unit: units.length, ...(plot.min === undefined ? {} : { min: plot.min }) },
    series: rings.map((ring, i) => {
      const path = at(wake.trajectories, ring)
      const look = lookOf(ring, selected === null ? null : selected === ring + 1)
      const values = { time: path.time, values: path[plot.column] }
      const name = all === 1 ? 'ring 1' : String(ring + 1)
      const unnamed = i % step !== 0 && i < rings.length - 1 && ring + 1 !== selected
      return { ...lineOf(`ring-${ring + 1}`, name, values, units.length, look, units.time), unnamed }
    }),
    bands: [],
    lines: [],
  }
}

function positionPlot(wake: Wake, options: WakePlotOptions): PlotModel {
  return ringPlot(wake, options, { id: 'wake-position', title: 'Position x', column: 'x' })
}

function radiusPlot(wake: Wake, options: WakePlotOptions): PlotModel {
  return ringPlot(wake, options, { id: 'wake-radius', title: 'Ring radius', column: 'radius', min: 0 })
}

function separationPlot(wake: Wake, options: WakePlotOptions): PlotModel {
  const { units, selected } = options
  const pairs = neighbourSeparations(wake)
  const signed = wake.model === 'coaxial'
  const title = signed ? 'Gap to the next ring' : 'Distance of neighbours'
  const base = { id: 'wake-separation', x: timeAxis(options), bands: [], lines: [] }
  if (pairs.length > MOST_PAIRS) {
    const line = lineOf('nearest', 'nearest pair', nearestPair(wake), units.length, ['primary', 'solid'], units.time)
    return { ...base, title: 'Nearest pair', y: { title: 'Distance', unit: units.length, min: 0 }, series: [line] }
  }
  return {
    ...base,
    title,
    y: { title, unit: units.length },
    series: pairs.map(({ first, second, separation }, i) => {
      const look = lookOf(i, selected === null ? null : selected === first || selected === second)
      return lineOf(`pair-${first}-${second}`, `${first}–${second}`, separation, units.length, look, units.time)
    }),
  }
}

function impulsePlot(wake: Wake, rings: readonly WakeRing[], options: WakePlotOptions): PlotModel {
  const { units, density } = options
  const { now, born } = totalImpulse(wake, rings, density)
  const kept = lineOf('now', 'now', now, units.impulse, ['primary', 'solid'], units.time)
  const asBorn = lineOf('as-born', 'as they appeared', born, units.impulse, ['secondary', 'dashed'], units.time)
  return {
    id: 'wake-impulse',
    title: 'Impulse along x',
    x: timeAxis(options),
    y: { title: 'Impulse along x', unit: units.impulse },
    series: differs(now, born) ? [asBorn, kept] : [kept],
    bands: [],
    lines: [],
  }
}

/** Two lines nearer than this share of the largest value are one on paper. */
const SAME_LINE = 0.01

function differs({ values }: WakeSeries, other: WakeSeries): boolean {
  let [largest, apart] = [0, 0]
  for (let index = 0; index < values.length; index++) {
    largest = Math.max(largest, Math.abs(at(values, index)), Math.abs(at(other.values, index)))
    apart = Math.max(apart, Math.abs(at(values, index) - at(other.values, index)))
  }
  return apart > SAME_LINE * largest
}
