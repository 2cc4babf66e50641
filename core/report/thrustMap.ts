/**
 * The map of a thruster as data: one result over two fields of its design, with contour lines, the edges of its limits, the published
 * pinch-off band and the designs that stand on it. In the shown units; one model feeds the window, the SVG and the CSV.
 */
import { at } from '../base'
import { writeCsv } from '../plan'
import { formatNumber, fromBase } from '../quantity'
import type { Design, DesignField, DesignMap, LimitName } from '../thruster'
import type { Pixel } from './boxes'
import { contourLines, regionAbove, valueBetween, type ContourGrid, type ContourLine } from './contours'
import { mapScope, mapStanding } from './thrustMapWords'
import { niceTicks } from './ticks'
import type { PlotAxis } from './types'

export interface ThrustMapUnits {
  readonly length: string
  readonly frequency: string
  readonly power: string
  readonly force: string
  readonly speed: string
}

/** What a map can be coloured by, with its words. */
export const MAP_RESULTS = {
  power: { title: 'Total power', unit: 'power' },
  thrust: { title: 'Mean thrust', unit: 'force' },
  overallEfficiency: { title: 'Overall efficiency', unit: null },
  froudeEfficiency: { title: 'Froude efficiency', unit: null },
  speed: { title: 'Vehicle speed', unit: 'speed' },
  frequency: { title: 'Frequency', unit: 'frequency' },
} as const
export type MapResult = keyof typeof MAP_RESULTS

/** Fields an axis can have, with their words; the number of thrusters has no values between. */
export const MAP_FIELDS = {
  diameter: { title: 'Exit diameter', unit: 'length' },
  strokeRatio: { title: 'Stroke ratio', unit: null },
  frequency: { title: 'Frequency', unit: 'frequency' },
  ejectShare: { title: 'Eject share', unit: null },
} as const
export type MapField = keyof typeof MAP_FIELDS

/** A design that stands on the map. */
export interface MapMark {
  readonly id: string
  readonly kind: 'present' | 'candidate'
  /** Stands in or beside the mark. */
  readonly label: string
  readonly x: number
  readonly y: number
  /** False for a design that differs in what the map does not vary: its colour here is not its own. */
  readonly onMap: boolean
  readonly count: number
}

export interface MapEdge {
  readonly name: LimitName
  /** The room is on the left of each line. */
  readonly lines: readonly ContourLine[]
}

export interface ThrustMapModel {
  readonly id: string
  readonly title: string
  readonly x: Required<PlotAxis>
  readonly y: Required<PlotAxis>
  readonly result: {
    readonly title: string
    readonly unit: string
    /** Values that the ends of the colours stand for; beyond them the end colour is kept. */
    readonly low: number
    readonly high: number
    readonly logarithmic: boolean
    /** Values drawn as lines and written on the scale. */
    readonly levels: readonly number[]
    /** True where values lie beyond the end of the colours. */
    readonly beyondLow: boolean
    readonly beyondHigh: boolean
  }
  readonly grid: ContourGrid
  readonly contours: readonly {
    readonly level: number
    readonly label: string
    readonly lines: readonly ContourLine[]
  }[]
  /** What all of the map has in common: its number of thrusters. */
  readonly scope: string
  /** Outlines of what breaks a limit. */
  readonly broken: readonly ContourLine[]
  /** Outlines of what cannot give the thrust that is asked. */
  readonly weak: readonly ContourLine[]
  readonly edges: readonly MapEdge[]
  /** Every limit that some choice of the map breaks, most often broken first. */
  readonly limits: readonly LimitName[]
  /** Share of the map that holds every limit. */
  readonly feasibleShare: number
  /** Of how many thrusters the map is, whether anything holds its limits, and where candidates that are not on it lie. */
  readonly standing: string
  readonly strips: readonly {
    readonly axis: 'x' | 'y'
    readonly from: number
    readonly to: number
    readonly label: string
  }[]
  readonly marks: readonly MapMark[]
  /** The map it was made from, for readouts and tables. */
  readonly map: DesignMap
}

