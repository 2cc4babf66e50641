/** What of a thruster can be taken out as a file. */
import { writeCsv, type Plan } from '../../core/plan'
import {
  plotToCsv,
  plotToSvg,
  sizePlot,
  thrusterPlots,
  thrustMapToCsv,
  thrustMapToSvg,
  type PlotModel,
  type ThrustMapModel,
} from '../../core/report'
import { plotToPng } from '../plots/plotImage'
import { svgToPng } from '../plots/svgImage'
import { CANDIDATE_COLUMNS, candidateHeadings, candidateRows } from './candidateRows'
import { exportStem, type ExportItem } from './exports'
import type { Finished } from './results'
import type { FinishedSizing } from './sizingJob'
import { shownUnits, type Units } from './units'

const PLOT_SIZE = { width: 640, height: 400, theme: 'print' } as const
const MAP_SIZE = { width: 900, height: 600, theme: 'light' } as const
const FONT = 'system-ui, sans-serif'

export interface ThrustPlots {
  readonly cycle: readonly PlotModel[]
  readonly travel: readonly PlotModel[]
  readonly size: readonly PlotModel[]
}

/** The plots of the page, the same in files. */
export function plotsOfThrust(finished: Finished | null, sized: FinishedSizing | null, units: Units): ThrustPlots {
  const section = finished?.plan.thruster ?? null
  const thruster = finished?.data.thruster?.result ?? null
  const shown = {
    time: units.wakeTime,
    speed: units.vehicleSpeed,
    exitSpeed: units.speed,
    pressure: units.corePressure,
    force: units.force,
    power: units.power,
    volume: units.volume,
  }
  const size = sized === null ? [] : sizePlot(sized.sizing, shown)
  if (finished === null || section === null || thruster === null) return { cycle: [], travel: [], size }
  const { plan, data } = finished
  return { ...thrusterPlots({ section, nozzle: plan.nozzle, water: data.water, thruster, units: shown }), size }
}

export function thrustExportItems(
  plan: Plan,
  finished: Finished | null,
  sized: FinishedSizing | null,
  map: ThrustMapModel | null,
  units: Units,
): readonly ExportItem[] {
  const stem = exportStem(plan)
  const items: ExportItem[] = []
  if (map !== null)
    items.push({
      id: map.id,
      title: `Map: ${map.title.charAt(0).toLowerCase()}${map.title.slice(1)}`,
      what: 'colours, contours, limits and candidates as shown; every place in the CSV',
      formats: [
        { kind: 'svg', name: `${stem}-map.svg`, make: async () => thrustMapToSvg(map, MAP_SIZE) },
        { kind: 'png', name: `${stem}-map.png`, make: () => svgToPng(thrustMapToSvg(map, MAP_SIZE), MAP_SIZE) },
        { kind: 'csv', name: `${stem}-map.csv`, make: async () => thrustMapToCsv(map) },
      ],
    })
  if (sized !== null && sized.sizing.candidates.length > 0)
    items.push({
      id: 'candidates',
      title: 'Candidates',
      what: 'the designs of the sizing, best first; SI units',
      formats: [{ kind: 'csv', name: `${stem}-candidates.csv`, make: async () => candidatesCsv(sized) }],
    })
  const { cycle, travel, size } = plotsOfThrust(finished, sized, units)
  for (const model of [...cycle, ...travel, ...size]) {
    const name = `${stem}-${model.id}`
    items.push({
      id: model.id,
      title: model.title,
      what: `plot against ${model.x.title.toLowerCase()}, in the units shown`,
      formats: [
        { kind: 'svg', name: `${name}.svg`, make: async () => plotToSvg(model, PLOT_SIZE) },
        { kind: 'png', name: `${name}.png`, make: () => plotToPng(model, FONT) },
        { kind: 'csv', name: `${name}.csv`, make: async () => plotToCsv(model) },
      ],
    })
  }
  return items
}

const SI = { power: 'W', force: 'N', length: 'm', frequency: 'Hz', volume: 'm³' }

function candidatesCsv({ plan, sizing }: FinishedSizing): string {
  const headings = { ...candidateHeadings({ ...shownUnits({}), ...SI }), overall: 'Overall efficiency' }
  const rows = candidateRows(sizing.candidates, shownUnits({}), plan.nozzle)
  return writeCsv(
    [...CANDIDATE_COLUMNS.map((column) => headings[column]), 'Held back by'],
    rows.map(({ values, note }) => [...CANDIDATE_COLUMNS.map((column) => values[column]), note]),
  )
}
