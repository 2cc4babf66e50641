import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  HILL_DIMENSIONLESS_ENERGY,
  coreRatioOfDimensionlessEnergy,
  dimensionlessEnergyOfSteadyRing,
  secondOrderRing,
  steadyRing,
  thinRingEnergy,
  thinRingSpeed,
} from '../../../core/ring'
import { coreRatioAt } from '../../../core/ring/steadyContinuation'
import { expectClose, expectNear } from '../../support/close'

/** w = ln(eps / (sqrt 2 - eps)): from eps = 1e-7 to sqrt 2 - 1e-6. */
const place = fc.double({ min: -16, max: 14, noNaN: true })
const factor = fc.double({ min: 0.01, max: 100, noNaN: true })

describe('the steady family', () => {
  // R5. Fraenkel 1972: 4 pi L U / Gamma = 4.1204 at eps = 0.1; digits given, +- 2e-4.
  it('follows Dyson and Fraenkel where it is thin', () => {
    expectNear(4 * Math.PI * steadyRing(1, 1, 0.1, 1).speed, 4.1204, 2e-4)
    for (const eps of [1e-6, 1e-3, 0.01, 0.03, 0.1]) {
      const full = steadyRing(2, 3, eps, 1000)
      const second = secondOrderRing(1000, 2, 3, eps)
      // What is left is O(eps^4 ln^2 eps): 2.5 eps^4 ln(8/eps) bounds all three.
      const allowed = 2.5 * eps ** 4 * Math.log(8 / eps) + 1e-14
      expectClose(full.speed, second.speed, allowed)
      expectClose(full.impulse, second.impulse, allowed)
      expectClose(full.energy, second.energy, allowed)
    }
  })

  it('tends to the thin ring of uniform core', () => {
    const ring = steadyRing(1, 1, 1e-5, 1)
    expectClose(ring.speed, thinRingSpeed(1, 1, 1e-5), 1e-9)
    expectClose(ring.energy, thinRingEnergy(1, 1, 1, 1e-5), 1e-9)
    expectNear(ring.innerRadius, 1 - 1e-5, 1e-12)
  })

  // R5. Hill 1894; Lamb art. 165: exact.
  it('ends in Hill s vortex', () => {
    const circulation = 0.03
    const rho = 998
    const ring = steadyRing(circulation, 0.05, Math.SQRT2, rho)
    const a = 0.1
    const U = circulation / (5 * a)
    expectClose(ring.speed, U, 1e-14)
    expectClose(ring.impulse, 2 * Math.PI * rho * a ** 3 * U, 1e-14)
    expectClose(ring.energy, (10 / 7) * Math.PI * rho * a ** 3 * U * U, 1e-14)
    expectClose(ring.energy / (ring.impulse * ring.speed), 5 / 7, 1e-14)
    expect(ring.innerRadius).toBe(0)
    expectClose(ring.outerRadius, a, 1e-14)
    // The line's volume series is good to 1e-12.
    expectClose(ring.carriedVolume, (4 / 3) * Math.PI * a ** 3, 1e-12)
    expectNear(HILL_DIMENSIONLESS_ENERGY, 0.160143, 5e-7)
    expect(dimensionlessEnergyOfSteadyRing(Math.SQRT2)).toBe(HILL_DIMENSIONLESS_ENERGY)
  })

  it('comes to Hill s vortex without a step', () => {
    const hill = steadyRing(1, 1, Math.SQRT2, 1)
    const near = steadyRing(1, 1, Math.SQRT2 - 1e-9, 1)
    // First order in sqrt 2 - eps.
    expectClose(near.speed, hill.speed, 1e-9)
    expectClose(near.impulse, hill.impulse, 1e-9)
    expectClose(near.energy, hill.energy, 1e-9)
    expectClose(near.carriedVolume, hill.carriedVolume, 2e-9)
  })

  // R6. Norbury 1973's measure of core size; 0.4858 +- 0.001.
  it('has dimensionless energy 0.33 at core ratio 0.4858', () => {
    expectNear(coreRatioOfDimensionlessEnergy(0.33), 0.4858, 0.001)
    expectNear(dimensionlessEnergyOfSteadyRing(0.4858), 0.33, 3e-4)
  })

  it('has no steps where the table meets its limits', () => {
    const join = [0.01, Math.SQRT2 - 1e-3]
    for (const eps of join) {
      const h = 1e-9
      const left = steadyRing(1, 1, eps - h, 1)
      const right = steadyRing(1, 1, eps + h, 1)
      for (const key of ['speed', 'impulse', 'energy', 'carriedVolume', 'outerRadius'] as const)
        // The step of the argument itself changes a value by at most 1e-9 / eps = 1e-7 at the thin end.
        expectClose(left[key], right[key], eps < 0.1 ? 2e-7 : 1e-8)
    }
  })

  it('loses dimensionless energy all along', () => {
    let before = Infinity
    // 1e-4 of w: 350 000 steps would be slow; 0.002 still has 100 steps between neighbouring rows.
    for (let w = -40; w < 15; w += 0.002) {
      const now = dimensionlessEnergyOfSteadyRing(coreRatioAt(w))
      if (!(now < before)) throw new Error(`dimensionless energy rises at w = ${w}`)
      before = now
    }
    expect(before).toBeGreaterThanOrEqual(HILL_DIMENSIONLESS_ENERGY)
  })

  it('scales with circulation, size and density', () => {
    fc.assert(
      fc.property(place, factor, factor, factor, (w, k, l, rho) => {
        const eps = coreRatioAt(w)
        const one = steadyRing(1, 1, eps, 1)
        const ring = steadyRing(k, l, eps, rho)
        expectClose(ring.speed, (k / l) * one.speed, 1e-13)
        expectClose(ring.impulse, rho * k * l * l * one.impulse, 1e-13)
        expectClose(ring.energy, rho * k * k * l * one.energy, 1e-13)
        expectClose(ring.carriedVolume, l ** 3 * one.carriedVolume, 1e-13)
        expectClose(ring.innerRadius, l * one.innerRadius, 1e-13)
        expectClose(ring.meanCoreRadius, l * eps, 1e-13)
      }),
    )
  })

  it('keeps the core inside the fluid carried and L the mean of its edges', () => {
    fc.assert(
      fc.property(place, (w) => {
        const eps = coreRatioAt(w)
        const ring = steadyRing(1, 1, eps, 1)
        expectClose((ring.innerRadius + ring.outerRadius) / 2, 1, 1e-14)
        // Core volume by Pappus, its centroid within the edges.
        expect(ring.carriedVolume).toBeGreaterThan(2 * Math.PI * ring.innerRadius * Math.PI * eps * eps)
        expect(ring.speed).toBeGreaterThan(0)
      }),
    )
  })

  it('refuses what is no ring of the family', () => {
    expect(() => steadyRing(1, 1, 0, 1)).toThrow(/coreRatio must be above 0/)
    expect(() => steadyRing(1, 1, 1.5, 1)).toThrow(/coreRatio must be at most 1\.414/)
    expect(() => steadyRing(1, 0, 0.1, 1)).toThrow(/radius must be above 0 m/)
    expect(() => steadyRing(Infinity, 1, 0.1, 1)).toThrow(/circulation must be a finite number/)
    expect(() => steadyRing(1, 1, 0.1, 0)).toThrow(/density must be above 0 kg\/m3/)
    expect(() => dimensionlessEnergyOfSteadyRing(-1)).toThrow(/coreRatio must be above 0/)
    expect(() => secondOrderRing(1, 1, 1, 0.6)).toThrow(/coreRatio must be at most 0\.5/)
    expect(() => coreRatioOfDimensionlessEnergy(0.15)).toThrow(/dimensionlessEnergy must be at least 0\.16014/)
  })
})