export interface ThrustMapInput {
  readonly map: DesignMap
  readonly result: MapResult
  readonly units: ThrustMapUnits
  /** The plan as it stands. */
  readonly present: Design
  readonly candidates: readonly Design[]
  /** Formation numbers between which published experiments put pinch-off; null: none for this nozzle. */
  readonly published: readonly [number, number] | null
  /** True where that band is the one in the stream of a vehicle under way. */
  readonly underWay: boolean
}

/** Largest over smallest value from which colours go by powers of ten. */
const LOGARITHMIC_FROM = 30
/** Steps of a linear scale. */
const STEPS = 12
/** Most lines on a logarithmic scale. */
const MOST_LEVELS = 10
/** Room beyond which a broken choice has no say in the range of the colours. */
const NEAR = -0.15
/** Share of the map that choices must fill to set the range of the colours. */
const ENOUGH = 0.02
/** Share of the choices left beyond each end of the colours where none of them holds its limits. */
const OUTLYING = 0.05

/** The map's model. Values that are not numbers have no colour. */
export function thrustMap(input: ThrustMapInput): ThrustMapModel {
  const { map, result, units, present, candidates, published } = input
  const x = axisOf(map.xField, map.x, units)
  const y = axisOf(map.yField, map.y, units)
  const unit = unitOf(MAP_RESULTS[result].unit, units)
  const values = map[result].map((value) => fromBase(value, unit))
  const grid: ContourGrid = { x: x.values, y: y.values, values }
  const least = leastRoom(map)
  const colours = colourRange(values, least)
  const title = MAP_RESULTS[result].title
  const bandName = input.underWay ? 'published pinch-off band, at this speed' : 'published pinch-off band'
  const thrustRoom = map.rooms.get('thrust')
  const feasible = map.feasible.reduce((sum, one) => sum + one, 0)
  const feasibleShare = feasible / map.feasible.length
  const marks = [
    ...candidates.map((design, i) => markOf(input, design, `candidate-${i + 1}`, 'candidate', `${i + 1}`)),
    markOf(input, present, 'present', 'present', 'this plan'),
  ]
  const scope = mapScope(present)
  return {
    id: 'thrust-map',
    title: `${title} over ${x.axis.title.toLowerCase()} and ${y.axis.title.toLowerCase()}`,
    x: x.axis,
    y: y.axis,
    result: { title, unit, ...colours },
    grid,
    contours: colours.levels.map((level) => ({
      level,
      label: formatNumber(level, 3),
      lines: contourLines(grid, level),
    })),
    scope,
    broken: regionAbove({ ...grid, values: least.map((room) => -room) }, 0),
    weak: thrustRoom === undefined ? [] : regionAbove({ ...grid, values: thrustRoom.map((room) => -room) }, 0),
    edges: edgesOf(map, grid, feasible > 0),
    limits: brokenLimits(map),
    feasibleShare,
    standing: mapStanding(scope, feasibleShare, marks),
    strips:
      published === null
        ? []
        : (['x', 'y'] as const).flatMap((axis) =>
            map[`${axis}Field`] === 'strokeRatio'
              ? [{ axis, from: published[0], to: published[1], label: bandName }]
              : [],
          ),
    marks,
    map,
  }
}

function axisOf(
  field: DesignField,
  values: readonly number[],
  units: ThrustMapUnits,
): { readonly axis: Required<PlotAxis>; readonly values: readonly number[] } {
  const { title, unit: key } = field === 'count' ? { title: 'Thrusters', unit: null } : MAP_FIELDS[field]
  const unit = unitOf(key, units)
  const shown = values.map((value) => fromBase(value, unit))
  return { axis: { title, unit, min: at(shown, 0), max: at(shown, shown.length - 1) }, values: shown }
}

