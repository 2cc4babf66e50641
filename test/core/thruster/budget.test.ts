import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { integrate } from '../../../core/base'
import { compileProgramme, type ClosedShape } from '../../../core/pulse'
import {
  LARGEST_PROXIMITY_LOSS,
  proximityLoss,
  shapeMoments,
  shapeMomentsInTime,
  vehicleBudget,
} from '../../../core/thruster'
import { expectClose, expectNear } from '../../support/close'
import { BARE } from './plans'

const SHAPES: readonly ClosedShape[] = ['rectangular', 'trapezoid', 'linear-ramp', 'half-sine', 'sine-squared']
const anyShape = fc.constantFrom(...SHAPES)
const share = fc.double({ min: 0, max: 0.4, noNaN: true })
const factor = fc.double({ min: 0.3, max: 3, noNaN: true })
const fast = fc.double({ min: 0.01, max: 0.3, noNaN: true })

/** Constant speed 0.5 m/s over four diameters of 20 mm. */
const CONSTANT = shapeMoments('rectangular', { peakSpeed: 0.5, riseTime: 0, fallTime: 0 }, 0.08)
const AREA = (Math.PI / 4) * 0.02 ** 2

describe('thrust', () => {
  // T1: f rho A L U; exact for a slug. 5e-8: six figures are printed.
  it('of 20 mm, four diameters, 0.5 m/s, once a second is 12.5438 mN', () => {
    const { meanThrust } = vehicleBudget(CONSTANT, BARE)
    expectNear(meanThrust, 0.0125438, 5e-8)
    expectClose(meanThrust, 998.2 * AREA * 0.08 * 0.5, 1e-14)
  })

  // T2: Krieg & Mohseni 2008, IEEE J. Ocean. Eng. 33:123 (recalled, not re-read; re-derived: half a sine in half the period).
  it('of a sinusoidal plunger is (pi^3/16) rho D^4 (L/D)^2 f^2: 0.0310063 N', () => {
    const moments = shapeMomentsInTime('half-sine', 0.04, 1 / 20)
    const { meanThrust } = vehicleBudget(moments, { ...BARE, density: 1000, diameter: 0.01, frequency: 10 })
    expectClose(meanThrust, (Math.PI ** 3 / 16) * 1000 * 0.01 ** 4 * 16 * 100, 1e-13)
    // Six figures are printed.
    expectClose(meanThrust, 0.0310063, 2e-6)
  })

  // T3: rho A U L f over rho A (f L)^2.
  it('of an intermittent slug jet is twice that of the steady jet of equal mean flow at f L/U = 0.5', () => {
    const budget = vehicleBudget(CONSTANT, { ...BARE, frequency: 0.5 * (0.5 / 0.08) })
    expectClose(budget.thrustRatio, 2, 1e-13)
    expectClose(budget.steadyJetThrust, 998.2 * AREA * 0.25 ** 2, 1e-13)
  })

  it('grows as D^2 U^2 at fixed stroke ratio and duty, and as the number of thrusters', () => {
    fc.assert(
      fc.property(anyShape, share, share, factor, factor, (shape, rise, fall, size, speed) => {
        const plain = vehicleBudget(shapeMomentsInTime(shape, 0.08, 0.2, rise, fall), { ...BARE, frequency: 2 })
        const scaled = vehicleBudget(shapeMomentsInTime(shape, 0.08 * size, (0.2 * size) / speed, rise, fall), {
          ...BARE,
          diameter: 0.02 * size,
          pistonDiameter: 0.04 * size,
          frequency: (2 * speed) / size,
          count: 3,
        })
        // A few roundings on either side.
        expectClose(scaled.meanThrust, 3 * plain.meanThrust * size ** 2 * speed ** 2, 1e-12)
        expectClose(scaled.power.total, 3 * plain.power.total * size ** 2 * speed ** 3, 1e-11)
        expectClose(scaled.plungerForce, plain.plungerForce * size ** 2 * speed ** 2, 1e-11)
        expectClose(scaled.thrustRatio, plain.thrustRatio, 1e-12)
      }),
    )
  })

  it('loses the momentum of the water taken in, unless it is recovered', () => {
    const at = (recoveredShare: number) => vehicleBudget(CONSTANT, { ...BARE, speed: 0.2, recoveredShare }).meanThrust
    expectClose(at(0), 998.2 * AREA * 0.08 * (0.5 - 0.2), 1e-13)
    expectClose(at(1), 998.2 * AREA * 0.08 * 0.5, 1e-13)
    expectClose(at(0.5), (at(0) + at(1)) / 2, 1e-13)
  })

  it('of canted jets is the cosine of the jets less the whole of the intake', () => {
    const cant = 0.3
    const budget = vehicleBudget(CONSTANT, { ...BARE, cant, speed: 0.1 })
    expectClose(budget.meanThrust, 998.2 * AREA * 0.08 * (0.5 * Math.cos(cant) - 0.1), 1e-13)
  })

  it('ranges from the slug to the quick-start over-pressure whatever is adopted, and not at all for a slow start', () => {
    const off = vehicleBudget(CONSTANT, BARE)
    const on = vehicleBudget(CONSTANT, { ...BARE, overPressure: 'quick-start' })
    // I_p = rho D^3 U/6 (Krueger 2005).
    expectClose(off.meanThrustHigh - off.meanThrustLow, (998.2 * 0.02 ** 3 * 0.5) / 6, 1e-12)
    expect(off.meanThrust).toBe(off.meanThrustLow)
    expectClose(on.meanThrust, off.meanThrustHigh, 1e-14)
    expect([on.meanThrustLow, on.meanThrustHigh]).toEqual([off.meanThrustLow, off.meanThrustHigh])
    const slow = vehicleBudget(shapeMoments('half-sine', { peakSpeed: 0.5, riseTime: 0, fallTime: 0 }, 0.08), BARE)
    expect(slow.quickStart).toBe(false)
    expect(slow.meanThrustHigh).toBe(slow.meanThrustLow)
  })

  it('of a computed jet takes its impulse and never an energy below the slug', () => {
    const computed = vehicleBudget(CONSTANT, {
      ...BARE,
      overPressure: 'computed',
      computedBeyondSlug: { impulse: 0.0005, energy: -0.001 },
    })
    const slug = vehicleBudget(CONSTANT, BARE)
    expectClose(computed.impulse, slug.impulse + 0.0005, 1e-14)
    expect(computed.energy).toBe(slug.energy)
  })

  // Athanassiadis & Hart 2016, arXiv 1604.05382, abstract: T = T_alone (1 - 2.04 spacing^-6), up to 10 %.
  it('of close neighbours loses in the low end of the range only', () => {
    expectClose(proximityLoss(2, 0.04, 0.02), 2.04 / 64, 1e-13)
    expect(proximityLoss(2, 0.021, 0.02)).toBe(LARGEST_PROXIMITY_LOSS)
    expect([proximityLoss(1, 0.021, 0.02), proximityLoss(2, null, 0.02)]).toEqual([0, 0])
    const pair = { ...BARE, count: 2, spacing: 0.025 }
    const near = vehicleBudget(CONSTANT, pair)
    const far = vehicleBudget(CONSTANT, { ...pair, spacing: null })
    expect(near.meanThrust).toBe(far.meanThrust)
    expectClose(near.meanThrustLow, 0.9 * far.meanThrustLow, 1e-13)
    expect(near.meanThrustHigh).toBe(far.meanThrustHigh)
  })
})

