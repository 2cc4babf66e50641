import { describe, expect, it } from 'vitest'
import { at, last } from '../../../core/base'
import { analyseThruster, type ThrusterInput } from '../../../core/thruster'
import { expectClose } from '../../support/close'
import { BENCH, UNDER_WAY, VEHICLE, withSection, withVehicle } from './plans'

/** No intake drag, quadratic body drag: M dV/dt = T - k V^2. */
const TEXTBOOK: ThrusterInput = withSection({ intake: { ...BENCH.intake, recoveredShare: 1 } }, UNDER_WAY)

describe('from rest to cruise', () => {
  it('takes the textbook time and way of constant thrust against quadratic drag where pulses are many', () => {
    const result = analyseThruster(withVehicle({ mass: 4000, addedMass: 0 }, TEXTBOOK))
    const { startUp, meanThrust, speed } = result
    expect(startUp?.pulseByPulse).toBe(false)
    // V = Vc tanh(t T / (M Vc)), x = (M Vc^2 / T) ln cosh: textbook.
    const scale = (4000 * speed) / meanThrust
    expectClose(startUp?.time ?? NaN, scale * Math.atanh(0.95), 1e-5)
    expectClose(startUp?.distance ?? NaN, scale * speed * Math.log(Math.cosh(Math.atanh(0.95))), 1e-5)
  })

  it('follows each pulse where they are few, and comes near the same time', () => {
    const result = analyseThruster(withVehicle({ mass: 12, addedMass: 0 }, TEXTBOOK))
    const { startUp, meanThrust, speed, period } = result
    expect(startUp?.pulseByPulse).toBe(true)
    const smooth = ((12 * speed) / meanThrust) * Math.atanh(0.95)
    // The speed rises by I/M in a stroke and goes on at (1 - 0.95^2) of the thrust there: a step is worth this many periods.
    const step = period / (1 - 0.95 ** 2)
    expect(Math.abs((startUp?.time ?? NaN) - smooth)).toBeLessThan(step)
    expect(step).toBeLessThan(0.05 * smooth)
    expect(startUp?.pulses).toBe(Math.ceil((startUp?.time ?? NaN) / period))
  })

  it('goes up in steps: the speed of a light vehicle rises in the stroke and falls in between', () => {
    const { startUp } = analyseThruster(withVehicle({ mass: 2, addedMass: 0 }))
    const speed = startUp?.history.speed ?? []
    const falls = speed.filter((value, i) => i > 0 && value < at(speed, i - 1)).length
    const rises = speed.filter((value, i) => i > 0 && value > at(speed, i - 1)).length
    expect(falls).toBeGreaterThan(10)
    expect(rises).toBeGreaterThan(10)
  })

  it('keeps the momentum: mass times speed after the first pulse is its impulse where drag is small', () => {
    const { startUp, pulse, period } = analyseThruster(
      withVehicle({ mass: 6, addedMass: 4, drag: { kind: 'area', dragArea: 1e-6 } }, TEXTBOOK),
    )
    expect(startUp?.movedMass).toBe(10)
    const { time, speed } = startUp?.history ?? { time: [], speed: [] }
    // Some whole number of pulses in: the history keeps every so many parts of a period.
    const i = time.findIndex((t) => t > 0 && Math.abs(t / period - Math.round(t / period)) < 1e-6)
    expect(i).toBeGreaterThan(0)
    const pulses = Math.round(at(time, i) / period)
    // Drag of 1 mm2 takes less than 1e-3 of the thrust in those pulses.
    expectClose(10 * at(speed, i), pulses * pulse.slug.impulse, 1e-3)
  })

  it('settles about the cruise speed, and with added mass takes longer', () => {
    const light = analyseThruster(withVehicle({ addedMass: 0 }))
    const heavy = analyseThruster(withVehicle({ addedMass: 8 }))
    // Both masses follow the same curve on a time of their own, pulses apart.
    expectClose((heavy.startUp?.time ?? NaN) / (light.startUp?.time ?? NaN), 2, 0.1)
    const end = last(light.startUp?.history.speed ?? [])
    expect(end).toBeGreaterThan(0.9 * light.speed)
    expect(end).toBeLessThan(1.1 * light.speed)
    expect(light.notes.map(({ id }) => id)).not.toContain('thruster-no-added-mass')
    expect(analyseThruster(withVehicle({ addedMass: null })).notes.map(({ id }) => id)).toContain(
      'thruster-no-added-mass',
    )
  })

  it('in turn or together comes to the same', () => {
    const time = (inTurn: boolean) =>
      analyseThruster(withSection({ count: 3, inTurn, vehicle: { ...VEHICLE, mass: 60 } }, UNDER_WAY)).startUp?.time ??
      NaN
    expectClose(time(true), time(false), 0.02)
  })

  it('stays finite for a vehicle lighter than one pulse of water', () => {
    const result = analyseThruster(withVehicle({ mass: 0.02, addedMass: 0 }))
    expect(result.startUp?.history.speed.every(Number.isFinite)).toBe(true)
    expect(result.startUp?.time).toBeGreaterThan(0)
    expect(result.notes.map(({ id }) => id)).toContain('thruster-light-vehicle')
  })

  it('is not told without a mass', () => {
    expect(analyseThruster(withVehicle({ mass: null })).startUp).toBeNull()
  })
})
