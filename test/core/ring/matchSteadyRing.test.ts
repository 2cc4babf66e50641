import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { matchSteadyRing, steadyRing, type RingInvariants, type SteadyRing } from '../../../core/ring'
import { coreRatioAt } from '../../../core/ring/steadyContinuation'
import { expectClose, expectNear } from '../../support/close'

const RHO = 998

/** Slug of constant exit speed: Gamma = U L / 2, I = rho A L U, E = rho A L U^2 / 2. */
function slug(strokeRatio: number, diameter: number, speed: number): RingInvariants {
  const stroke = strokeRatio * diameter
  const area = (Math.PI / 4) * diameter ** 2
  return {
    density: RHO,
    circulation: (speed * stroke) / 2,
    impulse: RHO * area * stroke * speed,
    energy: (RHO * area * stroke * speed * speed) / 2,
  }
}

function matched(values: RingInvariants): SteadyRing {
  const { status, ring } = matchSteadyRing(values)
  if (ring === null) throw new Error(`no ring: ${status}`)
  return ring
}

describe('the steady ring of given circulation, impulse and energy', () => {
  it('is the ring the three came from, from eps = 1e-8 to next to Hill s vortex', () => {
    fc.assert(
      fc.property(fc.double({ min: -19, max: 9, noNaN: true }), (w) => {
        const coreRatio = coreRatioAt(w)
        const { circulation, impulse, energy, speed } = steadyRing(0.02, 0.03, coreRatio, RHO)
        const ring = matched({ density: RHO, circulation, impulse, energy })
        // E_n itself carries 1e-16 of rounding; d ln eps / d E_n is 3.5 at the thin end, and next to Hill E_n is flat: an error of
        // 1e-16 / (sqrt 2 - eps) in eps, 1e-12 at w = 9.
        expectClose(ring.coreRatio, coreRatio, 1e-11)
        expectClose(ring.radius, 0.03, 1e-11)
        expectClose(ring.speed, speed, 1e-11)
      }),
      { numRuns: 300 },
    )
  })

  it('gives back circulation, impulse and energy for any possible three', () => {
    const positive = fc.double({ min: 1e-3, max: 1e3, noNaN: true })
    fc.assert(
      fc.property(positive, positive, fc.double({ min: 0.1602, max: 30, noNaN: true }), (circulation, impulse, En) => {
        const energy = En * Math.sqrt(RHO * impulse) * circulation ** 1.5
        const ring = matched({ density: RHO, circulation, impulse, energy })
        expectClose(ring.circulation, circulation, 1e-15)
        expectClose(ring.impulse, impulse, 1e-12)
        expectClose(ring.energy, energy, 1e-11)
      }),
    )
  })

  it('is found for very thin rings', () => {
    const { circulation, impulse, energy } = steadyRing(1, 1, 1e-4, 1)
    expectClose(matched({ density: 1, circulation, impulse, energy }).coreRatio, 1e-4, 1e-12)
    const thinner = steadyRing(1, 1, 1e-30, 1)
    expectClose(matched({ ...thinner, density: 1 }).coreRatio, 1e-30, 1e-12)
  })

  // J2. The slug meets Hill's dimensionless energy at L/D = 3.5 sqrt 5, where the ring moves at 0.7 U: exact.
  it('is Hill s vortex for a slug of L/D = 3.5 sqrt 5, moving at 0.7 of the exit speed', () => {
    const ring = matched(slug(3.5 * Math.sqrt(5), 0.03, 0.4))
    expectNear(3.5 * Math.sqrt(5), 7.826, 5e-4)
    // Rounding of E_n by 1e-16 moves eps by its square root.
    expectNear(ring.coreRatio, Math.SQRT2, 1e-6)
    expectClose(ring.speed, 0.7 * 0.4, 1e-6)
  })

  it('does not exist below Hill s energy, and says so', () => {
    const result = matchSteadyRing(slug(8, 0.03, 0.4))
    expect(result.status).toBe('below-hill')
    expect(result.ring).toBeNull()
    expectClose(result.dimensionlessEnergy, Math.sqrt(Math.PI / 2) / 8, 1e-14)
    expect(matchSteadyRing(slug(7.82, 0.03, 0.4)).status).toBe('matched')
  })

  // J3. Mohseni & Gharib 1998: limiting circulation 1.77..2.07; 1.97 for the energy-limit ring.
  it('has the limiting circulation of Mohseni and Gharib at dimensionless energy 0.33', () => {
    const values = slug(Math.sqrt(Math.PI / 2) / 0.33, 0.03, 0.4)
    const ring = matched(values)
    const limiting = ring.circulation / (Math.cbrt(ring.impulse / RHO) * ring.speed ** (2 / 3))
    expectNear(limiting, 1.97, 0.005)
    expect(limiting).toBeGreaterThan(1.77)
    expect(limiting).toBeLessThan(2.07)
  })

  it('refuses values that are not positive, naming the one', () => {
    const good = slug(3, 0.03, 0.4)
    expect(() => matchSteadyRing({ ...good, energy: 0 })).toThrow(/energy must be above 0 J, got 0 J/)
    expect(() => matchSteadyRing({ ...good, impulse: -1 })).toThrow(/impulse must be above 0 N s/)
    expect(() => matchSteadyRing({ ...good, circulation: Number.NaN })).toThrow(/circulation must be a finite number/)
    expect(() => matchSteadyRing({ ...good, density: 0 })).toThrow(/density must be above 0/)
  })
})
