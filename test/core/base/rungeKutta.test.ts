import { describe, expect, it } from 'vitest'
import { RungeKuttaStepper, type Derivative } from '../../../core/base'
import {
  DENSE_STAGES,
  ERROR_FIFTH,
  ERROR_THIRD,
  STAGES,
  STEP,
  type StageRow,
} from '../../../core/base/dormandPrinceTableau'
import { expectClose, expectNear } from '../../support/close'

const NODES = [0, ...STAGES.map((row) => row.node), 1, ...DENSE_STAGES.map((row) => row.node)]

function weightedSum(row: StageRow, of: (node: number) => number): number {
  return row.stages.reduce((sum, stage, k) => sum + (row.weights[k] ?? NaN) * of(NODES[stage] ?? NaN), 0)
}

/** Two-body problem: nonlinear, exact solution known. */
const orbit: Derivative = (_time, state, out) => {
  const [x = NaN, y = NaN, u = NaN, v = NaN] = state
  const cube = Math.hypot(x, y) ** 3
  out.set([u, v, -x / cube, -y / cube])
}
/** Circle of unit radius and speed: x = cos t. */
const CIRCLE = Float64Array.of(1, 0, 0, 1)
/** Eccentricity 0.6, period 2 pi. */
const PERIAPSIS = Float64Array.of(0.4, 0, 0, 2)

/** Steps of one size: the tolerance is far too wide to change them. */
function fixedSteps(size: number, until: number): RungeKuttaStepper {
  const stepper = new RungeKuttaStepper({
    derivative: orbit,
    time: 0,
    state: CIRCLE,
    relativeTolerance: 1e10,
    absoluteTolerance: 1e10,
    firstStep: size,
    longestStep: size,
  })
  while (stepper.time < until - 1e-9) expect(stepper.step(until)).toBe('accepted')
  return stepper
}

function orbitStepper(tolerance: number): RungeKuttaStepper {
  return new RungeKuttaStepper({
    derivative: orbit,
    time: 0,
    state: PERIAPSIS,
    relativeTolerance: tolerance,
    absoluteTolerance: tolerance,
  })
}

function runTo(stepper: RungeKuttaStepper, until: number): void {
  while (stepper.time !== until) expect(stepper.step(until)).toBe('accepted')
}

describe('the coefficients of the 8(5,3) pair', () => {
  // Identities of the method: Hairer, Norsett & Wanner 1993, II.1 (1.9) and II.2. 1e-14: rounding of coefficients up to 40.
  it('has rows that sum to their nodes', () => {
    for (const row of [...STAGES, ...DENSE_STAGES])
      expectNear(
        weightedSum(row, () => 1),
        row.node,
        1e-13,
      )
  })

  it.each([1, 2, 3, 4, 5, 6, 7, 8])('integrates t^(k-1) exactly for k = %i', (k) => {
    expectNear(
      weightedSum(STEP, (node) => node ** (k - 1)),
      1 / k,
      1e-14,
    )
  })

  it('meets the order condition of nested stages, sum b_i a_ij c_j = 1/6', () => {
    const nested = STEP.stages.reduce((sum, stage, k) => {
      const row = STAGES[stage - 1]
      return row === undefined ? sum : sum + (STEP.weights[k] ?? NaN) * weightedSum(row, (node) => node)
    }, 0)
    expectNear(nested, 1 / 6, 1e-14)
  })

  it('has error estimates that vanish for polynomials of degree below their order', () => {
    for (let k = 0; k < 3; k++)
      expectNear(
        weightedSum(ERROR_THIRD, (node) => node ** k),
        0,
        1e-14,
      )
    for (let k = 0; k < 5; k++)
      expectNear(
        weightedSum(ERROR_FIFTH, (node) => node ** k),
        0,
        1e-14,
      )
  })
})

