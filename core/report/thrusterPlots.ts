/**
 * The plots of a thruster: one period of its cycle, thrust and drag against speed, the way to cruise, and what a stroke buys.
 */
import { at, equallySpaced } from '../base'
import { exitPerPiston, type NozzleInput } from '../pulse'
import { fromBase } from '../quantity'
import {
  compileDrag,
  MEASURED_BEST_STROKE,
  type SizingResult,
  type ThrusterResult,
  type ThrusterSection,
} from '../thruster'
import type { WaterProperties } from '../water'
import type { PlotLine, PlotModel, PlotSeries } from './types'

export interface ThrusterPlotUnits {
  readonly time: string
  /** Of the vehicle. */
  readonly speed: string
  /** Of the jet; absent: as that of the vehicle. */
  readonly exitSpeed?: string
  readonly pressure: string
  readonly force: string
  readonly power: string
}

export interface ThrusterPlotInput {
  readonly section: ThrusterSection
  readonly nozzle: NozzleInput
  readonly water: WaterProperties
  readonly thruster: ThrusterResult
  readonly units: ThrusterPlotUnits
}

/** Plot models in the shown units; what does not exist for a thruster (drag on a bench) has no plot. */
export function thrusterPlots(input: ThrusterPlotInput): {
  readonly cycle: readonly PlotModel[]
  readonly travel: readonly PlotModel[]
} {
  return {
    cycle: cyclePlots(input),
    travel: [thrustInTime(input), ...thrustAgainstSpeed(input), ...startUpPlot(input), ...ringPerWork(input)],
  }
}

/** A limit farther off than this many times what is drawn would press the curve flat: its number stands in the title then. */
const FAR = 4

type Column = 'exitSpeed' | 'cavityPressure' | 'plungerForce' | 'power'

function cyclePlots({ section, nozzle, thruster, units }: ThrusterPlotInput): readonly PlotModel[] {
  const { maxForce, maxPower, maxSpeed } = section.actuator
  const { ambientPressure, vapourPressure } = thruster.cavitation
  const { time } = thruster.cycle
  const plot = (
    column: Column,
    title: string,
    unit: string,
    limits: readonly (readonly [value: number | null, words: string])[],
  ): PlotModel => {
    const y = thruster.cycle[column].map((value) => fromBase(value, unit))
    const reach = FAR * Math.max(...y.map((value) => (Number.isFinite(value) ? Math.abs(value) : 0)))
    const known = limits.flatMap(([value, words]) => (value === null ? [] : [{ value: fromBase(value, unit), words }]))
    const lines = known
      .filter(({ value }) => Math.abs(value) <= reach)
      .map(({ value, words }): PlotLine => ({ axis: 'y', value, label: words, kind: 'limit' }))
    return {
      id: `thruster-${column.replace(/[A-Z]/gu, (letter) => `-${letter.toLowerCase()}`)}`,
      title,
      x: { title: 'Time', unit: units.time, min: 0, max: fromBase(thruster.period, units.time) },
      y: { title, unit },
      series: [
        {
          ...line(
            column,
            title.toLowerCase(),
            time.map((value) => fromBase(value, units.time)),
            y,
          ),
          filled: true,
        },
      ],
      bands: [],
      lines,
    }
  }
  // Suction below this boils the water.
  const boiling = vapourPressure === null ? null : vapourPressure - ambientPressure
  return [
    plot('exitSpeed', 'Exit speed', units.exitSpeed ?? units.speed, [
      [maxSpeed === null ? null : maxSpeed * exitPerPiston(nozzle), 'plunger speed limit'],
    ]),
    plot('cavityPressure', 'Cavity pressure', units.pressure, [[boiling, 'vapour pressure']]),
    plot('plungerForce', 'Plunger force', units.force, [
      [maxForce, 'force limit'],
      [maxForce === null ? null : -maxForce, 'force limit, drawing'],
    ]),
    plot('power', 'Power of one thruster', units.power, [[maxPower, 'power limit']]),
  ]
}

function line(
  id: string,
  name: string,
  x: readonly number[],
  y: readonly (number | null)[],
  look: Pick<PlotSeries, 'role' | 'line'> = { role: 'primary', line: 'solid' },
): PlotSeries {
  return {
    id,
    name,
    x,
    y: y.map((value) => (value !== null && Number.isFinite(value) ? value : null)),
    filled: false,
    ...look,
  }
}