describe('efficiency', () => {
  // T4: textbook laws of jet propulsion, 2V/(U+V) and 2UV/(U^2+V^2).
  it('of a constant-speed jet at U/V = 2 is 0.8 with the fluid carried aboard and 2/3 with intake momentum lost', () => {
    const at = (recoveredShare: number) =>
      vehicleBudget(CONSTANT, { ...BARE, speed: 0.25, recoveredShare }).froudeEfficiency ?? NaN
    expectClose(at(1), 0.8, 1e-13)
    expectClose(at(0), 2 / 3, 1e-13)
  })

  it('divides by thrust power and wake energy, for every shape and every recovered share', () => {
    const recovered = fc.double({ min: 0, max: 1, noNaN: true })
    fc.assert(
      fc.property(anyShape, share, share, recovered, fast, (shape, rise, fall, recoveredShare, speed) => {
        const moments = shapeMomentsInTime(shape, 0.08, 0.12, rise, fall)
        const budget = vehicleBudget(moments, { ...BARE, frequency: 3, speed, recoveredShare })
        const { square, cube } = { square: moments.integralSpeedSquared, cube: moments.integralSpeedCubed }
        // Still water behind: int 1/2 rho A U (U - V)^2 dt of every pulse.
        const wake = 3 * 0.5 * 998.2 * AREA * (cube - 2 * speed * square + speed * speed * 0.08)
        const useful = budget.meanThrust * speed
        // Differences of terms of one size.
        expectClose(useful + wake, useful / (budget.froudeEfficiency ?? NaN), 1e-11)
        expect(budget.froudeEfficiency).toBeLessThan(1)
        expect(budget.overallEfficiency).toBeLessThan(1)
      }),
    )
  })

  it('is not given at rest, nor where the vehicle outruns its jet', () => {
    for (const speed of [0, 0.6]) {
      const budget = vehicleBudget(CONSTANT, { ...BARE, speed })
      expect([budget.froudeEfficiency, budget.overallEfficiency]).toEqual([null, null])
    }
  })
})

