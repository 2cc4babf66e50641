/**
 * The drawing of rings in motion: nozzles, wall, tube, stations, axes and reach around a run, all to one scale.
 *
 * What is drawn of the rings themselves is read from the run at each output time; here stands what does not move.
 */
import type { Vector, Wake, WakeRing } from '../filament'
import type { Plan } from '../plan'
import { formatNumber, formatQuantity, fromBase, toBase } from '../quantity'
import { tickStep } from './ticks'
import { hullOfRings, type Hull } from './wakeSceneReach'
import type { WakeSceneDatum, WakeSceneModel, WakeSceneRing } from './wakeSceneTypes'
import {
  axesOf,
  circlePoints,
  nozzlePoints,
  nozzlesOf,
  squarePoints,
  stationsOf,
  tubeOf,
  wallOf,
} from './wakeSurroundings'

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
const LONGEST_ARROW = 2.4
/** Room around the rings up to frames of walls and stations, in radii of the largest ring. */
const ROOM = 0.45
/** Parts the x axis is cut into at most. */
const TICKS = 10
/** Fall of the line of sight of the standard view, per length toward the eye. */
const SLOPE = 0.3
/** A direction this near to square to x has no sense along it. */
const SQUARE = 1e-6

/** Geometry around the rings of a run, and how it is read. */
export function wakeScene(data: WakeSceneData, plan: Plan, units: WakeSceneUnits): WakeSceneModel {
  const { wake, rings } = data
  const section = plan.wake
  const hull = hullOfRings(wake, rings)
  const nozzles = section === null || section.rings.length > 0 ? [] : nozzlesOf(plan, section, units.length)
  const room = ROOM * hull.radius
  const { wall: plane = null, tube: round = null } = section ?? {}
  const wall = plane === null ? null : wallOf(plane, hull, room, nozzles)
  const tube = round === null ? null : tubeOf(round, rings, hull, room, units.length)
  const stations = stationsOf(section?.stations ?? [], hull, room, units.length)
  const fixed = [
    ...nozzles.flatMap(nozzlePoints),
    ...(wall?.corners ?? []),
    ...(tube === null
      ? []
      : [...circlePoints(tube.from, tube, tube.radius), ...circlePoints(tube.to, tube, tube.radius)]),
    ...stations.flatMap(({ centre, radius }) => squarePoints(centre, radius)),
  ]
  const axes = axesOf(rings, hull, nozzles)
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
    axes,
    datum,
    arrowTime,
    units: { length: units.length, speed: units.speed },
    reach: Float32Array.from([
      ...hull.points,
      ...fixed.flat(),
      ...[...axes, datum].flatMap(({ from, to }) => [...from, ...to]),
    ]),
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

/** The x axis laid under everything drawn, at round numbers of the shown unit. */
function datumOf(hull: Hull, fixed: readonly Vector[], room: number, unit: string): WakeSceneDatum {
  const xs = fixed.map(([x]) => x)
  const low = Math.min(hull.min[0], 0, ...xs)
  const high = Math.max(hull.max[0], ...xs)
  const z = hull.middle[2]
  // Seen a little from above, what stands nearer to the eye hangs lower.
  const y = Math.min(hull.min[1], ...fixed.map((place) => place[1] - SLOPE * Math.max(0, place[2] - z))) - room
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

/** A round time in which the fastest ring goes two radii or so; 0 where none moves. */
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
