import type { SegmentInput } from './kernel'

/**
 * u(x) = sum Gamma dl x s / (4 pi (|s|^2 + delta^2)^(3/2)), s from the midpoint of the segment to the target
 * (Rosenhead 1930, Moore 1972). The operations and their order are those of core/kernel/assembly/segments.ts.
 *
 * @see Kernel.segmentVelocity
 */
export function segmentVelocity(input: SegmentInput, out: Float64Array): void {
  const { targets, targetDeltaSquared, segments, segmentCount } = input
  const share = targetDeltaSquared === null ? 1 : 0.5
  for (let i = input.firstTarget ?? 0; i < input.targetCount; i++) {
    const tx = targets[3 * i] ?? NaN
    const ty = targets[3 * i + 1] ?? NaN
    const tz = targets[3 * i + 2] ?? NaN
    const smoothing = targetDeltaSquared === null ? 0 : 0.5 * (targetDeltaSquared[i] ?? NaN)
    let ux = 0
    let uy = 0
    let uz = 0
    for (let j = 0; j < 8 * segmentCount; j += 8) {
      const sx = tx - (segments[j] ?? NaN)
      const sy = ty - (segments[j + 1] ?? NaN)
      const sz = tz - (segments[j + 2] ?? NaN)
      const gx = segments[j + 3] ?? NaN
      const gy = segments[j + 4] ?? NaN
      const gz = segments[j + 5] ?? NaN
      const square = sx * sx + sy * sy + sz * sz + (smoothing + share * (segments[j + 6] ?? NaN))
      const weight = 1 / (square * Math.sqrt(square))
      ux += (gy * sz - gz * sy) * weight
      uy += (gz * sx - gx * sz) * weight
      uz += (gx * sy - gy * sx) * weight
    }
    out[3 * i] = ux
    out[3 * i + 1] = uy
    out[3 * i + 2] = uz
  }
}
