import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { at, gaussLegendre, integrate } from '../../../core/base'
import { expectClose, expectNear } from '../../support/close'

describe('gaussLegendre', () => {
  it.each([1, 2, 3, 5, 8, 16, 33, 64])('is exact for powers up to 2n - 1 with n = %i points', (n) => {
    const { nodes, weights } = gaussLegendre(n)
    for (let power = 0; power <= 2 * n - 1; power++) {
      let sum = 0
      for (let i = 0; i < n; i++) sum += at(weights, i) * at(nodes, i) ** power
      // Rounding of n terms of size up to 1.
      expectNear(sum, power % 2 === 0 ? 2 / (power + 1) : 0, 4e-15 + n * Number.EPSILON, `x^${power}`)
    }
  })

  it('is not exact one power further, so the test above can fail', () => {
    const { nodes, weights } = gaussLegendre(3)
    let sum = 0
    for (let i = 0; i < 3; i++) sum += at(weights, i) * at(nodes, i) ** 6
    // Error term of Abramowitz & Stegun 25.4.30 for n = 3: 2^7 (3!)^4 / (7 (6!)^3) x 6! = 0.0457…
    expectNear(2 / 7 - sum, (128 * 1296) / (7 * 720 ** 2), 1e-14)
  })

  it('has rising nodes and positive weights', () => {
    const { nodes, weights } = gaussLegendre(41)
    for (let i = 1; i < 41; i++) expect(at(nodes, i)).toBeGreaterThan(at(nodes, i - 1))
    expect(weights.every((weight) => weight > 0)).toBe(true)
  })
})

describe('integrate', () => {
  const cases: [string, (x: number) => number, number, number, number][] = [
    ['exp on 0..1', Math.exp, 0, 1, Math.E - 1],
    ['sine on 0..pi', Math.sin, 0, Math.PI, 2],
    ['1/(1+x^2) on -1..1', (x) => 1 / (1 + x * x), -1, 1, Math.PI / 2],
    ['a narrow peak', (x) => 1e-3 / (1e-6 + (x - 0.3) ** 2), 0, 1, Math.atan(700) + Math.atan(300)],
    ['a corner', (x) => Math.abs(x - 1 / 3), 0, 1, (1 / 9 + 4 / 9) / 2],
    ['a square root at its end', Math.sqrt, 0, 1, 2 / 3],
    ['Gaussian over 16 widths', (x) => Math.exp(-x * x), -8, 8, Math.sqrt(Math.PI)],
    ['from high to low', Math.exp, 1, 0, 1 - Math.E],
  ]
  it.each(cases)('gives the exact integral of %s', (_, f, a, b, exact) => {
    // The default tolerance is 1e-12; a few intervals add up.
    expectClose(integrate(f, a, b), exact, 4e-12)
  })

  it('is exact to rounding for polynomials of degree 22 in one panel', () => {
    // The 15-point Kronrod rule has degree 3 x 7 + 1 = 22 (QUADPACK 1983), recalled, not re-read.
    let calls = 0
    const got = integrate(
      (x) => {
        calls++
        return 23 * x ** 22
      },
      0,
      1,
      1e-3,
    )
    expectClose(got, 1, 1e-14)
    expect(calls).toBeLessThanOrEqual(16)
  })

  it('is 0 over nothing, and adds over a split', () => {
    expect(integrate(Math.exp, 2, 2)).toBe(0)
    fc.assert(
      fc.property(fc.double({ min: -3, max: 3, noNaN: true }), (middle) => {
        const f = (x: number) => Math.cos(3 * x) + x
        expectNear(integrate(f, -3, middle) + integrate(f, middle, 3), (2 * Math.sin(9)) / 3, 1e-11)
      }),
    )
  })
})
