/**
 * The drawing of one pulse as numbers: nozzle, slug and ring to scale. SI lengths; x along the jet from the exit plane, r from the axis.
 */
import type { NozzleShape } from '../pulse'

/** A point of a meridional half-plane; r < 0 only in dimension lines, where it means below the axis in the drawing. */
export interface ScenePoint {
  readonly x: number
  readonly r: number
}

/** A cut through the nozzle wall: its inner and outer face at one station. */
export interface WallStation {
  readonly inner: ScenePoint
  readonly outer: ScenePoint
}

export interface SceneNozzle {
  readonly shape: NozzleShape
  readonly diameter: number
  /** Wall thickness drawn, a convention. */
  readonly wall: number
  /** Length drawn [m], at least the slug's. */
  readonly length: number
  /** From the rear to the lip. */
  readonly stations: readonly WallStation[]
}

export interface SceneSlug {
  /** Slug length at the exit [m], which is the stroke. */
  readonly stroke: number
  readonly diameter: number
  /** Meridian of the water that one stroke pushes out, from its rear face to the exit plane. Its volume is stroke x exit area. */
  readonly outline: readonly ScenePoint[]
  /** True where the stroke is too long to draw and the slug is cut short. */
  readonly shortened: boolean
}

export interface SceneRing {
  /** Centre of the core section and mean core radius L_r. */
  readonly x: number
  readonly radius: number
  readonly meanCoreRadius: number
  readonly coreRatio: number
  /** Closed outline of the core section. */
  readonly core: readonly ScenePoint[]
  /** Outline of the fluid carried along; open where it meets the axis. */
  readonly carried: readonly ScenePoint[]
}

export interface SceneArrow {
  readonly from: number
  readonly to: number
  readonly label: string
}

/** A column of fluid on the axis from the exit plane on. */
export interface SceneColumn {
  readonly length: number
  readonly diameter: number
  readonly label: string
}

export interface SceneBar {
  readonly from: ScenePoint
  readonly to: ScenePoint
  readonly label: string
}

/** A dimension the user may edit, with the plan path behind it. */
export interface SceneCallout extends SceneBar {
  readonly path: 'nozzle.diameter' | 'programme.stroke' | 'programme.peakSpeed'
  /** How the line ends: ticks of a dimension, or the head of a speed arrow. */
  readonly ends: 'ticks' | 'arrow'
}

export interface SceneExtent {
  readonly xMin: number
  readonly xMax: number
  readonly rMax: number
}

export interface PulseSceneModel {
  readonly nozzle: SceneNozzle
  readonly slug: SceneSlug
  /** Null where no ring is expected. */
  readonly ring: SceneRing | null
  /** Ring at the other end of the range, drawn as a thin outline. */
  readonly ghost: SceneRing | null
  readonly speed: SceneArrow | null
  readonly trailingJet: SceneColumn | null
  readonly scaleBar: SceneBar
  readonly callouts: readonly SceneCallout[]
  readonly labels: { readonly core: string; readonly carried: string }
  /** Everything drawn lies inside. */
  readonly extent: SceneExtent
  /** The drawing in words. */
  readonly description: string
  /** What in the drawing is convention and not a result, in sentences. */
  readonly conventions: readonly string[]
}