function thrustInTime({ section, thruster, units }: ThrusterPlotInput): PlotModel {
  const shown = (values: readonly number[]): number[] => values.map((value) => fromBase(value, units.force))
  const several = section.count > 1
  return {
    id: 'thruster-thrust',
    title: several ? `Thrust of all ${section.count}` : 'Thrust',
    x: { title: 'Time', unit: units.time, min: 0, max: fromBase(thruster.period, units.time) },
    y: { title: 'Thrust', unit: units.force },
    series: [
      line(
        'thrust',
        'thrust',
        thruster.cycle.time.map((value) => fromBase(value, units.time)),
        shown(thruster.cycle.totalThrust),
      ),
    ],
    bands: [],
    lines: [{ axis: 'y', value: fromBase(thruster.meanThrust, units.force), label: 'mean', kind: 'mark' }],
  }
}

const SPEEDS = 61
/** Speeds shown beyond the fastest that matters, as a share of it. */
const BEYOND = 1.35

/** Mean thrust falls in a straight line with speed: only the intake's share of it depends on speed. */
function thrustAgainstSpeed({ section, water, thruster, units }: ThrusterPlotInput): readonly PlotModel[] {
  const drag = section.vehicle?.drag ?? null
  if (drag === null) return []
  const law = compileDrag(drag, water.density, water.kinematicViscosity, section.vehicle?.length ?? null)
  const duties = thruster.duties.flatMap(({ speed }) => (speed === null ? [] : [speed]))
  const cruise = thruster.cruise?.speeds.map(({ speed }) => speed) ?? []
  const fastest = BEYOND * Math.max(thruster.speed, ...duties, ...cruise)
  const end = Math.min(law.highestSpeed, fastest > 0 ? fastest : 1)
  const speeds = equallySpaced(0, end, SPEEDS)
  const fall = water.density * thruster.flow * (1 - section.intake.recoveredShare)
  const thrustFrom = (thrust: number): number[] =>
    speeds.map((speed) => fromBase(thrust + fall * (thruster.speed - speed), units.force))
  const x = speeds.map((speed) => fromBase(speed, units.speed))
  const [low, high] = thruster.meanThrustRange
  const ends: readonly (readonly [string, number])[] = [
    ['lowest', low],
    ['highest', high],
  ]
  const mark = (value: number, label: string): PlotLine => ({
    axis: 'x',
    value: fromBase(value, units.speed),
    label,
    kind: 'mark',
  })
  return [
    {
      id: 'thruster-speed',
      title: 'Thrust and drag',
      x: { title: 'Speed', unit: units.speed, min: 0, max: fromBase(end, units.speed) },
      y: { title: 'Force', unit: units.force, min: 0 },
      series: [
        line('mean-thrust', 'thrust', x, thrustFrom(thruster.meanThrust)),
        ...ends
          .filter(([, thrust]) => Math.abs(thrust - thruster.meanThrust) > 1e-3 * Math.abs(thruster.meanThrust))
          .map(([name, thrust]) =>
            line(`thrust-${name}`, `thrust, ${name}`, x, thrustFrom(thrust), { role: 'secondary', line: 'dashed' }),
          ),
        line(
          'drag',
          'drag',
          x,
          speeds.map((speed) => fromBase(law.dragAt(speed), units.force)),
          {
            role: 'reference',
            line: 'solid',
          },
        ),
      ],
      bands: [],
      lines: [
        ...cruise.map((speed) => mark(speed, 'cruise')),
        ...duties.map((speed, i) => mark(speed, duties.length === 1 ? 'duty point' : `duty point ${i + 1}`)),
      ],
    },
  ]
}

function startUpPlot({ thruster, units }: ThrusterPlotInput): readonly PlotModel[] {
  const { startUp, cruise } = thruster
  if (startUp === null) return []
  const shown = (speed: number): number => fromBase(speed, units.speed)
  const fromRest = cruise?.fromRest ?? null
  return [
    {
      id: 'thruster-start-up',
      title: 'Speed from rest',
      x: { title: 'Time', unit: units.time, min: 0 },
      y: { title: 'Speed', unit: units.speed, min: 0 },
      series: [
        line(
          'speed',
          'speed',
          startUp.history.time.map((time) => fromBase(time, units.time)),
          startUp.history.speed.map(shown),
        ),
      ],
      bands: [],
      lines: [
        ...(fromRest === null ? [] : [{ axis: 'y', value: shown(fromRest), label: 'cruise', kind: 'mark' } as const]),
        ...(startUp.time === null
          ? []
          : [{ axis: 'x', value: fromBase(startUp.time, units.time), label: '95 % of it', kind: 'mark' } as const]),
      ],
    },
  ]
}