describe('power', () => {
  const full = {
    ...BARE,
    nozzleLength: 0.03,
    lossCoefficient: 0.2,
    intakeLossCoefficient: 0.5,
    intakeArea: 2 * AREA,
    efficiency: 0.5,
  }

  it('is jet, nozzle loss, refill and column over the efficiency', () => {
    const { power } = vehicleBudget(CONSTANT, full)
    const rhoA = 998.2 * AREA
    expectClose(power.jet, 0.5 * rhoA * 0.25 * 0.08, 1e-13)
    expectClose(power.nozzleLoss, 0.2 * power.jet, 1e-13)
    expectClose(power.column, 0.5 * rhoA * 0.03 * 0.25, 1e-13)
    // Half a sine of inflow through twice the exit area in the 0.84 s left.
    const peak = ((Math.PI / 2) * 0.08) / 0.84 / 2
    const refill = integrate((t) => 0.5 * rhoA * 2 * 1.5 * (peak * Math.sin((Math.PI * t) / 0.84)) ** 3, 0, 0.84)
    expectClose(power.refill, refill, 1e-11)
    expectClose(power.total, (power.jet + power.nozzleLoss + power.refill + power.column) / 0.5, 1e-13)
  })

  it('of water carried along is its energy at the speed of the vehicle, from half the momentum recovered on', () => {
    const at = (recoveredShare: number) => vehicleBudget(CONSTANT, { ...full, speed: 0.2, recoveredShare, count: 3 })
    const still = at(0).power
    for (const share of [0, 0.2, 0.5]) {
      // Nothing is added there, not even in the last digit.
      expect(at(share).power).toEqual(still)
      expect(still.total).toBe((still.jet + still.nozzleLoss + still.refill + still.column) / 0.5)
    }
    const all = at(1)
    expectClose(all.power.carried, 3 * 0.5 * 998.2 * AREA * 0.08 * 0.04, 1e-13)
    expectClose(at(0.75).power.carried, all.power.carried / 2, 1e-13)
    expectClose(all.power.total, still.total + all.power.carried / 0.5, 1e-13)
    // A refill that asks for most power asks for more where it carries water along: half a sine of inflow in 0.1 s.
    const short = { ...full, nozzleLength: 0, frequency: 1 / 0.26, speed: 0.2, intakeArea: AREA / 4 }
    const peak = (recoveredShare: number) => vehicleBudget(CONSTANT, { ...short, recoveredShare }).peakPower
    const inflow = ((Math.PI / 2) * AREA * 0.08) / 0.1
    expectClose(peak(1) - peak(0), (0.5 * 998.2 * 0.04 * inflow) / 0.5, 1e-9)
  })

  it('leaves no overall efficiency above the Froude efficiency', () => {
    fc.assert(
      fc.property(
        anyShape,
        share,
        factor,
        fast,
        fc.double({ min: 0, max: 1, noNaN: true }),
        (shape, rise, size, v, s) => {
          const moments = shapeMomentsInTime(shape, 0.08 * size, 0.2, rise, rise)
          // Nothing lost, and an intake so wide that the refill costs next to nothing: the nearest the two can come.
          const setting = { ...BARE, speed: 10 * v, recoveredShare: s, intakeArea: 1e3 * AREA, frequency: 2 }
          const { froudeEfficiency, overallEfficiency } = vehicleBudget(moments, setting)
          if (froudeEfficiency === null || overallEfficiency === null) return
          // Two sums of the same terms: a few roundings.
          expect(overallEfficiency).toBeLessThanOrEqual(froudeEfficiency * (1 + 1e-13))
          // All the momentum kept: 2 U V / (U^2 + V^2) is at most 1, and a varying U only lessens it.
          expect(overallEfficiency).toBeLessThanOrEqual(1 + 1e-13)
        },
      ),
    )
  })

  it('of the start over-pressure is its energy, rho D^3 U^2/12, in the jet', () => {
    const slug = vehicleBudget(CONSTANT, BARE).power.jet
    const more = vehicleBudget(CONSTANT, { ...BARE, overPressure: 'quick-start' }).power.jet
    expectClose(more - slug, (998.2 * 0.02 ** 3 * 0.25) / 12, 1e-12)
  })

  it('has no end where the pulse leaves no time to refill', () => {
    const budget = vehicleBudget(CONSTANT, { ...BARE, frequency: 6.25 })
    expect(budget.refillTime).toBeLessThanOrEqual(0)
    expect(budget.power.total).toBe(Infinity)
  })
})

