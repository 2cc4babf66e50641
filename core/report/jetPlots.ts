/**
 * The plots of a starting jet against formation time: circulation, impulse, dimensionless energy; all of it and the ring. Formation time
 * runs on after the stroke as on the timeline.
 */
import type { JetEnsemble, JetRun } from '../coaxial'
import { dimensionlessEnergy, type PulseResult } from '../pulse'
import { fromBase } from '../quantity'
import type { JetTimeline } from './jetTimeline'
import type { PlotAxis, PlotBand, PlotLine, PlotModel, PlotSeries } from './types'

export interface JetPlotUnits {
  /** For instance `cm²/s`. */
  readonly circulation: string
  /** For instance `mN·s`. */
  readonly impulse: string
}

export interface JetPlotOptions {
  /** The slug's sums beside the jet's; null: without them. */
  readonly pulse: PulseResult | null
  /** [kg/m3] */
  readonly density: number
  readonly timeline: JetTimeline
  /** The runs that give the formation number; null where there is none. */
  readonly formation: JetEnsemble | null
  readonly units: JetPlotUnits
}

/** Dimensionless energy of pinched rings: about 0.3, Mohseni, Ran & Colonius 2001, J. Fluid Mech. 430:267. */
export const PUBLISHED_RING_ENERGY = 0.3
/** Top of the energy plot: the energy of a young ring comes down from infinity. */
const ENERGY_TOP = 1
/** Room to the right of the last value for the names of the lines. */
const ROOM = 1.45
/** Room above the highest value for the names of marks and band. */
const HEADROOM = 1.3

/** Plot models of a jet in the shown units; the same for window, export and report. */
export function jetPlots(run: JetRun, options: JetPlotOptions): readonly PlotModel[] {
  return [circulationPlot(run, options), impulsePlot(run, options), energyPlot(run, options)]
}

type Look = Pick<PlotSeries, 'role' | 'line'>
const ALL: Look = { role: 'primary', line: 'solid' }
const RING: Look = { role: 'reference', line: 'dashed' }
const SLUG: Look = { role: 'secondary', line: 'solid' }
const OVER_PRESSURE: Look = { role: 'secondary', line: 'dotted' }

function series(id: string, name: string, x: readonly number[], y: PlotSeries['y'], look: Look): PlotSeries {
  return { id, name, x, y, ...look, filled: false }
}

function base(
  run: JetRun,
  { timeline, formation }: JetPlotOptions,
): Pick<PlotModel, 'x' | 'bands' | 'lines'> & { readonly places: readonly number[] } {
  const { history } = run
  const band = bandOf(formation)
  // Where the ring is full is the band; short words leave room for the lines.
  const lines = timeline.moments.flatMap(({ id, place }): PlotLine[] =>
    id === 'ring-full'
      ? []
      : [{ axis: 'x', value: place, label: id === 'stroke-end' ? 'stop' : 'pinch-off', kind: 'mark' }],
  )
  const end = Math.max(timeline.end * ROOM, ...band.map(({ to }) => to * 1.05))
  const x: PlotAxis = { title: 'Formation time, run on', unit: '', min: 0, max: roundUp(end) }
  const places = history.time.map((time, row) => timeline.placeOf(time, history.formationTime[row] ?? 0))
  return { x, bands: band, lines, places }
}

function bandOf(formation: JetEnsemble | null): PlotBand[] {
  const [low, high] = [formation?.formationNumberLow ?? null, formation?.formationNumberHigh ?? null]
  if (low === null || high === null) return []
  return [{ axis: 'x', from: low, to: Math.max(high, low + 0.02), label: 'full' }]
}

/** Up to the next half, so that the axis ends on a round number. */
function roundUp(value: number): number {
  return Math.ceil(value * 2 - 1e-9) / 2
}

function shown(values: readonly (number | null)[], unit: string): (number | null)[] {
  return values.map((value) => (value === null ? null : fromBase(value, unit)))
}

