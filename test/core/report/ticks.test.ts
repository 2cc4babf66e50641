import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { niceTicks, tickLabel, tickStep } from '../../../core/report'

describe('ticks', () => {
  it('step by 1, 2 or 5 times a power of ten', () => {
    expect(tickStep(4.8, 5)).toBe(1)
    expect(tickStep(0.2, 3)).toBe(0.1)
    expect(tickStep(900, 6)).toBe(200)
    expect(tickStep(23, 5)).toBe(5)
  })

  it('carry no binary noise', () => {
    expect(niceTicks(0, 0.6, 6)).toEqual([0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6])
    expect(niceTicks(-0.3, 0.3, 6)).toEqual([-0.3, -0.2, -0.1, 0, 0.1, 0.2, 0.3])
  })

  it('stay inside the ends, rise, and are not too many, whatever the range', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
        fc.integer({ min: 2, max: 10 }),
        (low, span, count) => {
          const high = low + span
          const ticks = niceTicks(low, high, count)
          const slack = span * 1e-6
          expect(ticks.length).toBeLessThanOrEqual(count + 1)
          ticks.forEach((tick, index) => {
            expect(tick).toBeGreaterThanOrEqual(low - slack)
            expect(tick).toBeLessThanOrEqual(high + slack)
            if (index > 0) expect(tick).toBeGreaterThan(ticks[index - 1] ?? Infinity)
          })
        },
      ),
    )
  })

  it('stay inside also where the step is near the last digit of the ends', () => {
    const low = -245159.71874999997
    for (const tick of niceTicks(low, low + 1e-6, 5)) expect(tick).toBeGreaterThanOrEqual(low - 1e-12)
    fc.assert(
      fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.integer({ min: 2, max: 10 }), (end, count) => {
        const ticks = niceTicks(end, end + 1e-6, count)
        return ticks.every((tick) => tick >= end - 1e-12 && tick <= end + 1e-6 + 1e-12)
      }),
      { numRuns: 2000 },
    )
  })

  it('answer ends that coincide, are swapped or are not finite', () => {
    expect(niceTicks(2, 2, 5)).toEqual([2])
    expect(niceTicks(3, 0, 3)).toEqual([0, 1, 2, 3])
    expect(niceTicks(0, Number.NaN, 3)).toEqual([])
    expect(tickStep(0, 4)).toBe(1)
  })

  it('are written with the decimals of their step and a true minus sign', () => {
    expect(tickLabel(0, 0.1)).toBe('0.0')
    expect(tickLabel(0.30000000000000004, 0.1)).toBe('0.3')
    expect(tickLabel(-5, 5)).toBe('\u22125')
    expect(tickLabel(200000, 100000)).toBe('2×10⁵')
    expect(tickLabel(0.00002, 0.00001)).toBe('2×10⁻⁵')
  })
})
