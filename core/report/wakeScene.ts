/**
 * The drawing of rings in motion: nozzles, wall, tube, stations, axes and reach around a run, all to one scale.
 *
 * What is drawn of the rings themselves is read from the run at each output time; here stands what does not move.
 */
import { at } from '../base'
import { acrossOf, PLAIN_NOZZLE, sharedAxis, type Vector, type Wake, type WakeRing, type WakeWall } from '../filament'
import type { Plan, WakeSection } from '../plan'
import { formatNumber, formatQuantity, fromBase, toBase } from '../quantity'
import { nozzleOutline } from './nozzleOutline'
import { tickStep } from './ticks'
import { hullOfRings, type Hull } from './wakeSceneReach'
import type {
  WakeSceneDatum,
  WakeSceneLine,
  WakeSceneModel,
  WakeSceneNozzle,
  WakeSceneRing,
  WakeSceneStation,
  WakeSceneTube,
  WakeSceneWall,
} from './wakeSceneTypes'

/** What the drawing needs of a run. */
export interface WakeSceneData {
  readonly rings: readonly WakeRing[]
  readonly wake: Wake
}

export interface WakeSceneUnits {
  /** Symbols of the shown units, for instance `mm` and `mm/s`. */
  readonly length: string
  readonly speed: string
}

/** The fastest ring's arrow, in radii of the largest ring. */
const LONGEST_ARROW = 1.5
/** Room around the rings up to frames of walls and stations, in radii of the largest ring. */
const ROOM = 0.45
/** Parts the x axis is cut into at most. */
const TICKS = 10
/** A direction this near to square to x has no sense along it. */
const SQUARE = 1e-6

/** Geometry around the rings of a run, and how it is read. */
export function wakeScene(data: WakeSceneData, plan: Plan, units: WakeSceneUnits): WakeSceneModel {
  const { wake, rings } = data
  const section = plan.wake
  const hull = hullOfRings(wake, rings)
  const nozzles = section === null || section.rings.length > 0 ? [] : nozzlesOf(plan, section, units.length)
  const room = ROOM * hull.radius
  const wall = section?.wall == null ? null : wallOf(section.wall, hull, room, nozzles)
  const tube = section?.tube == null ? null : tubeOf(section.tube, rings, hull, room, units.length)
  const stations = stationsOf(section?.stations ?? [], hull, room, units.length)
  const fixed = [
    ...nozzles.flatMap(nozzlePoints),
    ...(wall?.corners ?? []),
    ...(tube === null ? [] : [...circlePoints(tube.from, tube, tube.radius), ...circlePoints(tube.to, tube, tube.radius)]),
    ...stations.flatMap(({ centre, radius }) => squarePoints(centre, radius)),
  ]
  const datum = datumOf(hull, fixed, room, units.length)
  const conventions: string[] = []
  const arrowTime = arrowTimeOf(wake, hull.radius)
  if (arrowTime > 0) conventions.push(`Arrows: the way in ${formatQuantity(arrowTime, 's', 1)}.`)
  if (nozzles.length > 0) conventions.push('Nozzles upstream of their exits: a convention.')
  return {
    wake,
    rings: rings.map((ring, index): WakeSceneRing => ({ number: index + 1, sense: senseOf(ring) })),
    nozzles,
    wall,
    tube,
    stations,
    axes: axesOf(rings, hull, nozzles),
    datum,
    arrowTime,
    units: { length: units.length, speed: units.speed },
    reach: Float32Array.from([...hull.points, ...fixed.flat(), ...datum.from, ...datum.to]),
    dye: null,
    plane: null,
    description: describe(data, { nozzles, wall, tube, stations }, units),
    conventions,
  }
}

/** Which way a ring turns, by the way it would move alone. */
function senseOf(ring: WakeRing): 1 | -1 {
  const along = ring.direction[0] / Math.hypot(...ring.direction)
  const sense = Math.abs(along) < SQUARE ? ring.circulation : ring.circulation * along
  return sense < 0 ? -1 : 1
}

function plus(a: Vector, b: Vector, factor = 1): Vector {
  return [a[0] + factor * b[0], a[1] + factor * b[1], a[2] + factor * b[2]]
}

