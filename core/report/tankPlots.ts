/**
 * Plots of a tank run: where the ring is and when, how fast at each place, what the piston does, which strokes meet a target.
 */
import { formatQuantity, fromBase } from '../quantity'
import type { SpreadBand, Units } from '../plan'
import type { DriveLimitName, PistonProfile, Solution, TankRunResult } from '../tank'
import type { PlotLine, PlotModel, PlotSeries } from './types'

export type TankPlotUnits = Pick<Units, 'length' | 'wakeTime' | 'ringSpeed' | 'speed' | 'acceleration'>

type Values = readonly number[]

function series(
  id: string,
  name: string,
  x: Values,
  y: readonly (number | null)[],
  role: PlotSeries['role'],
  line: PlotSeries['line'] = 'solid',
): PlotSeries {
  return { id, name, x, y, role, line, filled: false }
}

/** Where the ring is over time, and its speed over the way. @param spread percentiles of the place over time, where they are known */
export function tankPlots(
  result: TankRunResult,
  units: TankPlotUnits,
  spread: SpreadBand | null = null,
): readonly PlotModel[] {
  return result.path === null ? [] : [positionPlot(result, units, spread), speedPlot(result, units)]
}

function positionPlot({ path, arrivals }: TankRunResult, units: TankPlotUnits, spread: SpreadBand | null): PlotModel {
  const lengths = (values: Values): number[] => values.map((value) => fromBase(value, units.length))
  const times = (values: Values): number[] => values.map((value) => fromBase(value, units.wakeTime))
  const list: PlotSeries[] = []
  if (path !== null) {
    const t = times(path.time)
    list.push(series('ring', 'ring', t, lengths(path.x), 'primary'))
    if (differ(path.x, path.xLow) || differ(path.x, path.xHigh))
      list.push(
        { ...series('fastest', 'fastest', t, lengths(path.xHigh), 'secondary', 'dashed'), fillTo: 'slowest' },
        series('slowest', 'slowest', t, lengths(path.xLow), 'secondary', 'dashed'),
      )
  }
  if (spread !== null) {
    const t = times(spread.x)
    list.push(
      { ...series('p95', '95 %', t, lengths(spread.p95), 'reference', 'dotted'), fillTo: 'p05' },
      series('p05', '5 %', t, lengths(spread.p05), 'reference', 'dotted'),
    )
  }
  return {
    id: 'tank-position',
    title: 'Place of the ring',
    x: { title: 'Time', unit: units.wakeTime, min: 0 },
    y: { title: 'Distance from the exit', unit: units.length, min: 0 },
    series: list,
    bands: [],
    lines: arrivals.map(({ station }): PlotLine => ({
      axis: 'y',
      value: fromBase(station, units.length),
      label: formatQuantity(station, units.length),
      kind: 'mark',
    })),
  }
}

/** The ends of the range are those of the stations: elsewhere they are not known at one place. */
function speedPlot({ path, arrivals }: TankRunResult, units: TankPlotUnits): PlotModel {
  const shown = (value: number): number => fromBase(value, units.ringSpeed)
  const list =
    path === null
      ? []
      : [
          series(
            'ring',
            'ring',
            path.x.map((x) => fromBase(x, units.length)),
            path.speed.map(shown),
            'primary',
          ),
        ]
  const seen = arrivals.flatMap(({ station, speedLow, speedHigh }) =>
    speedLow === null || speedHigh === null
      ? []
      : [{ station, x: fromBase(station, units.length), speedLow, speedHigh }],
  )
  if (seen.length > 1) {
    const x = seen.map((row) => row.x)
    list.push(
      {
        ...series(
          'highest',
          'highest',
          x,
          seen.map((row) => shown(row.speedHigh)),
          'secondary',
          'dashed',
        ),
        fillTo: 'lowest',
      },
      series(
        'lowest',
        'lowest',
        x,
        seen.map((row) => shown(row.speedLow)),
        'secondary',
        'dashed',
      ),
    )
  }
  return {
    id: 'tank-speed',
    title: 'Speed of the ring',
    x: { title: 'Distance', unit: units.length, min: 0 },
    y: { title: 'Speed', unit: units.ringSpeed, min: 0 },
    series: list,
    bands: [],
    lines: seen.map(({ station, x }): PlotLine => ({
      axis: 'x',
      value: x,
      label: formatQuantity(station, units.length),
      kind: 'mark',
    })),
  }
}

/** Share of a limit from which on it is drawn: a far one would flatten the curve. */
const NEAR_LIMIT = 0.4

/** What the controller tells the piston: place, speed and acceleration over time. */
export function pistonPlots(profile: PistonProfile, units: TankPlotUnits): readonly PlotModel[] {
  const x = profile.time.map((value) => fromBase(value, units.wakeTime))
  const plot = (name: string, values: Values, unit: string, limit: DriveLimitName): PlotModel => ({
    id: `piston-${name}`,
    title: `Piston ${name}`,
    x: { title: 'Time', unit: units.wakeTime },
    y: { title: `Piston ${name}`, unit },
    series: [
      series(
        name,
        name,
        x,
        values.map((value) => fromBase(value, unit)),
        'primary',
      ),
    ],
    bands: [],
    lines: limitLines(profile, limit, unit, limit === 'acceleration' ? [1, -1] : [1]),
  })
  return [
    plot('position', profile.position, units.length, 'travel'),
    plot('speed', profile.speed, units.speed, 'speed'),
    plot('acceleration', profile.acceleration, units.acceleration, 'acceleration'),
  ]
}

function limitLines(
  { limits }: PistonProfile,
  name: DriveLimitName,
  unit: string,
  signs: readonly (1 | -1)[],
): PlotLine[] {
  const row = limits.find((candidate) => candidate.name === name)
  if (row === undefined || row.limit === null || row.value < NEAR_LIMIT * row.limit) return []
  const limit = row.limit
  return signs.map((sign) => ({
    axis: 'y',
    value: sign * fromBase(limit, unit),
    label: `limit ${formatQuantity(sign * limit, unit, 3)}`,
    kind: 'limit',
  }))
}

/** Peak exit speed over stroke that meets the target; strokes the drive cannot follow stand apart. @param stroke of the plan [m] */
export function targetPlot(solutions: readonly Solution[], stroke: number, units: TankPlotUnits): PlotModel {
  const x = solutions.map((row) => fromBase(row.stroke, units.length))
  const speeds = (pick: (row: Solution) => boolean): (number | null)[] =>
    solutions.map((row) => (row.peakSpeed === null || !pick(row) ? null : fromBase(row.peakSpeed, units.speed)))
  const all = speeds(() => true)
  return {
    id: 'tank-target',
    title: 'Peak exit speed that meets the target',
    x: { title: 'Stroke', unit: units.length, min: 0 },
    y: { title: 'Peak exit speed', unit: units.speed, min: 0 },
    series: [
      ...(solutions.some((row) => row.peakSpeed !== null && !row.ok)
        ? [series('asked', 'outside the drive', x, all, 'secondary', 'dotted')]
        : []),
      series(
        'followed',
        'within the drive',
        x,
        speeds(({ ok }) => ok),
        'primary',
      ),
    ],
    bands: [],
    lines: [{ axis: 'x', value: fromBase(stroke, units.length), label: 'this plan', kind: 'mark' }],
  }
}

function differ(a: Values, b: Values): boolean {
  return a.some((value, i) => value !== b[i])
}
