import { beforeAll, describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { bodyVolume } from '../../../core/ring/dividingStreamline'
import { coreRatioAt, familyCoordinate, solveSteadyFamily } from '../../../core/ring/steadyContinuation'
import { FIRST_COORDINATE, LAST_COORDINATE, SPEED } from '../../../core/ring/steadyFamilyTable'
import { energyByBoundary, solvedCarriedBody, steadyIntegrals } from '../../../core/ring/steadyIntegrals'
import { byParticleTime, circularCore, solveSteadyRing, type SolvedRing } from '../../../core/ring/steadySolver'
import { steadyRing, steadyRingOutline } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'

/** Core ratio of a row of the table, counted from the thin end. */
function rowAt(index: number): number {
  const middle = (FIRST_COORDINATE + LAST_COORDINATE) / 2
  const half = (LAST_COORDINATE - FIRST_COORDINATE) / 2
  return coreRatioAt(middle - half * Math.cos((Math.PI * index) / (SPEED.length - 1)))
}

const ROWS = [rowAt(15), rowAt(30), rowAt(42)]
const BELOW = 0.004
const BETWEEN = [0.2, 0.9]
const NEAR_HILL = Math.SQRT2 - 5e-4

describe('solver of the steady family', () => {
  const rings = new Map<number, SolvedRing>()
  const solved = (coreRatio: number): SolvedRing => {
    const ring = rings.get(coreRatio)
    if (ring === undefined) throw new Error(`not solved: ${coreRatio}`)
    return ring
  }

  beforeAll(() => {
    const wanted = [...ROWS, BELOW, ...BETWEEN, NEAR_HILL].sort((a, b) => a - b)
    solveSteadyFamily(wanted, (ring) => rings.set(ring.coreRatio, ring))
  }, 120_000)

  /** Largest relative difference of speed, impulse, energy and inner radius between program and solver. */
  function difference(coreRatio: number): number {
    const ring = solved(coreRatio)
    const exact = steadyIntegrals(ring)
    // Solver: density 1, L = 1, vorticity r. Program: the same circulation.
    const got = steadyRing(exact.circulation, 1, coreRatio, 1)
    return Math.max(
      Math.abs(got.speed / ring.speed - 1),
      Math.abs(got.impulse / exact.impulse - 1),
      Math.abs(got.energy / exact.energy - 1),
      Math.abs(got.innerRadius / exact.innerRadius - 1),
      Math.abs(got.outerRadius / exact.outerRadius - 1),
    )
  }

  // 1e-8 is what the table promises; measured 1e-11.
  it.each(ROWS)('solved anew gives the row of the table at core ratio %f', (coreRatio) => {
    expect(solved(coreRatio).residual).toBeLessThan(1e-11)
    expect(difference(coreRatio)).toBeLessThan(1e-8)
  })

  it.each(BETWEEN)('is met between the rows at core ratio %f', (coreRatio) => {
    expect(difference(coreRatio)).toBeLessThan(1e-9)
  })

  it('is met below the table, where the second-order law is carried on', () => {
    // The law alone misses ln^2 eps terms of eps^4: 3e-9 at 0.004. The correction takes off all but their logarithms.
    expect(difference(BELOW)).toBeLessThan(1e-9)
  })

  it('is met between the last row and the sphere', () => {
    // d^3 ln d of what the two-term form leaves out, d = 5e-4; the inner radius has one order less.
    const ring = solved(NEAR_HILL)
    const exact = steadyIntegrals(ring)
    const got = steadyRing(exact.circulation, 1, NEAR_HILL, 1)
    expectClose(got.speed, ring.speed, 2e-9)
    expectClose(got.impulse, exact.impulse, 2e-9)
    expectClose(got.energy, exact.energy, 2e-9)
    expectClose(got.innerRadius, exact.innerRadius, 1e-6)
  })

  it('has one energy by the virial identity and by the boundary sum of psi omega', () => {
    for (const coreRatio of [at(ROWS, 1), ...BETWEEN]) {
      const ring = solved(coreRatio)
      // Two sums of spectral accuracy that share the shape only: rounding, grown by cancellation 1/eps^2 for thin cores.
      expectClose(energyByBoundary(ring, 2 * ring.contour.radial.length), steadyIntegrals(ring).energy, 1e-12)
    }
  })

  it('has dE = U dI along the family at fixed circulation and fixed core volume', () => {
    // omega/r is carried by the fluid, so neighbours reachable in ideal flow keep Gamma and core volume (Kelvin 1880; Benjamin 1976).
    // Gamma = 1, volume = 1: L = V^(-1/3). Five-point differences over 1 % of eps: error (24/30) 1e-8 for the logarithm of eps.
    for (const coreRatio of BETWEEN) {
      const h = 0.01 * coreRatio
      const start = byParticleTime(solved(coreRatio), 96)
      const values = [-2, -1, 1, 2].map((k) => {
        const ring = solveSteadyRing(coreRatio + k * h, start)
        if (ring === null) throw new Error('no neighbour found')
        const { circulation, impulse, energy, coreVolume } = steadyIntegrals(ring)
        const L = Math.cbrt(1 / coreVolume)
        return { E: (energy / circulation ** 2) * L, I: (impulse / circulation) * L * L }
      })
      const slope = (pick: (v: { E: number; I: number }) => number): number => {
        const [a, b, c, d] = values.map(pick)
        return ((a ?? NaN) - 8 * (b ?? NaN) + 8 * (c ?? NaN) - (d ?? NaN)) / (12 * h)
      }
      const { circulation, coreVolume } = steadyIntegrals(solved(coreRatio))
      const speed = (solved(coreRatio).speed / circulation) * Math.cbrt(coreVolume)
      expectClose(slope((v) => v.E) / slope((v) => v.I), speed, 1e-7)
    }
  })

  it('finds the same ring whatever the number of harmonics', () => {
    const coarse = solveSteadyRing(0.2, circularCore(0.2, 20))
    expect(coarse).not.toBeNull()
    if (coarse === null) return
    expectClose(coarse.speed, solved(0.2).speed, 1e-11)
  })

  it('carries the volume the program gives', () => {
    for (const coreRatio of [BELOW, ...BETWEEN]) {
      const ring = solved(coreRatio)
      const body = solvedCarriedBody(ring)
      expect(body).not.toBeNull()
      if (body === null) return
      // 1e-6 is promised; measured 2e-8.
      expectClose(steadyRing(1, 1, coreRatio, 1).carriedVolume, bodyVolume(body, 8), 1e-7)
    }
  })

  it('draws the outline the solver found', () => {
    for (const coreRatio of BETWEEN) {
      const { radial, axial } = byParticleTime(solved(coreRatio), 96).contour
      const { core } = steadyRingOutline(coreRatio)
      const quarter = (core.x.length - 1) / 4
      const t = Math.PI / 2
      let x = 0
      let r = 0
      radial.forEach((value, k) => (r += value * Math.cos(k * t)))
      axial.forEach((value, k) => (x += value * Math.sin(k * t)))
      expectNear(core.x[quarter] ?? NaN, x, 1e-4)
      expectNear(core.r[quarter] ?? NaN, r, 1e-4)
      const body = solvedCarriedBody(solved(coreRatio))
      const { carried } = steadyRingOutline(coreRatio)
      expectNear(carried.r[(carried.r.length - 1) / 2] ?? NaN, body?.equator ?? NaN, 1e-4)
    }
  })

  it('takes a coordinate that undoes itself', () => {
    expectClose(coreRatioAt(familyCoordinate(0.37)), 0.37, 1e-14)
  })
})
