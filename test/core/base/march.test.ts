import { describe, expect, it } from 'vitest'
import { march, RungeKuttaStepper, type Derivative } from '../../../core/base'
import { expectNear } from '../../support/close'

/** y'' = -y from (1, 0): y = cos t. */
const oscillator: Derivative = (_time, state, out) => {
  out[0] = state[1] ?? NaN
  out[1] = -(state[0] ?? NaN)
}

function oscillatorStepper(tolerance = 1e-11): RungeKuttaStepper {
  return new RungeKuttaStepper({
    derivative: oscillator,
    time: 0,
    state: Float64Array.of(1, 0),
    relativeTolerance: tolerance,
    absoluteTolerance: tolerance,
  })
}

const ownValue = {
  count: 1,
  evaluate: (_time: number, state: Float64Array, out: Float64Array): void => {
    out[0] = state[0] ?? NaN
  },
}

describe('march', () => {
  it('calls for every output in order, with the state there', async () => {
    const seen: number[] = []
    const result = await march(oscillatorStepper(), {
      until: 10,
      outputTimes: [-1, 0, 0.1, 3, 3.001, 10, 11],
      onOutput: (time, state) => {
        seen.push(time)
        // Dense output of order 7 at a step tolerance of 1e-11.
        expectNear(state[0] ?? NaN, Math.cos(time), 1e-9)
      },
    })
    expect(seen).toEqual([0.1, 3, 3.001, 10])
    expect(result.ended).toBe('until')
    expect(result.time).toBe(10)
  })

  it('locates changes of sign and their direction', async () => {
    const found: { time: number; rising: boolean }[] = []
    await march(oscillatorStepper(), {
      until: 20,
      events: ownValue,
      onCrossing: ({ time, rising }) => {
        found.push({ time, rising })
        return 'continue'
      },
    })
    expect(found.length).toBe(6)
    found.forEach(({ time, rising }, k) => {
      expectNear(time, (k + 0.5) * Math.PI, 1e-9)
      expect(rising).toBe(k % 2 === 1)
    })
  })

  it('finds two crossings within one step', async () => {
    const times: number[] = []
    await march(oscillatorStepper(1e-3), {
      until: 2 * Math.PI,
      events: {
        count: 1,
        evaluate: (time, _state, out) => {
          out[0] = (time - 3) ** 2 - 0.01
        },
      },
      onCrossing: ({ time }) => {
        times.push(time)
        return 'continue'
      },
    })
    expect(times.length).toBe(2)
    expectNear(times[0] ?? NaN, 2.9, 1e-12)
    expectNear(times[1] ?? NaN, 3.1, 1e-12)
  })

  it('stops at a crossing with the outputs before it and none after', async () => {
    const outputs: number[] = []
    const result = await march(oscillatorStepper(), {
      until: 20,
      outputTimes: [1, 1.5, 1.6, 2],
      onOutput: (time) => outputs.push(time),
      events: ownValue,
      onCrossing: () => 'stop',
    })
    expect(outputs).toEqual([1, 1.5])
    expect(result.ended).toBe('stopped')
    expectNear(result.time, Math.PI / 2, 1e-9)
    expectNear(result.state[1] ?? NaN, -1, 1e-9)
  })

  it('tells no crossing for a function that starts at zero and leaves it', async () => {
    let crossings = 0
    await march(oscillatorStepper(), {
      until: 1,
      events: {
        count: 1,
        evaluate: (_time, state, out) => {
          out[0] = state[1] ?? NaN
        },
      },
      onCrossing: () => {
        crossings++
        return 'continue'
      },
    })
    expect(crossings).toBe(0)
  })

  it('stops between steps once cancelled', async () => {
    const signal = { aborted: false }
    let pauses = 0
    const result = await march(oscillatorStepper(), {
      until: 1e6,
      signal,
      pause: async () => {
        if (++pauses === 5) signal.aborted = true
        await Promise.resolve()
      },
    })
    expect(result.ended).toBe('cancelled')
    expect(result.time).toBeLessThan(10)
  })

  it('stops within a step once cancelled where slopes are costly', async () => {
    const signal = { aborted: false }
    let slopes = 0
    const stepper = new RungeKuttaStepper({
      derivative: (time, state, out) => {
        if (++slopes === 20) signal.aborted = true
        oscillator(time, state, out)
      },
      time: 0,
      state: Float64Array.of(1, 0),
      relativeTolerance: 1e-8,
      absoluteTolerance: 1e-8,
    })
    const result = await march(stepper, {
      until: 1e6,
      signal,
      pause: () => Promise.resolve(),
      pauseWithinSteps: true,
    })
    expect(result.ended).toBe('cancelled')
    expect(slopes).toBe(20)
  })

  it('fails with a sentence where the step becomes too small', async () => {
    const stepper = new RungeKuttaStepper({
      derivative: (_time, state, out) => {
        out[0] = (state[0] ?? NaN) ** 2
      },
      time: 0,
      state: Float64Array.of(1),
      relativeTolerance: 1e-8,
      absoluteTolerance: 1e-8,
    })
    const result = await march(stepper, { until: 2 })
    expect(result.ended).toBe('failed')
    expect(result.message).toMatch(/^The time step became too small to go on at t = /)
  })
})
