/**
 * The drawing of a tank run: tank, nozzle, the ring at its stations, what the camera sees and how far the walls are, all to one scale.
 *
 * Sizes and places are results or inputs; what is a convention of the drawing is told as one.
 */
import { at, bracket } from '../base'
import { formatNumber, formatQuantity, formatRange, fromBase, toBase } from '../quantity'
import type { Units } from '../plan'
import type { NozzleInput } from '../pulse'
import type { Clearance, TankArrival, TankPath, TankRunResult, TankRunSection } from '../tank'
import { nozzleOutline } from './nozzleOutline'
import type {
  TankDimension,
  TankExtent,
  TankSceneCamera,
  TankSceneField,
  TankSceneModel,
  TankSceneStation,
  TankSceneWall,
  TankView,
} from './tankSceneTypes'
import { tickStep } from './ticks'

export interface TankSceneInput {
  readonly section: TankRunSection
  readonly nozzle: NozzleInput
  /** Slug length at the exit [m]. */
  readonly stroke: number
  readonly result: TankRunResult
}

/** Tank and clearances are told in the unit of long lengths, the ring in that of short ones. */
export type TankSceneUnits = Pick<Units, 'length' | 'bodyLength' | 'wakeTime'>

export function tankScene(input: TankSceneInput, units: TankSceneUnits): TankSceneModel {
  const { section, nozzle, result } = input
  const { walls, path } = result
  const outline = nozzleOutline(nozzle, input.stroke).nozzle.stations
  const field = fieldOf(input, units)
  const camera = field === null ? null : cameraOf(section, field, units)
  const stations = section.stations.map((x) => station(x, result, units))
  const reach = Math.max(...section.stations, path === null ? 0 : (path.x.at(-1) ?? 0), 4 * nozzle.diameter)
  const extents = extentsOf(input, outline[0]?.inner.x ?? -nozzle.diameter, field, reach)
  const place = emptiest([0, ...section.stations, field?.xMax ?? 0], extents.whole.xMax)
  const sizes = section.tank
  const practice = section.practice.clearance
  // Off the axis, below the ring's way.
  const beside = 1.5 * (path === null ? nozzle.diameter : path.radiusHigh.reduce((a, b) => Math.max(a, b), 0))
  const size = (value: number | null, ends: readonly [number, number] | null): TankDimension | null =>
    value === null || ends === null
      ? null
      : dimension(
          extents.whole.xMax,
          ends[0],
          extents.whole.xMax,
          ends[1],
          formatQuantity(Math.abs(ends[1] - ends[0]), units.bodyLength),
        )
  const half = walls.bore === null ? walls.side : walls.bore / 2
  const planWalls: TankSceneWall[] = both(half)
  const sideWalls: TankSceneWall[] =
    walls.bore === null
      ? [
          ...(walls.surface === null ? [] : [{ kind: 'surface', r: walls.surface } as const]),
          ...(walls.floor === null ? [] : [{ kind: 'wall', r: -walls.floor } as const]),
        ]
      : both(half)
  const plan: TankView = {
    id: 'plan',
    title: 'From above',
    walls: planWalls,
    clearances: across(result.clearances, ['side wall', 'tank wall'], place, units, practice),
    size: size(walls.bore ?? sizes.width, half === null ? null : [-half, half]),
    field: field === null ? null : { ...field, half: 0 },
    camera,
  }
  const side: TankView = {
    id: 'side',
    title: 'From the side',
    walls: sideWalls,
    clearances: [
      ...across(result.clearances, ['surface', 'floor'], place, units, practice),
      ...ahead(result.clearances, section.stations, walls.end, -beside, units, practice),
    ],
    size:
      walls.bore === null && walls.surface !== null && walls.floor !== null
        ? size(sizes.depth, [-walls.floor, walls.surface])
        : null,
    field,
    camera: null,
  }
  const span = extents.path.xMax - extents.path.xMin
  const bar = toBase(tickStep(fromBase(span * 0.16, units.length), 1), units.length)
  return {
    nozzle: outline,
    path: path === null ? null : { x: path.x, radius: path.radius, radiusHigh: path.radiusHigh },
    stations,
    views: [plan, side],
    end: walls.end,
    length: walls.end === null ? null : dimension(0, 0, walls.end, 0, formatQuantity(walls.end, units.bodyLength)),
    scaleBar: { length: bar, label: formatQuantity(bar, units.length) },
    extents,
    description: describe(input, units),
    conventions: conventionsOf(input, camera),
  }
}

