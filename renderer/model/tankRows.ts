/** Results of a tank run as figures and rows of tables, in the shown units. Pure; every number is core's own. */
import type { SpreadOutcome, SpreadQuantity } from '../../core/plan'
import { formatNumber, formatQuantity, formatRange, fromBase } from '../../core/quantity'
import { bytesText, dayText, type TankExplanationId } from '../../core/report'
import type { Solution, TankArrival, TankRunResult } from '../../core/tank'
import type { Units } from './units'

export interface TankFigure {
  readonly id: TankExplanationId
  readonly key: string
  readonly label: string
  readonly figure: string
  readonly unit: string
  readonly notes: readonly string[]
  /** Breaks what is asked of it. */
  readonly warn?: boolean
}

const NONE = '—'
/** Peaks closer than this, relative, are one. */
const SAME = 1e-6

/** Spread of a quantity at a station; null where none is known. */
export function scatterAt(spread: SpreadOutcome | null, index: number, key: 'time' | 'speed'): SpreadQuantity | null {
  return spread?.quantities.find(({ path }) => path === `tankRun.arrivals.${index}.${key}`) ?? null
}

/** When and how fast the ring comes by each station. @param spread of the very plan; null where none is known */
export function stationFigures(
  { arrivals }: TankRunResult,
  spread: SpreadOutcome | null,
  units: Units,
): readonly TankFigure[] {
  return arrivals.map((row, i) => {
    const label = formatQuantity(row.station, units.length)
    const key = `station-${i}`
    if (row.time === null)
      return { id: 'tank.arrival', key, label, figure: NONE, unit: '', notes: [row.reason ?? 'not seen'], warn: true }
    const time = formatRange(row.timeLow ?? row.time, row.timeHigh ?? row.time, units.wakeTime)
    const scatter = scatterAt(spread, i, 'time')
    return {
      id: 'tank.arrival',
      key,
      label,
      figure: time.text,
      unit: time.unit,
      notes: [
        `adopted ${formatQuantity(row.time, units.wakeTime, 3)}, at ${speedText(row, units)}`,
        ...(scatter?.p05 === null || scatter === null || scatter.p95 === null
          ? []
          : [`scatter about it, 5 to 95 %: ${rangeText(scatter.p05, scatter.p95, units.wakeTime)}`]),
        ...(row.reason === null ? [] : [row.reason]),
      ],
    }
  })
}

function rangeText(low: number, high: number, unit: string): string {
  const { text, unit: shown } = formatRange(low, high, unit)
  return `${text} ${shown}`
}

function speedText({ speed, speedLow, speedHigh }: TankArrival, { ringSpeed }: Units): string {
  return speed === null ? NONE : rangeText(speedLow ?? speed, speedHigh ?? speed, ringSpeed)
}

/** Setting camera and light. */
export function cameraFigures({ imaging, storage }: TankRunResult, units: Units): readonly TankFigure[] {
  const { pairInterval, pairIntervalForGradient, gradientOk, frameRate, frameRateOk, evenFrames, pairs } = imaging
  return [
    {
      id: 'tank.pairInterval',
      key: 'pairInterval',
      label: 'Pair interval',
      ...quantity(pairInterval, units.rampTime),
      notes:
        gradientOk === false && pairIntervalForGradient !== null
          ? [`${formatQuantity(pairIntervalForGradient, units.rampTime, 3)} for the core: no one interval serves both`]
          : evenFrames === null
            ? []
            : [evenFrames ? 'an even row of frames will do' : 'pairs must straddle two frames'],
      warn: gradientOk === false,
    },
    {
      id: 'tank.frameRate',
      key: 'frameRate',
      label: 'Frame rate',
      ...quantity(frameRate, units.frequency),
      notes: [
        ...(pairs === null ? [] : [`${pairs} pairs a run`]),
        ...(frameRateOk === false ? ['more than the camera takes'] : []),
      ],
      warn: frameRateOk === false,
    },
    {
      id: 'tank.storage',
      key: 'storage',
      label: 'Store of a run',
      figure: storage === null ? NONE : (bytesText(storage).split(' ')[0] ?? ''),
      unit: storage === null ? '' : (bytesText(storage).split(' ')[1] ?? ''),
      notes: [],
    },
  ]
}

function quantity(value: number | null, unit: string): { readonly figure: string; readonly unit: string } {
  return { figure: value === null ? NONE : formatNumber(fromBase(value, unit), 3), unit: value === null ? '' : unit }
}

/** Whether the walls matter. */
export function wallFigures({ clearances, wallShare }: TankRunResult): readonly TankFigure[] {
  const [first] = clearances.toSorted((a, b) => a.overDiameter - b.overDiameter)
  if (first === undefined) return []
  const near = clearances.filter(({ ok, wallInteraction }) => !ok || wallInteraction)
  return [
    {
      id: 'tank.walls',
      key: 'walls',
      label: 'Change of speed',
      figure: formatNumber(100 * wallShare, 2),
      unit: '%',
      notes: [
        `nearest: ${first.wall}, ${formatNumber(first.overDiameter, 3)} D`,
        ...(near.length === 0 ? [] : [`nearer than practice: ${near.map(({ wall }) => wall).join(', ')}`]),
      ],
      warn: near.length > 0,
    },
  ]
}

