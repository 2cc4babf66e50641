/**
 * Where the drawing is seen from. The projection is parallel, so the scale bar holds everywhere along the axis.
 */
import type { Pixel, PulseSceneModel, ScenePoint } from '../../core/report'
import { add, dot, unit, type Vector } from './vectors'

export interface View {
  /** Turn about the vertical [rad]: 0 from the side, pi/2 facing the oncoming ring. */
  readonly azimuth: number
  /** Height above the axis [rad]. */
  readonly elevation: number
  /** Pixels a metre. */
  readonly scale: number
  /** Point in the middle of the picture, along the screen's right and up [m]. */
  readonly centre: { readonly right: number; readonly up: number }
}

export type Angles = Pick<View, 'azimuth' | 'elevation'>

export interface Size {
  readonly width: number
  readonly height: number
}

/** Room around the drawing that labels need, in pixels. */
export interface Margins {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

export interface Basis {
  readonly right: Vector
  readonly up: Vector
  /** From the drawing to the eye. */
  readonly toward: Vector
  /** Radial direction in which outlines and dimensions are drawn: square to the view where there is one. */
  readonly radial: Vector
}

export type StandardView = 'side' | 'threeQuarter' | 'endOn' | 'above'

const DEGREE = Math.PI / 180
export const STANDARD_VIEWS: Readonly<Record<StandardView, Angles>> = {
  side: { azimuth: 0, elevation: 0 },
  threeQuarter: { azimuth: 24 * DEGREE, elevation: 13 * DEGREE },
  endOn: { azimuth: 90 * DEGREE, elevation: 0 },
  above: { azimuth: 0, elevation: 90 * DEGREE },
}

const HIGHEST = 85 * DEGREE

export function basisOf(view: Angles): Basis {
  const [sa, ca, se, ce] = [
    Math.sin(view.azimuth),
    Math.cos(view.azimuth),
    Math.sin(view.elevation),
    Math.cos(view.elevation),
  ]
  const toward: Vector = [sa * ce, se, ca * ce]
  const across = Math.hypot(toward[1], toward[2])
  // toward x e_x, the radial direction square to the view; seen along the axis any will do.
  const square: Vector = across < 1e-3 ? [0, 1, 0] : unit([0, toward[2], -toward[1]])
  return {
    right: [ca, 0, -sa],
    up: [-sa * se, ce, -ca * se],
    toward,
    radial: square[1] < 0 ? [0, -square[1], -square[2]] : square,
  }
}

/** A point of the meridional half-plane that faces the eye. */
export function inSpace(point: ScenePoint, basis: Basis): Vector {
  return [point.x, point.r * basis.radial[1], point.r * basis.radial[2]]
}

export function project(point: Vector, basis: Basis, view: View, size: Size): Pixel {
  return {
    x: size.width / 2 + (dot(point, basis.right) - view.centre.right) * view.scale,
    y: size.height / 2 - (dot(point, basis.up) - view.centre.up) * view.scale,
  }
}

/** Turned by angles, never over the top. */
export function turned(view: View, azimuth: number, elevation: number): View {
  return {
    ...view,
    azimuth: view.azimuth + azimuth,
    elevation: Math.min(HIGHEST, Math.max(-HIGHEST, view.elevation + elevation)),
  }
}

/** Magnified about a pixel, which stays where it is. */
export function magnified(
  view: View,
  factor: number,
  about: Pixel,
  size: Size,
  limits: readonly [number, number],
): View {
  const scale = Math.min(limits[1], Math.max(limits[0], view.scale * factor))
  const [dx, dy] = [about.x - size.width / 2, size.height / 2 - about.y]
  const shift = 1 / view.scale - 1 / scale
  return { ...view, scale, centre: { right: view.centre.right + dx * shift, up: view.centre.up + dy * shift } }
}

/** Moved across the picture by pixels. */
export function shifted(view: View, dx: number, dy: number): View {
  return {
    ...view,
    centre: { right: view.centre.right - dx / view.scale, up: view.centre.up + dy / view.scale },
  }
}

/** A part of the picture's plane, along the screen's right and up [m]. */
export interface Frame {
  readonly left: number
  readonly right: number
  readonly bottom: number
  readonly top: number
}

/** What the drawing covers on the screen's right and up, in metres. */
export function projectedFrame(model: PulseSceneModel, basis: Basis): Frame {
  let frame: Frame = { left: Infinity, right: -Infinity, bottom: Infinity, top: -Infinity }
  const take = (point: Vector, reachRight: number, reachUp: number): void => {
    const [x, y] = [dot(point, basis.right), dot(point, basis.up)]
    frame = {
      left: Math.min(frame.left, x - reachRight),
      right: Math.max(frame.right, x + reachRight),
      bottom: Math.min(frame.bottom, y - reachUp),
      top: Math.max(frame.top, y + reachUp),
    }
  }
  // A circle about the axis reaches r |component square to the axis| along any direction.
  const sideways = Math.hypot(basis.right[1], basis.right[2])
  const upward = Math.hypot(basis.up[1], basis.up[2])
  const circle = (point: ScenePoint): void => take([point.x, 0, 0], point.r * sideways, point.r * upward)
  for (const { outer } of model.nozzle.stations) circle(outer)
  for (const ring of [model.ring, model.ghost]) {
    if (ring === null) continue
    for (const point of ring.core) circle(point)
    for (const point of ring.carried) circle(point)
  }
  for (const bar of [...model.callouts, model.scaleBar]) {
    for (const end of [bar.from, bar.to]) take(inSpace(end, basis), 0, 0)
  }
  const bar = (model.scaleBar.to.x - model.scaleBar.from.x) / 2
  take(inSpace({ x: 0, r: model.scaleBar.from.r }, basis), Math.abs(basis.toward[0]) * bar, 0)
  if (model.speed !== null) take([model.speed.to, 0, 0], 0, 0)
  if (model.trailingJet !== null) circle({ x: model.trailingJet.length, r: model.trailingJet.diameter / 2 })
  return frame
}

/** The scale and centre at which everything drawn fills the picture. */
export function fitted(model: PulseSceneModel, angles: Angles, size: Size, margins: Margins): View {
  return fittedTo(projectedFrame(model, basisOf(angles)), angles, size, margins)
}

/** The scale and centre at which a frame fills the picture. */
export function fittedTo(frame: Frame, angles: Angles, size: Size, margins: Margins): View {
  const width = Math.max(40, size.width - margins.left - margins.right)
  const height = Math.max(40, size.height - margins.top - margins.bottom)
  const scale = Math.min(width / (frame.right - frame.left), height / (frame.top - frame.bottom))
  return {
    azimuth: angles.azimuth,
    elevation: angles.elevation,
    scale,
    centre: {
      right: (frame.left + frame.right) / 2 + (margins.right - margins.left) / 2 / scale,
      up: (frame.bottom + frame.top) / 2 + (margins.top - margins.bottom) / 2 / scale,
    },
  }
}

/**
 * A view that still shows everything while the plan is dragged: kept as long as the drawing stays inside and is not small, so that a
 * longer stroke looks longer.
 */
export function followed(view: View, model: PulseSceneModel, size: Size, margins: Margins): View {
  const best = fitted(model, view, size, margins)
  const frame = projectedFrame(model, basisOf(view))
  const left = size.width / 2 + (frame.left - view.centre.right) * view.scale
  const right = size.width / 2 + (frame.right - view.centre.right) * view.scale
  const top = size.height / 2 - (frame.top - view.centre.up) * view.scale
  const bottom = size.height / 2 - (frame.bottom - view.centre.up) * view.scale
  const inside =
    left >= margins.left * 0.8 &&
    right <= size.width - margins.right * 0.8 &&
    top >= margins.top * 0.8 &&
    bottom <= size.height - margins.bottom * 0.8
  return inside && view.scale > 0.75 * best.scale ? view : best
}

/** Middle of the drawing in space, for the camera to look at. */
export function lookedAt(view: View, basis: Basis): Vector {
  return add(add([0, 0, 0], basis.right, view.centre.right), basis.up, view.centre.up)
}
