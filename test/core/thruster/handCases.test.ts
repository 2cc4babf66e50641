/**
 * Two vehicles reckoned outside the project: the period cut into four million equal parts in another language, every sum by the midpoint rule
 * from the definitions in words (momentum through exit and intake, kinetic energy, unsteady Bernoulli), and the digits set down here.
 */
import { describe, expect, it } from 'vitest'
import type { PulseInput } from '../../../core/pulse'
import { analyseThruster, type ThrusterInput } from '../../../core/thruster'
import { expectClose } from '../../support/close'
import { TUBE } from '../pulse/plans'
import { BENCH, ON_BENCH, PUSH, VEHICLE } from './plans'

/** The sums: midpoints of 4e6 parts leave 1e-12; their rounding is of the same order. */
const SUMS = 1e-10
/** Peaks at the end of a ramp are read half a part before it. */
const PEAKS = 3e-6

const hullPulse: PulseInput = {
  ...PUSH,
  density: 1026,
  kinematicViscosity: 1.19e-6,
  nozzle: { ...TUBE, diameter: 0.06, pistonDiameter: 0.12, length: 0.05, lossCoefficient: 0.1 },
  programme: { shape: 'trapezoid', stroke: 0.24, peakSpeed: 2.5, riseTime: 0.02, fallTime: 0.02, rows: [] },
}

/** A hull of 2 m at 1 m/s: two jets canted by 10 degrees, fired in turn every 0.4 s, with valves that take 10 ms. */
const HULL: ThrusterInput = {
  ...ON_BENCH,
  pulse: hullPulse,
  vapourPressure: 1700,
  absolutePressure: 101325 + 1026 * 9.80665 * 5,
  frequency: 2.5,
  section: {
    ...BENCH,
    count: 2,
    inTurn: true,
    cant: (10 * Math.PI) / 180,
    vehicle: {
      speed: 1,
      mass: 60,
      addedMass: 6,
      length: 2,
      drag: { kind: 'hull', wettedArea: 1.2, formFactor: 0.2 },
    },
    actuator: { ...BENCH.actuator, efficiency: 0.6, ejectShare: 0.4, valveLag: 0.01 },
    intake: { area: 0.008, recoveredShare: 0.3, lossCoefficient: 0.5 },
    energyStore: 1e6,
  },
}

/** A vehicle of 0.3 m at 0.3 m/s, one plunger that moves as half a sine. */
const SMALL: ThrusterInput = {
  ...ON_BENCH,
  frequency: 2,
  pulse: {
    ...PUSH,
    nozzle: { ...TUBE, diameter: 0.012, pistonDiameter: 0.03, length: 0.01, lossCoefficient: 0.2 },
    programme: { shape: 'half-sine', stroke: 0.04, peakSpeed: 0.6, riseTime: 0, fallTime: 0, rows: [] },
  },
  section: {
    ...BENCH,
    vehicle: {
      ...VEHICLE,
      speed: 0.3,
      mass: 0.5,
      length: 0.3,
      drag: { kind: 'hull', wettedArea: 0.06, formFactor: 0.3 },
    },
    actuator: { ...BENCH.actuator, efficiency: 0.5 },
  },
}

