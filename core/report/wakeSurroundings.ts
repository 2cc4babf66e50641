/**
 * What stands around rings in motion: nozzles, wall, tube, stations and the lines rings set out on, as far as they are drawn.
 */
import { at } from '../base'
import { acrossOf, PLAIN_NOZZLE, type Vector, type WakeRing, type WakeWall } from '../filament'
import type { Plan, WakeSection } from '../plan'
import { formatQuantity } from '../quantity'
import { nozzleOutline } from './nozzleOutline'
import { inner, plus, unitVector } from './spaceVectors'
import type { Hull } from './wakeSceneReach'
import type { WakeSceneLine, WakeSceneNozzle, WakeSceneStation, WakeSceneTube, WakeSceneWall } from './wakeSceneTypes'

export function nozzlesOf(plan: Plan, section: WakeSection, unit: string): WakeSceneNozzle[] {
  // A short slug: the nozzle stands for where rings come from, not for the stroke.
  const outline = nozzleOutline(plan.nozzle, plan.nozzle.diameter).nozzle
  const ratio = plan.nozzle.axisRatio
  const given = section.nozzles.length === 0 ? [PLAIN_NOZZLE] : section.nozzles
  const size = formatQuantity(plan.nozzle.diameter, unit)
  return given.map(({ position, direction }, index) => {
    const forward = unitVector(direction)
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

export function nozzlePoints({ position, axes, outline }: WakeSceneNozzle): Vector[] {
  const radius = outline.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0)
  return [0, -outline.length].flatMap((x) =>
    [-1, 1].flatMap((side) => [axes[1], axes[2]].map((axis) => plus(plus(position, axes[0], x), axis, side * radius))),
  )
}

export function squarePoints([x, y, z]: Vector, half: number): Vector[] {
  return [-half, half].flatMap((a): Vector[] => [
    [x, y + a, z],
    [x, y, z + a],
  ])
}

export function circlePoints(
  centre: Vector,
  tube: { readonly from: Vector; readonly to: Vector },
  radius: number,
): Vector[] {
  const across = acrossOf(unitVector(plus(tube.to, tube.from, -1)))
  return [-radius, radius].flatMap((a) => across.map((axis) => plus(centre, axis, a)))
}

/** The wall as far as rings come beside it, and no smaller than a few of them. */
export function wallOf(
  { point, normal }: WakeWall,
  hull: Hull,
  room: number,
  nozzles: readonly WakeSceneNozzle[],
): WakeSceneWall {
  const front = unitVector(normal)
  const side = Math.sign(inner(plus(hull.middle, point, -1), front)) || 1
  const [first, second] = acrossOf(front)
  const reach = (axis: Vector): readonly [number, number] => {
    let [low, high] = [Infinity, -Infinity]
    const take = (value: number): void => {
      low = Math.min(low, value)
      high = Math.max(high, value)
    }
    for (let i = 0; i < hull.points.length; i += 3)
      take(at(hull.points, i) * axis[0] + at(hull.points, i + 1) * axis[1] + at(hull.points, i + 2) * axis[2])
    for (const nozzle of nozzles) for (const place of nozzlePoints(nozzle)) take(inner(place, axis))
    return [low - 2 * room, high + 2 * room]
  }
  const [across, up] = [reach(first), reach(second)]
  const foot = inner(point, front)
  const corner = (a: number, b: number): Vector =>
    plus(plus([front[0] * foot, front[1] * foot, front[2] * foot], first, a), second, b)
  return {
    corners: [corner(across[0], up[0]), corner(across[1], up[0]), corner(across[1], up[1]), corner(across[0], up[1])],
    behind: [-side * front[0], -side * front[1], -side * front[2]],
    label: 'wall',
  }
}

export function tubeOf(
  radius: number,
  rings: readonly WakeRing[],
  hull: Hull,
  room: number,
  unit: string,
): WakeSceneTube {
  const first = rings[0]
  const axis = first === undefined ? ([1, 0, 0] as const) : unitVector(first.direction)
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

export function stationsOf(places: readonly number[], hull: Hull, room: number, unit: string): WakeSceneStation[] {
  const [, y, z] = hull.middle
  const reach = Math.max(hull.max[1] - y, hull.max[2] - z) + room / 2
  return [...new Set(places)].map((x) => ({
    centre: [x, y, z],
    radius: reach,
    label: `station ${formatQuantity(x, unit)}`,
  }))
}

/** One line for every different line the rings set out on, at most eight. */
export function axesOf(rings: readonly WakeRing[], hull: Hull, nozzles: readonly WakeSceneNozzle[]): WakeSceneLine[] {
  const lines: WakeSceneLine[] = []
  const origins: { readonly point: Vector; readonly direction: Vector }[] = []
  for (const ring of rings) {
    if (lines.length >= 8) break
    const direction = unitVector(ring.direction)
    const known = origins.some((origin) => {
      const apart = plus(ring.centre, origin.point, -1)
      const off = plus(apart, origin.direction, -inner(apart, origin.direction))
      const turned = Math.abs(inner(direction, origin.direction))
      return turned > 1 - 1e-9 && Math.hypot(...off) < 1e-6 * hull.radius
    })
    if (known) continue
    origins.push({ point: ring.centre, direction })
    let [low, high] = [0, 0]
    const half = 2 * hull.radius
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
    const margin = 0.4 * hull.radius
    lines.push({
      from: plus(ring.centre, direction, Math.min(low, -behind) - margin),
      to: plus(ring.centre, direction, high + margin),
    })
  }
  return lines
}
