/** Rings in motion in print: where they begin and end, events, arrivals with the range between the ageing laws. */
import { wakeSummary } from '../../filament'
import type { DocumentBlock } from '../document/types'
import { wakePlots } from '../wakePlots'
import { wakeScene } from '../wakeScene'
import { wakeSceneToSvg } from '../wakeSceneSvg'
import { FULL, plotFigures } from './figures'
import { plain, tableOf } from './show'
import type { RecordContext, RecordWake } from './types'

/** Rows of a table that are printed; the whole of it is in the run's own files. */
const MOST_ROWS = 40

const EVENT_WORDS: Readonly<Record<string, string>> = {
  pass: 'pass',
  arrival: 'arrival',
  'cores-touch': 'cores touch',
  'near-wall': 'near a wall',
  'pinch-off': 'pinch-off',
  merge: 'merge',
  end: 'end',
}

export function wakeBlocks(context: RecordContext): readonly DocumentBlock[] {
  const { data, show } = context
  const outcome = data.wake
  if (outcome === null) return []
  const { wake, ageing, turbulent } = outcome
  const ages = turbulent === null ? ageing : 'laminar and turbulent, both shown between them'
  const drifts = [wake.drift.circulation, wake.drift.impulse, wake.drift.energy]
  return [
    { kind: 'subheading', text: 'Wake' },
    ...(wake.status === 'done' ? [] : [{ kind: 'paragraph', tone: 'limit', text: wake.message } as const]),
    {
      kind: 'pairs',
      rows: [
        ['Engine', wake.model === 'coaxial' ? 'rings on one axis' : 'rings in space'],
        ['Ageing', ages],
        ['Followed for', show.result(wake.time, 'wakeTime')],
        [
          'Holds until',
          // Nearer to the start than rounding tells.
          wake.validUntil <= 1e-9 * wake.time ? 'not from the start' : show.result(wake.validUntil, 'wakeTime'),
        ],
        ['Passes', String(wake.events.filter(({ event }) => event === 'pass').length)],
        [
          'Drift of circulation, impulse, energy',
          drifts.every((one) => one === null)
            ? 'none is conserved here'
            : drifts.map((one) => (one === null ? 'not conserved' : plain(one))).join(', '),
        ],
      ],
    },
    { kind: 'paragraph', tone: 'small', text: `${asSentence(wake.modelReason)} ${asSentence(wake.reason)}` },
    ...ringTable(context, outcome),
    ...arrivalTable(context, outcome),
    ...eventTable(context, outcome),
    ...drawings(context, outcome),
  ]
}

function asSentence(clause: string): string {
  const text = clause.charAt(0).toUpperCase() + clause.slice(1)
  return /[.!?]$/u.test(text) ? text : `${text}.`
}

/** Rings as they begin and as they end. */
function ringTable({ show }: RecordContext, { wake, rings }: RecordWake): DocumentBlock[] {
  const ends = wakeSummary(wake).rings
  const shown = ends.slice(0, MOST_ROWS)
  const born = shown.map(({ ring }) => rings[ring - 1])
  const table = tableOf(
    'Rings at the beginning and at the last time',
    { title: 'Ring', cells: shown.map(({ ring }) => String(ring)) },
    [
      show.column(
        'Appears',
        'wakeTime',
        born.map((ring) => ring?.startTime ?? 0),
      ),
      show.column(
        'Circulation',
        'circulation',
        shown.map(({ circulation }) => circulation),
      ),
      show.column(
        'Radius, first',
        'length',
        born.map((ring) => (ring?.curve === undefined ? ring?.radius : null)),
      ),
      show.column(
        'last',
        'length',
        shown.map(({ radius }) => radius),
      ),
      show.column(
        'Core radius, first',
        'length',
        born.map((ring) => ring?.coreRadius),
      ),
      show.column(
        'last',
        'length',
        shown.map(({ coreRadius }) => coreRadius),
      ),
      show.column(
        'Speed, last',
        'ringSpeed',
        shown.map(({ speed }) => speed),
      ),
    ],
  )
  return shown.length === 0 ? [] : [table, ...furtherRows(ends.length, 'rings', 'trajectory.csv')]
}

