/** The spread over stated deviations, and what a sweep ran over, in print. */
import { quantityDefinition, unitKeyOf, type SpreadBand, type SpreadQuantity, type UnitKey } from '../../plan'
import { fromBase } from '../../quantity'
import type { DocumentBlock } from '../document/types'
import type { PlotModel, PlotSeries } from '../types'
import { plotFigures } from './figures'
import { pathInWords } from './inputRows'
import { NONE, percent, type Show } from './show'
import type { RecordContext } from './types'

/** Group of a summary quantity by its SI unit and its place. */
function keyOf({ path, unit }: SpreadQuantity): UnitKey {
  if (path.endsWith('ring.speed') || /arrivals\.\d+\.speed$/u.test(path)) return 'ringSpeed'
  if (path === 'thruster.speed') return 'vehicleSpeed'
  if (/arrivals\.\d+\.time$/u.test(path)) return 'wakeTime'
  return UNIT_KEYS_OF[unit] ?? 'number'
}

const UNIT_KEYS_OF: Readonly<Record<string, UnitKey>> = {
  s: 'time',
  m: 'length',
  'm/s': 'speed',
  'm2/s': 'circulation',
  'N s': 'impulse',
  J: 'energy',
  N: 'force',
  W: 'power',
}

const WORDS: Readonly<Record<string, string>> = {
  'pulse.strokeRatio': 'Stroke over exit diameter',
  'pulse.duration': 'Duration of the stroke',
  'pulse.dimensionlessEnergy': 'Dimensionless energy',
  'pulse.formationNumber.adopted': 'Formation number, adopted',
  'pulse.total.circulation': 'Circulation of the pulse',
  'pulse.total.impulse': 'Impulse of the pulse',
  'pulse.total.energy': 'Energy of the pulse',
  'pulse.ring.circulation': 'Ring circulation',
  'pulse.ring.impulse': 'Ring impulse',
  'pulse.ring.radius': 'Ring radius',
  'pulse.ring.coreRatio': 'Core over ring radius',
  'pulse.ring.speed': 'Ring speed',
  'pulse.ring.reynolds': 'Ring Reynolds number',
  'thruster.meanThrust': 'Mean thrust',
  'thruster.peakThrust': 'Peak thrust',
  'thruster.power.total': 'Total power',
  'thruster.speed': 'Speed of the vehicle',
  'thruster.froudeEfficiency': 'Froude efficiency',
  'thruster.overallEfficiency': 'Overall efficiency',
}

function wordsOf(path: string, stations: readonly string[]): string {
  const arrival = /^tankRun\.arrivals\.(\d+)\.(time|speed|radius)$/u.exec(path)
  if (arrival === null) return WORDS[path] ?? pathInWords(path)
  const what = { time: 'Arrival', speed: 'Ring speed', radius: 'Ring radius' }[arrival[2] ?? '']
  return `${what ?? path} at ${stations[Number(arrival[1])] ?? 'the station'}`
}

export function spreadBlocks({ plan, data, show }: RecordContext): readonly DocumentBlock[] {
  const { spread } = data
  if (spread === null) return []
  const stations = (plan.tankRun?.stations ?? []).map((station) => show.result(station, 'length'))
  return [
    { kind: 'subheading', text: 'Spread' },
    {
      kind: 'paragraph',
      tone: spread.status === 'done' ? 'small' : 'limit',
      text: `${spread.used} of ${spread.samples} samples used, seed ${spread.seed}.${spread.status === 'done' && spread.refused === 0 ? '' : ` ${spread.message}`} Percentiles over the deviations among the inputs.`,
    },
    {
      kind: 'table',
      caption: null,
      columns: [
        { title: 'Figure' },
        { title: '5 to 95 %', numeric: true },
        { title: 'Median', numeric: true },
        { title: 'Mean', numeric: true },
        { title: 'Deviation over mean', numeric: true },
        { title: 'Plan as it stands', numeric: true },
      ],
      rows: spread.quantities.map((quantity) => {
        const key = keyOf(quantity)
        const { path, mean, standardDeviation, p05, p50, p95, nominal } = quantity
        return [
          wordsOf(path, stations),
          show.range(p05, p95, key),
          show.result(p50, key),
          show.result(mean, key),
          mean === null || standardDeviation === null || mean === 0
            ? NONE
            : percent(Math.abs(standardDeviation / mean)),
          show.result(nominal, key),
        ]
      }),
    },
    ...(spread.circulation === null || !isWide(spread.circulation)
      ? []
      : plotFigures([bandPlot(spread.circulation, show)])),
  ]
}

/** Width over height from which a band can be seen in print. */
const SEEN = 0.03

function isWide({ p05, p95, nominal }: SpreadBand): boolean {
  const most = Math.max(...nominal)
  return p95.some((high, i) => high - (p05[i] ?? high) > SEEN * most)
}

/** Circulation of the slug with its percentiles. */
function bandPlot({ x, nominal, p05, p95 }: SpreadBand, show: Show): PlotModel {
  const unit = show.unit('circulation', nominal)
  const series = (
    id: string,
    name: string,
    values: readonly number[],
    look: Pick<PlotSeries, 'role' | 'line'>,
  ): PlotSeries => ({
    id,
    name,
    x,
    y: values.map((value) => (Number.isFinite(value) ? fromBase(value, unit) : null)),
    filled: false,
    ...look,
  })
  return {
    id: 'spread-circulation',
    title: 'Circulation of the slug, 5 to 95 %',
    x: { title: 'Formation time', unit: '', min: 0 },
    y: { title: 'Circulation', unit, min: 0 },
    series: [
      series('plan', 'plan', nominal, { role: 'primary', line: 'solid' }),
      { ...series('p95', '95 %', p95, { role: 'secondary', line: 'dashed' }), fillTo: 'p05' },
      series('p05', '5 %', p05, { role: 'secondary', line: 'dotted' }),
    ],
    bands: [],
    lines: [],
  }
}

/** A sweep is a table of its own: what it ran over, and where its rows are. */
export function sweepBlocks({ plan, data, show }: RecordContext): readonly DocumentBlock[] {
  const { sweep } = data
  if (sweep === null) return []
  const fields = (plan.sweep?.fields ?? []).map(({ path, values }) => {
    const definition = quantityDefinition(path)
    const key = definition === null ? 'number' : unitKeyOf(path, definition.dimension)
    return `${pathInWords(path)}, ${show.range(Math.min(...values), Math.max(...values), key)} in ${values.length}`
  })
  return [
    { kind: 'subheading', text: 'Sweep' },
    {
      kind: 'paragraph',
      text: `${sweep.total} rows over ${fields.join('; ')}. The rows stand in sweep.csv beside this record.`,
    },
  ]
}