describe('peaks', () => {
  const wet = { ...BARE, nozzleLength: 0.05, lossCoefficient: 0.3, intakeArea: 1, frequency: 0.5 }

  it.each(SHAPES.filter((shape) => shape !== 'rectangular'))(
    'of force and power of a %s are those found along its course',
    (shape) => {
      const ramps = { peakSpeed: 0.5, riseTime: 0.05, fallTime: 0.03 }
      const moments = shapeMoments(shape, ramps, 0.08)
      const budget = vehicleBudget(moments, wet)
      const programme = compileProgramme({ shape, stroke: 0.08, ...ramps, rows: [] })
      let high = 0
      let low = 0
      let power = 0
      const n = 200_000
      const h = programme.duration / n
      for (let i = 0; i + 1 < n; i++) {
        const middle = programme.speedAt((i + 0.5) * h)
        const slope = (programme.speedAt((i + 1) * h) - programme.speedAt(i * h)) / h
        const inertia = 998.2 * 0.05 * slope
        const pressure = 499.1 * (1.3 - 1 / 16) * middle ** 2 + inertia
        high = Math.max(high, pressure)
        low = Math.min(low, pressure)
        power = Math.max(power, AREA * middle * (499.1 * 1.3 * middle ** 2 + Math.max(0, inertia)))
      }
      // The search along the course has steps of 1/200000; the parabola of the smooth shapes is good to about 1e-5.
      expectClose(budget.cavityPressureHigh, high, 3e-5)
      expectClose(budget.peakPower, power, 3e-5)
      if (shape === 'linear-ramp') return expect(budget.plungerForce).toBe(Infinity)
      expectClose(budget.cavityPressureLow, low, 3e-5)
      expectClose(budget.plungerForce, 4 * AREA * Math.max(high, -low), 3e-5)
    },
  )

  it('have no bound where the speed jumps and water stands in the nozzle', () => {
    expect(vehicleBudget(CONSTANT, wet).plungerForce).toBe(Infinity)
    expect(vehicleBudget(CONSTANT, wet).peakPower).toBe(Infinity)
    const dry = vehicleBudget(CONSTANT, { ...wet, nozzleLength: 0 })
    expect(dry.plungerAcceleration).toBe(Infinity)
    expectClose(dry.plungerForce, 4 * AREA * 499.1 * (1.3 - 1 / 16) * 0.25, 1e-13)
    expectClose(dry.peakPower, AREA * 499.1 * 1.3 * 0.125, 1e-13)
  })

  it('of the refill count as well: half a sine back in the time left', () => {
    const budget = vehicleBudget(CONSTANT, { ...BARE, frequency: 1 / 0.2 })
    const travel = 0.08 / 4
    const left = 0.2 - 0.16
    expectClose(budget.plungerSpeed, ((Math.PI / 2) * travel) / left, 1e-12)
    expectClose(budget.intakeSuction, 499.1 * ((Math.PI / 2) * (0.08 / left)) ** 2, 1e-12)
    expectNear(budget.refillTime, left, 1e-15)
  })

  it('leave the eject time its share of the period less one valve lag, and the refill two less', () => {
    const budget = vehicleBudget(CONSTANT, { ...BARE, ejectShare: 0.4, valveLag: 0.01 })
    expectClose(budget.ejectTimeAllowed, 0.39, 1e-13)
    expectClose(budget.refillTime, 1 - 0.16 - 0.02, 1e-13)
  })
})
