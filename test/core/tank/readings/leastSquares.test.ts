import { describe, expect, it } from 'vitest'
import { at, randomSource } from '../../../../core/base'
import { leastSquares } from '../../../../core/tank/readings/leastSquares'
import { median, robustDeviation } from '../../../../core/tank/readings/robust'
import { correlationOf, inverseOf } from '../../../../core/tank/readings/smallMatrix'
import { student95 } from '../../../../core/tank/readings/student'
import { expectClose, expectNear } from '../../../support/close'

describe('least squares', () => {
  const random = randomSource(11)
  const points = Array.from({ length: 40 }, (_, k) => ({ x: k / 10, sigma: 0.1 + 0.01 * k }))
  const line = points.map(({ x, sigma }) => ({ x, sigma, y: 2 - 0.5 * x + sigma * random.normal() }))

  it('of a straight line are those of the closed form, with their covariance', () => {
    const { parameters, covariance, status } = leastSquares({
      start: [0, 0],
      scale: [1, 1],
      residuals: ([a = 0, b = 0]) => Float64Array.from(line, ({ x, y, sigma }) => (a + b * x - y) / sigma),
    })
    const sum = (value: (one: (typeof line)[number]) => number): number =>
      line.reduce((total, one) => total + value(one) / one.sigma ** 2, 0)
    const [s, sx, sxx, sy, sxy] = [
      sum(() => 1),
      sum(({ x }) => x),
      sum(({ x }) => x * x),
      sum(({ y }) => y),
      sum(({ x, y }) => x * y),
    ]
    const determinant = s * sxx - sx * sx
    expect(status).toBe('done')
    // Slopes by differences of 1e-5 in a model that is straight: rounding over the step, 1e-11.
    expectClose(at(parameters, 0), (sxx * sy - sx * sxy) / determinant, 1e-9)
    expectClose(at(parameters, 1), (s * sxy - sx * sy) / determinant, 1e-9)
    expectClose(at(at(covariance ?? [], 0), 0), sxx / determinant, 1e-8)
    expectClose(at(at(covariance ?? [], 0), 1), -sx / determinant, 1e-8)
  })

  it('find the bottom of a curved valley from far away', () => {
    // Rosenbrock's valley as residuals: 10 (y - x^2) and 1 - x, least at (1, 1).
    const { parameters, sumOfSquares, status } = leastSquares({
      start: [-1.2, 1],
      scale: [1, 1],
      residuals: ([x = 0, y = 0]) => Float64Array.from([10 * (y - x * x), 1 - x]),
    })
    expect(status).toBe('done')
    expectNear(at(parameters, 0), 1, 1e-6)
    expectNear(at(parameters, 1), 1, 1e-6)
    expect(sumOfSquares).toBeLessThan(1e-12)
  })

  it('do not depend on the units of a parameter', () => {
    const fit = (unit: number) =>
      leastSquares({
        start: [0, unit],
        scale: [1, unit],
        residuals: ([a = 0, b = 0]) =>
          Float64Array.from(line, ({ x, y, sigma }) => (a + (b / unit) * x * x - y) / sigma),
      })
    expectClose(at(fit(1e-6).parameters, 1), at(fit(1).parameters, 1) * 1e-6, 1e-8)
  })

  it('have no covariance where two parameters do the same', () => {
    const { covariance } = leastSquares({
      start: [0, 0],
      scale: [1, 1],
      residuals: ([a = 0, b = 0]) => Float64Array.from(line, ({ y, sigma }) => (a + b - y) / sigma),
    })
    expect(covariance).toBeNull()
  })

  it('fail in a sentence where the matrix of a step is singular', () => {
    // Slopes of 1e12: what the damping adds is lost in their squares, and the two columns are one.
    const { status, message, covariance } = leastSquares({
      start: [0, 0],
      scale: [1, 1],
      residuals: ([a = 0, b = 0]) => Float64Array.from([1, 2, 3], (y) => 1e12 * (a + b - y)),
    })
    expect(status).toBe('failed')
    expect(message).toMatch(/^The readings determine no step of the fit: they cannot tell apart what is fitted to them/)
    expect(covariance).toBeNull()
  })

  it('fail in a sentence where the model has no value', () => {
    expect(leastSquares({ start: [0], scale: [1], residuals: () => Float64Array.from([NaN, 1]) })).toMatchObject({
      status: 'failed',
      message: 'The model has no finite value where the fit starts.',
    })
  })
})

describe('small matrices', () => {
  it('are inverted: the Hilbert matrix of order 3', () => {
    // Inverse of H3, integers; condition 524, so that rounding is some 1e-13.
    const hilbert = [0, 1, 2].map((i) => [0, 1, 2].map((j) => 1 / (i + j + 1)))
    const wanted = [
      [9, -36, 30],
      [-36, 192, -180],
      [30, -180, 180],
    ]
    inverseOf(hilbert)?.forEach((row, i) => row.forEach((value, j) => expectClose(value, at(at(wanted, i), j), 1e-11)))
    expect(inverseOf(hilbert)).not.toBeNull()
    expect(
      inverseOf([
        [1, 2],
        [2, 4],
      ]),
    ).toBeNull()
    expect(
      correlationOf([
        [4, -1],
        [-1, 1],
      ]),
    ).toEqual([
      [1, -0.5],
      [-0.5, 1],
    ])
  })
})

describe('statistics', () => {
  // Abramowitz & Stegun, Table 26.10, t at 0.975 (two-sided 0.05), three decimals. Recalled, not re-read.
  it.each([
    [1, 12.706],
    [3, 3.182],
    [5, 2.571],
    [10, 2.228],
    [30, 2.042],
    [120, 1.98],
  ])("Student's 95 %% factor for %d degrees of freedom is %d", (freedom, t) => {
    // Half of the last figure printed.
    expectNear(student95(freedom), t, 0.0006)
  })

  it('the median and the deviation from it do not mind one wild value', () => {
    expect(median([3, 1, 2])).toBe(2)
    expect(median([4, 1, 2, 3])).toBe(2.5)
    expect(median([])).toBeNaN()
    const values = Array.from({ length: 2001 }, (_, k) => (k === 0 ? 1e9 : 0))
    expect(robustDeviation(values)).toBe(0)
    const random = randomSource(5)
    const normal = Float64Array.from({ length: 20_000 }, () => 3 * random.normal())
    // Standard error of this estimate: 1.17 / sqrt(20 000) of it, 0.8 %; three of them.
    expectClose(robustDeviation(normal), 3, 0.025)
  })
})
