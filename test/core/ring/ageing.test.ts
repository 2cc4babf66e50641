import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { integrate } from '../../../core/base'
import {
  ageingRegime,
  laminarAgeing,
  laminarCoreRadius,
  lateAgeing,
  stokesRingSpeed,
  thinRingSpeed,
  turbulentAgeing,
  type Ageing,
} from '../../../core/ring'
import { expectClose } from '../../support/close'

const laminar = laminarAgeing({ circulation: 2e-3, radius: 0.02, coreRadius: 0.003, viscosity: 1e-6 })
const late = lateAgeing({ speed: 0.05, radius: 0.02, impulsePerDensity: 4e-6, viscosity: 1e-6 })
const turbulent = turbulentAgeing({ speed: 0.5, radius: 0.02, coreRadius: 0.006 })
const LAWS: readonly (readonly [string, Ageing])[] = [
  ['laminar', laminar],
  ['late', late],
  ['turbulent', turbulent],
]

describe('ageing of a ring', () => {
  it.each(LAWS)('has distance as the integral of speed under the %s law', (_, law) => {
    // Quadrature of the speed to 1e-11; the laminar law changes form inside, where speed is continuous.
    const end = 12
    const distance = integrate((t) => law.atTime(t).speed, 0, end, 1e-11)
    expectClose(law.atTime(end).distance, distance, 1e-10)
    expect(law.atTime(0).distance).toBe(0)
  })

  it.each(LAWS)('finds the time to reach a distance under the %s law', (_, law) => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 60, noNaN: true }), (time) => {
        const found = law.timeToReach(law.atTime(time).distance)
        // The distance grows ever slower: the time it gives back loses what the speed has lost.
        expectClose(found ?? Number.NaN, time, 1e-9)
      }),
    )
  })

  it('begins as the thin ring and hands over where the core is 0.3 of the radius, with speed and distance continuous', () => {
    expect(laminar.atTime(0).speed).toBe(thinRingSpeed(2e-3, 0.02, 0.003, 'gaussian'))
    const change = (0.006 ** 2 - 0.003 ** 2) / 4e-6
    const before = laminar.atTime(change * (1 - 1e-9))
    const after = laminar.atTime(change * (1 + 1e-9))
    expect([before.law, after.law]).toEqual(['thin', 'late'])
    expectClose(after.speed, before.speed, 1e-8)
    expectClose(after.distance, before.distance, 1e-8)
    expectClose(after.coreRadius ?? 0, 0.006, 1e-8)
  })

  it('grows its core as the square root of time', () => {
    expectClose(laminarCoreRadius(0.003, 1e-6, 4), Math.sqrt(0.003 ** 2 + 1.6e-5), 1e-15)
    expectClose(laminarCoreRadius(0, 1e-6, 4), 0.004, 1e-15)
  })

  it('starts on the later-life law at a given speed where the core is thick from the first', () => {
    const ring = { circulation: 2e-3, radius: 0.02, coreRadius: 0.009, viscosity: 1e-6 }
    const given = laminarAgeing({ ...ring, speed: 0.01 })
    expectClose(given.atTime(0).speed, 0.01, 1e-14)
    expect(given.atTime(0).law).toBe('late')
    expect(laminarAgeing(ring).atTime(0).speed).toBeCloseTo(thinRingSpeed(2e-3, 0.02, 0.009, 'gaussian'), 14)
  })

  // Rott & Cantwell 1993 through Fukumoto & Kaplanski 2008, recalled, not re-read: the two rounded constants agree to 4e-4.
  it('ends in the Stokes limit', () => {
    const time = 1e9
    expectClose(late.atTime(time).speed, stokesRingSpeed(4e-6, 1e-6, time), 5e-4)
  })

  it('stops at a finite distance in a viscous fluid and says so', () => {
    expect(late.timeToReach(late.reach * 1.0001)).toBeNull()
    expect(late.timeToReach(late.reach * 0.9)).toBeGreaterThan(0)
    expect(laminar.timeToReach(laminar.reach)).toBeNull()
    // The reach is approached as t^(-1/2).
    expectClose(late.atTime(1e12).distance, late.reach, 1e-4)
  })

  // L3. Glezer & Coles 1990 (recalled): at constant impulse twice the size is an eighth of the speed.
  it('falls to an eighth of its speed at twice its size when turbulent', () => {
    const origin = 0.02 / 0.011
    const time = turbulent.timeToReach(origin)
    const aged = turbulent.atTime(time ?? 0)
    expectClose(aged.radius, 0.04, 1e-12)
    expectClose(aged.speed, 0.5 / 8, 1e-12)
    expectClose(aged.coreRadius ?? 0, 0.012, 1e-12)
    expect(turbulent.reach).toBe(Infinity)
  })

  it('grows as t^(1/4) and slows as t^(-3/4) long after the start when turbulent', () => {
    const early = turbulent.atTime(1e9)
    const later = turbulent.atTime(16e9)
    // The start is 1e9 times younger: 1e-9 of the exponent's worth is left.
    expectClose(later.radius / early.radius, 2, 1e-8)
    expectClose(later.speed / early.speed, 1 / 8, 1e-8)
  })

  // Common practice: 3000 and 10 000.
  it('chooses its law by ring Reynolds number', () => {
    expect(ageingRegime(2.9e-3, 1e-6)).toBe('laminar')
    expect(ageingRegime(5e-3, 1e-6)).toBe('between')
    expect(ageingRegime(-2e-2, 1e-6)).toBe('turbulent')
  })

  it('refuses times before the start, distances behind it and values that are no ring', () => {
    expect(() => laminar.atTime(-1)).toThrow(/time must be at least 0 s, got -1 s/)
    expect(() => late.timeToReach(-1)).toThrow(/distance must be at least 0 m/)
    expect(() => turbulent.timeToReach(Number.NaN)).toThrow(/distance must be a finite number/)
    expect(() => turbulentAgeing({ speed: 0, radius: 1 })).toThrow(/speed must be above 0 m\/s/)
    expect(() => laminarAgeing({ circulation: 1, radius: 1, coreRadius: 2, viscosity: 1e-6 })).toThrow(/at most 1 m/)
    expect(() => lateAgeing({ speed: 1, radius: 1, impulsePerDensity: 0, viscosity: 1e-6 })).toThrow(/above 0 m4\/s/)
    expect(() => ageingRegime(1, 0)).toThrow(/viscosity must be above 0/)
    expect(() => stokesRingSpeed(1, 1e-6, 0)).toThrow(/time must be above 0 s/)
  })
})
