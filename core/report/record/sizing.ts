/** The sizing in print: candidates side by side, what binds them, the front of power against size. */
import type { Candidate, CandidatePoint, SizingResult } from '../../thruster'
import type { DocumentBlock } from '../document/types'
import type { UnitKey } from '../../plan'
import type { PlotModel } from '../types'
import { fromBase } from '../../quantity'
import { plotFigures } from './figures'
import { NONE, percent, plain, tableOf, type Show, type ShownColumn } from './show'
import type { RecordContext } from './types'

/** Points of the front that are printed as rows. */
const FRONT_ROWS = 12

export function sizingBlocks({ show }: RecordContext, sizing: SizingResult): readonly DocumentBlock[] {
  const shown =
    sizing.candidates.length > 0 ? sizing.candidates : sizing.nearest === null ? [] : [sizing.nearest.candidate]
  const found = sizing.candidates.length > 0
  const goal = sizing.goal === 'power' ? 'least power' : 'most thrust'
  return [
    { kind: 'subheading', text: 'Sizing' },
    {
      kind: 'paragraph',
      tone: sizing.status === 'done' && found ? 'small' : 'limit',
      text: `${sizing.message} Looked for: ${goal}.`,
    },
    ...(shown.length === 0 ? [] : [candidateTable(shown, found, show), pointTable(shown, show)]),
    ...frontBlocks(sizing, show),
  ]
}

/** Candidates as columns: what differs stands in one line. */
function candidateTable(candidates: readonly Candidate[], found: boolean, show: Show): DocumentBlock {
  const line = (name: string, read: (one: Candidate) => string): string[] => [name, ...candidates.map(read)]
  return {
    kind: 'table',
    caption: found ? 'Candidates, best first' : 'The design nearest to holding every limit; it breaks at least one',
    columns: [{ title: '' }, ...candidates.map((_, i) => ({ title: found ? `No. ${i + 1}` : 'Nearest' }))],
    rows: [
      line('Power', ({ power }) => show.result(power, 'power')),
      line('Thrust at the first duty point', ({ thrust }) => show.result(thrust, 'force')),
      line('Thrust range there', ({ points }) =>
        show.range(points[0]?.thrustRange[0], points[0]?.thrustRange[1], 'force'),
      ),
      line('Thrusters', ({ design }) => String(design.count)),
      line('Exit diameter', ({ design }) => show.result(design.diameter, 'length')),
      line('Piston diameter', ({ pistonDiameter }) => show.result(pistonDiameter, 'length')),
      line('Stroke ratio', ({ design }) => plain(design.strokeRatio)),
      line('Stroke', ({ stroke }) => show.result(stroke, 'length')),
      line('Plunger travel', ({ plungerTravel }) => show.result(plungerTravel, 'length')),
      line('Eject share', ({ design }) => percent(design.ejectShare)),
      line('Swept volume, all', ({ sweptVolume }) => show.result(sweptVolume, 'volume')),
      line('Binds', ({ binding }) =>
        binding === null ? 'no limit' : `${binding.name}, room ${percent(binding.slack)}`,
      ),
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

function pointTable(candidates: readonly Candidate[], show: Show): DocumentBlock {
  const points = candidates.flatMap((candidate, i) =>
    candidate.points.map((point) => ({ ...point, name: String(i + 1) })),
  )
  const ranges = (
    title: string,
    key: UnitKey,
    read: (point: CandidatePoint) => readonly [number, number] | null,
  ): ShownColumn => ({
    column: { title, numeric: true },
    cells: points.map((point) => {
      const ends = read(point)
      return ends === null || ends[0] === ends[1] ? NONE : show.range(ends[0], ends[1], key)
    }),
  })
  const numbers = (title: string, key: UnitKey, read: (point: CandidatePoint) => number | null): ShownColumn =>
    show.column(title, key, points.map(read))
  const percents = (value: number | null): number | null => (value === null ? null : 100 * value)
  return tableOf(
    'The same designs at their duty points. Scatter: two standard deviations of manufacture. Stroke left: before pinch-off in exit diameters, in the stream of the vehicle’s speed',
    { title: 'No.', cells: points.map(({ name }) => name) },
    [
      numbers('Speed', 'vehicleSpeed', ({ speed }) => speed),
      ranges('Thrust range', 'force', ({ thrustRange }) => thrustRange),
      numbers('Thrust', 'force', ({ thrust }) => thrust),
      ranges('Scatter', 'force', ({ spread }) => [spread.low, spread.high]),
      numbers('Frequency', 'frequency', ({ frequency }) => frequency),
      numbers('Power', 'power', ({ power }) => power.total),
      numbers('Froude eff. (%)', 'number', ({ froudeEfficiency }) => percents(froudeEfficiency)),
      numbers('Overall eff. (%)', 'number', ({ overallEfficiency }) => percents(overallEfficiency)),
      ranges('Stroke left', 'number', ({ formationMargin }) =>
        formationMargin === null ? null : [formationMargin.low, formationMargin.high],
      ),
    ],
  )
}

function frontBlocks({ front, goal }: SizingResult, show: Show): DocumentBlock[] {
  if (front.length < 2) return []
  const step = Math.max(1, Math.ceil(front.length / FRONT_ROWS))
  const rows = front.filter((_, i) => i % step === 0 || i === front.length - 1)
  const model = frontPlot(front, goal, show)
  return [
    ...plotFigures([model]),
    tableOf(
      `Front of ${goal === 'power' ? 'power' : 'thrust'} against size${rows.length < front.length ? `: ${rows.length} of ${front.length} designs` : ''}`,
      { title: 'Thrusters', cells: rows.map(({ design }) => String(design.count)) },
      [
        show.column(
          'Swept volume',
          'volume',
          rows.map((row) => row.sweptVolume),
        ),
        show.column(
          'Power',
          'power',
          rows.map((row) => row.power),
        ),
        show.column(
          'Thrust',
          'force',
          rows.map((row) => row.thrust),
        ),
        show.column(
          'Exit diameter',
          'length',
          rows.map(({ design }) => design.diameter),
        ),
        show.column(
          'Stroke ratio',
          'number',
          rows.map(({ design }) => design.strokeRatio),
        ),
        show.column(
          'Frequency, least',
          'frequency',
          rows.map(({ frequencies }) => Math.min(...frequencies)),
        ),
        show.column(
          'largest',
          'frequency',
          rows.map(({ frequencies }) => Math.max(...frequencies)),
        ),
      ],
    ),
  ]
}

function frontPlot(front: SizingResult['front'], goal: SizingResult['goal'], show: Show): PlotModel {
  const volume = show.unit(
    'volume',
    front.map(({ sweptVolume }) => sweptVolume),
  )
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
