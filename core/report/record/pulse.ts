/** One pulse in print: the ring with its range, every estimate of the formation number, what trails. */
import type { PulseResult, PulseRing } from '../../pulse'
import type { DocumentBlock } from '../document/types'
import { adoptedBasisInWords } from '../explanations'
import { pulsePlots } from '../pulsePlots'
import { pulseScene } from '../pulseScene'
import { sceneToSvg } from '../sceneSvg'
import { FULL, plotFigures } from './figures'
import { NONE, percent, plain, type Show } from './show'
import type { RecordContext } from './types'

/** Ends of the range of the ring: the slug alone and, for a quick start, with its over-pressure. */
export function ringEnds(pulse: PulseResult): readonly PulseRing[] {
  return [pulse.ringFromSlug ?? pulse.ring, pulse.ringWithOverPressure].filter((ring) => ring !== null)
}

/** One line of figures: name, range, adopted value, what the range stands for. */
export type FigureRow = readonly [name: string, range: string, adopted: string, basis: string]

/** Lowest and highest; null where there are none. */
function endsOf(values: readonly number[]): readonly [number | null, number | null] {
  return values.length === 0 ? [null, null] : [Math.min(...values), Math.max(...values)]
}

const RING_ROWS = [
  ['Ring circulation', 'circulation', 'circulation'],
  ['Ring speed', 'speed', 'ringSpeed'],
  ['Ring radius', 'radius', 'length'],
  ['Mean core radius', 'meanCoreRadius', 'length'],
  ['Core over ring radius', 'coreRatio', 'number'],
  ['Ring impulse', 'impulse', 'impulse'],
  ['Ring energy', 'energy', 'energy'],
  ['Ring Reynolds number', 'reynolds', 'number'],
  ['Volume carried along', 'carriedVolume', 'volume'],
] as const

/** Rows of the ring, range first and adopted value second. */
export function ringFigures(pulse: PulseResult, show: Show): readonly FigureRow[] {
  const ends = ringEnds(pulse)
  const basis =
    pulse.ringWithOverPressure === null
      ? 'one value: the start is too slow for over-pressure'
      : 'slug, to slug with quick start'
  return RING_ROWS.map(([name, key, unit]): FigureRow => {
    const [low, high] = endsOf(ends.map((ring) => ring[key]))
    return [name, low === high ? NONE : show.range(low, high, unit), show.result(pulse.ring?.[key], unit), basis]
  })
}

/** Rows of the formation number and the stroke left before it. */
export function formationFigures({ plan, show }: RecordContext, pulse: PulseResult): readonly FigureRow[] {
  const { low, high, adopted } = pulse.formationNumber
  const basis = adoptedBasisInWords(plan).formationNumber
  const margin = pulse.margin
  return [
    [
      'Formation number',
      show.range(low, high, 'number'),
      plain(adopted),
      `published band and estimates; ${basis} adopted`,
    ],
    [
      'Stroke left before pinch-off (D)',
      margin === null ? NONE : show.range(margin.low, margin.high, 'number'),
      plain(margin?.adopted),
      'every estimate that has a value, and the published band',
    ],
  ]
}

export function figureTable(caption: string | null, rows: readonly FigureRow[]): DocumentBlock {
  return {
    kind: 'table',
    caption,
    columns: [
      { title: 'Figure' },
      { title: 'Range', numeric: true },
      { title: 'Adopted', numeric: true },
      { title: 'What the range stands for' },
    ],
    rows,
  }
}

export function pulseDrawing({ plan, show }: RecordContext, pulse: PulseResult): DocumentBlock {
  const scene = pulseScene(pulse, plan.nozzle, {
    length: show.unit('length', [plan.nozzle.diameter]),
    speed: show.unit('ringSpeed', [pulse.ring?.speed]),
    exitSpeed: show.unit('speed', [pulse.peakSpeed]),
  })
  return {
    kind: 'figure',
    svg: sceneToSvg(scene, { width: FULL, height: 250, theme: 'print' }),
    caption: `Nozzle, slug and ring to one scale. ${scene.conventions.join(' ')}`,
  }
}