function unitOf(key: keyof ThrustMapUnits | null, units: ThrustMapUnits): string {
  return key === null ? '' : units[key]
}

/** The least room of every choice over all its limits but one; 1 where none is asked. */
function leastRoom({ rooms, feasible }: DesignMap, but: LimitName | null = null): Float64Array {
  const least = new Float64Array(feasible.length).fill(1)
  for (const [name, room] of rooms)
    if (name !== but)
      room.forEach((value, cell) => {
        if (value < at(least, cell)) least[cell] = value
      })
  return least
}

type ColourRange = Omit<ThrustMapModel['result'], 'title' | 'unit'>

/** Colours span what holds its limits; where that is too little, what nearly does, else all there is but its extremes. */
function colourRange(values: Float64Array, least: Float64Array): ColourRange {
  const sorted = (counts: (cell: number) => boolean): Float64Array =>
    values.filter((value, cell) => Number.isFinite(value) && counts(cell)).sort()
  const all = sorted(() => true)
  const [lowest = Infinity, highest = -Infinity] = [all[0], all.at(-1)]
  const some = [0, NEAR]
    .map((room) => sorted((cell) => at(least, cell) >= room))
    .find((held) => held.length >= ENOUGH * values.length && (held.at(-1) ?? 0) > (held[0] ?? 0))
  const shown = some ?? all
  const cut = some === undefined ? Math.floor(OUTLYING * (all.length - 1)) : 0
  const [from, to] = shown.length === 0 ? [Infinity, -Infinity] : [at(shown, cut), at(shown, shown.length - 1 - cut)]
  if (!(to > from)) return { low: from, high: to, logarithmic: false, levels: [], beyondLow: false, beyondHigh: false }
  const logarithmic = from > 0 && to / from >= LOGARITHMIC_FROM
  const levels = logarithmic ? ladder(from, to) : niceTicks(from, to, STEPS)
  return { low: from, high: to, logarithmic, levels, beyondLow: lowest < from, beyondHigh: highest > to }
}

/** 1, 2 and 5 times the powers of ten between two values, only the powers where that is too many. */
function ladder(from: number, to: number): readonly number[] {
  const decades = Array.from(
    { length: Math.ceil(Math.log10(to)) - Math.floor(Math.log10(from)) + 1 },
    (_, i) => Math.floor(Math.log10(from)) + i,
  )
  const rungs = (steps: readonly number[]): number[] =>
    decades
      .flatMap((power) => steps.map((step) => Number(`${step}e${power}`)))
      .filter((value) => value >= from && value <= to)
  const fine = rungs([1, 2, 5])
  return fine.length <= MOST_LEVELS ? fine : rungs([1])
}

/** Share of the colours a value stands at, 0 to 1. */
export function colourShare({ low, high, logarithmic }: ThrustMapModel['result'], value: number): number {
  if (!(high > low)) return 0.5
  const share = logarithmic ? Math.log(value / low) / Math.log(high / low) : (value - low) / (high - low)
  return Math.min(1, Math.max(0, share))
}

/** Value that a share of the colours stands for. */
export function valueAtShare({ low, high, logarithmic }: ThrustMapModel['result'], share: number): number {
  return logarithmic ? low * (high / low) ** share : low + (high - low) * share
}

/** Room of the other limits below which an edge no longer bounds what is feasible. */
const HELD = -0.01

/** Each limit's edge where it is what stands in the way; all of it where nothing is feasible. */
function edgesOf(map: DesignMap, grid: ContourGrid, some: boolean): MapEdge[] {
  const edges: MapEdge[] = []
  for (const [name, room] of map.rooms) {
    const lines = contourLines({ ...grid, values: room }, 0)
    const others = leastRoom(map, name)
    const active = some
      ? lines.flatMap((line) => partsWhere(line, (place) => valueBetween({ ...grid, values: others }, place) >= HELD))
      : lines
    if (active.length > 0) edges.push({ name, lines: active })
  }
  return edges
}