/** How long the day is and how the water has to be. */
export function dayFigures({ settling, matrix }: TankRunResult): readonly TankFigure[] {
  return [
    {
      id: 'tank.settling',
      key: 'settling',
      label: 'Wait between runs',
      figure: formatNumber(settling.settlingTime / 60, 3),
      unit: 'min',
      notes: [settling.ruledBy === 'practice' ? 'common practice' : 'ten times the passage'],
    },
    ...(matrix === null
      ? []
      : [
          {
            id: 'tank.day',
            key: 'day',
            label: 'The day',
            figure: dayText(matrix.time.total),
            unit: '',
            notes: [
              `${matrix.runs.length} runs of ${matrix.combinations} combinations`,
              ...(matrix.storage === null ? [] : [`${bytesText(matrix.storage)} in store`]),
            ],
          } as const,
        ]),
    {
      id: 'tank.regime',
      key: 'regime',
      label: 'Ring is',
      figure: settling.ring.regime === 'between' ? 'in between' : (settling.ring.regime ?? NONE),
      unit: '',
      notes: [settling.ring.text, settling.start.impulsive ? 'impulsive start' : 'the start is not impulsive'],
      warn: settling.ring.regime === 'turbulent' || !settling.start.impulsive,
    },
  ]
}

export interface TankTable {
  readonly id: string
  readonly title: string
  readonly columns: readonly string[]
  /** Columns of words, from 0; the others are figures. */
  readonly words: readonly number[]
  readonly rows: readonly { readonly cells: readonly string[]; readonly warn: boolean }[]
}

export function tankTables(result: TankRunResult, spread: SpreadOutcome | null, units: Units): readonly TankTable[] {
  return [
    arrivalRows(result, spread, units),
    triggerRows(result, units),
    clearanceRows(result, units),
    imagingRows(result, units),
  ]
}

function number(value: number | null, unit: string, digits = 4): string {
  return value === null ? '' : formatNumber(fromBase(value, unit), digits)
}

function arrivalRows({ arrivals }: TankRunResult, spread: SpreadOutcome | null, units: Units): TankTable {
  const { length, wakeTime, ringSpeed } = units
  return {
    id: 'arrivals',
    title: 'Arrivals',
    words: [],
    columns: [
      `Station (${length})`,
      `Time (${wakeTime})`,
      'Earliest',
      'Latest',
      ...(spread === null ? [] : ['5 %', '95 %']),
      `Speed (${ringSpeed})`,
      'Lowest',
      'Highest',
      `Radius (${length})`,
    ],
    rows: arrivals.map((row, i) => {
      const scatter = scatterAt(spread, i, 'time')
      return {
        cells: [
          number(row.station, length),
          ...[row.time, row.timeLow, row.timeHigh].map((value) => number(value, wakeTime)),
          ...(spread === null ? [] : [number(scatter?.p05 ?? null, wakeTime), number(scatter?.p95 ?? null, wakeTime)]),
          ...[row.speed, row.speedLow, row.speedHigh].map((value) => number(value, ringSpeed)),
          number(row.radius, length),
        ],
        warn: row.time === null,
      }
    }),
  }
}

function triggerRows({ triggers }: TankRunResult, { wakeTime }: Units): TankTable {
  return {
    id: 'triggers',
    title: 'Triggers',
    words: [0, 5],
    columns: ['Device', `After command (${wakeTime})`, `After motion (${wakeTime})`, 'Earliest', 'Latest', 'What'],
    rows: triggers.map(({ device, afterCommand, time, early, late, text }) => ({
      cells: [device, ...[afterCommand, time, early, late].map((value) => number(value, wakeTime)), text],
      warn: false,
    })),
  }
}

function clearanceRows({ clearances }: TankRunResult, { bodyLength }: Units): TankTable {
  return {
    id: 'clearances',
    title: 'Clearances',
    words: [0, 5],
    columns: ['Wall', `Distance (${bodyLength})`, 'In D', 'In ring radii', 'Changes the speed by (%)', 'Verdict'],
    rows: clearances.map(({ wall, distance, overDiameter, overRadius, costPercent, ok, wallInteraction }) => ({
      cells: [
        wall,
        number(distance, bodyLength),
        formatNumber(overDiameter, 3),
        overRadius === null ? '' : formatNumber(overRadius, 3),
        costPercent === null ? '' : formatNumber(costPercent, 2),
        wallInteraction ? 'the ring meets the wall' : ok ? 'far enough' : 'nearer than practice',
      ],
      warn: !ok || wallInteraction,
    })),
  }
}