describe('a hull of 2 m at 1 m/s', () => {
  const result = analyseThruster(HULL)

  it('has the thrust, the power and the wake that were summed up outside', () => {
    const { meanThrust, power, froudeEfficiency, overallEfficiency } = result
    expectClose(meanThrust, 5.538646842060744, SUMS)
    expectClose(power.jet, 9.745367673590408, SUMS)
    expectClose(power.nozzleLoss, 0.9745367673590408, SUMS)
    expectClose(power.refill, 0.4433535265635785, SUMS)
    expectClose(power.column, 2.2663645752537613, SUMS)
    expectClose(power.total, 22.38270423794465, SUMS)
    // Useful power over useful power and what is left behind in still water.
    const wake = 3.510493634011733
    expectClose(froudeEfficiency ?? NaN, meanThrust / (meanThrust + wake), SUMS)
    expectClose(overallEfficiency ?? NaN, 5.538646842060744 / 22.38270423794465, SUMS)
    expectClose(result.endurance ?? NaN, 1e6 / 22.38270423794465, SUMS)
  })

  it('has the peaks of plunger and cavity that were summed up outside', () => {
    expectClose(result.cavity.pressureHigh, 9738.977887880195, PEAKS)
    expectClose(result.cavity.pressureLow, -6412.500002760327, PEAKS)
    expectClose(result.plunger.force, 110.1452449897363, PEAKS)
    expectClose(result.plunger.speed, 0.625, 1e-13)
    expectClose(result.plunger.acceleration, 31.25, 1e-7)
    expectClose(result.plunger.peakPower, 117.0953078586107, PEAKS)
    expectClose(result.cavitation.ambientPressure - result.cavitation.intakePressure, 196.005292471685, SUMS)
  })

  it('meets its drag by the friction line at 1.6805e6', () => {
    // 0.5 rho V^2 S (1 + k) 0.075 / (log10(V L / nu) - 2)^2
    const friction = 0.075 / (Math.log10(2 / 1.19e-6) - 2) ** 2
    expectClose(result.dragAtSpeed ?? NaN, 0.5 * 1026 * 1.2 * 1.2 * friction, 1e-13)
    expectClose(result.dragAtSpeed ?? NaN, 3.103047303, 1e-9)
  })

  it('counts the steady jets of both thrusters', () => {
    // 2 rho A (f L)^2
    const steady = 2 * 1026 * (Math.PI / 4) * 0.06 ** 2 * (2.5 * 0.24) ** 2
    expectClose(result.steadyJetThrust, steady, 1e-13)
    expectClose(result.thrustRatio, result.meanThrust / steady, 1e-13)
  })

  it('ripples in turn between the extremes of the sum, wherever they lie', () => {
    // Both curves summed at 400 000 times of the period outside: the lowest lies between two times of the history.
    expectClose(result.ripple ?? NaN, 3.157073652, 1e-6)
    expectClose(result.peakThrust, 15.24714729, 1e-6)
  })
})

describe('a vehicle of 0.3 m at 0.3 m/s', () => {
  const result = analyseThruster(SMALL)

  it('has the thrust, the power and the peaks that were summed up outside', () => {
    expectClose(result.meanThrust, 0.0015465442490815965, SUMS)
    expectClose(result.power.jet, 0.001083780099122687, SUMS)
    expectClose(result.power.nozzleLoss, 0.0002167560198245374, SUMS)
    expectClose(result.power.refill, 0.00011409837184053562, SUMS)
    expectClose(result.power.column, 0.0004064175371710078, SUMS)
    expectClose(result.power.total, 0.0036421040559175355, SUMS)
    const useful = 0.3 * 0.0015465442490815965
    expectClose(result.froudeEfficiency ?? NaN, useful / (useful + 0.00021339928722721087), SUMS)
    // A parabola through three of 65 places finds the top of a smooth curve to about 1e-5.
    expectClose(result.cavity.pressureHigh, 249.25996175259763, 1e-5)
    expectClose(result.plunger.force, 0.17619148455210754, 1e-5)
    expectClose(result.plunger.peakPower, 0.032467885653560354, 1e-5)
    expectClose(result.plunger.speed, 0.096, 1e-12)
    expectClose(result.plunger.acceleration, 2.88, 1e-12)
  })

  it('says that it cannot hold that speed', () => {
    const limit = result.limits.find(({ name }) => name === 'thrust')
    expect(limit?.ok).toBe(false)
    // Friction line at 0.3 x 0.3 / 1.0034e-6.
    expectClose(limit?.limit ?? NaN, 0.0301388844, 3e-9)
  })
})
