/**
 * The tank as numbers to draw: seen from above and from the side, to one scale. SI lengths; x along the jet from the exit plane, r from
 * its axis: to the left of the jet in the view from above, up in the view from the side.
 */
import type { ScenePoint, WallStation } from './sceneTypes'

export interface TankSceneWall {
  readonly kind: 'wall' | 'surface'
  /** r of the wall, negative below the axis in the drawing. */
  readonly r: number
}

/** A dimension line; `warn` where it is less than it should be. */
export interface TankDimension {
  readonly from: ScenePoint
  readonly to: ScenePoint
  readonly label: string
  readonly warn: boolean
}

export interface TankSceneField {
  readonly xMin: number
  readonly xMax: number
  /** Half of its height; 0 where it is seen on edge. */
  readonly half: number
  /** Of the light sheet; null where it is not known. */
  readonly thickness: number | null
  readonly label: string
  readonly sheetLabel: string
}

/** Lens and the ends of what it sees; r is negative: the camera stands on the viewer's side of the tank. */
export interface TankSceneCamera {
  readonly at: ScenePoint
  readonly sees: readonly [number, number]
  readonly label: string
}

export interface TankView {
  readonly id: 'plan' | 'side'
  readonly title: string
  /** Walls across the axis; an absent one is not told. */
  readonly walls: readonly TankSceneWall[]
  /** Distances between ring and walls, in exit diameters. */
  readonly clearances: readonly TankDimension[]
  /** Whole width or depth, right of the view; null where it is not told. */
  readonly size: TankDimension | null
  readonly field: TankSceneField | null
  readonly camera: TankSceneCamera | null
}

export interface TankSceneStation {
  readonly x: number
  /** What stands beside it, longest first. */
  readonly labels: readonly string[]
  /** The ring there; null where none comes by. */
  readonly ring: { readonly radius: number; readonly coreRadius: number } | null
  /** First and last place a ring of the range may be at when the adopted one is here; null where that is not known. */
  readonly spread: readonly [number, number] | null
}

/** Way of the ring's core and how far out the widest of the range runs. */
export interface TankScenePath {
  readonly x: readonly number[]
  readonly radius: readonly number[]
  readonly radiusHigh: readonly number[]
}

export interface TankSceneModel {
  readonly nozzle: readonly WallStation[]
  readonly path: TankScenePath | null
  readonly stations: readonly TankSceneStation[]
  /** From above, then from the side. */
  readonly views: readonly [TankView, TankView]
  /** x of the far wall; null: not told, and the tank is drawn open. */
  readonly end: number | null
  /** Exit plane to far wall. */
  readonly length: TankDimension | null
  /** A bar in round units, for the part of the tank about the path. */
  readonly scaleBar: { readonly length: number; readonly label: string }
  /** What is drawn: the whole tank, or only where the ring runs. */
  readonly extents: Readonly<Record<TankExtentName, TankExtent>>
  readonly description: string
  readonly conventions: readonly string[]
}

export type TankExtentName = 'whole' | 'path'

export interface TankExtent {
  readonly xMin: number
  readonly xMax: number
  /** Lowest and highest r of each view, from above first. */
  readonly across: readonly [readonly [number, number], readonly [number, number]]
}