function imagingRows({ imaging }: TankRunResult, units: Units): TankTable {
  const { length, rampTime, imageScale, frequency } = units
  const verdict = (ok: boolean | null, bad: string): string => (ok === null ? '' : ok ? 'will do' : bad)
  const row = (name: string, value: string, words = '', ok: boolean | null = null) => ({
    cells: [name, value, words],
    warn: ok === false,
  })
  const shown = (value: number | null, unit: string): string => (value === null ? NONE : formatQuantity(value, unit, 3))
  const plain = (value: number | null): string => (value === null ? NONE : formatNumber(value, 3))
  const field = imaging.fieldOfView
  return {
    id: 'imaging',
    title: 'Imaging',
    words: [0, 2],
    columns: ['', 'Value', 'Verdict'],
    rows: [
      row('Scale', shown(imaging.scale, imageScale)),
      row('Field', field === null ? NONE : `${number(field[0], length, 3)} × ${number(field[1], length, 3)} ${length}`),
      row('Magnification', plain(imaging.magnification)),
      row('Interrogation window', shown(imaging.windowSize, length)),
      row(
        'Vectors across the core',
        plain(imaging.vectorsAcrossCore),
        verdict(imaging.vectorsOk, `fewer than 8: ${shown(imaging.scaleForVectors, imageScale)} would do`),
        imaging.vectorsOk,
      ),
      row('Largest displacement', `${plain(imaging.largestDisplacement)} px`, 'a quarter of the window'),
      row(
        'Gradient across the core',
        imaging.gradient === null ? NONE : `${plain(imaging.gradient)} px/px`,
        verdict(imaging.gradientOk, `above 0.05: ${shown(imaging.pairIntervalForGradient, rampTime)} would do`),
        imaging.gradientOk,
      ),
      row(
        'Even row of frames',
        shown(imaging.evenFrameRate, frequency),
        verdict(imaging.evenFrames, 'straddle frames'),
      ),
      row('Light sheet', shown(imaging.sheetThickness, length), verdict(imaging.sheetOk, 'too thin'), imaging.sheetOk),
      row(
        'Depth of field',
        shown(imaging.depthOfField, length),
        verdict(imaging.depthOfFieldOk, 'less than the sheet'),
        imaging.depthOfFieldOk,
      ),
      row('Seeding', imaging.seeding === null ? NONE : `${formatNumber(imaging.seeding / 1e6, 2)} a cm³`),
      row('Scale in water over dry', plain(imaging.refraction?.waterOverAirScale ?? null)),
      ...imaging.notes.map(({ item, text }) => row(item, '', text)),
    ],
  }
}

export interface SolutionRow {
  readonly marks: readonly string[]
  readonly solution: Solution
  readonly cells: readonly string[]
  readonly ok: boolean
}

/** What is to be known of a row, in sentences. */
function marksOf(solution: Solution, { speed }: Units): readonly string[] {
  const { strokeRatio, pinchedOff, formationNumber, peakSpeed, askedPeakSpeed, reason } = solution
  return [
    ...(pinchedOff === true && formationNumber !== null
      ? [
          `Past pinch-off, ${formatNumber(formationNumber, 3)} D: the stroke's last ${formatNumber(strokeRatio - formationNumber, 2)} D trail behind.`,
        ]
      : []),
    ...(peakSpeed !== null && askedPeakSpeed !== null && askedPeakSpeed > peakSpeed * (1 + SAME)
      ? [
          `The stroke is too short for its ramps: asked for ${formatQuantity(askedPeakSpeed, speed)}, it reaches the peak told.`,
        ]
      : []),
    ...(reason === null
      ? []
      : [`${reason.charAt(0).toUpperCase()}${reason.slice(1)}${/[.!?]$/u.test(reason) ? '' : '.'}`]),
  ]
}

export function solutionColumns({ length, speed, circulation, ringSpeed }: Units): readonly string[] {
  return [
    `Stroke (${length})`,
    'Stroke ratio',
    `Peak exit speed (${speed})`,
    `Circulation (${circulation})`,
    'Reynolds number',
    `At the station (${ringSpeed})`,
    `Piston speed (${speed})`,
    `Piston travel (${length})`,
  ]
}

export function solutionRows(solutions: readonly Solution[], units: Units): readonly SolutionRow[] {
  return solutions.map((solution) => ({
    solution,
    ok: solution.ok,
    marks: marksOf(solution, units),
    cells: [
      number(solution.stroke, units.length),
      formatNumber(solution.strokeRatio, 3),
      number(solution.peakSpeed, units.speed),
      number(solution.circulation, units.circulation, 3),
      number(solution.reynolds, '', 3),
      number(solution.speedAtStation, units.ringSpeed, 3),
      number(solution.pistonSpeed, units.speed, 3),
      number(solution.pistonTravel, units.length, 3),
    ],
  }))
}
