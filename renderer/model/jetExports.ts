/** What of a computed starting jet can be taken out as a file. */
import { jetTable, type Plan } from '../../core/plan'
import { formatNumber } from '../../core/quantity'
import { jetPlots, jetSceneToSvg, plotToCsv, plotToSvg, type JetSceneModel, type PlotModel } from '../../core/report'
import { plotToPng } from '../plots/plotImage'
import { exportStem, type ExportItem } from './exports'
import type { FinishedJet } from './jetJob'
import type { Units } from './units'

const PLOT_SIZE = { width: 640, height: 400, theme: 'print' } as const
const SECTION_SIZE = { width: 960, height: 480, theme: 'light' } as const
const FONT = 'system-ui, sans-serif'

/** The plots of a jet, the same on the page and in files. */
export function plotsOf(finished: FinishedJet, { timeline }: JetSceneModel, units: Units): readonly PlotModel[] {
  return jetPlots(finished.jet.own.shown, {
    pulse: finished.pulse,
    density: finished.data.water.density,
    timeline,
    formation: finished.jet.formation,
    units,
  })
}

/** @param index number of the shape shown */
export function jetExportItems(
  plan: Plan,
  finished: FinishedJet,
  model: JetSceneModel,
  index: number,
  units: Units,
): readonly ExportItem[] {
  const stem = exportStem(plan)
  const time = `${formatNumber(model.shapes[index]?.time ?? 0, 4)} s`
  return [
    {
      id: 'jet',
      title: 'Starting jet over time',
      what: 'circulation, ring, impulse, energy of the computed jet; SI units',
      formats: [{ kind: 'csv', name: `${stem}-jet.csv`, make: async () => jetTable(finished.jet) }],
    },
    {
      id: 'jet-section',
      title: `Section of the jet at ${time}`,
      what: 'the sheet as computed, to scale',
      formats: [
        {
          kind: 'svg',
          name: `${stem}-jet-at-${time}.svg`,
          make: async () => jetSceneToSvg(model, index, SECTION_SIZE),
        },
      ],
    },
    ...plotsOf(finished, model, units).map((plot): ExportItem => {
      const name = `${stem}-${plot.id}`
      return {
        id: plot.id,
        title: plot.title,
        what: 'plot against formation time, in the units shown',
        formats: [
          { kind: 'svg', name: `${name}.svg`, make: async () => plotToSvg(plot, PLOT_SIZE) },
          { kind: 'png', name: `${name}.png`, make: () => plotToPng(plot, FONT) },
          { kind: 'csv', name: `${name}.csv`, make: async () => plotToCsv(plot) },
        ],
      }
    }),
  ]
}
