/**
 * The nozzle as it is drawn: wall stations and the slug inside them. Shapes upstream of the exit are a drawing convention; the
 * exit diameter and the volume of the slug are to scale.
 */
import { at } from '../base'
import type { NozzleInput } from '../pulse'
import type { SceneNozzle, ScenePoint, SceneSlug, WallStation } from './sceneTypes'

/** Longest slug drawn, in exit diameters; beyond it the drawing would shrink the ring to nothing. */
const LONGEST_SLUG = 12
/** Wall drawn, in exit diameters. */
const WALL = 0.06
/** Tube drawn beyond the slug at least and at most, and the least drawn at all, in exit diameters: the ring is the subject. */
const BEHIND_SLUG = 0.22
const MOST_BEHIND_SLUG = 0.6
const SHORTEST_TUBE = 1.7

/** Nozzle and slug for a stroke [m] > 0. */
export function nozzleOutline(
  nozzle: NozzleInput,
  stroke: number,
): { readonly nozzle: SceneNozzle; readonly slug: SceneSlug } {
  const { diameter } = nozzle
  const wall = WALL * diameter
  const shown = Math.min(stroke, LONGEST_SLUG * diameter)
  const chamber = nozzle.shape === 'tube' ? diameter : Math.max(nozzle.pistonDiameter, diameter)
  const mouth = mouthOf(nozzle, chamber, wall)
  // Water left for the chamber once the mouth is full.
  const rest = Math.max(0, (shown * diameter * diameter) / 4 - mouthVolume(mouth))
  const mouthLength = -at(mouth, 0).x
  const slugLength = mouthLength + rest / ((chamber * chamber) / 4)
  const asked = nozzle.shape === 'tube' ? Math.min(nozzle.length, slugLength + MOST_BEHIND_SLUG * diameter) : 0
  const length = Math.max(slugLength + BEHIND_SLUG * diameter, asked, mouthLength + SHORTEST_TUBE * diameter)
  const rear: ScenePoint = { x: -length, r: chamber / 2 }
  const inner = [rear, ...mouth]
  return {
    nozzle: { shape: nozzle.shape, diameter, wall, length, stations: wallStations(inner, wall, nozzle.shape) },
    slug: {
      stroke,
      diameter,
      outline: slugMeridian(inner, (shown * diameter * diameter) / 4),
      shortened: shown < stroke,
    },
  }
}

/** Inner meridian from the chamber's end to the exit plane. */
function mouthOf(nozzle: NozzleInput, chamber: number, wall: number): ScenePoint[] {
  const exit = nozzle.diameter / 2
  const passage = Math.min(nozzle.length, LONGEST_SLUG * nozzle.diameter)
  if (nozzle.shape === 'tube' || chamber <= nozzle.diameter) {
    return [
      { x: -SHORTEST_TUBE * 0.1 * nozzle.diameter, r: exit },
      { x: 0, r: exit },
    ]
  }
  if (nozzle.shape === 'orifice') {
    return [
      { x: -wall, r: chamber / 2 },
      { x: -wall, r: exit },
      { x: 0, r: exit },
    ]
  }
  // A cone of one in two, and a straight passage where the plan gives one.
  const cone = chamber - nozzle.diameter
  const points = [
    { x: -passage - cone, r: chamber / 2 },
    { x: 0 - passage, r: exit },
  ]
  return passage > 0 ? [...points, { x: 0, r: exit }] : points
}

/** Volume over pi of a body of revolution between two stations: a frustum. */
function frustum(a: ScenePoint, b: ScenePoint): number {
  return ((b.x - a.x) * (a.r * a.r + a.r * b.r + b.r * b.r)) / 3
}

function mouthVolume(mouth: readonly ScenePoint[]): number {
  return mouth.slice(1).reduce((sum, point, index) => sum + frustum(at(mouth, index), point), 0)
}

/** Meridian of the last `volume` (over pi) of water before the exit. */
function slugMeridian(inner: readonly ScenePoint[], volume: number): ScenePoint[] {
  const outline: ScenePoint[] = [at(inner, inner.length - 1)]
  let left = volume
  for (let index = inner.length - 2; index >= 0 && left > 0; index -= 1) {
    const rear = at(inner, index)
    const front = at(inner, index + 1)
    const part = frustum(rear, front)
    if (part <= left) {
      outline.unshift(rear)
      left -= part
      continue
    }
    outline.unshift(cutFrustum(rear, front, left))
    left = 0
  }
  return outline
}

/** The station that leaves `volume` (over pi) between itself and the front of a frustum. */
function cutFrustum(rear: ScenePoint, front: ScenePoint, volume: number): ScenePoint {
  const slope = (rear.r - front.r) / (rear.x - front.x)
  if (Math.abs(slope) < 1e-9) return { x: front.x - volume / (front.r * front.r), r: front.r }
  // Volume to the front is (front.r^3 - r^3) / (3 slope).
  const r = Math.cbrt(front.r ** 3 - 3 * slope * volume)
  return { x: front.x + (r - front.r) / slope, r }
}

function wallStations(inner: readonly ScenePoint[], wall: number, shape: NozzleInput['shape']): WallStation[] {
  const outside = at(inner, 0).r + wall
  return inner.map((point) => ({
    inner: point,
    outer: { x: point.x, r: shape === 'orifice' ? outside : point.r + wall },
  }))
}
