import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { equallySpaced } from '../../../core/base'
import {
  contourLines,
  regionAbove,
  valueBetween,
  type ContourGrid,
  type ContourLine,
} from '../../../core/report/contours'
import { expectNear } from '../../support/close'

function gridOf(of: (x: number, y: number) => number, places = 41, from = -2, to = 2): ContourGrid {
  const axis = equallySpaced(from, to, places)
  return { x: axis, y: axis, values: axis.flatMap((y) => axis.map((x) => of(x, y))) }
}

/** Twice the area a closed line goes round, positive where it runs with its inside on the left. */
function turned(line: ContourLine): number {
  return line.reduce((sum, { x, y }, i) => {
    const next = line[(i + 1) % line.length] ?? { x, y }
    return sum + x * next.y - next.x * y
  }, 0)
}

describe('contourLines', () => {
  it('finds a circle closed, with the higher values on its left', () => {
    const [line, ...others] = contourLines(
      gridOf((x, y) => 2 - Math.hypot(x, y)),
      1,
    )
    expect(others).toEqual([])
    expect(line?.[0]).toEqual(line?.at(-1))
    // Inside is higher, so the line turns left around it; chords of a radius 1 on a grid of 0.1 lie within (0.1)^2 / 8 of it.
    expect(turned(line ?? [])).toBeGreaterThan(0)
    for (const { x, y } of line ?? []) expectNear(Math.hypot(x, y), 1, 0.1 ** 2 / 8 + 1e-12)
  })

  it('is exact where the values are straight in x and y, and open where it leaves the grid', () => {
    const [line, ...others] = contourLines(
      gridOf((x, y) => x + 2 * y),
      0.5,
    )
    expect(others).toEqual([])
    for (const { x, y } of line ?? []) expectNear(x + 2 * y, 0.5, 1e-12)
    const ends = [line?.[0], line?.at(-1)].map((end) => Math.max(Math.abs(end?.x ?? 0), Math.abs(end?.y ?? 0)))
    for (const end of ends) expectNear(end, 2, 1e-12)
  })

  it('parts or joins a saddle by the value in the middle', () => {
    const saddle = (middle: number): ContourGrid => ({ x: [0, 1], y: [0, 1], values: [middle, 0, 0, middle] })
    // With the high corners at 3 the middle is above 1, at 1.5 it is below.
    expect(contourLines(saddle(3), 1)).toHaveLength(2)
    expect(contourLines(saddle(1.5), 1)).toHaveLength(2)
    const joined = contourLines(saddle(3), 1).flat()
    const apart = contourLines(saddle(1.5), 1).flat()
    expect(joined.some(({ x, y }) => x > 0.5 && y === 0)).toBe(true)
    expect(apart.some(({ x, y }) => x < 0.5 && y === 0)).toBe(true)
  })

  it('passes over places without a value', () => {
    const grid = gridOf((x, y) => (x > 1 ? NaN : x + y))
    for (const { x } of contourLines(grid, 0).flat()) expect(x).toBeLessThanOrEqual(1 + 1e-12)
  })

  it('keeps every crossing between its two places, whatever the values', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 25, maxLength: 25 }), (values) => {
        const axis = [0, 1, 2, 3, 4]
        for (const line of contourLines({ x: axis, y: axis, values }, 0.1))
          for (const { x, y } of line) {
            // Each point lies on a side of a cell.
            expect(Math.min(Math.abs(x - Math.round(x)), Math.abs(y - Math.round(y)))).toBeLessThan(1e-9)
            expect(x).toBeGreaterThanOrEqual(0)
            expect(y).toBeLessThanOrEqual(4)
          }
      }),
    )
  })
})

describe('regionAbove', () => {
  it('closes along the rim what runs out of the grid', () => {
    const lines = regionAbove(
      gridOf((x) => x, 21),
      0,
    )
    expect(lines).toHaveLength(1)
    const [line = []] = lines
    expect(line[0]).toEqual(line.at(-1))
    // The right half of a square of side 4.
    expectNear(Math.abs(turned(line)) / 2, 8, 1e-9)
  })

  it('is the whole grid where everything is above, and nothing where nothing is', () => {
    const [whole = []] = regionAbove(
      gridOf(() => 1),
      0,
    )
    expectNear(Math.abs(turned(whole)) / 2, 16, 1e-9)
    expect(
      regionAbove(
        gridOf(() => -1),
        0,
      ),
    ).toEqual([])
  })
})

describe('valueBetween', () => {
  it('is exact for values straight in each axis, and no number outside', () => {
    const grid = gridOf((x, y) => 3 + x - y + x * y, 5)
    expectNear(valueBetween(grid, { x: 0.3, y: -1.7 }), 3 + 0.3 + 1.7 - 0.51, 1e-12)
    expectNear(valueBetween(grid, { x: 2, y: 2 }), 7, 1e-12)
    expect(valueBetween(grid, { x: 2.1, y: 0 })).toBeNaN()
  })
})