const SLUG_NAMES = { id: 'slug', name: 'slug', look: SLUG }
const QUICK = { id: 'over-pressure', name: 'quick start', look: OVER_PRESSURE }

/** A sum of the slug along the ruler: it stays what it is when the stroke is over. */
function slugSeries(
  pulse: PulseResult | null,
  read: (history: PulseResult['history']) => readonly number[],
  { end }: JetTimeline,
  unit: string,
  { id, name, look } = SLUG_NAMES,
): PlotSeries[] {
  if (pulse === null) return []
  const { formationTime } = pulse.history
  const values = read(pulse.history)
  const x = [...formationTime, Math.max(end, formationTime[formationTime.length - 1] ?? 0)]
  const final = values[values.length - 1] ?? 0
  return [series(id, name, x, shown([...values, final], unit), look)]
}

/** From zero, with room at the top. */
function upward(title: string, unit: string, list: readonly PlotSeries[]): PlotAxis {
  let most = 0
  for (const { y } of list) for (const value of y) most = Math.max(most, value ?? 0)
  return { title, unit, min: 0, ...(most > 0 ? { max: HEADROOM * most } : {}) }
}

function circulationPlot(run: JetRun, options: JetPlotOptions): PlotModel {
  const { places, ...rest } = base(run, options)
  const { pulse, timeline, units } = options
  const unit = units.circulation
  const list = [
    series('total', 'all', places, shown(run.history.totalCirculation, unit), ALL),
    series('ring', 'ring', places, shown(run.history.ringCirculation, unit), RING),
    ...slugSeries(pulse, (history) => history.circulation, timeline, unit),
    ...(pulse?.quickStart === true
      ? slugSeries(pulse, (history) => history.circulationQuickStart, timeline, unit, QUICK)
      : []),
  ]
  return {
    id: 'jet-circulation',
    title: 'Circulation shed',
    y: upward('Circulation', unit, list),
    series: list,
    ...rest,
  }
}

function impulsePlot(run: JetRun, options: JetPlotOptions): PlotModel {
  const { places, ...rest } = base(run, options)
  const unit = options.units.impulse
  const list = [
    series('total', 'all', places, shown(run.history.totalImpulse, unit), ALL),
    series('ring', 'ring', places, shown(run.history.ringImpulse, unit), RING),
    ...slugSeries(options.pulse, (history) => history.impulse, options.timeline, unit),
  ]
  return { id: 'jet-impulse', title: 'Impulse shed', y: upward('Impulse', unit, list), series: list, ...rest }
}

function energyPlot(run: JetRun, options: JetPlotOptions): PlotModel {
  const { places, ...rest } = base(run, options)
  const { history } = run
  const of = (
    circulation: readonly (number | null)[],
    impulse: readonly (number | null)[],
    energy: readonly (number | null)[],
  ): (number | null)[] =>
    energy.map((value, row) => {
      const [gamma, i] = [circulation[row] ?? null, impulse[row] ?? null]
      if (value === null || gamma === null || i === null || !(gamma > 0) || !(i > 0) || !(value > 0)) return null
      return dimensionlessEnergy({ circulation: gamma, impulse: i, energy: value }, options.density)
    })
  return {
    id: 'jet-energy',
    title: 'Dimensionless energy',
    y: { title: 'Dimensionless energy', unit: '', min: 0, max: ENERGY_TOP },
    series: [
      series('total', 'all', places, of(history.totalCirculation, history.totalImpulse, history.totalEnergy), ALL),
      series('ring', 'ring', places, of(history.ringCirculation, history.ringImpulse, history.ringEnergy), RING),
    ],
    ...rest,
    lines: [
      ...rest.lines,
      { axis: 'y', value: PUBLISHED_RING_ENERGY, label: `published about ${PUBLISHED_RING_ENERGY}`, kind: 'limit' },
    ],
  }
}
