import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { at, completeEllipticFromComplement } from '../../../core/base'
import { expectClose, expectNear } from '../../support/close'
import { kernels } from './kernels'
import { atPoint, mutual, randomRings, streams, unitRing, velocities } from './rings'

/** u_x, u_r, psi of a smoothed unit ring by the trapezoidal rule round it, which converges faster than any power. */
function byQuadrature(x: number, r: number, deltaSquared: number, points: number): [number, number, number] {
  let [axial, radial, stream] = [0, 0, 0]
  for (let k = 0; k < points; k++) {
    const cosine = Math.cos((2 * Math.PI * k) / points)
    const square = x * x + r * r + 1 - 2 * r * cosine + deltaSquared
    const weight = 1 / (2 * points)
    axial += (weight * (1 - r * cosine)) / square ** 1.5
    radial += (weight * x * cosine) / square ** 1.5
    stream += (weight * r * cosine) / Math.sqrt(square)
  }
  return [axial, radial, stream]
}

describe.each(kernels)('coaxial sums, $name', (kernel) => {
  it('gives the plain filament of check R7', () => {
    // Lamb, Hydrodynamics, art. 161: R = Gamma = 1, at (r, x) = (0.5, 0.5) and (2, 0.5), as given in the list of checks.
    const [axial, radial] = atPoint(kernel, unitRing(), 0.5, 0.5)
    expectClose(radial, 0.128668084873, 1e-10)
    expectClose(axial, 0.345831670043, 1e-10)
    const [axialOutside, radialOutside] = atPoint(kernel, unitRing(), 0.5, 2)
    expectClose(radialOutside, 0.0303318686696, 1e-10)
    expectClose(axialOutside, -0.0265187584447, 1e-10)
  })

  it('gives R^2 / (2 (R^2 + x^2 + delta^2)^1.5) and no radial speed on the axis', () => {
    for (const x of [-3, -0.2, 0, 1e-9, 0.7, 40]) {
      for (const delta of [0, 0.1, 2]) {
        const [axial, radial, stream] = atPoint(kernel, unitRing(delta * delta), x, 0)
        // The last interval of the table is good to 3e-14 at its ends.
        expectClose(axial, 0.5 / (1 + x * x + delta * delta) ** 1.5, 1e-13, `axis at x = ${x}, delta = ${delta}`)
        expect(radial === 0 && stream === 0).toBe(true)
      }
    }
  })

  it('moves a lone smoothed ring as check R9 says', () => {
    // 4 pi R U / Gamma at delta / R = 0.05 and 0.1, as given in the list of checks to 9 digits.
    expectClose(4 * Math.PI * atPoint(kernel, unitRing(0.05 ** 2), 0, 1)[0], 4.07342085, 1e-7)
    expectClose(4 * Math.PI * atPoint(kernel, unitRing(0.1 ** 2), 0, 1)[0], 3.37632355, 1e-7)
  })

  it('follows ln(8 R / delta) - 1 for small delta, below the table too', () => {
    for (const delta of [1e-5, 1e-6, 3e-7, 1e-8, 1e-12, 1e-40]) {
      const speed = 4 * Math.PI * atPoint(kernel, unitRing(delta * delta), 0, 1)[0]
      // Next term: of order delta^2 ln(8/delta), 2e-9 at most; the table adds 1e-13.
      expectClose(speed, Math.log(8 / delta) - 1, 2 * delta * delta * Math.log(8 / delta) + 2e-13, `delta ${delta}`)
    }
  })

  it('agrees with quadrature round the ring, near and far', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: 0, max: 4, noNaN: true }),
        fc.double({ min: 0.1, max: 1, noNaN: true }),
        (x, r, delta) => {
          const got = atPoint(kernel, unitRing(delta * delta), x, r)
          const expected = byQuadrature(x, r, delta * delta, 1200)
          // The rule itself stops at exp(-1200 delta): nothing. Against the size of the vector, 1e-12 is rounding of 1200 terms.
          const speed = Math.hypot(expected[0], expected[1])
          expectNear(got[0], expected[0], 1e-12 * speed, 'axial')
          expectNear(got[1], expected[1], 1e-12 * speed, 'radial')
          expectNear(got[2], expected[2], 1e-12 * (Math.abs(expected[2]) + 1e-3), 'stream')
        },
      ),
      { numRuns: 200 },
    )
  })

  it('agrees with the closed form in K and E, close to the filament', () => {
    for (const distance of [1e-1, 1e-2, 1e-4, 1e-6, 1e-7]) {
      for (const angle of [0.3, 1.2, 2.9, 4.4]) {
        const x = distance * Math.cos(angle)
        const r = 1 + distance * Math.sin(angle)
        const a2 = x * x + (1 + r) ** 2
        const b2 = x * x + (r - 1) ** 2
        const { K, E } = completeEllipticFromComplement(b2 / a2)
        // Lamb, Hydrodynamics, art. 161, in the usual form, with 1 - r^2 taken as a product so that nothing cancels this close.
        const factor = 1 / (2 * Math.PI * Math.sqrt(a2))
        const axial = factor * (K + (((1 - r) * (1 + r) - x * x) / b2) * E)
        const radial = ((factor * x) / r) * (-K + ((1 + r * r + x * x) / b2) * E)
        const stream = (Math.sqrt(a2) / (2 * Math.PI)) * (0.5 * (1 + b2 / a2) * K - E)
        const got = atPoint(kernel, unitRing(), x, r)
        // Both forms take 1 - r from a rounded r in the same way; a few dozen epsilon of the speed are left.
        const speed = 1 / (2 * Math.PI * distance)
        expectNear(got[0], axial, 1e-13 * speed, `axial at ${distance}`)
        expectNear(got[1], radial, 1e-13 * speed, `radial at ${distance}`)
        expectClose(got[2], stream, 1e-12, `stream at ${distance}`)
      }
    }
  })

  it('tends to the dipole far away', () => {
    for (const [x, r] of [
      [300, 400],
      [-5e4, 1],
      [1e3, 3e6],
    ] as const) {
      const distance = Math.hypot(x, r)
      const [axial, radial, stream] = atPoint(kernel, unitRing(), x, r)
      // Moment pi R^2 Gamma; the next multipole is (R / distance)^2 times a number near 3.
      const tolerance = 6 / distance ** 2 + 1e-13
      const size = 0.25 / distance ** 3
      expectNear(axial, (size * (2 * x * x - r * r)) / distance ** 2, 2 * size * tolerance, 'axial')
      expectNear(radial, (size * 3 * x * r) / distance ** 2, 2 * size * tolerance, 'radial')
      expectClose(stream, (0.25 * r * r) / distance ** 3, tolerance, 'stream')
    }
  })

  it('has u_x = (d psi / d r) / r and u_r = -(d psi / d x) / r', () => {
    const ring = unitRing(0.01)
    for (const [x, r] of [
      [0.1, 0.9],
      [0.5, 1.6],
      [-0.4, 0.3],
    ] as const) {
      const step = 1e-4
      const along = (dx: number, dr: number): number => {
        const psi = (k: number): number => atPoint(kernel, ring, x + k * dx, r + k * dr)[2]
        return (8 * (psi(1) - psi(-1)) - (psi(2) - psi(-2))) / (12 * step)
      }
      const [axial, radial] = atPoint(kernel, ring, x, r)
      // Fourth-order difference: step^4 times a fifth derivative of at most 1e5, and rounding of 1e-16 / step.
      expectNear(axial, along(0, step) / r, 1e-10, 'axial')
      expectNear(radial, -along(step, 0) / r, 1e-10, 'radial')
    }
  })

  it('keeps the impulse sum Gamma r^2 when a pair takes the mean delta^2', () => {
    const rings = randomRings(60, 7)
    const { radial } = velocities(kernel, mutual(rings, false))
    let sum = 0
    let size = 0
    for (let i = 0; i < rings.count; i++) {
      const part = at(rings.circulation, i) * at(rings.r, i) * at(radial, i)
      sum += part
      size += Math.abs(part)
    }
    // Pairs cancel to rounding and to the table's 3e-14.
    expectNear(sum, 0, 1e-13 * size)
    const { radial: oneSided } = velocities(kernel, mutual(rings, false, false))
    const broken = oneSided.reduce((total, u, i) => total + at(rings.circulation, i) * at(rings.r, i) * u, 0)
    expect(Math.abs(broken)).toBeGreaterThan(1e-6 * size)
  })

  it('has a symmetric stream function when a pair takes the mean delta^2', () => {
    const rings = { ...randomRings(2, 3), circulation: Float64Array.of(1, 1) }
    const [first = NaN, second = NaN] = streams(kernel, mutual(rings, true))
    expectClose(first, second, 1e-13)
  })

  it('leaves out only the own ring with skipSelf, also where it alone would be infinite', () => {
    for (const count of [1, 2, 7, 8]) {
      const rings = { ...randomRings(count, 11), deltaSquared: new Float64Array(count) }
      const { axial, radial } = velocities(kernel, mutual(rings, true))
      const stream = streams(kernel, mutual(rings, true))
      for (let i = 0; i < count; i++) {
        const others = {
          ...rings,
          count: count - 1,
          x: rings.x.filter((_, j) => j !== i),
          r: rings.r.filter((_, j) => j !== i),
          circulation: rings.circulation.filter((_, j) => j !== i),
        }
        const expected = atPoint(kernel, others, at(rings.x, i), at(rings.r, i))
        expect([axial[i], radial[i], stream[i]]).toEqual(expected)
      }
    }
  })

  it('passes NaN on to the targets that see it, and no further', () => {
    const targets = {
      targetCount: 3,
      targetX: Float64Array.of(0.1, NaN, 0.3),
      targetR: Float64Array.of(0.5, 0.5, 0.5),
      targetDeltaSquared: null,
      rings: unitRing(0.01),
      skipSelf: false,
    }
    const { axial, radial } = velocities(kernel, targets)
    expect([...axial].map(Number.isNaN)).toEqual([false, true, false])
    expect([...radial].map(Number.isNaN)).toEqual([false, true, false])
    expect([...streams(kernel, targets)].map(Number.isNaN)).toEqual([false, true, false])
    for (const field of ['x', 'r', 'circulation', 'deltaSquared'] as const) {
      const rings = { ...unitRing(0.01), [field]: Float64Array.of(NaN) }
      const [u, v] = atPoint(kernel, rings, 0.1, 0.5)
      expect([u, v], field).toEqual([NaN, NaN])
    }
  })

  it('does not write past the targets of the call', () => {
    const rings = randomRings(5, 2)
    const out = { axial: new Float64Array(9).fill(7), radial: new Float64Array(9).fill(7) }
    kernel.coaxialVelocity(mutual(rings, false), out)
    expect([...out.axial.subarray(5), ...out.radial.subarray(5)]).toEqual([7, 7, 7, 7, 7, 7, 7, 7])
    kernel.coaxialVelocity({ ...mutual(rings, false), targetCount: 0 }, out)
    expect(out.axial[5]).toBe(7)
  })
})
