/**
 * What can be taken out of the window as a file, and how each is made.
 */
import type { ExportKind } from '../../app/contract'
import { planFileName, pulseTable, type Plan } from '../../core/plan'
import { plotToCsv, plotToSvg, pulsePlots } from '../../core/report'
import type { RunData } from '../../core/run'
import { plotToPng } from '../plots/plotImage'
import type { Units } from './units'

export interface ExportItem {
  readonly id: string
  readonly title: string
  readonly what: string
  readonly formats: readonly ExportFormat[]
}

export interface ExportFormat {
  readonly kind: ExportKind
  readonly name: string
  readonly make: () => Promise<string | Uint8Array | null>
}

/** Plots leave the window on white, at a size that fills a page's column. */
const PLOT_SIZE = { width: 640, height: 400, theme: 'print' } as const
const FONT = 'system-ui, sans-serif'

/** Stem of every exported file's name, from the plan's title. */
export function exportStem(plan: Plan): string {
  return planFileName(plan.title).replace(/\.ringwright\.json$/u, '')
}

/** @param picture takes the picture of the scene; null where none is shown */
export function exportItems(
  plan: Plan,
  data: RunData,
  units: Units,
  picture: (() => Promise<Uint8Array | null>) | null,
): readonly ExportItem[] {
  const { pulse } = data
  const stem = exportStem(plan)
  const items: ExportItem[] = []
  if (pulse === null) return items
  items.push({
    id: 'pulse',
    title: 'Pulse over time',
    what: 'exit speed, formation time, circulation, impulse, energy; SI units',
    formats: [{ kind: 'csv', name: `${stem}-pulse.csv`, make: async () => pulseTable(pulse) }],
  })
  for (const model of pulsePlots(pulse, units)) {
    const name = `${stem}-${model.id}`
    items.push({
      id: model.id,
      title: model.title,
      what: 'plot against formation time, in the units shown',
      formats: [
        { kind: 'svg', name: `${name}.svg`, make: async () => plotToSvg(model, PLOT_SIZE) },
        { kind: 'png', name: `${name}.png`, make: () => plotToPng(model, FONT) },
        { kind: 'csv', name: `${name}.csv`, make: async () => plotToCsv(model) },
      ],
    })
  }
  if (picture !== null)
    items.push({
      id: 'picture',
      title: 'Picture',
      what: 'the drawing as it is seen now',
      formats: [{ kind: 'png', name: `${stem}-picture.png`, make: picture }],
    })
  return items
}
