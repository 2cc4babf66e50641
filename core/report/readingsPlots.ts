/**
 * Plots of a comparison: what was read off with its uncertainty over the predicted band and the fit, residuals, the force of the stand
 * and what the velocity fields gave. Values in the shown units, every reading in them: thin them for drawing.
 */
import { at } from '../base'
import type { Units } from '../plan'
import { fromBase } from '../quantity'
import type { FieldResult, ForceLog, ReadingRow, ReadingsCalibration, ReadingsPath, ReadingsResult } from '../tank'
import { MARKERS } from './plotMarkers'
import type { PlotLine, PlotMarker, PlotModel, PlotSeries } from './types'

export type ReadingsPlotUnits = Pick<Units, 'length' | 'wakeTime' | 'circulation' | 'force'>

/** Runs drawn with marks of their own; the rest share the last. */
export const MOST_RUNS_SHOWN = 4

/** The leading ring of a computed jet, beside the closed models. */
export interface JetTrack {
  readonly time: ArrayLike<number>
  /** null before the ring is told. */
  readonly x: readonly (number | null)[]
  readonly radius: readonly (number | null)[]
  readonly circulation: readonly (number | null)[]
}

export interface TrackOptions {
  readonly units: ReadingsPlotUnits
  /** The run that is looked at alone; null: all. */
  readonly run: string | null
  readonly jet: JetTrack | null
}

type Track = 'x' | 'radius' | 'circulation'

const TRACKS: Readonly<
  Record<Track, { readonly title: string; readonly sigma: keyof ReadingRow; readonly unit: 'length' | 'circulation' }>
> = {
  x: { title: 'Place of the ring', sigma: 'sigmaX', unit: 'length' },
  radius: { title: 'Ring radius', sigma: 'sigmaRadius', unit: 'length' },
  circulation: { title: 'Circulation', sigma: 'sigmaCirculation', unit: 'circulation' },
}

/** Place, radius and circulation over time: those of which there are readings. */
export function trackPlots(result: ReadingsResult, options: TrackOptions): readonly PlotModel[] {
  const names: readonly Track[] = ['x', 'radius', 'circulation']
  return names
    .filter((name) => result.calibrated.some((row) => row[name] !== null))
    .map((name) => trackPlot(result, name, options))
}

function trackPlot(result: ReadingsResult, track: Track, { units, run, jet }: TrackOptions): PlotModel {
  const { title, unit } = TRACKS[track]
  const shown = (value: number): number => fromBase(value, units[unit])
  const times = (values: ArrayLike<number>): number[] => Array.from(values, (value) => fromBase(value, units.wakeTime))
  const series: PlotSeries[] = []
  const predicted = result.paths.filter(({ basis }) => basis !== 'fit')
  const line = (
    id: string,
    name: string,
    path: Pick<ReadingsPath, 'time'>,
    values: readonly (number | null)[],
    role: PlotSeries['role'],
    style: PlotSeries['line'],
  ): PlotSeries => ({
    id,
    name,
    x: times(path.time),
    y: values.map((value) => (value === null ? null : shown(value))),
    role,
    line: style,
    filled: false,
  })
  const [adopted] = predicted
  if (adopted !== undefined) {
    series.push(line('prediction', 'prediction', adopted, adopted[track], 'primary', 'solid'))
    const alike = predicted.filter(({ time }) => time.length === adopted.time.length)
    const ends = (choose: (...values: number[]) => number): number[] =>
      adopted.time.map((_, k) => choose(...alike.map((path) => at(path[track], k))))
    const [low, high] = [ends(Math.min), ends(Math.max)]
    if (low.some((value, k) => value !== high[k]))
      series.push(
        { ...line('high', 'band', adopted, high, 'secondary', 'dotted'), fillTo: 'low', unnamed: true },
        { ...line('low', 'band, low', adopted, low, 'secondary', 'dotted'), unnamed: true },
      )
  }
  const fit = result.paths.find(({ basis }) => basis === 'fit')
  if (fit !== undefined) series.push(line('fit', 'fit', fit, fit[track], 'reference', 'dashed'))
  if (jet !== null && jet[track].some((value) => value !== null))
    series.push(line('jet', 'computed jet', { time: Array.from(jet.time) }, jet[track], 'secondary', 'dashed'))
  series.push(...runSeries(result, track, units, run))
  return {
    id: `readings-${track}`,
    title,
    x: { title: 'Time after the piston starts', unit: units.wakeTime, min: 0 },
    y: { title, unit: units[unit], ...(track === 'x' ? {} : endsOf(series)) },
    series,
    bands: [],
    lines: [],
  }
}

