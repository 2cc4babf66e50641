import { describe, expect, it } from 'vitest'
import { march, RungeKuttaStepper } from '../../../core/base'
import type { CoaxialRing, CoaxialWake } from '../../../core/coaxial'
import { RingFlow } from '../../../core/coaxial/ringFlow'
import { typescriptKernel } from '../../../core/kernel'
import { expectClose, expectNear } from '../../support/close'
import { lastOf, marched, ring, timesOf } from './scenes'
import { extrapolated } from './secondIntegrator'

/** Two equal rings a radius apart: they pass through one another again and again. */
const PAIR = [ring({ coreRadius: 0.05 }), ring({ coreRadius: 0.05, x: 1 })]

function flowOf(rings: readonly CoaxialRing[]): { flow: RingFlow; state: Float64Array } {
  const flow = new RingFlow({
    rings,
    law: 'thin',
    axialFlow: 0,
    wall: null,
    tubeRadius: null,
    coreGrowth: 0,
    sizeGrowth: 0,
    kernel: typescriptKernel,
  })
  const state = Float64Array.from([
    ...rings.map((one) => one.x),
    ...rings.map((one) => one.radius),
    ...rings.map((one) => one.coreRadius ** 2 * one.radius),
    ...rings.map((one) => one.circulation),
  ])
  return { flow, state }
}

function differences(wake: CoaxialWake): { apart: number; radii: [number, number] } {
  const first = lastOf(wake, 0)
  const second = lastOf(wake, 1)
  return { apart: second.x - first.x, radii: [first.radius, second.radius] }
}

describe('two equal rings in turn', () => {
  // Check P3: identity; 1e-9 at tolerance 1e-11.
  it('keep sum Gamma R^2 and energy to 1e-9 at tolerance 1e-11, through a dozen passes', async () => {
    const wake = await marched({ rings: PAIR, duration: 100, outputStep: 1, tolerance: 1e-11 })
    expect(timesOf(wake, 'pass').length).toBeGreaterThan(12)
    expect(wake.drift.impulse ?? NaN).toBeLessThan(1e-9)
    expect(wake.drift.energy ?? NaN).toBeLessThan(1e-9)
    expect(wake.drift.circulation).toBe(0)
    expect(wake.validUntil).toBe(100)
  })

  it('pass at equal intervals and swap roles each time', async () => {
    const wake = await marched({ rings: PAIR, duration: 60, outputStep: 60, tolerance: 1e-11 })
    const times = timesOf(wake, 'pass')
    const interval = (times[1] ?? NaN) - (times[0] ?? NaN)
    times.slice(1).forEach((time, k) => expectNear(time - (times[k] ?? NaN), interval, 1e-8))
    const details = wake.events.filter((event) => event.event === 'pass').map((event) => event.detail)
    details.forEach((detail, k) => expect(detail).toBe(k % 2 === 0 ? 'ring 1 inside ring 2' : 'ring 2 inside ring 1'))
  })

  it('return to where they began, relative to one another, after two intervals', async () => {
    const probe = await marched({ rings: PAIR, duration: 20, tolerance: 1e-12 })
    const [first = NaN, second = NaN] = timesOf(probe, 'pass')
    const period = 2 * (second - first)
    const wake = await marched({ rings: PAIR, duration: period, outputStep: period, tolerance: 1e-12 })
    const { apart, radii } = differences(wake)
    expectNear(apart, 1, 1e-8)
    radii.forEach((radius) => expectNear(radius, 1, 1e-8))
  })

  it('move alike wherever they start and mirrored when mirrored', async () => {
    const base = await marched({ rings: PAIR, duration: 5 })
    const shifted = await marched({ rings: PAIR.map((one) => ({ ...one, x: one.x + 1000 })), duration: 5 })
    const mirrored = await marched({
      rings: PAIR.map((one) => ({ ...one, x: -one.x, circulation: -one.circulation })),
      duration: 5,
    })
    for (const i of [0, 1]) {
      // Places near 1000 are rounded to 1e-13, which five time units stretch a hundredfold.
      expectNear(lastOf(shifted, i).x - 1000, lastOf(base, i).x, 1e-10)
      expect(lastOf(mirrored, i).x).toBe(-lastOf(base, i).x)
      expect(lastOf(mirrored, i).radius).toBe(lastOf(base, i).radius)
    }
  })

  it('scale with Gamma and R as they must: times with R^2 / Gamma', async () => {
    const base = await marched({ rings: PAIR, duration: 5 })
    const small = await marched({
      rings: PAIR.map((one) => ({ ...one, x: one.x / 50, radius: 1 / 50, coreRadius: 0.05 / 50, circulation: 0.01 })),
      duration: (5 * 0.02 ** 2) / 0.01,
    })
    // Scaling by 50 is not exact in binary: rounding only.
    for (const i of [0, 1]) expectClose(lastOf(small, i).x * 50, lastOf(base, i).x, 1e-11)
  })

  it('go back the way they came when the circulations are reversed', async () => {
    const there = await marched({ rings: PAIR, duration: 7, tolerance: 1e-12 })
    const back = await marched({
      rings: PAIR.map((one, i) => ({ ...one, ...lastOf(there, i), circulation: -1 })),
      duration: 7,
      tolerance: 1e-12,
    })
    PAIR.forEach((one, i) => {
      expectNear(lastOf(back, i).x, one.x, 1e-9)
      expectNear(lastOf(back, i).radius, 1, 1e-9)
      expectNear(lastOf(back, i).coreRadius, 0.05, 1e-9)
    })
  })

  it('are followed alike by a second integrator, extrapolation of the midpoint rule', async () => {
    const { flow, state } = flowOf(PAIR)
    const values = extrapolated(flow.derivative, state, 12, 1e-12)
    const wake = await marched({ rings: PAIR, duration: 12, outputStep: 12, tolerance: 1e-12 })
    for (const i of [0, 1]) {
      expectClose(lastOf(wake, i).x, values[i] ?? NaN, 1e-9)
      expectClose(lastOf(wake, i).radius, values[2 + i] ?? NaN, 1e-9)
    }
  })

  it('come nearer to the true path as fast as the tolerance is lowered', async () => {
    const path = async (tolerance: number): Promise<number> =>
      lastOf(await marched({ rings: PAIR, duration: 10, outputStep: 10, tolerance }), 0).x
    const truth = await path(1e-13)
    for (const tolerance of [1e-6, 1e-8, 1e-10])
      // The flow stretches errors by some tens on the way.
      expect(Math.abs((await path(tolerance)) - truth)).toBeLessThan(100 * tolerance)
  })

  it('cost at most 260 slopes a pass at the default tolerance', async () => {
    const wake = await marched({ rings: PAIR, duration: 100, outputStep: 100 })
    expect(wake.counters.evaluations / timesOf(wake, 'pass').length).toBeLessThan(260)
    expect(wake.counters.steps).toBeGreaterThan(wake.counters.rejected)
  })

  it('keep their sums under the regularised law too, the energy to the order of (delta/R)^2', async () => {
    const wake = await marched({ rings: PAIR, law: 'regularised', duration: 20, tolerance: 1e-11 })
    expect(wake.drift.impulse ?? NaN).toBeLessThan(1e-9)
    // delta/R = 0.024 and up to three times that in the shrunken ring.
    expect(wake.drift.energy ?? NaN).toBeLessThan(2e-3)
    expect(wake.drift.energy ?? NaN).toBeGreaterThan(1e-9)
  })
})

