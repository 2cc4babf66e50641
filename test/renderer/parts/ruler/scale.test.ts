import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { axisEnd, axisTicks, nextRoundNumber, outlinePoints, tickText } from '../../../../renderer/parts/ruler/scale'

describe('ruler scale', () => {
  it('goes up in steps of 1, 2 and 5', () => {
    expect([0.9, 1, 1.1, 2, 3, 5, 7, 10, 11, 99].map(nextRoundNumber)).toEqual([1, 1, 2, 2, 5, 5, 10, 10, 20, 100])
  })

  it('is never below the number it must hold nor above ten times of it, for any magnitude', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e6, noNaN: true }), (x) => {
        const round = nextRoundNumber(x)
        expect(round).toBeGreaterThanOrEqual(x * (1 - 1e-8))
        expect(round).toBeLessThanOrEqual(2.5 * x * (1 + 1e-8))
      }),
    )
  })

  it('shows ten diameters for an ordinary stroke and grows with a long one', () => {
    expect(axisEnd(3.2, [3.6, 4.5], [3.06, 3.8, 3.91])).toBe(10)
    expect(axisEnd(8, [3.6, 4.5], [3.8])).toBe(10)
    expect(axisEnd(9, [3.6, 4.5], [3.8])).toBe(20)
    expect(axisEnd(40, null, [])).toBe(50)
  })

  it('makes room for an estimate near the plan but not for one far away', () => {
    expect(axisEnd(3, [8, 11], [12])).toBe(20)
    expect(axisEnd(3, [3.6, 4.5], [400])).toBe(10)
  })

  it('has major ticks that are round, start at zero and end at the axis end', () => {
    const ticks = axisTicks(10, 1080)
    const major = ticks.filter((tick) => tick.major).map((tick) => tickText(tick.value))
    expect(major).toEqual(['0', '1', '2', '3', '4', '5', '6', '7', '8', '9', '10'])
    expect(
      axisTicks(10, 240)
        .filter((tick) => tick.major)
        .map((tick) => tick.value),
    ).toEqual([0, 2, 4, 6, 8, 10])
  })

  it('draws the outline relative to the fastest speed', () => {
    expect(outlinePoints([0, 1, 2], [0, 0.5, 0.25])).toEqual([
      [0, 0],
      [1, 1],
      [2, 0.5],
    ])
    expect(outlinePoints([0, 1], [0, 0])).toEqual([])
  })
})
