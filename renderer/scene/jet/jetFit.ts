/** What of a starting jet the picture covers: everything that is ever drawn. */
import type { JetSceneModel } from '../../../core/report'
import { basisOf, fittedTo, type Angles, type Margins, type Size, type View } from '../view'

export function fittedJet({ extent }: JetSceneModel, angles: Angles, size: Size, margins: Margins): View {
  const { right, up } = basisOf(angles)
  const { xMin, xMax, rMax } = extent
  // A circle about the axis reaches r |component square to the axis| along any direction.
  const sideways = rMax * Math.hypot(right[1], right[2])
  const upward = rMax * Math.hypot(up[1], up[2])
  const [across, rise] = [
    [xMin * right[0], xMax * right[0]],
    [xMin * up[0], xMax * up[0]],
  ] as const
  const frame = {
    left: Math.min(...across) - sideways,
    right: Math.max(...across) + sideways,
    bottom: Math.min(...rise) - upward,
    top: Math.max(...rise) + upward,
  }
  return fittedTo(frame, angles, size, margins)
}
