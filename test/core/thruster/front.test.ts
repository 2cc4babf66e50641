import { describe, expect, it } from 'vitest'
import { at, last } from '../../../core/base'
import { nonDominated, paretoFront } from '../../../core/thruster/front'
import { searchLeast, type SearchProblem } from '../../../core/thruster/search'
import { excess } from '../../../core/thruster/searchCompare'
import { distance, searchDistinct } from '../../../core/thruster/searchDistinct'
import type { Variable } from '../../../core/thruster/searchSpace'
import { expectClose } from '../../support/close'

const log = (low: number, high: number): Variable => ({ kind: 'real', low, high, scale: 'log' })

/** Least y^2 / x under x y >= 1. */
const pipe: SearchProblem = {
  variables: [log(0.1, 10), log(0.1, 10)],
  score: (v) => ({ value: at(v, 1) ** 2 / at(v, 0), violation: excess(1, at(v, 0) * at(v, 1)) }),
}
/** Size x + y; the value falls with x and rises with y, so the front lies on x y = 1: value x^-3, size x + 1/x for x >= 1. */
const pipeSize = (v: Float64Array) => at(v, 0) + at(v, 1)

describe('paretoFront', () => {
  it('lies on the front worked by hand: value x^-3 at size x + 1/x', async () => {
    const least = await searchLeast(pipe, { seed: 1 })
    expectClose(least.best.value, 1e-3, 1e-6) // x at its end, 10
    const { points, status } = await paretoFront(pipe, pipeSize, { seed: 1, count: 20, least })
    expect(status).toBe('done')
    expect(points.length).toBe(20)
    for (const { size, value } of points) {
      const x = (size + Math.sqrt(Math.max(0, size * size - 4))) / 2
      // Steepest at the smallest size, where x = 1 + sqrt(size - 2): a size off by 1e-6 moves x by 1e-3.
      expectClose(value, x ** -3, 4e-3, `size ${size}`)
    }
    // Away from that end the search's own aim holds.
    for (const { size, value } of points.filter(({ size }) => size > 2.2))
      expectClose(value, ((size + Math.sqrt(size * size - 4)) / 2) ** -3, 1e-4, `size ${size}`)
    expectClose(at(points, 0).size, 2, 1e-5)
    expectClose(last(points).size, 10.1, 1e-5)
  })

  it('rises in size and falls in value, strictly', async () => {
    const least = await searchLeast(pipe, { seed: 2 })
    const { points } = await paretoFront(pipe, pipeSize, { seed: 2, count: 12, least })
    points.slice(1).forEach((point, i) => {
      expect(point.size).toBeGreaterThan(at(points, i).size)
      expect(point.value).toBeLessThan(at(points, i).value)
    })
  })
})

describe('nonDominated', () => {
  it('keeps what no other beats in both', () => {
    const points = [
      { size: 3, value: 1 },
      { size: 1, value: 5 },
      { size: 2, value: 5 },
      { size: 2, value: 3 },
      { size: 4, value: 2 },
      { size: 1, value: 6 },
    ]
    expect(nonDominated(points)).toEqual([
      { size: 1, value: 5 },
      { size: 2, value: 3 },
      { size: 3, value: 1 },
    ])
  })
})

describe('nonDominated of points alike but for rounding', () => {
  const near = (value: number): number => value * (1 + 4e-16)

  it('keeps one of them, whichever rounding favours', () => {
    const front = [
      { size: 1, value: 5 },
      { size: 2, value: 3 },
    ]
    for (const twin of [
      { size: near(1), value: 5 - 1e-15 },
      { size: near(2), value: 3 - 1e-15 },
      { size: 2, value: near(3) },
    ])
      expect(nonDominated([...front, twin]).length).toBe(2)
    // The same for values below 0, as of thrust.
    expect(
      nonDominated([
        { size: 1, value: -5 },
        { size: near(1), value: near(-5) },
      ]).length,
    ).toBe(1)
  })

  it('keeps the better of two of one size, and both of two that differ by more', () => {
    expect(
      nonDominated([
        { size: 1, value: 5 },
        { size: near(1), value: 4 },
      ]),
    ).toEqual([{ size: near(1), value: 4 }])
    expect(
      nonDominated([
        { size: 1, value: 5 },
        { size: 1 + 1e-8, value: 5 - 1e-7 },
      ]).length,
    ).toBe(2)
  })
})

describe('searchDistinct', () => {
  /** Two valleys: 0 at (0.2, 0.2) and 0.01 at (0.8, 0.7). */
  const valleys: SearchProblem = {
    variables: [
      { kind: 'real', low: 0, high: 1, scale: 'linear' },
      { kind: 'real', low: 0, high: 1, scale: 'linear' },
    ],
    score: (v) => {
      const valley = (x: number, y: number) => (at(v, 0) - x) ** 2 + (at(v, 1) - y) ** 2
      return { value: Math.min(valley(0.2, 0.2), 0.01 + valley(0.8, 0.7)), violation: 0 }
    },
  }

  it('finds the best, the other valley, and then the best at a distance', async () => {
    const { found, status } = await searchDistinct(valleys, { seed: 1, count: 3, apart: 0.15 })
    expect(status).toBe('done')
    const values = found.map(({ best }) => best.value)
    expectClose(1 + at(values, 0), 1, 1e-6)
    // At 0.15 from the best in one field the first valley stands at 0.0225; the second valley's floor is lower.
    expectClose(at(values, 1), 0.01, 1e-4)
    expectClose(at(values, 2), 0.0225, 1e-4)
    for (const a of found)
      for (const b of found)
        if (a !== b) expect(distance(valleys.variables, a.best.point, b.best.point)).toBeGreaterThanOrEqual(0.15)
  })

  it('tells the least violated alone where nothing is inside the limits', async () => {
    const { found } = await searchDistinct(
      { ...valleys, score: (v) => ({ value: 0, violation: 1 + at(v, 0) }) },
      { seed: 1, count: 3, apart: 0.15 },
    )
    expect(found.length).toBe(1)
    expectClose(at(found, 0).best.violation, 1, 1e-6)
  })
})