describe('the energy of a set of rings', () => {
  it('gives the motion: 2 pi R Gamma dx/dt = dH/dR and 2 pi R Gamma dR/dt = -dH/dx', () => {
    const { flow, state } = flowOf([ring(), ring({ circulation: -0.6, radius: 1.7, x: 0.8, core: 'gaussian' })])
    const slope = new Float64Array(state.length)
    flow.derivative(0, state, slope)
    const change = (index: number): number => {
      const step = 1e-5
      const at = (by: number): number => {
        const moved = state.slice()
        moved[index] = (moved[index] ?? NaN) + by
        return flow.energy(moved).sum
      }
      return (at(step) - at(-step)) / (2 * step)
    }
    for (const i of [0, 1]) {
      const strength = 2 * Math.PI * (state[2 + i] ?? NaN) * (state[6 + i] ?? NaN)
      // Central differences of step 1e-5: 1e-10 of curvature and 1e-11 of rounding.
      expectClose(change(2 + i), strength * (slope[i] ?? NaN), 1e-8, 'dH/dR')
      expectClose(-change(i), strength * (slope[2 + i] ?? NaN), 1e-8, 'dH/dx')
    }
  })

  it('is kept by the march in reverse time as well', async () => {
    const { flow, state } = flowOf(PAIR)
    const stepper = new RungeKuttaStepper({
      derivative: flow.derivative,
      time: 0,
      state,
      relativeTolerance: 0,
      absoluteTolerance: 1e-12,
    })
    const result = await march(stepper, { until: -5 })
    expect(result.time).toBe(-5)
    expectClose(flow.energy(result.state).sum, flow.energy(state).sum, 1e-10)
  })
})