/** Ends of an axis that does not begin at zero: points that are compared, not amounts. */
function endsOf(series: readonly PlotSeries[]): { readonly min: number; readonly max: number } | object {
  const values = series.flatMap(({ y, error }) =>
    y.flatMap((value, k) => (value === null ? [] : [value - (error?.[k] ?? 0), value + (error?.[k] ?? 0)])),
  )
  if (values.length === 0) return {}
  const low = values.reduce((a, b) => Math.min(a, b))
  const high = values.reduce((a, b) => Math.max(a, b))
  const room = 0.25 * (high - low)
  return high > low ? { min: Math.max(0, low - room), max: high + room } : {}
}

function runSeries(
  { calibrated }: ReadingsResult,
  track: Track,
  units: ReadingsPlotUnits,
  only: string | null,
): readonly PlotSeries[] {
  const { sigma, unit } = TRACKS[track]
  const shown = (value: number): number => fromBase(value, units[unit])
  return groups(
    calibrated,
    ({ run }) => run,
    (row) => row[track] !== null,
  )
    .filter(({ names }) => only === null || names.includes(only))
    .map(({ label, names, marker, list }) => {
      const own = only === null ? list : list.filter(({ run }) => run === only)
      return {
        id: `run-${names[0] ?? ''}`,
        name: only ?? label,
        x: own.map(({ time }) => fromBase(time, units.wakeTime)),
        y: own.map((row) => shown(row[track] ?? Number.NaN)),
        error: own.map((row) => {
          const size = row[sigma]
          return typeof size === 'number' ? shown(size) : null
        }),
        marker,
        role: 'reference' as const,
        line: 'solid' as const,
        filled: false,
      }
    })
}

interface RunGroup<T> {
  readonly label: string
  readonly names: readonly string[]
  readonly marker: PlotMarker
  readonly list: readonly T[]
}

/** Readings by run, each with a mark of its own; those of many runs share the last. */
function groups<T>(all: readonly T[], runOf: (one: T) => string, used: (one: T) => boolean): readonly RunGroup<T>[] {
  const byRun = new Map<string, T[]>()
  for (const one of all) {
    if (!used(one)) continue
    const own = byRun.get(runOf(one))
    if (own === undefined) byRun.set(runOf(one), [one])
    else own.push(one)
  }
  const runs = [...byRun]
  const apart = runs.length > MOST_RUNS_SHOWN ? MOST_RUNS_SHOWN - 1 : runs.length
  const own = runs.slice(0, apart).map(([name, list], index) => ({
    label: runs.length === 1 ? 'readings' : name.length < 4 ? `run ${name}` : name,
    names: [name],
    marker: at(MARKERS, index),
    list,
  }))
  const rest = runs.slice(apart)
  if (rest.length === 0) return own
  return [
    ...own,
    {
      label: `${rest.length} further runs`,
      names: rest.map(([name]) => name),
      marker: at(MARKERS, apart),
      list: rest.flatMap(([, list]) => list),
    },
  ]
}

/** Measured less fitted place over time; outliers crossed. Null without residuals. */
export function residualPlot(
  result: ReadingsResult,
  track: Track,
  { units, run }: Pick<TrackOptions, 'units' | 'run'>,
): PlotModel | null {
  const { title, unit } = TRACKS[track]
  const runOf = (row: number): string => result.calibrated[row]?.run ?? ''
  const own = result.residuals.filter(({ quantity, row }) => quantity === track && (run === null || runOf(row) === run))
  if (own.length === 0) return null
  const mark = (id: string, name: string, marker: PlotMarker, list: typeof own): PlotSeries => ({
    id,
    name,
    x: list.map(({ time }) => fromBase(time, units.wakeTime)),
    y: list.map(({ residual }) => fromBase(residual, units[unit])),
    marker,
    role: 'reference',
    line: 'solid',
    filled: false,
  })
  const shown = groups(
    own.filter(({ outlier }) => !outlier),
    ({ row }) => runOf(row),
    () => true,
  ).map(({ label, names, marker, list }) => mark(`run-${names[0] ?? ''}`, run ?? label, marker, [...list]))
  const outliers = own.filter(({ outlier }) => outlier)
  return {
    id: `readings-residual-${track}`,
    title: `${title} less the fit`,
    x: { title: 'Time after the piston starts', unit: units.wakeTime, min: 0 },
    y: { title: 'Residual', unit: units[unit] },
    series: [...shown, ...(outliers.length === 0 ? [] : [mark('outliers', 'outliers', 'cross', outliers)])],
    bands: [],
    lines: [{ axis: 'y', value: 0, label: '', kind: 'mark' }],
  }
}

