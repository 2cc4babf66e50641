import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { ProgrammeInput } from '../../../core/pulse'
import { compileProgramme } from '../../../core/pulse'
import { integrateProfile, pistonProfile } from '../../../core/tank'
import { roundedMotion, smallestRounding, extremes } from '../../../core/tank/rounding'
import { expectClose, expectNear } from '../../support/close'
import { CONSTANT, TUBE } from '../pulse/plans'
import { DRIVE } from './sections'

const TRAPEZOID: ProgrammeInput = { ...CONSTANT, shape: 'trapezoid', riseTime: 0.02, fallTime: 0.02 }

const shape = fc.constantFrom('rectangular', 'trapezoid', 'linear-ramp', 'half-sine', 'sine-squared')
const programmes: fc.Arbitrary<ProgrammeInput> = fc.record({
  shape,
  stroke: fc.double({ min: 0.01, max: 0.2, noNaN: true }),
  peakSpeed: fc.double({ min: 0.05, max: 1, noNaN: true }),
  riseTime: fc.double({ min: 0, max: 0.1, noNaN: true }),
  fallTime: fc.double({ min: 0, max: 0.1, noNaN: true }),
  rows: fc.constant([]),
})

describe('the piston profile', () => {
  it('integrates to the stroke of the piston, whatever shape, limits and step', () => {
    fc.assert(
      fc.property(
        programmes,
        fc.integer({ min: 5, max: 400 }),
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        fc.option(fc.double({ min: 0.1, max: 30, noNaN: true })),
        fc.option(fc.double({ min: 1, max: 3000, noNaN: true })),
        (programme, steps, leak, maxAcceleration, maxJerk) => {
          const { duration } = compileProgramme(programme)
          const drive = { ...DRIVE, leak, maxAcceleration, maxJerk }
          const profile = pistonProfile({ programme, nozzle: TUBE, controllerStep: duration / steps, drive })
          // Exit area over piston area is 1/4 here; what leaks, the piston has to add.
          const travel = programme.stroke / 4 / (1 - leak)
          const check = integrateProfile(profile)
          expectClose(profile.travel, travel, 1e-12)
          expectClose(check.travel, travel, 1e-9)
          expectClose(check.lastPosition, travel, 1e-12)
          // Position and speed follow from the acceleration between rows: speeds and accelerations are written to 12 digits, times to 15,
          // which leaves 1e-14 x 400 steps of the step itself.
          expectNear(check.positionMisfit, 0, 1e-11)
          expectNear(check.speedMisfit, 0, 1e-11)
          expect(check.restsAtEnds).toBe(true)
          for (const value of profile.speed) expect(value).toBeGreaterThanOrEqual(0)
          for (const { name, ok, value, limit } of profile.limits) {
            if (limit === null) continue
            expect(ok, name).toBe(value <= limit * (1 + 1e-9))
          }
          const longest = profile.rounding.steps[0] + profile.rounding.steps[1] >= steps - 1
          if (!longest) expect(profile.ok).toBe(true)
        },
      ),
    )
  })

  it('keeps every row within the limits that rounding can keep', () => {
    const drive = { ...DRIVE, maxAcceleration: 4, maxJerk: 400 }
    const profile = pistonProfile({ programme: CONSTANT, nozzle: TUBE, controllerStep: 0.001, drive })
    expect(profile.ok).toBe(true)
    for (const a of profile.acceleration) expect(Math.abs(a)).toBeLessThanOrEqual(4 * (1 + 1e-9))
    for (let k = 1; k < profile.time.length; k++) {
      const jerk = ((profile.acceleration[k] ?? NaN) - (profile.acceleration[k - 1] ?? NaN)) / 0.001
      expect(Math.abs(jerk)).toBeLessThanOrEqual(400 * (1 + 1e-9))
    }
    // A jump of V = 0.125 m/s of the piston through two boxes: V / (n1 h) = 4 m/s2 needs 31.25 steps, V / (n1 n2 h2) = 400 m/s3 needs
    // n1 n2 = 312.5, so 32 and 10.
    expect(profile.rounding.steps).toEqual([32, 10])
    expectClose(profile.rounding.longerBy, 0.042, 1e-12)
    expectClose(profile.rounding.delay, 0.021, 1e-12)
  })

  it('rounds no more than it must: no smaller sum of boxes keeps the limits', () => {
    const way = Float64Array.from({ length: 41 }, (_, k) => (k / 40) ** 1.5)
    const sampled = { step: 0.01, way }
    fc.assert(
      fc.property(
        fc.double({ min: 5, max: 100, noNaN: true }),
        fc.double({ min: 100, max: 5000, noNaN: true }),
        (acceleration, jerk) => {
          const found = smallestRounding(sampled, { acceleration, jerk }, 40)
          if (!found.kept) return
          for (let total = 2; total < found.first + found.second; total++)
            for (let second = 1; 2 * second <= total; second++) {
              const seen = extremes(sampled, { first: total - second, second })
              expect(seen.acceleration > acceleration || seen.jerk > jerk).toBe(true)
            }
        },
      ),
    )
  })

  it('finds long roundings by halving in, next to the shortest', () => {
    const way = Float64Array.from({ length: 4001 }, (_, k) => k / 4000)
    // A jump of 1 m/s over steps of 1/4000 s: V / A = 0.1 s is 400 steps, V / (J w1) = 0.05 s another 200.
    const found = smallestRounding({ step: 1 / 4000, way }, { acceleration: 10, jerk: 200 }, 4000)
    expect(found).toEqual({ first: 400, second: 200, kept: true })
  })

  it('is the programme itself, half a rounding later, where nothing needs rounding', () => {
    const programme = compileProgramme(TRAPEZOID)
    const profile = pistonProfile({ programme: TRAPEZOID, nozzle: TUBE, controllerStep: 1e-4, drive: DRIVE })
    const { delay } = profile.rounding
    for (const time of [0.01, 0.04, 0.07]) {
      const k = Math.round((time + delay) / 1e-4)
      expectNear(profile.speed[k] ?? NaN, programme.speedAt(time) / 4, 1e-12)
    }
    expect(profile.rounding.steps).toEqual([1, 1])
    expectClose(profile.rounding.peakSpeed[1], 0.5, 1e-12)
    expectNear(profile.rounding.circulationShare, 1, 1e-4)
  })

  it('a rounded box loses circulation as its sums say', () => {
    // Speed 1 over a time 1, averaged over w = 0.3: straight ramps of that length, and int v^2 = 1 - w/3; the second box of one step and
    // the sum over steps change it by the square of the step only.
    const way = Float64Array.from({ length: 10001 }, (_, k) => k / 10000)
    const { speed } = roundedMotion({ step: 1e-4, way }, { first: 3000, second: 1 })
    const square = speed.reduce((sum, v) => sum + v * v * 1e-4, 0)
    expectNear(square, 1 - 0.3 / 3, 1e-7)
  })

  it('tells limits that cannot be kept, and keeps the planned speed and stroke', () => {
    const drive = { ...DRIVE, maxTravel: 0.005, maxSpeed: 0.1, maxAcceleration: 0.5 }
    const profile = pistonProfile({ programme: TRAPEZOID, nozzle: TUBE, controllerStep: 0.001, drive })
    const told = Object.fromEntries(profile.limits.map((limit) => [limit.name, limit]))
    expect(told['travel']).toMatchObject({ ok: false, limit: 0.005 })
    expect(told['travel']?.text).toMatch(/above the drive's 0.005 m: a shorter stroke/)
    expect(told['speed']?.ok).toBe(false)
    expect(told['acceleration']?.text).toMatch(/even with ramps as long as the stroke/)
    expect(told['jerk']).toMatchObject({ ok: true, limit: null })
    expect(profile.ok).toBe(false)
    expectClose(profile.position.at(-1) ?? NaN, 0.01, 1e-12)
  })

  it('starts its rows a lag before the first motion', () => {
    const drive = { ...DRIVE, lag: 0.015 }
    const { time } = pistonProfile({ programme: TRAPEZOID, nozzle: TUBE, controllerStep: 0.001, drive })
    expect(time.slice(0, 3)).toEqual([-0.015, -0.014, -0.013])
  })

  it('refuses steps and drives that cannot be, with the field', () => {
    const given = { programme: CONSTANT, nozzle: TUBE, controllerStep: 0.001, drive: DRIVE }
    const refused = (parts: object): unknown => {
      try {
        pistonProfile({ ...given, ...parts })
      } catch (error) {
        return error
      }
      return null
    }
    expect(refused({ controllerStep: 0.03 })).toMatchObject({
      field: 'tankRun.controllerStep',
      message: expect.stringMatching(/at most 0.02 s, a quarter of the stroke's 0.08 s, got 0.03 s/),
    })
    expect(refused({ controllerStep: 1e-7 })).toMatchObject({
      field: 'tankRun.controllerStep',
      message: expect.stringMatching(/at most 200000 rows/),
    })
    expect(refused({ drive: { ...DRIVE, leak: 0.6 } })).toMatchObject({ field: 'tankRun.drive.leak' })
    expect(refused({ drive: { ...DRIVE, lag: -1 } })).toMatchObject({ field: 'tankRun.drive.lag' })
    expect(refused({ drive: { ...DRIVE, maxSpeed: 0 } })).toMatchObject({ field: 'tankRun.drive.maxSpeed' })
  })
})
