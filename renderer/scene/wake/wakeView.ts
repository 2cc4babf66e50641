/**
 * What of the wake the picture covers: everything that is ever drawn, or the surroundings of one ring.
 */
import type { RingShape } from '../../../core/filament'
import type { WakeSceneModel } from '../../../core/report'
import { dot } from '../vectors'
import { basisOf, fittedTo, type Angles, type Margins, type Size, type View } from '../view'

/** Width and height shown about a followed ring, in its radii. */
const AROUND = { right: 5.5, up: 3.2 }

export function fittedWake(model: WakeSceneModel, angles: Angles, size: Size, margins: Margins): View {
  const { right, up } = basisOf(angles)
  const frame = { left: Infinity, right: -Infinity, bottom: Infinity, top: -Infinity }
  const { reach } = model
  for (let i = 0; i < reach.length; i += 3) {
    const [x, y, z] = [reach[i] ?? 0, reach[i + 1] ?? 0, reach[i + 2] ?? 0]
    const across = x * right[0] + y * right[1] + z * right[2]
    const upward = x * up[0] + y * up[1] + z * up[2]
    frame.left = Math.min(frame.left, across)
    frame.right = Math.max(frame.right, across)
    frame.bottom = Math.min(frame.bottom, upward)
    frame.top = Math.max(frame.top, upward)
  }
  return fittedTo(frame, angles, size, margins)
}

/** The same view with a ring in the middle. */
export function centredOn(view: View, { centre }: RingShape): View {
  const { right, up } = basisOf(view)
  return { ...view, centre: { right: dot(centre, right), up: dot(centre, up) } }
}

/** A ring and its neighbourhood fill the picture. */
export function fittedRing(ring: RingShape, angles: Angles, size: Size, margins: Margins): View {
  const { right, up } = basisOf(angles)
  const [x, y] = [dot(ring.centre, right), dot(ring.centre, up)]
  const [across, upward] = [AROUND.right * ring.radius, AROUND.up * ring.radius]
  const frame = { left: x - across, right: x + across, bottom: y - upward, top: y + upward }
  return fittedTo(frame, angles, size, margins)
}