/** The parts of a line whose places count. */
function partsWhere(line: ContourLine, counts: (place: Pixel) => boolean): ContourLine[] {
  const parts: Pixel[][] = []
  let part: Pixel[] = []
  for (const place of line) {
    if (counts(place)) part.push(place)
    else {
      if (part.length > 1) parts.push(part)
      part = []
    }
  }
  if (part.length > 1) parts.push(part)
  return parts
}

function brokenLimits({ rooms }: DesignMap): readonly LimitName[] {
  return [...rooms]
    .map(([name, room]) => ({ name, cells: room.reduce((sum, value) => sum + (value < 0 ? 1 : 0), 0) }))
    .filter(({ cells }) => cells > 0)
    .sort((a, b) => b.cells - a.cells)
    .map(({ name }) => name)
}

/** Relative difference at which two designs differ in a field. */
const SAME = 1e-6

function markOf(
  { map, units, present }: ThrustMapInput,
  design: Design,
  id: string,
  kind: MapMark['kind'],
  label: string,
): MapMark {
  const place = (field: DesignField): number =>
    fromBase(design[field] ?? NaN, unitOf(field === 'count' ? null : MAP_FIELDS[field].unit, units))
  const kept = (['diameter', 'strokeRatio', 'count', 'ejectShare', 'frequency'] as const).filter(
    (field) => field !== map.xField && field !== map.yField && design[field] !== null && present[field] !== null,
  )
  const onMap = kept.every(
    (field) => Math.abs((design[field] ?? 0) / (present[field] ?? 1) - 1) < SAME || design[field] === present[field],
  )
  return { id, kind, label, x: place(map.xField), y: place(map.yField), onMap, count: design.count }
}

/** What the map says at a place, for a cursor: the value, and the limits that are broken there. */
export function mapReading(
  model: ThrustMapModel,
  place: Pixel,
): { readonly value: number; readonly broken: readonly LimitName[] } {
  const { x, y } = model.grid
  const broken = model.limits.filter((name) => {
    const room = model.map.rooms.get(name)
    return room !== undefined && valueBetween({ x, y, values: room }, place) < 0
  })
  return { value: valueBetween(model.grid, place), broken }
}

/** Every choice of the map a row: its fields, the result, whether it holds its limits and what stands in its way. */
export function thrustMapToCsv({ grid, x, y, result, map }: ThrustMapModel): string {
  const heading = (title: string, unit: string): string => (unit === '' ? title : `${title} (${unit})`)
  const header = [
    heading(x.title, x.unit),
    heading(y.title, y.unit),
    heading(result.title, result.unit),
    'feasible',
    'limit',
  ]
  const rows = grid.y.flatMap((b, j) =>
    grid.x.map((a, i) => {
      const cell = j * grid.x.length + i
      const value = grid.values[cell] ?? NaN
      return [a, b, Number.isFinite(value) ? value : null, at(map.feasible, cell), map.limit[cell] ?? null]
    }),
  )
  return writeCsv(header, rows)
}

/** What the map shows, in words. */
export function describeThrustMap({ title, scope, result, feasibleShare, limits, marks }: ThrustMapModel): string {
  const unit = result.unit === '' ? '' : ` ${result.unit}`
  const held =
    feasibleShare === 0
      ? 'No choice on this map holds every limit'
      : `${Math.round(100 * feasibleShare)} % of the choices hold every limit`
  return [
    `${title}, ${scope}, ${formatNumber(result.low, 3)} to ${formatNumber(result.high, 3)}${unit}.`,
    `${held}.`,
    ...(limits.length === 0 ? [] : [`Limits in the way: ${limits.join(', ')}.`]),
    ...(marks.length > 1 ? [`${marks.length - 1} candidates are marked.`] : []),
  ].join(' ')
}
