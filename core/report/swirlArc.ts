/**
 * The arc that shows which way a core turns: forward next to the axis, back on the outside.
 */
import type { ScenePoint, SceneRing } from './sceneTypes'

/** Ends of the arc about the middle of the core section, from downstream over the outside to upstream [rad]. */
const FROM = -0.12 * Math.PI
const TO = 0.7 * Math.PI

/**
 * Points of the arc in the order the fluid goes, outside the core outline by a gap.
 *
 * @param gap distance from the outline [m].
 */
export function swirlArc(ring: SceneRing, gap: number): readonly ScenePoint[] {
  const count = ring.core.length
  const centre = ring.core.reduce((sum, { x, r }) => ({ x: sum.x + x / count, r: sum.r + r / count }), { x: 0, r: 0 })
  return ring.core
    .map(({ x, r }) => {
      const [dx, dr] = [x - centre.x, r - centre.r]
      const reach = Math.hypot(dx, dr)
      const grown = reach > 0 ? 1 + gap / reach : 1
      return { angle: Math.atan2(dr, dx), x: centre.x + dx * grown, r: centre.r + dr * grown }
    })
    .filter(({ angle }) => angle > FROM && angle < TO)
    .sort((a, b) => a.angle - b.angle)
    .map(({ x, r }) => ({ x, r }))
}
