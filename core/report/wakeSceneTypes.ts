/**
 * The drawing of rings in motion as numbers: what stands still around them, and the run they are drawn from. SI; x along the jet,
 * y up, z toward someone who looks from the side.
 */
import type { FieldPlane, Vector, Wake } from '../filament'
import type { SceneNozzle } from './sceneTypes'

export interface WakeSceneRing {
  /** From 1, as in tables and files. */
  readonly number: number
  /**
   * Which way it turned when it appeared: 1 as a ring that moves toward +x, -1 as one that moves toward -x. Square to x, where neither
   * holds, the sign of its circulation.
   */
  readonly sense: 1 | -1
}

/** An exit the rings come from, drawn cut open. */
export interface WakeSceneNozzle {
  /** Middle of the exit [m]. */
  readonly position: Vector
  /** Unit vectors: along the jet, then across it; right-handed. */
  readonly axes: readonly [Vector, Vector, Vector]
  /** Extent along the second and third of them over that of the circle of equal area. */
  readonly stretch: readonly [number, number]
  readonly outline: SceneNozzle
  readonly label: string
}

/** The part of a plane wall that is drawn. */
export interface WakeSceneWall {
  /** In order around it. */
  readonly corners: readonly [Vector, Vector, Vector, Vector]
  /** Unit normal into the solid, away from the rings. */
  readonly behind: Vector
  readonly label: string
}

export interface WakeSceneTube {
  readonly radius: number
  /** Ends of its axis as far as it is drawn. */
  readonly from: Vector
  readonly to: Vector
  readonly label: string
}

/** A place along x where arrivals are told, drawn as a circle of no physical size. */
export interface WakeSceneStation {
  readonly centre: Vector
  readonly radius: number
  readonly label: string
}

export interface WakeSceneLine {
  readonly from: Vector
  readonly to: Vector
}

/** The x axis with its numbers, under everything else. */
export interface WakeSceneDatum extends WakeSceneLine {
  readonly title: string
  readonly ticks: readonly { readonly place: Vector; readonly label: string }[]
}

/** Passive points carried by the flow. */
export interface WakeSceneDye {
  /** x y z of every point [m], one array for each output time. */
  readonly positions: readonly Float32Array[]
}

/** A field on a flat rectangle through the rings, with the unit its scale is read in. */
export interface WakeScenePlane extends FieldPlane {
  readonly unit: string
}

export interface WakeSceneModel {
  readonly wake: Wake
  /** In the order of their numbers. */
  readonly rings: readonly WakeSceneRing[]
  readonly nozzles: readonly WakeSceneNozzle[]
  readonly wall: WakeSceneWall | null
  readonly tube: WakeSceneTube | null
  readonly stations: readonly WakeSceneStation[]
  /** Lines along which rings set out. */
  readonly axes: readonly WakeSceneLine[]
  readonly datum: WakeSceneDatum
  /** An arrow is the way a ring makes in this time [s]. */
  readonly arrowTime: number
  /** Shown units. */
  readonly units: { readonly length: string; readonly speed: string }
  /** x y z of points that outline everything that is ever drawn, for fitting the view. */
  readonly reach: Float32Array
  readonly dye: WakeSceneDye | null
  readonly plane: WakeScenePlane | null
  /** The drawing in words. */
  readonly description: string
  /** What in the drawing is convention and not a result, in sentences. */
  readonly conventions: readonly string[]
}