/** Where along the axis there is most room for dimension lines across it. */
function emptiest(marks: readonly number[], end: number): number {
  const sorted = marks.filter((x) => x < end).toSorted((a, b) => a - b)
  const gaps = sorted.map((x, i) => ({ x, size: (sorted[i + 1] ?? end) - x }))
  const widest = gaps.reduce((best, gap) => (gap.size > best.size ? gap : best), { x: 0, size: 0 })
  return widest.x + widest.size * (widest.x === sorted.at(-1) ? 0.35 : 0.5)
}

function both(half: number | null): TankSceneWall[] {
  return half === null
    ? []
    : [
        { kind: 'wall', r: half },
        { kind: 'wall', r: -half },
      ]
}

function dimension(x1: number, r1: number, x2: number, r2: number, label: string, warn = false): TankDimension {
  return { from: { x: x1, r: r1 }, to: { x: x2, r: r2 }, label, warn }
}

/** Clearances from the axis across it. */
function across(
  rows: readonly Clearance[],
  names: readonly Clearance['wall'][],
  x: number,
  units: TankSceneUnits,
  practice: number,
): TankDimension[] {
  return rows
    .filter(({ wall }) => names.includes(wall))
    .map((row) =>
      dimension(
        x,
        0,
        x,
        row.wall === 'floor' ? -row.distance : row.distance,
        clearanceText(row, units, practice),
        !row.ok,
      ),
    )
}

/** The clearance from the last station to the far wall. */
function ahead(
  rows: readonly Clearance[],
  stations: readonly number[],
  end: number | null,
  r: number,
  units: TankSceneUnits,
  practice: number,
): TankDimension[] {
  const row = rows.find(({ wall }) => wall === 'far wall')
  if (row === undefined || end === null) return []
  const inside = stations.filter((x) => x <= end)
  return [
    dimension(inside.length === 0 ? 0 : Math.max(...inside), r, end, r, clearanceText(row, units, practice), !row.ok),
  ]
}

/** `8 D, 200 mm`; too near `5 D of 8 D, 125 mm`. */
function clearanceText({ overDiameter, distance, ok }: Clearance, units: TankSceneUnits, practice: number): string {
  const wanted = ok ? '' : ` of ${formatNumber(practice, 3)} D`
  return `${formatNumber(overDiameter, 3)} D${wanted}, ${formatQuantity(distance, units.bodyLength, 3)}`
}

function station(x: number, { arrivals, path }: TankRunResult, units: TankSceneUnits): TankSceneStation {
  const arrival = arrivals.find((row) => row.station === x)
  const place = formatQuantity(x, units.length)
  const time = arrival === undefined ? null : timeText(arrival, units.wakeTime)
  const seen = arrival?.radius ?? null
  return {
    x,
    labels: time === null ? [`${place}: not seen`, place] : [`${place}: ${time}`, time, place],
    ring: seen === null ? null : { radius: seen, coreRadius: arrival?.coreRadius ?? 0 },
    spread: arrival?.time === null || arrival === undefined ? null : spreadAt(path, arrival.time),
  }
}

/** Earliest to latest passage; null where the ring is not seen. */
function timeText({ time, timeLow, timeHigh }: TankArrival, unit: string): string | null {
  if (time === null) return null
  const range = formatRange(timeLow ?? time, timeHigh ?? time, unit)
  return `${range.text} ${range.unit}`
}

function spreadAt(path: TankPath | null, time: number | null): readonly [number, number] | null {
  if (path === null || time === null || path.time.length < 2) return null
  const i = bracket(path.time, time)
  const [a, b] = [at(path.time, i), at(path.time, i + 1)]
  const share = Math.min(1, Math.max(0, (time - a) / (b - a)))
  const value = (list: readonly number[]): number => at(list, i) + share * (at(list, i + 1) - at(list, i))
  return [value(path.xLow), value(path.xHigh)]
}

/** The camera's field about the middle of the stations. */
function fieldOf({ section, result }: TankSceneInput, { length }: TankSceneUnits): TankSceneField | null {
  const { fieldOfView, sheetThickness } = result.imaging
  if (fieldOfView === null || section.stations.length === 0) return null
  const [along, high] = fieldOfView
  const middle = (Math.min(...section.stations) + Math.max(...section.stations)) / 2
  const number = (value: number): string => formatNumber(fromBase(value, length), 3)
  const { surface, floor, side, bore } = result.walls
  const past =
    high / 2 >
    Math.min(bore === null ? (surface ?? Infinity) : bore / 2, bore === null ? (floor ?? Infinity) : (side ?? Infinity))
  return {
    xMin: middle - along / 2,
    xMax: middle + along / 2,
    half: high / 2,
    thickness: sheetThickness,
    label: `camera field ${number(along)} × ${number(high)} ${length}${past ? ', past the water' : ''}`,
    sheetLabel:
      sheetThickness === null ? 'light sheet' : `light sheet ${formatQuantity(sheetThickness, length, 2)} thick`,
  }
}

