import { describe, expect, it } from 'vitest'
import { at, last } from '../../../core/base'
import type { ClosedShape } from '../../../core/pulse'
import { analyseThruster, type CycleHistory, type ThrusterInput } from '../../../core/thruster'
import { expectClose, expectNear } from '../../support/close'
import { BENCH, ON_BENCH, PUSH, withSection, withVehicle } from './plans'

/** Mean of a column over the period by the trapezoidal rule; corners stand twice, so jumps cost only the gap between the two. */
function mean(history: CycleHistory, column: keyof CycleHistory): number {
  let sum = 0
  const { time } = history
  const values = history[column]
  for (let i = 1; i < time.length; i++)
    sum += ((at(values, i) + at(values, i - 1)) / 2) * (at(time, i) - at(time, i - 1))
  return sum / last(time)
}

/**
 * Trapezoids of the period's 1/200, h, overestimate the square of a ramp by h^2/12 times its slope at the end: with h = 1/300 s and the
 * two ramps of 0.04 s here 7e-4 of the whole; the cube of it 1.5 times that.
 */
const TRAPEZOIDS = 1.1e-3

const busy = withVehicle(
  { speed: 0.15 },
  {
    ...ON_BENCH,
    section: {
      ...BENCH,
      actuator: { ...BENCH.actuator, valveLag: 0.02, efficiency: 0.6 },
      intake: { area: 2e-4, recoveredShare: 0.3, lossCoefficient: 0.8 },
    },
  },
)

describe('the period', () => {
  it.each<ClosedShape>(['rectangular', 'trapezoid', 'linear-ramp', 'half-sine', 'sine-squared'])(
    'of a %s has the mean thrust and the mean power of the budget',
    (shape) => {
      // Without water in the nozzle: a jump would set it going in no time, which a history cannot hold.
      const nozzle = { ...PUSH.nozzle, length: 0 }
      const pulse = { ...PUSH, nozzle, programme: { ...PUSH.programme, shape } }
      const result = analyseThruster({ ...busy, frequency: 1.5, pulse })
      expectClose(mean(result.cycle, 'totalThrust'), result.meanThrust, TRAPEZOIDS)
      expectClose(mean(result.cycle, 'power'), result.power.total, TRAPEZOIDS)
      expectNear(mean(result.cycle, 'plungerSpeed'), 0, TRAPEZOIDS * result.plunger.speed)
    },
  )

  it.each<ClosedShape>(['trapezoid', 'half-sine', 'sine-squared'])(
    'of a %s with water in the nozzle has the power of the budget as well, its column in it',
    (shape) => {
      const result = analyseThruster({
        ...busy,
        pulse: { ...PUSH, programme: { ...PUSH.programme, shape, peakSpeed: 0.6 } },
      })
      expect(result.power.column).toBeGreaterThan(0.05 * result.power.jet)
      expectClose(mean(result.cycle, 'power'), result.power.total, TRAPEZOIDS)
    },
  )

  it('has the power of water that is carried along in the refill', () => {
    const intake = { ...busy.section.intake, recoveredShare: 0.9 }
    const result = analyseThruster({ ...busy, section: { ...busy.section, intake } })
    expect(result.power.carried).toBeGreaterThan(0.01 * result.power.jet)
    expectClose(mean(result.cycle, 'power'), result.power.total, TRAPEZOIDS)
  })

  it('spreads over-pressure over the stroke, so that its mean stays', () => {
    const pulse = { ...PUSH, overPressure: 'quick-start', programme: { ...PUSH.programme, riseTime: 0.02 } } as const
    const result = analyseThruster({ ...busy, pulse })
    expect(result.quickStart).toBe(true)
    expect(result.meanThrust).toBe(result.meanThrustRange[1])
    expectClose(mean(result.cycle, 'totalThrust'), result.meanThrust, TRAPEZOIDS)
    expectClose(mean(result.cycle, 'power'), result.power.total, TRAPEZOIDS)
  })

  it('has the peaks of the budget', () => {
    const { cycle, plunger, cavity } = analyseThruster(busy)
    const absolute = (values: readonly number[]) => Math.max(...values.map(Math.abs))
    // Corners are read 1e-6 of the stroke beside; slopes are differences over 4e-7 of it.
    expectClose(absolute(cycle.plungerForce), plunger.force, 1e-5)
    expectClose(absolute(cycle.plungerSpeed), plunger.speed, 1e-5)
    expectClose(absolute(cycle.plungerAcceleration), plunger.acceleration, 1e-5)
    expectClose(Math.max(...cycle.power), plunger.peakPower, 1e-5)
    expectClose(Math.max(...cycle.plungerPosition), plunger.travel, 1e-9)
    expectClose(Math.max(...cycle.cavityPressure), cavity.pressureHigh, 1e-5)
    expectClose(Math.min(...cycle.cavityPressure), cavity.pressureLow, 1e-5)
  })

  it('waits one lag, pushes, waits another and refills to the end, at rest in between and back where it was', () => {
    const { cycle, period } = analyseThruster(busy)
    const duration = PUSH.programme.stroke / 0.5 + 0.04
    const { time, plungerSpeed, plungerPosition } = cycle
    expect(at(time, 0)).toBe(0)
    expect(last(time)).toBe(period)
    expectNear(last(plungerPosition), 0, 1e-12)
    time.forEach((t, i) => {
      const speed = at(plungerSpeed, i)
      if (t < 0.02 || (t > 0.02 + duration && t < 0.04 + duration)) expect(speed).toBe(0)
      else if (t > 0.021 && t < 0.019 + duration) expect(speed).toBeGreaterThan(0)
      else if (t > 0.041 + duration && t < period * 0.999) expect(speed).toBeLessThan(0)
      if (i > 0) expect(t).toBeGreaterThan(at(time, i - 1))
    })
  })

  it('peaks at rho A U^2 times the number fired together', () => {
    const one = analyseThruster(ON_BENCH)
    expectClose(one.peakThrust, 998.2 * Math.PI * 1e-4 * 0.25, 1e-9)
    const three = analyseThruster(withSection({ count: 3 }))
    expectClose(three.peakThrust, 3 * one.peakThrust, 1e-12)
    expectClose(three.ripple ?? NaN, one.ripple ?? 0, 1e-12)
    expectClose(one.ripple ?? NaN, one.peakThrust / one.meanThrust, 1e-9)
  })
})

