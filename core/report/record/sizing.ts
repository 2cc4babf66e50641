/** The sizing in print: candidates side by side, what binds them, the front of power against size. */
import type { Candidate, SizingResult } from '../../thruster'
import type { DocumentBlock } from '../document/types'
import type { PlotModel } from '../types'
import { fromBase } from '../../quantity'
import { plotFigures } from './figures'
import { NONE, percent, plain, type Show } from './show'
import type { RecordContext } from './types'

/** Points of the front that are printed as rows. */
const FRONT_ROWS = 12

export function sizingBlocks({ show }: RecordContext, sizing: SizingResult): readonly DocumentBlock[] {
  const shown = sizing.candidates.length > 0 ? sizing.candidates : sizing.nearest === null ? [] : [sizing.nearest.candidate]
  const found = sizing.candidates.length > 0
  const goal = sizing.goal === 'power' ? 'least power' : 'most thrust'
  return [
    { kind: 'subheading', text: 'Sizing' },
    { kind: 'paragraph', tone: sizing.status === 'done' && found ? 'small' : 'limit', text: `${sizing.message} Looked for: ${goal}.` },
    ...(shown.length === 0 ? [] : [candidateTable(shown, found, show), ...shown.map((one, i) => pointTable(one, found ? String(i + 1) : 'nearest', show))]),
    ...frontBlocks(sizing, show),
  ]
}

/** Candidates as columns: what differs stands in one line. */
function candidateTable(candidates: readonly Candidate[], found: boolean, show: Show): DocumentBlock {
  const line = (name: string, read: (one: Candidate) => string): string[] => [name, ...candidates.map(read)]
  return {
    kind: 'table',
    caption: found ? 'Candidates, best first' : 'The design nearest to holding every limit; it breaks at least one',
    columns: [{ title: '' }, ...candidates.map((_, i) => ({ title: found ? `No. ${i + 1}` : 'Nearest', numeric: true }))],
    rows: [
      line('Power', ({ power }) => show.result(power, 'power')),
      line('Thrust at the first duty point', ({ thrust }) => show.result(thrust, 'force')),
      line('Thrust range there', ({ points }) => show.range(points[0]?.thrustRange[0], points[0]?.thrustRange[1], 'force')),
      line('Thrusters', ({ design }) => String(design.count)),
      line('Exit diameter', ({ design }) => show.result(design.diameter, 'length')),
      line('Piston diameter', ({ pistonDiameter }) => show.result(pistonDiameter, 'length')),
      line('Stroke ratio', ({ design }) => plain(design.strokeRatio)),
      line('Stroke', ({ stroke }) => show.result(stroke, 'length')),
      line('Plunger travel', ({ plungerTravel }) => show.result(plungerTravel, 'length')),
      line('Eject share', ({ design }) => percent(design.ejectShare)),
      line('Swept volume, all', ({ sweptVolume }) => show.result(sweptVolume, 'volume')),
      line('Binds', ({ binding }) => (binding === null ? 'no limit' : `${binding.name}, room ${percent(binding.slack)}`)),
      line('At the end of its range', ({ rangeEnds }) =>
        rangeEnds.length === 0 ? NONE : rangeEnds.map(({ field, end }) => `${FIELD_WORDS[field]} ${end}`).join(', '),
      ),
      line('Within the spread of', ({ withinSpread }) => (withinSpread.length === 0 ? NONE : withinSpread.join(', '))),
    ],
  }
}

const FIELD_WORDS = {
  diameter: 'diameter',
  strokeRatio: 'stroke ratio',
  count: 'count',
  ejectShare: 'eject share',
  frequency: 'frequency',
} as const

function pointTable({ points }: Candidate, name: string, show: Show): DocumentBlock {
  return {
    kind: 'table',
    caption: `Candidate ${name} at its duty points`,
    columns: ['Speed', 'Thrust asked', 'Thrust', 'Range', 'Scatter as made', 'Frequency', 'Power', 'Froude eff.', 'Overall eff.', 'Stroke left (D)'].map(
      (title) => ({ title, numeric: true }),
    ),
    rows: points.map((point) => [
      show.result(point.speed, 'vehicleSpeed'),
      show.result(point.thrustAsked, 'force'),
      show.result(point.thrust, 'force'),
      show.range(point.thrustRange[0], point.thrustRange[1], 'force'),
      show.range(point.spread.low, point.spread.high, 'force'),
      show.result(point.frequency, 'frequency'),
      show.result(point.power.total, 'power'),
      percent(point.froudeEfficiency),
      percent(point.overallEfficiency),
      point.formationMargin === null ? NONE : show.range(point.formationMargin.low, point.formationMargin.high, 'number'),
    ]),
  }
}

function frontBlocks({ front, goal }: SizingResult, show: Show): DocumentBlock[] {
  if (front.length < 2) return []
  const step = Math.max(1, Math.ceil(front.length / FRONT_ROWS))
  const rows = front.filter((_, i) => i % step === 0 || i === front.length - 1)
  const model = frontPlot(front, goal, show)
  return [
    ...plotFigures([model]),
    {
      kind: 'table',
      caption: `Front of ${goal === 'power' ? 'power' : 'thrust'} against size${rows.length < front.length ? `: ${rows.length} of ${front.length} designs` : ''}`,
      columns: ['Swept volume', 'Power', 'Thrust', 'Thrusters', 'Exit diameter', 'Stroke ratio', 'Frequency'].map((title) => ({ title, numeric: true })),
      rows: rows.map(({ design, sweptVolume, power, thrust, frequencies }) => [
        show.result(sweptVolume, 'volume'),
        show.result(power, 'power'),
        show.result(thrust, 'force'),
        String(design.count),
        show.result(design.diameter, 'length'),
        plain(design.strokeRatio),
        show.range(Math.min(...frequencies), Math.max(...frequencies), 'frequency'),
      ]),
    },
  ]
}

function frontPlot(front: SizingResult['front'], goal: SizingResult['goal'], show: Show): PlotModel {
  const volume = show.unit('volume', front.map(({ sweptVolume }) => sweptVolume))
  const byPower = goal === 'power'
  const values = front.map(({ power, thrust }) => (byPower ? power : thrust))
  const unit = show.unit(byPower ? 'power' : 'force', values)
  const title = byPower ? 'Power' : 'Thrust'
  return {
    id: 'sizing-front',
    title: `${title} against size`,
    x: { title: 'Swept volume of all thrusters', unit: volume, min: 0 },
    y: { title, unit, min: 0 },
    series: [
      {
        id: 'front',
        name: 'best of each size',
        x: front.map(({ sweptVolume }) => fromBase(sweptVolume, volume)),
        y: values.map((value) => fromBase(value, unit)),
        role: 'primary',
        line: 'solid',
        filled: false,
      },
    ],
    bands: [],
    lines: [],
  }
}