describe('RungeKuttaStepper', () => {
  it('converges with order 8', () => {
    const error = (size: number): number => Math.abs((fixedSteps(size, 8).state[0] ?? NaN) - Math.cos(8))
    // Coarser steps are not yet asymptotic, finer ones meet rounding.
    expectNear(Math.log2(error(0.25) / error(0.125)), 8, 0.2, 'observed order')
  })

  it('interpolates inside a step with order 7: the error there falls as the eighth power of the step', () => {
    const error = (size: number): number => {
      const stepper = fixedSteps(size, size)
      const out = new Float64Array(4)
      let largest = 0
      for (let k = 1; k < 20; k++) {
        const time = (k * size) / 20
        stepper.interpolate(time, out)
        largest = Math.max(largest, Math.abs((out[0] ?? NaN) - Math.cos(time)))
      }
      return largest
    }
    expectNear(Math.log2(error(0.5) / error(0.25)), 8, 0.2, 'observed power')
  })

  it('meets both ends of the step from inside it', () => {
    const stepper = fixedSteps(0.5, 1)
    const out = new Float64Array(4)
    stepper.interpolate(stepper.previousTime + 1e-9, out)
    // 1e-9 of time at unit speed, and the step's own error below 1e-7.
    expectNear(out[0] ?? NaN, Math.cos(0.5), 1e-7)
    stepper.interpolate(stepper.time, out)
    expect(out[0]).toBe(stepper.state[0])
  })

  it.each([
    { tolerance: 1e-6, evaluations: 330 },
    { tolerance: 1e-9, evaluations: 560 },
    { tolerance: 1e-12, evaluations: 1150 },
  ])('follows an ellipse for a period to $tolerance with at most $evaluations slopes', ({ tolerance, evaluations }) => {
    const stepper = orbitStepper(tolerance)
    runTo(stepper, 2 * Math.PI)
    // The error at the end gathers over some tens of steps and is multiplied by the passage near the centre.
    stepper.state.forEach((value, i) => expectNear(value, PERIAPSIS[i] ?? NaN, 100 * tolerance))
    expect(stepper.counters.evaluations).toBeLessThanOrEqual(evaluations)
    expect(stepper.counters.steps).toBeGreaterThan(0)
  })

  it('runs backwards to where it came from', () => {
    const stepper = orbitStepper(1e-12)
    runTo(stepper, 5)
    const back = new RungeKuttaStepper({
      derivative: orbit,
      time: 5,
      state: stepper.state,
      relativeTolerance: 1e-12,
      absoluteTolerance: 1e-12,
    })
    runTo(back, 0)
    back.state.forEach((value, i) => expectNear(value, PERIAPSIS[i] ?? NaN, 1e-9))
  })

  it('allows each component its own error', () => {
    const pair: Derivative = (time, _state, out) => {
      out[0] = Math.cos(50 * time)
      out[1] = 0
    }
    const work = (tolerances: Float64Array): number => {
      const stepper = new RungeKuttaStepper({
        derivative: pair,
        time: 0,
        state: new Float64Array(2),
        relativeTolerance: 0,
        absoluteTolerance: tolerances,
      })
      runTo(stepper, 10)
      return stepper.counters.steps
    }
    expect(work(Float64Array.of(1e-3, 1e-12))).toBeLessThan(work(Float64Array.of(1e-12, 1e-12)) / 2)
  })

  it('gives up where the solution leaves the numbers, y = 1/(1 - t)', () => {
    const stepper = new RungeKuttaStepper({
      derivative: (_time, state, out) => {
        out[0] = (state[0] ?? NaN) ** 2
      },
      time: 0,
      state: Float64Array.of(1),
      relativeTolerance: 1e-8,
      absoluteTolerance: 1e-8,
    })
    let outcome = stepper.step(2)
    for (let k = 0; k < 10000 && outcome === 'accepted'; k++) outcome = stepper.step(2)
    expect(outcome).toBe('too-small')
    expectClose(stepper.time, 1, 1e-6)
  })

  it('says so where the slopes are no numbers from the start', () => {
    const stepper = new RungeKuttaStepper({
      derivative: (_time, _state, out) => {
        out[0] = NaN
      },
      time: 0,
      state: Float64Array.of(1),
      relativeTolerance: 1e-8,
      absoluteTolerance: 1e-8,
    })
    expect(stepper.step(1)).toBe('not-finite')
  })
})
