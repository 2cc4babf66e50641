/** What of a tank run can be taken out as a file. */
import {
  arrivalsTable,
  profileReadFirst,
  profileTable,
  runMatrixTable,
  triggerTableText,
  type Plan,
} from '../../core/plan'
import { drawingColours, pistonPlots, plotToCsv, plotToSvg, tankPlots, tankSceneToSvg } from '../../core/report'
import { plotToPng } from '../plots/plotImage'
import { svgToPng } from '../plots/svgImage'
import { exportStem, type ExportItem } from './exports'
import type { Tank } from './tank'
import type { Units } from './units'

const PLOT_SIZE = { width: 640, height: 400, theme: 'print' } as const
const DRAWING_SIZE = { width: 900, height: 520 } as const
const FONT = 'system-ui, sans-serif'

/** Empty where no run is planned. */
export function tankExportItems(
  plan: Plan,
  { planned, scene, spread, part }: Tank,
  units: Units,
): readonly ExportItem[] {
  const [held, drawn] = [planned.value, scene.value]
  if (held === null || drawn === null) return []
  const { result, cautions } = held
  const stem = `${exportStem(plan)}-`
  const table = (id: string, title: string, what: string, text: () => string): ExportItem => ({
    id,
    title,
    what,
    formats: [{ kind: 'csv', name: `${stem}${id}.csv`, make: async () => text() }],
  })
  const { matrix } = result
  const drawing = (): string =>
    tankSceneToSvg(drawn, { ...DRAWING_SIZE, colours: drawingColours('print'), part: part.value, id: 'tank' })
  return [
    {
      id: 'profile',
      title: 'Piston profile',
      what: 'every step of the controller, and what to read before a machine moves by it; SI units',
      formats: [
        {
          kind: 'txt',
          name: `${stem}profile-read-first.txt`,
          make: async () => profileReadFirst(result.profile, cautions),
        },
        { kind: 'csv', name: `${stem}profile.csv`, make: async () => profileTable(result.profile) },
      ],
    },
    ...(matrix === null
      ? []
      : [table('run-matrix', 'Run matrix', 'one row a run, in the order of the day', () => runMatrixTable(matrix))]),
    table('arrivals', 'Arrivals', 'when and how fast the ring comes by each station; SI units', () =>
      arrivalsTable(result.arrivals),
    ),
    table('triggers', 'Triggers', 'when each device acts; SI units', () => triggerTableText(result.triggers)),
    {
      id: 'tank-drawing',
      title: 'Drawing of the tank',
      what: 'from above and from the side, to scale',
      formats: [
        { kind: 'svg', name: `${stem}tank.svg`, make: async () => drawing() },
        { kind: 'png', name: `${stem}tank.png`, make: () => svgToPng(drawing(), DRAWING_SIZE) },
      ],
    },
    ...[...tankPlots(result, units, spread.value?.position ?? null), ...pistonPlots(result.profile, units)].map(
      (model): ExportItem => ({
        id: model.id,
        title: model.title,
        what: 'plot, in the units shown',
        formats: [
          { kind: 'svg', name: `${stem}${model.id}.svg`, make: async () => plotToSvg(model, PLOT_SIZE) },
          { kind: 'png', name: `${stem}${model.id}.png`, make: () => plotToPng(model, FONT) },
          { kind: 'csv', name: `${stem}${model.id}.csv`, make: async () => plotToCsv(model) },
        ],
      }),
    ),
  ]
}