export function pulseBlocks(context: RecordContext): readonly DocumentBlock[] {
  const { data, show } = context
  const { pulse } = data
  if (pulse === null) return []
  const { total, slug, overPressure, trailingJet } = pulse
  const sums = [
    ['Circulation', 'circulation', 'circulation'],
    ['Impulse', 'impulse', 'impulse'],
    ['Energy', 'energy', 'energy'],
  ] as const
  return [
    { kind: 'subheading', text: 'One pulse' },
    {
      kind: 'pairs',
      rows: [
        ['Stroke over exit diameter L/D', plain(pulse.strokeRatio)],
        ['Duration', show.result(pulse.duration, 'time')],
        ['Peak exit speed', show.result(pulse.peakSpeed, 'speed')],
        ['Mean exit speed', show.result(pulse.meanSpeed, 'speed')],
        ['Piston travel', show.result(pulse.pistonTravel, 'length')],
        ['Peak piston speed', show.result(pulse.pistonPeakSpeed, 'speed')],
        ['Jet Reynolds number', plain(pulse.jetReynolds)],
        ['Start, in formation times', `${plain(pulse.startFormationTime)}, ${pulse.quickStart ? 'quick' : 'slow'}`],
        ['Dimensionless energy of the slug', plain(pulse.dimensionlessEnergy)],
        ['Core pressure drop', show.result(pulse.corePressureDrop, 'corePressure')],
        ['Most unstable waves round the ring', plain(pulse.unstableWaveNumber)],
        ['Limiting circulation', plain(pulse.limitingCirculation)],
      ],
    },
    pulse.ring === null
      ? { kind: 'paragraph', tone: 'limit', text: 'No ring is expected from this pulse.' }
      : ringTable(pulse, show),
    {
      kind: 'table',
      caption: 'Sums over the whole pulse',
      columns: [
        { title: 'Sum' },
        { title: 'Slug', numeric: true },
        { title: 'Quick-start terms', numeric: true },
        { title: 'Adopted total', numeric: true },
        { title: 'Trails behind the ring', numeric: true },
        { title: 'Share that trails', numeric: true },
      ],
      rows: sums.map(([name, key, unit]) => [
        name,
        show.result(slug[key], unit),
        show.result(overPressure[key], unit),
        show.result(total[key], unit),
        show.result(trailingJet[key], unit),
        percent(trailingJet[key] / total[key]),
      ]),
    },
    estimates(context, pulse),
    ...plotFigures(
      pulsePlots(pulse, {
        speed: show.unit('speed', [pulse.peakSpeed]),
        circulation: show.unit('circulation', [pulse.total.circulation]),
      }),
    ),
  ]
}

function ringTable(pulse: PulseResult, show: Show): DocumentBlock {
  const rows = ringFigures(pulse, show)
  return {
    kind: 'table',
    caption: `The ring, matched by: ${pulse.ring?.model ?? NONE}. Range: ${rows[0]?.[3] ?? NONE}`,
    columns: [{ title: 'Figure' }, { title: 'Range', numeric: true }, { title: 'Adopted', numeric: true }],
    rows: rows.map(([name, range, adopted]) => [name, range, adopted]),
  }
}

const ESTIMATES = [
  ['energyLimit', 'Energy limit'],
  ['carriedVolume', 'Carried volume'],
  ['speedMatch', 'Speed match'],
  ['computed', 'Computed jet'],
  ['published', 'Published band'],
] as const

/** Every estimate, also those without a value and why. */
function estimates({ plan }: RecordContext, pulse: PulseResult): DocumentBlock {
  const numbers = pulse.formationNumber
  const noteOf = (key: string): string =>
    numbers.notes
      .filter(({ estimate }) => estimate === key)
      .map(({ text }) => text)
      .join(' ')
  const rows = ESTIMATES.map(([key, name]): string[] => {
    const value = numbers[key]
    const text = typeof value === 'number' || value === null ? plain(value) : `${plain(value[0])} to ${plain(value[1])}`
    const before = key === 'published' ? null : numbers.unmodified[key]
    return [
      plan.models.formationNumber === key ? `${name}, adopted` : name,
      text,
      key === 'published' ? NONE : plain(before),
      key === 'computed' && value === null && noteOf(key) === ''
        ? 'the starting jet is not computed here'
        : noteOf(key),
    ]
  })
  return {
    kind: 'table',
    caption: 'Formation number: every estimate, each raw, none clipped into the published band',
    columns: [
      { title: 'Estimate' },
      { title: 'Value', numeric: true },
      { title: 'Before modifiers', numeric: true },
      { title: 'Note' },
    ],
    rows,
    flows: true,
  }
}