function furtherRows(count: number, what: string, file: string): DocumentBlock[] {
  if (count <= MOST_ROWS) return []
  return [{ kind: 'paragraph', tone: 'small', text: `${count - MOST_ROWS} further ${what} stand in ${file}.` }]
}

const OPEN_ARRIVALS: DocumentBlock = {
  kind: 'paragraph',
  tone: 'small',
  text: 'Without a latest time: under the other ageing law the ring had not arrived when its run ended, so it arrives at the earliest time or later.',
}

function arrivalTable({ show }: RecordContext, { arrivals }: RecordWake): DocumentBlock[] {
  if (arrivals.length === 0) return []
  const shown = arrivals.slice(0, MOST_ROWS)
  return [
    tableOf(
      'Arrivals, with the range between the ageing laws where both were run',
      { title: 'Ring', cells: shown.map(({ ring }) => String(ring)) },
      [
        show.column(
          'Station',
          'length',
          shown.map(({ station }) => station),
        ),
        show.column(
          'Earliest',
          'wakeTime',
          shown.map(({ timeLow }) => timeLow),
        ),
        show.column(
          'Latest',
          'wakeTime',
          shown.map(({ timeHigh }) => timeHigh),
        ),
        show.column(
          'Adopted',
          'wakeTime',
          shown.map(({ time }) => time),
        ),
      ],
    ),
    ...(shown.some(({ timeHigh }) => timeHigh === null) ? [OPEN_ARRIVALS] : []),
    ...furtherRows(arrivals.length, 'arrivals', 'events.csv'),
  ]
}

function eventTable({ show }: RecordContext, { wake }: RecordWake): DocumentBlock[] {
  const others = wake.events.filter(({ event }) => event !== 'arrival')
  const shown = others.length > MOST_ROWS ? [...others.slice(0, MOST_ROWS - 1), ...others.slice(-1)] : others
  const [time, x] = [
    show.column(
      'Time',
      'wakeTime',
      shown.map((one) => one.time),
    ),
    show.column(
      'x',
      'length',
      shown.map((one) => one.x),
    ),
  ]
  return [
    {
      kind: 'table',
      caption: 'Events; arrivals stand above',
      columns: [time.column, { title: 'Event' }, { title: 'Rings' }, x.column, { title: 'Detail' }],
      rows: shown.map(({ event, rings, detail }, i) => [
        time.cells[i] ?? '',
        EVENT_WORDS[event] ?? event,
        rings.join(', '),
        x.cells[i] ?? '',
        detail,
      ]),
    },
    ...furtherRows(others.length, 'events', 'events.csv'),
  ]
}

function drawings({ plan, data, show }: RecordContext, { wake, rings }: RecordWake): DocumentBlock[] {
  if (wake.outputTimes.length === 0) return []
  const length = show.unit(
    'length',
    rings.map(({ radius }) => radius),
  )
  const scene = wakeScene({ rings, wake }, plan, { length, speed: show.unit('ringSpeed', [data.pulse?.ring?.speed]) })
  const last = wake.outputTimes.length - 1
  const choice = { selected: null, trails: true, stations: true }
  const plots = wakePlots(wake, rings, {
    units: {
      length,
      time: show.unit('wakeTime', [wake.time]),
      impulse: show.unit('impulse', [data.pulse?.ring?.impulse]),
    },
    density: data.water.density,
    duration: wake.time,
    selected: null,
  })
  return [
    {
      kind: 'figure',
      svg: wakeSceneToSvg(scene, last, { width: FULL, height: 250, theme: 'print' }, choice),
      caption: `The rings at the last time, ${show.result(wake.outputTimes[last], 'wakeTime')}, seen from the side, with the paths they came by.`,
    },
    ...plotFigures(plots),
  ]
}
