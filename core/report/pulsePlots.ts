/**
 * The plots of one pulse against formation time: exit speed, circulation, dimensionless energy.
 */
import { fromBase } from '../quantity'
import { last } from '../base'
import { LIMITING_ENERGY, type PulseResult } from '../pulse'
import type { PlotAxis, PlotModel, PlotSeries } from './types'

export interface PulsePlotUnits {
  /** Symbol of the shown unit, for instance `m/s`. */
  readonly speed: string
  /** For instance `cm²/s`. */
  readonly circulation: string
}

/** Ends the formation-time axis steps through while a stroke grows, so that it stands still during most of a drag. */
const AXIS_ENDS = [0.6, 1.2, 2.4, 4.8, 6, 8, 10, 12, 15, 20]

/** Top of the energy plot in normal use: the running energy comes down from infinity. */
const ENERGY_TOP = 1.25

/** Plot models of a pulse in the shown units; the same for window, export and report. */
export function pulsePlots(pulse: PulseResult, units: PulsePlotUnits): readonly PlotModel[] {
  return [speedPlot(pulse, units.speed), circulationPlot(pulse, units.circulation), energyPlot(pulse)]
}

function formationAxis(end: number): PlotAxis {
  return { title: 'Formation time', unit: '', min: 0, max: end }
}

function axisEnd(needed: number): number {
  return AXIS_ENDS.find((end) => end >= needed) ?? Math.ceil(needed / 10) * 10
}

/** Room to the right of the stroke's end for the names of the lines. */
function strokeEnd(pulse: PulseResult): number {
  return Math.max(last(pulse.history.formationTime), pulse.strokeRatio) * 1.3
}

function speedPlot(pulse: PulseResult, unit: string): PlotModel {
  const { formationTime, exitSpeed } = pulse.history
  // The outline is closed where speed starts or stops at once, as the slug is.
  const x = [0, ...formationTime, last(formationTime)]
  const y = [0, ...exitSpeed.map((speed) => fromBase(speed, unit)), 0]
  return {
    id: 'exit-speed',
    title: 'Exit speed',
    x: formationAxis(axisEnd(strokeEnd(pulse))),
    y: { title: 'Exit speed', unit, min: 0 },
    series: [{ id: 'exit-speed', name: 'exit speed', x, y, role: 'primary', line: 'solid', filled: true }],
    bands: [],
    lines: [],
  }
}

function circulationPlot(pulse: PulseResult, unit: string): PlotModel {
  const { formationTime, circulation, circulationQuickStart } = pulse.history
  const shown = (values: readonly number[]): number[] => values.map((value) => fromBase(value, unit))
  const series: PlotSeries[] = [
    {
      id: 'slug',
      name: 'slug',
      x: formationTime,
      y: shown(circulation),
      role: 'primary',
      line: 'solid',
      filled: false,
    },
  ]
  if (pulse.quickStart) {
    const y = shown(circulationQuickStart)
    series.push({
      id: 'quick-start',
      name: 'quick start',
      x: formationTime,
      y,
      role: 'secondary',
      line: 'dashed',
      filled: false,
    })
  }
  return {
    id: 'circulation',
    title: 'Circulation',
    x: formationAxis(axisEnd(strokeEnd(pulse))),
    y: { title: 'Circulation', unit, min: 0 },
    series,
    bands: [],
    lines: [],
  }
}

function energyPlot(pulse: PulseResult): PlotModel {
  const { formationTime, dimensionlessEnergy } = pulse.history
  const band = pulse.formationNumber.published
  const y = dimensionlessEnergy.map((value) => (value !== null && Number.isFinite(value) ? value : null))
  const needed = Math.max(strokeEnd(pulse) / 1.2, (band?.[1] ?? 0) * 1.05)
  return {
    id: 'dimensionless-energy',
    title: 'Dimensionless energy',
    x: formationAxis(axisEnd(needed)),
    // A very short stroke ends above the usual top and still has to be seen.
    y: { title: 'Dimensionless energy', unit: '', min: 0, max: Math.max(ENERGY_TOP, 1.6 * pulse.dimensionlessEnergy) },
    series: [
      {
        id: 'energy',
        name: 'dimensionless energy',
        x: formationTime,
        y,
        role: 'primary',
        line: 'solid',
        filled: false,
      },
    ],
    bands: band === null ? [] : [{ axis: 'x', from: band[0], to: band[1], label: 'published band' }],
    lines: [{ axis: 'y', value: LIMITING_ENERGY, label: limitLabel(pulse), kind: 'limit' }],
  }
}

/** The limit as it crosses the slug's energy: modifiers of nozzle and stream move the estimate, not this curve. */
function limitLabel({ formationNumber }: PulseResult): string {
  const { energyLimit, unmodified } = formationNumber
  const moved =
    energyLimit !== null && unmodified.energyLimit !== null && Math.abs(energyLimit - unmodified.energyLimit) > 1e-9
  return moved ? `limit ${LIMITING_ENERGY}, before modifiers` : `limit ${LIMITING_ENERGY}`
}