describe('thrusters fired in turn', () => {
  const inTurn = (count: number, shape: ClosedShape, frequency: number): ThrusterInput => ({
    ...withSection({ count, inTurn: true }),
    frequency,
    pulse: { ...PUSH, programme: { ...PUSH.programme, shape } },
  })

  it('keep the mean and lower the ripple', () => {
    const together = analyseThruster(withSection({ count: 2 }))
    const apart = analyseThruster(withSection({ count: 2, inTurn: true }))
    expect(apart.meanThrust).toBe(together.meanThrust)
    expectClose(mean(apart.cycle, 'totalThrust'), apart.meanThrust, TRAPEZOIDS)
    expect(apart.ripple).toBeLessThan(together.ripple ?? 0)
    expectClose(apart.peakThrust, together.peakThrust / 2, 1e-9)
  })

  it('two sine-squared strokes of half a period each leave a ripple of a single one over its own mean', () => {
    // sin^4 over half a period each: mean 3/8 of the peak, from 0 to the peak. The refill needs a little time, so not quite half.
    const duration = (2 * 0.08) / 0.5
    const { ripple } = analyseThruster(inTurn(2, 'sine-squared', 0.4999 / duration))
    expectClose(ripple ?? NaN, 8 / 3, 1e-3)
  })

  it('make a level thrust of rectangles that follow each other without a gap', () => {
    const duration = 0.08 / 0.5
    const { ripple, meanThrust, peakThrust } = analyseThruster(inTurn(4, 'rectangular', 0.25 / duration))
    expectClose(meanThrust, peakThrust, 1e-9)
    // What is left are the slivers beside a corner where one ends and the next has not begun, or both push.
    expect(ripple).toBeLessThanOrEqual(1 + 1e-9)
  })
})
