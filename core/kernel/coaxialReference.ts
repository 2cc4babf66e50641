import type { CoaxialInput, CoaxialVelocity } from './kernel'
import { FIRST_INTERVAL, kernelTables, LARGEST_M1, SMALLEST_M1 } from './tables'

/*
 * Source x', r', Gamma; target x, r; h = (x - x')^2 + delta^2, A^2 = h + (r' + r)^2, B^2 = h + (r' - r)^2, m1 = B^2 / A^2.
 *
 *   u_x = Gamma r'^2 / (pi A^3) ([h + (r' - r)(r' + 3 r)] / B^2 + e - 4 r^2 f / A^2)
 *   u_r = 4 Gamma r r'^2 (x - x') / (pi A^3) (1 / B^2 + f / A^2)
 *   psi = 4 Gamma r^2 r'^2 / (pi A^3) C
 *
 * with e, f and C of ellipticParts.ts. These are the integrals of the Rosenhead-Moore kernel round the ring
 * (Rosenhead 1930, Moore 1972; delta = 0: Lamb, Hydrodynamics, 6th ed., art. 161) written so that nothing cancels near
 * the axis, far away or close to the ring.
 *
 * The operations and their order are those of core/kernel/assembly/coaxial.ts: change both or neither.
 */

/** m1 as a double and as its two words, to look up the table by its own bits. One thread never interleaves calls. */
const scratch = new Float64Array(1)
const scratchWords = new Int32Array(scratch.buffer)

/** A word of the mantissa's top three bits set to 1.0, the rest kept. */
const FRACTION = 0x1ffff
const UNIT = 0x3ff00000

/** e falls by this a halving of m1, f rises by three times as much, C falls by twice: a quarter of ln 2. */
const QUARTER_LOG_TWO = 0.17328679513998632

/** @see Kernel.coaxialVelocity */
export function coaxialVelocity(input: CoaxialInput, out: CoaxialVelocity): void {
  const { targetX, targetR, targetDeltaSquared, skipSelf } = input
  const { count, x, r, circulation, deltaSquared } = input.rings
  const table = kernelTables().velocity
  // Local names: the loops below run several times slower through what a bundler or loader makes of imports.
  const first = FIRST_INTERVAL
  const smallest = SMALLEST_M1
  const largest = LARGEST_M1
  const number = scratch
  const words = scratchWords
  const fraction = FRACTION
  const unit = UNIT
  const share = targetDeltaSquared === null ? 1 : 0.5
  for (let i = input.firstTarget ?? 0; i < input.targetCount; i++) {
    const tx = targetX[i] ?? NaN
    const tr = targetR[i] ?? NaN
    const smoothing = targetDeltaSquared === null ? 0 : 0.5 * (targetDeltaSquared[i] ?? NaN)
    const r4 = 4 * tr
    let axial = 0
    let radial = 0
    for (let j = 0; j < count; j++) {
      if (skipSelf && i === j) continue
      const sr = r[j] ?? NaN
      const strength = (circulation[j] ?? NaN) * sr * sr * (1 / Math.PI)
      const dx = tx - (x[j] ?? NaN)
      const h = dx * dx + (smoothing + share * (deltaSquared[j] ?? NaN))
      const sum = sr + tr
      const difference = sr - tr
      const a2 = h + sum * sum
      const b2 = h + difference * difference
      const both = 1 / (a2 * b2)
      const inverseA = b2 * both
      const inverseB = a2 * both
      const m1 = b2 * inverseA
      let shift = 0
      number[0] = m1 < largest ? m1 : largest
      let high = words[1] ?? 0
      if (m1 < smallest) {
        // Down to here e and f are linear in ln m1 to the last bit: continue that line.
        const octaves = (first >> 3) - (high >> 20)
        shift = octaves * QUARTER_LOG_TWO
        high += octaves << 20
      }
      const at = ((high >> 17) - first) * 16
      words[1] = (high & fraction) | unit
      const t = (number[0] ?? NaN) - 1.0625
      const t2 = t * t
      let e =
        ((((table[at + 0] ?? NaN) * t2 + (table[at + 4] ?? NaN)) * t2 + (table[at + 8] ?? NaN)) * t2 +
          (table[at + 12] ?? NaN)) *
          t +
        ((((table[at + 2] ?? NaN) * t2 + (table[at + 6] ?? NaN)) * t2 + (table[at + 10] ?? NaN)) * t2 +
          (table[at + 14] ?? NaN))
      let f =
        ((((table[at + 1] ?? NaN) * t2 + (table[at + 5] ?? NaN)) * t2 + (table[at + 9] ?? NaN)) * t2 +
          (table[at + 13] ?? NaN)) *
          t +
        ((((table[at + 3] ?? NaN) * t2 + (table[at + 7] ?? NaN)) * t2 + (table[at + 11] ?? NaN)) * t2 +
          (table[at + 15] ?? NaN))
      e += shift
      f -= 3 * shift
      const scale = strength * (inverseA * Math.sqrt(inverseA))
      const fa = f * inverseA
      axial += scale * ((h + difference * (difference + r4)) * inverseB + e - tr * r4 * fa)
      radial += scale * (dx * (inverseB + fa))
    }
    out.axial[i] = axial
    out.radial[i] = r4 * radial
  }
}

