/** The starting jet in its meridional plane, as numbers. SI lengths; x along the jet from the exit plane, r from the axis. */
import type { JetSnapshot } from '../coaxial'
import type { JetTimeline } from './jetTimeline'
import type { SceneExtent, SceneNozzle } from './sceneTypes'

export interface JetSceneUnits {
  /** For instance `mm`. */
  readonly length: string
  /** Of ages, for instance `s`. */
  readonly time: string
}

/** The ring at a time: where its circulation is. */
export interface JetSceneRing {
  readonly x: number
  readonly radius: number
}

export interface JetSceneModel {
  readonly diameter: number
  /** The same in the shown unit. */
  readonly diameterText: string
  readonly nozzle: SceneNozzle
  readonly timeline: JetTimeline
  /** Every computed shape, in the order of their times. */
  readonly shapes: readonly JetSnapshot[]
  /** The ring at each of them; null before a ring is cut. */
  readonly rings: readonly (JetSceneRing | null)[]
  /** Everything drawn at any time lies inside. */
  readonly extent: SceneExtent
  readonly units: JetSceneUnits
  /** What in the drawing is convention and not a result, in sentences. */
  readonly conventions: readonly string[]
}