/** Force with its zero taken off, and its mean over each period. Null without a force that could be read. */
export function forcePlot(
  log: ForceLog,
  { timeOffset }: ReadingsCalibration,
  result: ReadingsResult,
  units: ReadingsPlotUnits,
): PlotModel | null {
  const { force, prediction } = result
  if (force === null) return null
  const { zero, drift } = force.zero
  const shown = (value: number): number => fromBase(value, units.force)
  const seconds = (value: number): number => fromBase(value, units.wakeTime)
  const time = Array.from(log.time, (value) => value + timeOffset)
  const first = time.findIndex((value) => value >= -1e-6 * force.period)
  const begin = Math.max(0, Math.round((time[first] ?? 0) / force.period)) * force.period
  const steps = force.perPeriod.flatMap(({ mean }, k) => [
    { x: begin + k * force.period, y: mean },
    { x: begin + (k + 1) * force.period, y: mean },
  ])
  const expected = prediction.meanForce
  const lines: PlotLine[] =
    expected === undefined ? [] : [{ axis: 'y', value: shown(expected.value), label: 'predicted mean', kind: 'mark' }]
  return {
    id: 'readings-force',
    title: 'Force on the stand',
    x: { title: 'Time after the piston starts', unit: units.wakeTime },
    y: { title: 'Force', unit: units.force },
    series: [
      {
        id: 'force',
        name: 'force less its zero',
        x: time.map(seconds),
        y: time.map((when, k) => shown(at(log.force, k) - zero - drift * when)),
        role: 'secondary',
        line: 'solid',
        filled: false,
        unnamed: true,
      },
      {
        id: 'mean',
        name: 'mean over each period',
        x: steps.map(({ x }) => seconds(x)),
        y: steps.map(({ y }) => shown(y)),
        role: 'primary',
        line: 'solid',
        filled: false,
      },
    ],
    bands: [],
    lines,
  }
}

/** Force over one period, the mean over the periods: peak and ripple are read off it. Null without a force that could be read. */
export function cyclePlot({ force, prediction }: ReadingsResult, units: ReadingsPlotUnits): PlotModel | null {
  if (force === null || force.cycle.length === 0) return null
  const shown = (value: number): number => fromBase(value, units.force)
  const mark = (value: number, label: string): PlotLine => ({ axis: 'y', value: shown(value), label, kind: 'mark' })
  const expected = prediction.meanForce
  return {
    id: 'readings-force-cycle',
    title: 'Force over one period',
    x: { title: 'Time in the period', unit: units.wakeTime, min: 0 },
    y: { title: 'Force', unit: units.force },
    series: [
      {
        id: 'cycle',
        name: 'mean of the periods',
        x: force.cycle.map((_, k) => fromBase((k + 0.5) * (force.period / force.cycle.length), units.wakeTime)),
        y: force.cycle.map(shown),
        role: 'primary',
        line: 'solid',
        filled: true,
      },
    ],
    bands: [],
    lines: [
      ...(force.mean === null ? [] : [mark(force.mean, 'mean')]),
      // Of one pulse the cycle is the log, over which no mean was predicted.
      ...(expected === undefined || force.mean === null ? [] : [mark(expected.value, 'predicted mean')]),
    ],
  }
}

/** Circulation of everything and of the ring, frame by frame. */
export function fieldPlot({ frames, formationNumber, pinchOff }: FieldResult, units: ReadingsPlotUnits): PlotModel {
  // Against formation time while the stroke lasts, which stands still afterwards: time tells frames apart throughout.
  const x = frames.map(({ time }) => fromBase(time, units.wakeTime))
  const circulation = (value: number): number => fromBase(value, units.circulation)
  return {
    id: 'readings-fields',
    title: 'Circulation in the fields',
    x: { title: 'Time after the piston starts', unit: units.wakeTime },
    y: { title: 'Circulation', unit: units.circulation, min: 0 },
    series: [
      {
        id: 'total',
        name: 'everything',
        x,
        y: frames.map(({ totalCirculation }) => circulation(totalCirculation)),
        error: frames.map(({ circulationError }) => circulation(circulationError)),
        marker: 'circle',
        role: 'reference',
        line: 'solid',
        filled: false,
      },
      {
        id: 'ring',
        name: 'the ring',
        x,
        y: frames.map(({ ring }) => (ring === null ? null : circulation(ring.circulation))),
        marker: 'diamond',
        role: 'primary',
        line: 'solid',
        filled: false,
      },
    ],
    bands: [],
    lines:
      pinchOff === null
        ? []
        : [
            {
              axis: 'x',
              value: fromBase(pinchOff.time, units.wakeTime),
              label: formationNumber === null ? 'pinched off' : `pinched off, F ${formationNumber.value.toFixed(2)}`,
              kind: 'mark',
            },
          ],
  }
}