/** @see Kernel.coaxialStream */
export function coaxialStream(input: CoaxialInput, out: Float64Array): void {
  const { targetX, targetR, targetDeltaSquared, skipSelf } = input
  const { count, x, r, circulation, deltaSquared } = input.rings
  const table = kernelTables().stream
  // Local names: the loops below run several times slower through what a bundler or loader makes of imports.
  const first = FIRST_INTERVAL
  const smallest = SMALLEST_M1
  const largest = LARGEST_M1
  const number = scratch
  const words = scratchWords
  const fraction = FRACTION
  const unit = UNIT
  const share = targetDeltaSquared === null ? 1 : 0.5
  for (let i = input.firstTarget ?? 0; i < input.targetCount; i++) {
    const tx = targetX[i] ?? NaN
    const tr = targetR[i] ?? NaN
    const smoothing = targetDeltaSquared === null ? 0 : 0.5 * (targetDeltaSquared[i] ?? NaN)
    let total = 0
    for (let j = 0; j < count; j++) {
      if (skipSelf && i === j) continue
      const sr = r[j] ?? NaN
      const strength = (circulation[j] ?? NaN) * sr * sr * (1 / Math.PI)
      const dx = tx - (x[j] ?? NaN)
      const h = dx * dx + (smoothing + share * (deltaSquared[j] ?? NaN))
      const sum = sr + tr
      const difference = sr - tr
      const inverseA = 1 / (h + sum * sum)
      const m1 = (h + difference * difference) * inverseA
      let shift = 0
      number[0] = m1 < largest ? m1 : largest
      let high = words[1] ?? 0
      if (m1 < smallest) {
        const octaves = (first >> 3) - (high >> 20)
        shift = octaves * QUARTER_LOG_TWO
        high += octaves << 20
      }
      const at = ((high >> 17) - first) * 8
      words[1] = (high & fraction) | unit
      const t = (number[0] ?? NaN) - 1.0625
      const t2 = t * t
      const odd = (((table[at] ?? NaN) * t2 + (table[at + 2] ?? NaN)) * t2 + (table[at + 4] ?? NaN)) * t2
      const even = (((table[at + 1] ?? NaN) * t2 + (table[at + 3] ?? NaN)) * t2 + (table[at + 5] ?? NaN)) * t2
      const c = (odd + (table[at + 6] ?? NaN)) * t + (even + (table[at + 7] ?? NaN)) + 2 * shift
      total += strength * (inverseA * Math.sqrt(inverseA)) * c
    }
    out[i] = 4 * tr * tr * total
  }
}