function cameraOf(
  { camera }: TankRunSection,
  field: TankSceneField,
  { bodyLength }: TankSceneUnits,
): TankSceneCamera | null {
  const { standOff, waterPath, windowThickness } = camera
  if (standOff === null || waterPath === null) return null
  const away = standOff + waterPath + (windowThickness ?? 0)
  return {
    at: { x: (field.xMin + field.xMax) / 2, r: -away },
    sees: [field.xMin, field.xMax],
    label: `camera, ${formatQuantity(away, bodyLength, 3)} from the sheet`,
  }
}

function extentsOf(
  { nozzle, result, section }: TankSceneInput,
  rear: number,
  field: TankSceneField | null,
  reach: number,
): TankSceneModel['extents'] {
  const { walls, path } = result
  const ring = path === null ? nozzle.diameter : path.radiusHigh.reduce((a, b) => Math.max(a, b), 0)
  const near = Math.max(2.2 * ring, 1.2 * nozzle.diameter, 1.12 * (field?.half ?? 0))
  const behind = rear - 0.4 * nozzle.diameter
  const open = Math.max(reach, field?.xMax ?? 0) + 3 * nozzle.diameter
  const far = (distance: number | null): number => distance ?? Math.max(near, 6 * nozzle.diameter)
  const half = far(walls.bore === null ? walls.side : walls.bore / 2)
  const whole: TankExtent = {
    xMin: behind,
    xMax: Math.max(walls.end ?? open, ...section.stations.map((x) => x + nozzle.diameter)),
    across: [
      [-half, half],
      [walls.bore === null ? -far(walls.floor) : -half, walls.bore === null ? far(walls.surface) : half],
    ],
  }
  const clipped = (low: number, high: number): readonly [number, number] => [Math.max(low, -near), Math.min(high, near)]
  const [plan, side] = whole.across
  const cut: TankExtent = {
    xMin: behind,
    xMax: Math.min(whole.xMax, open),
    across: [clipped(Math.max(plan[0], -1.8 * ring), Math.min(plan[1], 1.8 * ring)), clipped(side[0], side[1])],
  }
  return { whole, path: cut }
}

function conventionsOf({ section, nozzle, result }: TankSceneInput, camera: TankSceneCamera | null): string[] {
  const told = ['Nozzle upstream of its exit: a convention.']
  if (result.imaging.fieldOfView !== null && section.stations.length > 0)
    told.push('Camera field about the middle of the stations.')
  if (camera !== null) told.push('Camera drawn nearer than it stands.')
  const missing = [
    section.tank.length === null ? 'length' : '',
    section.tank.bore === null && section.tank.width === null ? 'width' : '',
    section.tank.bore === null && section.tank.depth === null ? 'depth' : '',
  ].filter((word) => word !== '')
  if (missing.length > 0) told.push(`Tank ${missing.join(', ')} not given: drawn open.`)
  if (nozzle.axisRatio !== 1) told.push('The exit is drawn as a round one of equal area.')
  return told
}

function describe(
  { section, nozzle, result }: TankSceneInput,
  { length, bodyLength, wakeTime }: TankSceneUnits,
): string {
  const { tank } = section
  const size = (name: string, value: number | null): string =>
    value === null ? '' : `${name} ${formatQuantity(value, bodyLength)}`
  const sizes =
    tank.bore === null
      ? [size('length', tank.length), size('width', tank.width), size('depth of water', tank.depth)]
      : [size('length', tank.length), size('bore', tank.bore)]
  const told = sizes.filter((text) => text !== '')
  const arrivals = result.arrivals.map((arrival) => {
    const when = timeText(arrival, wakeTime)
    return `at ${formatQuantity(arrival.station, length)} ${when === null ? 'no ring is seen' : `the ring comes by at ${when}`}`
  })
  const walls = result.clearances.map(({ text }) => text)
  return [
    `Drawing to scale from above and from the side: a tank${told.length === 0 ? ' of sizes not given' : ` of ${told.join(', ')}`}, nozzle of exit diameter ${formatQuantity(nozzle.diameter, length)}.`,
    arrivals.length === 0 ? 'No stations.' : `Stations: ${arrivals.join('; ')}.`,
    ...walls,
  ].join(' ')
}
