import type { CoaxialTreeSettings } from './coaxialTree'
import type { TreeSettings } from './segmentTree'

/** Tolerances the trees are made for; below, the plain sums are as fast. */
export const SEGMENT_TOLERANCE = { smallest: 1e-8, largest: 1e-2 } as const
export const COAXIAL_TOLERANCE = { smallest: 1e-9, largest: 1e-2 } as const

/**
 * Measured errors: relative root mean square over the points of 64 and 256 rings of 256 segments at random places, not
 * touching, is `error` at `opening` and falls with that power of the opening.
 */
const SEGMENTS = [
  { order: 6, opening: 0.42, error: 1e-4, power: 7.5, from: 2e-5, mixed: true },
  { order: 8, opening: 0.32, error: 1e-6, power: 8.6, from: 1e-6, mixed: true },
  { order: 10, opening: 0.32, error: 6e-8, power: 10.5, from: 0, mixed: false },
] as const

/** Past this opening the expansions converge too slowly for the laws above. */
const WIDEST_OPENING = 0.6

/** Points in a leaf: fewer make more work between cells, more make more pairs. */
const SEGMENT_LEAF = 48
const COAXIAL_LEAF = 32

/** Settings whose error is expected somewhat below `tolerance`, a relative root mean square. */
export function segmentTreeSettings(tolerance: number): TreeSettings {
  const row = SEGMENTS.find(({ from }) => tolerance >= from) ?? SEGMENTS[2]
  const opening = Math.min(WIDEST_OPENING, row.opening * ((0.8 * tolerance) / row.error) ** (1 / row.power))
  return { order: row.order, opening, leafSize: SEGMENT_LEAF, mixed: row.mixed }
}

/** Settings for another try when the error came out above the tolerance. */
export function sharperSegmentTree(settings: TreeSettings, tolerance: number, error: number): TreeSettings {
  const factor = 0.9 * (tolerance / error) ** (1 / (settings.order + 1.5))
  return { ...settings, opening: settings.opening * Math.min(0.9, Math.max(0.3, factor)) }
}

/** Measured errors on a rolled sheet of 10000 rings, delta alike or differing. */
const COAXIAL = [
  { points: 4, room: 1.6, error: 1e-3 },
  { points: 5, room: 2, error: 9.5e-5 },
  { points: 6, room: 2.2, error: 6.5e-6 },
  { points: 7, room: 2.6, error: 4.5e-7 },
  { points: 8, room: 2.9, error: 2.5e-8 },
  { points: 9, room: 2.9, error: 3.2e-9 },
  { points: 10, room: 2.9, error: 7.5e-10 },
] as const

/** Settings whose error is expected below `tolerance`, a relative root mean square. */
export function coaxialTreeSettings(tolerance: number): CoaxialTreeSettings {
  const { points, room } = COAXIAL.find(({ error }) => error <= tolerance) ?? COAXIAL[6]
  return { points, room, leafSize: COAXIAL_LEAF }
}

/** Settings for another try when the error came out above the tolerance. */
export function sharperCoaxialTree(settings: CoaxialTreeSettings): CoaxialTreeSettings {
  return { ...settings, points: settings.points + 1, room: settings.room * 1.15 }
}
