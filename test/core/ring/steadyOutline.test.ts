import { describe, expect, it } from 'vitest'
import { at, last } from '../../../core/base'
import { steadyRing, steadyRingOutline, type MeridionalCurve } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'

const RATIOS = [1e-3, 0.005, 0.0117, 0.05, 0.1, 0.4858, 0.9, 1.2, 1.35, 1.41, Math.SQRT2 - 1e-4, Math.SQRT2]

/** Area and volume of revolution of a curve closed by its ends, by trapezoids. */
function measures(curve: MeridionalCurve): { area: number; volume: number } {
  let area = 0
  let volume = 0
  const n = curve.x.length
  for (let i = 0; i < n; i++) {
    const j = (i + 1) % n
    const dx = at(curve.x, j) - at(curve.x, i)
    const r1 = at(curve.r, i)
    const r2 = at(curve.r, j)
    area += (dx * (r1 + r2)) / 2
    volume += (Math.PI * dx * (r1 * r1 + r1 * r2 + r2 * r2)) / 3
  }
  return { area: Math.abs(area), volume: Math.abs(volume) }
}

describe('outlines of a steady ring', () => {
  it.each(RATIOS)('are those of the ring of core ratio %f', (coreRatio) => {
    const { core, carried } = steadyRingOutline(coreRatio)
    const ring = steadyRing(1, 1, coreRatio, 1)
    // Polygon of 256 points inside a convex curve: 3e-4 of the area; beyond the last row the corners differ by 6e-3 of L.
    expectClose(measures(core).area, Math.PI * coreRatio ** 2, coreRatio > 1.4133 ? 2e-3 : 1e-3)
    // Polygon of 96 points: 2e-3.
    expectClose(measures(carried).volume, ring.carriedVolume, 3e-3)
    expectNear(Math.max(...core.r), ring.outerRadius, 1e-4 * coreRatio + 1e-6)
    expectNear(Math.min(...core.r), ring.innerRadius, 1e-4 * coreRatio + 1e-6)
  })

  it.each(RATIOS)('are closed, symmetric and stay off the other side of the axis at core ratio %f', (coreRatio) => {
    const { core, carried, carriedKind } = steadyRingOutline(coreRatio)
    expect([last(core.x), last(core.r)]).toEqual([at(core.x, 0), at(core.r, 0)])
    for (const curve of [core, carried]) {
      expect(Math.min(...curve.r)).toBeGreaterThanOrEqual(0)
      expect([...curve.x, ...curve.r].every(Number.isFinite)).toBe(true)
      expectNear(Math.max(...curve.x), -Math.min(...curve.x), 1e-12)
    }
    expect(at(carried.r, 0)).toBe(last(carried.r))
    if (carriedKind === 'spheroid') expect(at(carried.r, 0)).toBe(0)
    else expect(at(carried.x, 0)).toBe(0)
  })

  it.each(RATIOS)('keep the core inside the fluid carried at core ratio %f', (coreRatio) => {
    const { core, carried } = steadyRingOutline(coreRatio)
    expect(Math.max(...core.r)).toBeLessThanOrEqual(Math.max(...carried.r) + 1e-4)
    expect(Math.max(...core.x)).toBeLessThanOrEqual(Math.max(...carried.x) + 1e-4)
  })

  // R10. Kelvin 1867: for R/a above 86 the fluid carried is a torus; two digits given.
  it('become a torus where R/a passes 86', () => {
    let low = 0.005
    let high = 0.02
    while (high - low > 1e-7) {
      const middle = (low + high) / 2
      if (steadyRingOutline(middle).carriedKind === 'torus') low = middle
      else high = middle
    }
    expectNear(1 / low, 86, 0.5)
  })

  it('refuse a core ratio outside the family', () => {
    expect(() => steadyRingOutline(0)).toThrow(/coreRatio must be above 0/)
    expect(() => steadyRingOutline(2)).toThrow(/coreRatio must be at most/)
  })
})
