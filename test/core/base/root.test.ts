import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bracketedRoot } from '../../../core/base'
import { expectNear } from '../../support/close'

describe('bracketedRoot', () => {
  const cases: [string, (x: number) => number, number, number, number][] = [
    ['x^2 - 2', (x) => x * x - 2, 0, 2, Math.SQRT2],
    ['cos x - x', (x) => Math.cos(x) - x, 0, 1, 0.7390851332151607], // Dottie number, recalled, not re-read
    ['exp(-x) - 1e-6', (x) => Math.exp(-x) - 1e-6, 0, 100, 6 * Math.LN10],
    ['x^9, flat at the root', (x) => x ** 9, -1, 0.7, 0],
    ['a jump', (x) => (x < 0.25 ? -1 : 1), 0, 1, 0.25],
  ]
  it.each(cases)('finds the root of %s', (_, f, low, high, root) => {
    const got = bracketedRoot(f, low, high) ?? NaN
    // Full precision: 4 eps |x|; x^9 underflows to 0 within 1e-36.
    expectNear(got, root, 8 * Number.EPSILON * Math.max(Math.abs(root), 1e-16 / Number.EPSILON))
  })

  it('takes either order of the ends, and an end that is a root', () => {
    expectNear(bracketedRoot((x) => x * x - 2, 2, 0) ?? NaN, Math.SQRT2, 1e-15)
    expect(bracketedRoot((x) => x - 1, 1, 5)).toBe(1)
    expect(bracketedRoot((x) => x - 5, 1, 5)).toBe(5)
  })

  it('says null where the ends have one sign or are no numbers', () => {
    expect(bracketedRoot((x) => x * x + 1, -1, 1)).toBeNull()
    expect(bracketedRoot(() => NaN, 0, 1)).toBeNull()
    expect(bracketedRoot((x) => Math.sqrt(x), -1, 1)).toBeNull()
  })

  it('keeps to the tolerance and brackets for any monotone cubic', () => {
    const coefficient = fc.double({ min: 0.01, max: 100, noNaN: true })
    fc.assert(
      fc.property(coefficient, coefficient, fc.double({ min: -9, max: 9, noNaN: true }), (a, b, root) => {
        const f = (x: number) => a * (x - root) ** 3 + b * (x - root)
        expectNear(bracketedRoot(f, -10, 10, 1e-9) ?? NaN, root, 1e-9 + 1e-14)
      }),
    )
  })

  it('takes few evaluations on a smooth function', () => {
    let calls = 0
    bracketedRoot(
      (x) => {
        calls++
        return Math.exp(x) - 5
      },
      0,
      10,
    )
    // Bisection to the same width takes 53; superlinear steps a fraction of it.
    expect(calls).toBeLessThan(20)
  })
})
