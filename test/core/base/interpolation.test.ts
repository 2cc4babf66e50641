import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { at, bracket, equallySpaced, evaluateCubic, last, monotoneCubic } from '../../../core/base'
import { expectClose, expectNear } from '../../support/close'

const steps = fc.array(
  fc.record({
    dx: fc.double({ min: 1e-3, max: 10, noNaN: true }),
    dy: fc.oneof(fc.constant(0), fc.double({ min: 0, max: 10, noNaN: true })),
  }),
  { minLength: 1, maxLength: 12 },
)

/** Points with the given steps from (1, -2). */
function pointsOf(list: readonly { dx: number; dy: number }[], sign: (i: number) => number) {
  const x = [1]
  const y = [-2]
  list.forEach(({ dx, dy }, i) => {
    x.push(last(x) + dx)
    y.push(last(y) + sign(i) * dy)
  })
  return { x, y }
}

describe('monotoneCubic', () => {
  it('passes through its points', () => {
    fc.assert(
      fc.property(steps, (list) => {
        const { x, y } = pointsOf(list, (i) => (i % 3 === 1 ? -1 : 1))
        const curve = monotoneCubic(x, y)
        x.forEach((point, i) =>
          expectNear(evaluateCubic(curve, point).value, at(y, i), 1e-12 * (1 + Math.abs(at(y, i)))),
        )
      }),
    )
  })

  it.each([1, -1])('is monotone where the points are (sign %i)', (sign) => {
    fc.assert(
      fc.property(steps, (list) => {
        const { x, y } = pointsOf(list, () => sign)
        const curve = monotoneCubic(x, y)
        const values = equallySpaced(at(x, 0), last(x), 400).map((p) => evaluateCubic(curve, p))
        for (let i = 1; i < values.length; i++)
          // Rounding of values up to 120.
          expect(sign * (at(values, i).value - at(values, i - 1).value)).toBeGreaterThanOrEqual(-1e-12)
        for (const { slope } of values) expect(sign * slope).toBeGreaterThanOrEqual(-1e-9)
      }),
    )
  })

  it('stays between neighbouring points, whatever their order', () => {
    fc.assert(
      fc.property(steps, (list) => {
        const { x, y } = pointsOf(list, (i) => (i % 2 === 0 ? 1 : -1))
        const curve = monotoneCubic(x, y)
        for (const p of equallySpaced(at(x, 0), last(x), 300)) {
          const i = bracket(x, p)
          const [a, b] = [at(y, i), at(y, i + 1)]
          const { value } = evaluateCubic(curve, p)
          expect(value).toBeGreaterThanOrEqual(Math.min(a, b) - 1e-12)
          expect(value).toBeLessThanOrEqual(Math.max(a, b) + 1e-12)
        }
      }),
    )
  })

  it('reproduces a straight line exactly, with two points or more', () => {
    for (const x of [
      [0, 2],
      [0, 0.5, 2, 7],
    ]) {
      const curve = monotoneCubic(
        x,
        x.map((p) => 3 * p - 1),
      )
      for (const p of [0.1, 0.5, 1.9]) {
        expectClose(evaluateCubic(curve, p).value, 3 * p - 1, 1e-14)
        expectClose(evaluateCubic(curve, p).slope, 3, 1e-14)
      }
    }
  })

  it('returns the slope of the value it returns', () => {
    const curve = monotoneCubic([0, 1, 3, 4], [0, 2, 3, 7])
    for (const p of [0.3, 1.7, 3.6]) {
      const h = 1e-5
      const difference = (evaluateCubic(curve, p + h).value - evaluateCubic(curve, p - h).value) / (2 * h)
      // Central difference: h^2 times a third derivative of about 10, plus rounding 1e-16/h.
      expectNear(evaluateCubic(curve, p).slope, difference, 1e-8)
    }
  })

  it('converges with at least second order on a smooth rising function', () => {
    const error = (count: number) => {
      const x = equallySpaced(0, 1, count)
      const curve = monotoneCubic(x, x.map(Math.exp))
      return Math.max(...equallySpaced(0, 1, 501).map((p) => Math.abs(evaluateCubic(curve, p).value - Math.exp(p))))
    }
    // Harmonic-mean slopes on equal steps are second-order accurate, so values are third order: halving divides by 8.
    const order = Math.log2(error(21) / error(41))
    expect(order).toBeGreaterThan(2.8)
  })
})

describe('arrays', () => {
  it('bracket holds its index inside the list', () => {
    expect([-1, 0, 0.5, 1, 2.5, 3, 9].map((x) => bracket([0, 1, 2, 3], x))).toEqual([0, 0, 0, 1, 2, 2, 2])
  })
  it('equallySpaced has both ends exact', () => {
    expect(equallySpaced(0.1, 0.7, 4)[3]).toBe(0.7)
    expect(equallySpaced(0, 1, 5)).toEqual([0, 0.25, 0.5, 0.75, 1])
  })
  it('at and last refuse an index outside', () => {
    expect(() => at([1, 2], 2)).toThrow(/index 2 is outside 0\.\.1/)
    expect(() => last([])).toThrow(RangeError)
  })
})