function inner(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

function unitOf(a: Vector): Vector {
  const length = Math.hypot(...a)
  return [a[0] / length, a[1] / length, a[2] / length]
}

function nozzlesOf(plan: Plan, section: WakeSection, unit: string): WakeSceneNozzle[] {
  // A short slug: the nozzle stands for where rings come from, not for the stroke.
  const outline = nozzleOutline(plan.nozzle, plan.nozzle.diameter).nozzle
  const ratio = plan.nozzle.axisRatio ?? 1
  const given = section.nozzles.length === 0 ? [PLAIN_NOZZLE] : section.nozzles
  const size = formatQuantity(plan.nozzle.diameter, unit)
  return given.map(({ position, direction }, index) => {
    const forward = unitOf(direction)
    const [first, second] = acrossOf(forward)
    // The side that is cut open is turned to the eye of the side view; half a turn about the jet leaves an ellipse as it is.
    const side = second[2] < 0 ? -1 : 1
    const turned = (axis: Vector): Vector => [axis[0] * side, axis[1] * side, axis[2] * side]
    return {
      position,
      axes: [forward, turned(first), turned(second)],
      stretch: [Math.sqrt(ratio), 1 / Math.sqrt(ratio)],
      outline,
      label: given.length > 1 ? `nozzle ${index + 1}, ${size}` : `nozzle, ${size}`,
    }
  })
}

function nozzlePoints({ position, axes, outline }: WakeSceneNozzle): Vector[] {
  const radius = outline.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0)
  return [0, -outline.length].flatMap((x) =>
    [-1, 1].flatMap((side) =>
      [axes[1], axes[2]].map((axis) => plus(plus(position, axes[0], x), axis, side * radius)),
    ),
  )
}

function squarePoints([x, y, z]: Vector, half: number): Vector[] {
  return [-half, half].flatMap((a): Vector[] => [
    [x, y + a, z],
    [x, y, z + a],
  ])
}

function circlePoints(centre: Vector, tube: { readonly from: Vector; readonly to: Vector }, radius: number): Vector[] {
  const across = acrossOf(unitOf(plus(tube.to, tube.from, -1)))
  return [-radius, radius].flatMap((a) => across.map((axis) => plus(centre, axis, a)))
}

/** The wall as far as rings come beside it, and no smaller than a few of them. */
function wallOf(
  { point, normal }: WakeWall,
  hull: Hull,
  room: number,
  nozzles: readonly WakeSceneNozzle[],
): WakeSceneWall {
  const front = unitOf(normal)
  const side = Math.sign(inner(plus(hull.middle, point, -1), front)) || 1
  const [first, second] = acrossOf(front)
  const reach = (axis: Vector): readonly [number, number] => {
    let [low, high] = [Infinity, -Infinity]
    const take = (value: number): void => {
      low = Math.min(low, value)
      high = Math.max(high, value)
    }
    for (let i = 0; i < hull.points.length; i += 3)
      take(
        at(hull.points, i) * axis[0] + at(hull.points, i + 1) * axis[1] + at(hull.points, i + 2) * axis[2],
      )
    for (const nozzle of nozzles) for (const place of nozzlePoints(nozzle)) take(inner(place, axis))
    return [low - 2 * room, high + 2 * room]
  }
  const [across, up] = [reach(first), reach(second)]
  const base = plus(point, plus(point, [0, 0, 0]), 0)
  const foot = inner(base, front)
  const corner = (a: number, b: number): Vector =>
    plus(plus([front[0] * foot, front[1] * foot, front[2] * foot], first, a), second, b)
  return {
    corners: [
      corner(across[0], up[0]),
      corner(across[1], up[0]),
      corner(across[1], up[1]),
      corner(across[0], up[1]),
    ],
    behind: [-side * front[0], -side * front[1], -side * front[2]],
    label: 'wall',
  }
}

function tubeOf(radius: number, rings: readonly WakeRing[], hull: Hull, room: number, unit: string): WakeSceneTube {
  const first = rings[0]
  const axis = first === undefined ? ([1, 0, 0] as const) : unitOf(first.direction)
  const centre = first?.centre ?? [0, 0, 0]
  let [low, high] = [0, 0]
  for (let i = 0; i < hull.points.length; i += 3) {
    const place: Vector = [at(hull.points, i), at(hull.points, i + 1), at(hull.points, i + 2)]
    const along = inner(plus(place, centre, -1), axis)
    low = Math.min(low, along)
    high = Math.max(high, along)
  }
  return {
    radius,
    from: plus(centre, axis, low - room),
    to: plus(centre, axis, high + room),
    label: `tube, ${formatQuantity(2 * radius, unit)}`,
  }
}

function stationsOf(places: readonly number[], hull: Hull, room: number, unit: string): WakeSceneStation[] {
  const [, y, z] = hull.middle
  const reach = Math.max(hull.max[1] - y, hull.max[2] - z) + room / 2
  return [...new Set(places)].map((x) => ({
    centre: [x, y, z],
    radius: reach,
    label: `station ${formatQuantity(x, unit)}`,
  }))
}