function ringPerWork({ thruster }: ThrusterPlotInput): readonly PlotModel[] {
  const curve = thruster.ringImpulsePerWork
  if (curve === null) return []
  const [from, to] = MEASURED_BEST_STROKE
  const { strokeRatio } = thruster.pulse
  const first = at(curve.strokeRatio, 0)
  const end = at(curve.strokeRatio, curve.strokeRatio.length - 1)
  return [
    {
      id: 'thruster-ring-per-work',
      title: 'Ring impulse per work',
      x: { title: 'Stroke ratio', unit: '', min: 0, max: end },
      y: { title: 'Ring impulse per work', unit: 'N·s/J', min: 0 },
      series: [line('ring-per-work', 'ring impulse per work', curve.strokeRatio, curve.impulsePerWork)],
      bands: [{ axis: 'x', from, to, label: 'measured best' }],
      lines:
        strokeRatio >= first && strokeRatio <= end
          ? [{ axis: 'x', value: strokeRatio, label: 'this stroke', kind: 'mark' }]
          : [],
    },
  ]
}

/** Power, or thrust, of the smallest designs: the front of a sizing, with its candidates. */
export function sizePlot(
  { goal, front, candidates }: Pick<SizingResult, 'goal' | 'front' | 'candidates'>,
  units: Pick<ThrusterPlotUnits, 'force' | 'power'> & { readonly volume: string },
): readonly PlotModel[] {
  if (front.length < 2) return []
  const [title, unit] = goal === 'power' ? ['Total power', units.power] : ['Mean thrust', units.force]
  const worth = ({ power, thrust }: { readonly power: number; readonly thrust: number }): number =>
    fromBase(goal === 'power' ? power : thrust, unit)
  const size = ({ sweptVolume }: { readonly sweptVolume: number }): number => fromBase(sweptVolume, units.volume)
  const inOrder = [...candidates].sort((a, b) => a.sweptVolume - b.sweptVolume)
  return [
    {
      id: 'thruster-size',
      title: `${title} of the smallest designs`,
      x: { title: 'Swept volume of all plungers', unit: units.volume, min: 0 },
      y: { title, unit, min: 0 },
      series: [
        line('front', 'front', front.map(size), front.map(worth)),
        ...inOrder.map((candidate) => {
          const number = candidates.indexOf(candidate) + 1
          // A short upright stroke, since a plot knows lines only.
          const [x, y] = [size(candidate), worth(candidate)]
          return line(`candidate-${number}`, `${number}`, [x, x], [0, y], { role: 'secondary', line: 'dotted' })
        }),
      ],
      bands: [],
      lines: [],
    },
  ]
}

/** One part of the power, to be drawn as a piece of a bar. */
export interface PowerPart {
  readonly id: 'jet' | 'nozzleLoss' | 'refill' | 'column' | 'carried' | 'actuator'
  readonly label: string
  /** [W] */
  readonly power: number
  /** Of the total, 0 to 1. */
  readonly share: number
}

/** Where the power goes, from the jet to what the actuator loses; parts that sum to the total. */
export function powerBar({ power }: Pick<ThrusterResult, 'power'>): readonly PowerPart[] {
  const { jet, nozzleLoss, refill, column, carried, total } = power
  const parts = [
    ['jet', 'jet', jet],
    ['nozzleLoss', 'nozzle loss', nozzleLoss],
    ['refill', 'refill', refill],
    ['column', 'water column', column],
    ['carried', 'water carried along', carried],
    ['actuator', 'actuator loss', total - jet - nozzleLoss - refill - column - carried],
  ] as const
  return parts
    .filter(([, , watts]) => watts > 1e-12 * total)
    .map(([id, label, watts]) => ({ id, label, power: watts, share: watts / total }))
}
