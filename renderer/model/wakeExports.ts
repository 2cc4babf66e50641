/** What of a wake can be taken out as a file. */
import { at } from '../../core/base'
import { eventTable, trajectoryTable, wakeFile, type Plan } from '../../core/plan'
import { formatNumber } from '../../core/quantity'
import { plotToCsv, plotToSvg, wakePlots } from '../../core/report'
import { plotToPng } from '../plots/plotImage'
import { exportStem, type ExportItem } from './exports'
import type { Units } from './units'
import type { FinishedWake } from './wakeJob'

const PLOT_SIZE = { width: 640, height: 400, theme: 'print' } as const
const FONT = 'system-ui, sans-serif'

/** What is on the screen: the output shown, and the scene at that time as glTF where there is one. */
export interface WakeView {
  readonly index: number
  readonly toGltf: (() => Promise<string | null>) | null
}

/** @param view null where the wake is not on the screen: the rings are then those at the last time */
export function wakeExportItems(
  plan: Plan,
  finished: FinishedWake,
  view: WakeView | null,
  units: Units,
): readonly ExportItem[] {
  const { wake, data } = finished
  const stem = exportStem(plan)
  const march = wake.wake
  const index = Math.min(view?.index ?? Infinity, march.outputTimes.length - 1)
  const time = `${formatNumber(at(march.outputTimes, index), 5)} s`
  // No space in the name of a file.
  const inName = time.replace(' ', '')
  const toGltf = view?.toGltf ?? null
  const items: ExportItem[] = [
    {
      id: 'trajectory',
      title: 'Trajectories',
      what: 'every ring at every output time; SI units',
      formats: [{ kind: 'csv', name: `${stem}-trajectory.csv`, make: async () => trajectoryTable(march) }],
    },
    {
      id: 'events',
      title: 'Events',
      what: 'passes, arrivals, cores that touch, walls; SI units',
      formats: [{ kind: 'csv', name: `${stem}-events.csv`, make: async () => eventTable(march) }],
    },
    {
      id: 'rings',
      title: `Rings at ${time}`,
      what: 'closed curves with circulation, core radius and speed; SI units',
      formats: [
        { kind: 'vtp', name: `${stem}-rings-at-${inName}.vtp`, make: async () => wakeFile(march, index) },
        ...(toGltf === null ? [] : [{ kind: 'gltf' as const, name: `${stem}-rings-at-${inName}.gltf`, make: toGltf }]),
      ],
    },
  ]
  const options = {
    units: { length: units.length, time: units.wakeTime, impulse: units.impulse },
    density: data.water.density,
    duration: march.time,
    selected: null,
  }
  for (const model of wakePlots(march, wake.rings, options)) {
    const name = `${stem}-${model.id}`
    items.push({
      id: model.id,
      title: model.title,
      what: 'plot against time, in the units shown',
      formats: [
        { kind: 'svg', name: `${name}.svg`, make: async () => plotToSvg(model, PLOT_SIZE) },
        { kind: 'png', name: `${name}.png`, make: () => plotToPng(model, FONT) },
        { kind: 'csv', name: `${name}.csv`, make: async () => plotToCsv(model) },
      ],
    })
  }
  return items
}