/** One line for every different line the rings set out on, at most eight. */
function axesOf(rings: readonly WakeRing[], hull: Hull, nozzles: readonly WakeSceneNozzle[]): WakeSceneLine[] {
  const lines: WakeSceneLine[] = []
  const origins: { readonly point: Vector; readonly direction: Vector }[] = []
  for (const ring of rings) {
    if (lines.length >= 8) break
    const direction = unitOf(ring.direction)
    const known = origins.some((origin) => {
      const apart = plus(ring.centre, origin.point, -1)
      const off = plus(apart, origin.direction, -inner(apart, origin.direction))
      const turned = Math.abs(inner(direction, origin.direction))
      return turned > 1 - 1e-9 && Math.hypot(...off) < 1e-6 * hull.radius
    })
    if (known) continue
    origins.push({ point: ring.centre, direction })
    let [low, high] = [-hull.radius, hull.radius]
    const half = Math.max(2, 1e-9) * hull.radius
    for (let i = 0; i < hull.points.length; i += 3) {
      const place: Vector = [at(hull.points, i), at(hull.points, i + 1), at(hull.points, i + 2)]
      const apart = plus(place, ring.centre, -1)
      const along = inner(apart, direction)
      // Only rings near the line make it longer: beyond a crossing it leads nowhere.
      if (Math.hypot(...plus(apart, direction, -along)) > half) continue
      low = Math.min(low, along)
      high = Math.max(high, along)
    }
    const behind = nozzles.length === 0 ? 0 : Math.max(...nozzles.map(({ outline }) => outline.length))
    const margin = 0.25 * hull.radius
    lines.push({
      from: plus(ring.centre, direction, Math.min(low, -behind) - margin),
      to: plus(ring.centre, direction, high + margin),
    })
  }
  return lines
}

/** The x axis laid under everything drawn, at round numbers of the shown unit. */
function datumOf(hull: Hull, fixed: readonly Vector[], room: number, unit: string): WakeSceneDatum {
  const [xs, ys] = [fixed.map(([x]) => x), fixed.map(([, y]) => y)]
  const low = Math.min(hull.min[0], 0, ...xs)
  const high = Math.max(hull.max[0], ...xs)
  const y = Math.min(hull.min[1], ...ys) - room
  const z = hull.middle[2]
  const step = tickStep(fromBase(Math.max(high - low, hull.radius), unit), TICKS)
  const first = Math.floor(fromBase(low, unit) / step + 1e-9)
  const final = Math.ceil(fromBase(high, unit) / step - 1e-9)
  const place = (index: number): Vector => [toBase(index * step, unit), y, z]
  return {
    from: place(first),
    to: place(final),
    title: `x (${unit})`,
    ticks: Array.from({ length: final - first + 1 }, (_, i) => ({
      place: place(first + i),
      label: formatNumber((first + i) * step, 4),
    })),
  }
}

/** A round time in which the fastest ring goes about one and a half radii; 0 where none moves. */
function arrowTimeOf(wake: Wake, radius: number): number {
  let fastest = 0
  for (const { speed } of wake.trajectories) for (const value of speed) fastest = Math.max(fastest, Math.abs(value))
  if (!(fastest > 0) || !Number.isFinite(fastest)) return 0
  const wanted = (LONGEST_ARROW * radius) / fastest
  const step = tickStep(wanted, 1)
  // The ladder rounds up: one rung down where that would be much longer.
  return step > 1.25 * wanted ? tickStep(wanted * 0.5, 1) : step
}

function describe(
  { wake, rings }: WakeSceneData,
  around: Pick<WakeSceneModel, 'nozzles' | 'wall' | 'tube' | 'stations'>,
  units: WakeSceneUnits,
): string {
  const count = rings.length === 1 ? 'one vortex ring' : `${rings.length} vortex rings`
  const where = wake.model === 'coaxial' ? (rings.length === 1 ? 'on its axis' : 'on one axis') : 'in space'
  const parts = [`Drawing to scale: ${count} ${where} over ${formatQuantity(wake.time, 's')}.`]
  const besides = [
    ...around.nozzles.map(({ label }) => label),
    ...(around.tube === null ? [] : [around.tube.label]),
    ...(around.wall === null ? [] : ['a plane wall']),
    ...around.stations.map(({ label }) => label),
  ]
  if (besides.length > 0) parts.push(`With ${besides.join('; ')}.`)
  const against = rings.filter((ring) => senseOf(ring) < 0).length
  if (against > 0 && against < rings.length)
    parts.push(
      `${against === 1 ? 'One ring turns' : `${against} rings turn`} the other way, as a ring that moves toward −x.`,
    )
  const radii = rings.map(({ radius }) => radius)
  if (radii.length > 0)
    parts.push(`At the start the largest ring radius is ${formatQuantity(Math.max(...radii), units.length)}.`)
  return parts.join(' ')
}
