import { describe, expect, it } from 'vitest'
import { firstPlateau, type PlateauRow } from '../../../../core/coaxial/jet/plateau'
import { axialDensity, ringCut } from '../../../../core/coaxial/jet/ringCut'
import { nextStep, scaleProgramme } from '../../../../core/coaxial/jet/scaledProgramme'
import { compileProgramme } from '../../../../core/pulse'
import { expectClose, expectNear } from '../../../support/close'

/** Density of bumps [place, height, width] and what ringCut makes of it. */
function cutOf(...bumps: readonly (readonly [number, number, number])[]) {
  const step = 0.01
  const start = 6
  const values = Float64Array.from({ length: 800 }, (_, k) =>
    bumps.reduce((sum, [x, height, width]) => sum + height * Math.exp(-(((start - k * step - x) / width) ** 2)), 0),
  )
  return ringCut({ start, step, values })
}

describe('circulation along the axis', () => {
  it('keeps the circulation, and spreads one filament to a Gaussian of 0.15 D', () => {
    const { start, step, values } = axialDensity([2], [3], 1)
    const total = values.reduce((sum, value) => sum + value * step, 0)
    // Four standard deviations hold all but 6e-5.
    expectClose(total, 3, 1e-4)
    const peak = 3 / (0.15 * Math.sqrt(2 * Math.PI))
    const away = Math.round((start - 2 - 0.15) / step)
    expectClose(Math.max(...values), peak, 0.01)
    expectClose(values[away] ?? NaN, peak * Math.exp(-0.5), 0.1)
  })

  it('is empty without filaments, and has no ring then', () => {
    expect(ringCut(axialDensity([], [], 0))).toBeNull()
    expect(ringCut(axialDensity([1], [-1], 1))).toBeNull()
  })
})

describe('the ring cut', () => {
  it('lies at the minimum behind the leading peak', () => {
    const cut = cutOf([4, 2, 0.3], [1, 1, 0.8])
    expect(cut?.trailingJet).toBe(true)
    expectNear(cut?.x ?? NaN, 3.1, 0.3)
    expect(cut?.ratio ?? NaN).toBeLessThan(0.05)
  })

  it('takes the most downstream peak above 0.3 of the highest, and none below', () => {
    expect(cutOf([4, 0.35, 0.2], [2, 1, 0.5])?.x ?? NaN).toBeGreaterThan(2.5)
    const all = cutOf([4, 0.25, 0.2], [2, 1, 0.5])
    expect(all?.trailingJet).toBe(false)
  })

  it('passes over a rise of less than 0.1 of the peak', () => {
    // A bump of 0.05 behind the ring, then one of 0.5.
    const cut = cutOf([4, 1, 0.3], [2.8, 0.05, 0.2], [1, 0.5, 0.4])
    expect(cut?.x ?? NaN).toBeLessThan(2.5)
  })

  it('sees no jet in a stopping vortex, and ends the ring before it', () => {
    const cut = cutOf([3, 1, 0.4], [0, -0.4, 0.3])
    expect(cut?.trailingJet).toBe(false)
    expect(cut?.ratio).toBeNull()
    expect(cut?.x ?? NaN).toBeGreaterThan(0.5)
  })
})

describe('the first plateau', () => {
  const rows = (list: readonly (readonly [number, number | null, number | null])[]): PlateauRow[] =>
    list.map(([time, circulation, ratio]) => ({ time, circulation, ratio }))

  it('needs one formation time within 0.03 and a ratio below 0.12 at its end', () => {
    const list = rows([
      [4, 1.9, 0.2],
      [4.5, 2.0, 0.2],
      [5, 2.01, 0.15],
      [5.5, 2.02, 0.11],
      [6, 2.03, 0.08],
    ])
    expect(firstPlateau(list)).toEqual({ from: 1, to: 3 })
    expect(firstPlateau(list.slice(2))).toEqual({ from: 0, to: 2 })
    expect(firstPlateau(list.slice(3))).toBeNull()
  })

  it('is not there while the circulation still grows', () => {
    expect(
      firstPlateau(
        rows([
          [5, 2.0, 0.05],
          [5.5, 2.02, 0.05],
          [6, 2.04, 0.05],
          [6.5, 2.06, 0.05],
        ]),
      ),
    ).toBeNull()
  })

  it('stays the first when the ring swallows another piece of the jet later', () => {
    const list = rows([
      [5, 2.0, 0.05],
      [6, 2.0, 0.05],
      [7, 2.5, 0.05],
      [8, 2.5, 0.02],
    ])
    expect(firstPlateau(list)).toEqual({ from: 0, to: 1 })
  })

  it('does not reach back over a time without a cut', () => {
    const list = rows([
      [5, 2.0, 0.05],
      [5.5, null, null],
      [6, 2.0, 0.05],
      [6.5, 2.0, 0.05],
    ])
    expect(firstPlateau(list)).toBeNull()
  })
})

describe('time steps', () => {
  it('end at jumps of the speed and at the end of the stroke, and are equal in between', () => {
    const rows = [
      { time: 0, speed: 0 },
      { time: 0.01, speed: 0.5 },
      { time: 0.03, speed: 0.5 },
    ]
    const table = compileProgramme({ shape: 'table', stroke: 1, peakSpeed: 1, riseTime: 0, fallTime: 0, rows })
    const scaled = scaleProgramme(table, 0.01)
    // The corner at 0.01 s is no jump.
    expect(scaled.stops).toHaveLength(1)
    expectClose(scaled.duration, 1.5, 1e-12)
    expectClose(nextStep(0, 0.4, scaled.stops), 0.375, 1e-12)
    expectClose(nextStep(1.125, 0.4, scaled.stops), 0.375, 1e-12)
    expect(nextStep(scaled.duration, 0.4, scaled.stops)).toBe(0.4)
  })

  it('scale a programme so that its peak and its stroke ratio are what the plan says', () => {
    const scaled = scaleProgramme(
      compileProgramme({ shape: 'half-sine', stroke: 0.06, peakSpeed: 0.4, riseTime: 0, fallTime: 0, rows: [] }),
      0.02,
    )
    expectClose(scaled.strokeRatio, 3, 1e-12)
    expectClose(scaled.before(scaled.duration / 2), 1, 1e-12)
    expectClose(scaled.formationTime(2 * scaled.duration), 3, 1e-12)
    // int sin^2 over the half wave: (pi/4) L/D.
    expectClose(scaled.square, (Math.PI / 4) * 3, 1e-12)
  })
})
