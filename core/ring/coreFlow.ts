/**
 * Flow of a solved core at any point off its boundary.
 *
 * The contour integral on panels that halve towards the nearest point of the boundary, as on the boundary itself.
 */
import { gaussLegendre } from '../base'
import { emptyPoint, harmonics, pointOnContour, type CoreContour } from './coreContour'
import { FieldSum, gradedPanels } from './coreField'
import type { AxisymmetricFlow } from './dividingStreamline'
import { read } from './read'

const RULE = gaussLegendre(12)
/** A point of the axis is taken this far off it: psi is proportional to r^2 and the velocity even in r. */
const AXIS = 1e-7

/** Flow for vorticity = r inside the contour. */
export function coreFlow(contour: CoreContour): AxisymmetricFlow {
  const size = contour.radial.length
  const samples = 8 * size
  const cosines = new Float64Array(size)
  const sines = new Float64Array(size)
  const point = emptyPoint()
  const sampleX = new Float64Array(samples)
  const sampleR = new Float64Array(samples)
  for (let i = 0; i < samples; i++) {
    harmonics((2 * Math.PI * i) / samples, cosines, sines)
    pointOnContour(point, contour, cosines, sines)
    sampleX[i] = point.x
    sampleR[i] = point.r
  }
  const panels = gradedPanels(size - 1)

  return (x, radius, out) => {
    const r = Math.max(radius, AXIS)
    let nearest = 0
    let least = Infinity
    for (let i = 0; i < samples; i++) {
      const distance = (read(sampleX, i) - x) ** 2 + (read(sampleR, i) - r) ** 2
      if (distance < least) {
        least = distance
        nearest = i
      }
    }
    const sum = new FieldSum(x, r)
    const t = nearestParameter((2 * Math.PI * nearest) / samples)
    // Inside a panel shorter than the distance over the speed of the contour the kernel is smooth: no need to go further down.
    harmonics(t, cosines, sines)
    pointOnContour(point, contour, cosines, sines)
    const clear = (0.25 * Math.hypot(point.x - x, point.r - r)) / Math.hypot(point.xSlope, point.rSlope)
    let first = 0
    while (first + 2 < panels.length && read(panels, first + 1) < clear) first++
    for (let side = -1; side <= 1; side += 2) {
      for (let panel = first; panel + 1 < panels.length; panel++) {
        const low = panel === first ? 0 : read(panels, panel)
        const half = (read(panels, panel + 1) - low) / 2
        for (let g = 0; g < RULE.nodes.length; g++) {
          harmonics(t + side * (low + half * (1 + read(RULE.nodes, g))), cosines, sines)
          pointOnContour(point, contour, cosines, sines)
          sum.add(point, half * read(RULE.weights, g))
        }
      }
    }
    sum.finish(out)

    function nearestParameter(start: number): number {
      let s = start
      for (let n = 0; n < 4; n++) {
        harmonics(s, cosines, sines)
        pointOnContour(point, contour, cosines, sines)
        const along = (point.x - x) * point.xSlope + (point.r - r) * point.rSlope
        const step = along / (point.xSlope ** 2 + point.rSlope ** 2)
        s -= Math.max(-Math.PI / samples, Math.min(Math.PI / samples, step))
      }
      return s
    }
  }
}
