import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { at, bracketedRoot, randomSource } from '../../../core/base'
import {
  compileProgramme,
  computePulse,
  type ClosedShape,
  type ComputedJet,
  type ProgrammeInput,
} from '../../../core/pulse'
import { programmeMoments, shapeMomentsInTime } from '../../../core/thruster'
import { compileDesigns, type CompiledDesigns } from '../../../core/thruster/design'
import { pulseOfDesign, thrusterInputOf } from '../../../core/thruster/designInput'
import { DesignRings, NO_START } from '../../../core/thruster/designRing'
import { scaledMoments, scaledProgramme } from '../../../core/thruster/designStroke'
import type { Design, DesignProblem, PointFigures } from '../../../core/thruster/designTypes'
import { analyseThruster } from '../../../core/thruster/thruster'
import { expectClose, expectNear } from '../../support/close'
import { PROBLEM, SEARCH, SECTION, problemWith } from './sizingProblem'

const JET: ComputedJet = {
  formationNumber: 3.9,
  formationNumberLow: 3.7,
  formationNumberHigh: 4.2,
  circulationBeyondSlug: 0.0011,
  impulseBeyondSlug: 0.0021,
  energyBeyondSlug: 0.0003,
}
const TWO_POINTS = [
  { thrust: 1.5, share: 3 },
  { speed: 0.5, share: 1 },
] as const
const TABLE: ProgrammeInput = {
  shape: 'table',
  stroke: 0,
  peakSpeed: 0,
  riseTime: 0,
  fallTime: 0,
  rows: [0, 0.4, 0.5, 0.45, 0.1, 0].map((speed, i) => ({ time: 0.05 * i, speed })),
}

/** Random designs inside the ranges of the search. */
function designs(count: number, seed: number, frequency: boolean): Design[] {
  const random = randomSource(seed)
  const between = ([low, high]: readonly [number, number]) => low * (high / low) ** random.uniform()
  return Array.from({ length: count }, () => ({
    diameter: between(SEARCH.diameter),
    strokeRatio: between(SEARCH.strokeRatio),
    count: 1 + Math.floor(4 * random.uniform()),
    ejectShare: between([0.3, 0.7]),
    frequency: frequency ? between([0.2, 3]) : null,
  }))
}

describe('scaledMoments', () => {
  it.each<ClosedShape>(['rectangular', 'trapezoid', 'linear-ramp', 'half-sine', 'sine-squared'])(
    'is what the closed forms give for the same shape in another stroke and time: %s',
    (shape) => {
      const from = shapeMomentsInTime(shape, 0.1, 0.4, 0.2, 0.1)
      const scaled = scaledMoments(from, 0.033, 1.7)
      const direct = shapeMomentsInTime(shape, 0.033, 1.7, 0.2, 0.1)
      for (const key of ['integralSpeedSquared', 'integralSpeedCubed', 'peakSpeed', 'risenSpeedSquared'] as const)
        expectClose(scaled[key], direct[key], 1e-13, key) // rounding of a dozen products
      expectClose(scaled.timeTo95PercentOfPeak, direct.timeTo95PercentOfPeak, 1e-13)
      if (Number.isFinite(direct.peakAcceleration)) expectClose(scaled.peakAcceleration, direct.peakAcceleration, 1e-13)
      else expect(scaled.peakAcceleration).toBe(direct.peakAcceleration)
      direct.course.forEach((value, i) => {
        expectNear(at(scaled.course, i), value, 1e-12)
      })
    },
  )

  it.each<[string, ProgrammeInput]>([
    ['trapezoid', PROBLEM.pulse.programme],
    ['a trapezoid too short for its ramps', { ...PROBLEM.pulse.programme, stroke: 0.01 }],
    ['half-sine', { ...PROBLEM.pulse.programme, shape: 'half-sine' }],
    ['table', TABLE],
  ])('belongs to the programme that is written for it: %s', (_, programme) => {
    const from = programmeMoments(compileProgramme(programme), programme)
    const written = scaledProgramme(programme, from, 0.05, 0.9)
    const read = programmeMoments(compileProgramme(written), written)
    const scaled = scaledMoments(from, 0.05, 0.9)
    for (const key of ['stroke', 'duration', 'integralSpeedSquared', 'integralSpeedCubed', 'peakSpeed'] as const)
      expectClose(read[key], scaled[key], 1e-12, key)
    expectClose(read.timeTo95PercentOfPeak, scaled.timeTo95PercentOfPeak, 1e-9)
  })
})

describe('compileDesigns: the frequency of a duty point', () => {
  const bases: [string, DesignProblem][] = [
    ['slug', problemWith({ target: TWO_POINTS })],
    ['slug with quick starts', problemWith({ target: TWO_POINTS }, { overPressure: 'quick-start' })],
    ['slug with a computed start', problemWith({ target: TWO_POINTS }, { overPressure: 'computed', jet: JET })],
    ['canted jets', problemWith({ target: TWO_POINTS, cant: 0.4 }, { overPressure: 'quick-start' })],
    ['a table', problemWith({ target: TWO_POINTS }, { programme: TABLE })],
  ]

  it.each(bases)('just gives the thrust asked for, at rest and under way: %s', (_, problem) => {
    const compiled = compileDesigns(problem)
    const asked = compiled.demands.map(({ thrust }) => thrust)
    // Drag at 0.5 m/s of a drag area of 0.01 m2: 1025/2 x 0.25 x 0.01 N.
    expect(asked).toEqual([1.5, 0.5 * 1025 * 0.25 * 0.01])
    const seen = { given: 0, shortened: 0, short: 0 }
    for (const design of designs(400, 3, false)) {
      for (const point of compiled.evaluate(design).points) {
        const { meanThrust } = point.budget
        const full = design.strokeRatio * design.diameter
        const { frequency, stroke } = point.held
        if (frequency === 5) {
          seen.short++
          expect(meanThrust).toBeLessThanOrEqual((point.thrustAsked ?? 0) * (1 + 1e-12))
          continue
        }
        expectClose(meanThrust, point.thrustAsked ?? 0, 1e-12) // closed form: rounding only
        if (stroke < full) {
          seen.shortened++
          expect(frequency).toBe(0.2)
        } else {
          seen.given++
          expect(frequency).toBeGreaterThanOrEqual(0.2)
        }
      }
    }
    expect(seen.given).toBeGreaterThan(100)
    expect(seen.short).toBeGreaterThan(10)
  })

  it('agrees with a root of the budget itself', () => {
    const compiled = compileDesigns(at(bases, 1)[1])
    for (const design of designs(40, 5, false)) {
      const point = at(compiled.evaluate(design).points, 1)
      if (point.held.frequency >= 5 || point.held.frequency <= 0.2) continue
      const excess = (frequency: number) =>
        compiled.evaluateHeld({ ...point.held, frequency }, 0.5, null).budget.meanThrust - (point.thrustAsked ?? 0)
      const root = bracketedRoot(excess, 0.01, 5)
      expectClose(point.held.frequency, root ?? Number.NaN, 1e-11)
    }
  })

  it('shortens the stroke where the slowest frequency gives too much, also across the end of quick starts', () => {
    const gentle = problemWith(
      { target: [{ thrust: 0.02, share: 1 }] },
      { overPressure: 'quick-start', programme: { ...PROBLEM.pulse.programme, riseTime: 0.06 } },
    )
    const compiled = compileDesigns(gentle)
    const kinds = new Set<boolean>()
    for (const design of designs(300, 8, false)) {
      const point = at(compiled.evaluate(design).points, 0)
      if (point.held.frequency > 0.2) continue
      expectClose(point.budget.meanThrust, 0.02, 1e-12)
      expect(point.held.stroke).toBeLessThanOrEqual(design.strokeRatio * design.diameter)
      kinds.add(point.budget.quickStart)
    }
    expect(kinds).toEqual(new Set([true, false]))
  })

  it('needs more power for more thrust, whatever the design', () => {
    const [low, high] = [0.5, 0.6].map((thrust) => compileDesigns(problemWith({ target: [{ thrust, share: 1 }] })))
    fc.assert(
      fc.property(
        fc.double({ min: 0.02, max: 0.06, noNaN: true }),
        fc.double({ min: 1, max: 6, noNaN: true }),
        (d, s) => {
          const design = { diameter: d, strokeRatio: s, count: 2, ejectShare: 0.4, frequency: null }
          const [a, b] = [low?.evaluate(design), high?.evaluate(design)]
          if (b?.violation === 0) expect(b.power).toBeGreaterThan(a?.power ?? Infinity)
        },
      ),
    )
  })
})

describe('compileDesigns against the full analysis', () => {
  /** Shared figures of search and analysis. */
  function expectSame(compiled: CompiledDesigns, point: PointFigures): void {
    const whole = analyseThruster(thrusterInputOf(compiled, point))
    const { budget } = point
    // One function of inputs that differ in the last digits.
    expectClose(whole.meanThrust, budget.meanThrust, 1e-9, 'thrust')
    expectClose(whole.power.total, budget.power.total, 1e-9, 'power')
    expectClose(whole.plunger.force, budget.plungerForce, 1e-9, 'force')
    expectClose(whole.plunger.travel, budget.plungerTravel, 1e-9, 'travel')
    expectClose(whole.refillTime, budget.refillTime, 1e-9, 'refill time')
    expectClose(whole.speed, point.speed, 1e-9, 'speed')
    expect(whole.limits.map(({ name }) => name)).toEqual(expect.arrayContaining(point.limits.map(({ name }) => name)))
    for (const limit of point.limits) {
      const other = whole.limits.find(({ name }) => name === limit.name)
      // The search keeps 0.2 % of the core's fall of pressure for its tables.
      const scale = limit.name === 'core cavitation' ? 4e-3 : 1e-9
      expectNear(limit.value, other?.value ?? Number.NaN, scale * Math.max(Math.abs(limit.value), 1e-3), limit.name)
      expectClose(limit.limit, other?.limit ?? Number.NaN, 1e-9, limit.name)
    }
  }

  it.each<[string, DesignProblem]>([
    ['least power at a duty point', problemWith({ target: TWO_POINTS })],
    ['a quick start', problemWith({ target: TWO_POINTS }, { overPressure: 'quick-start' })],
    ['a computed start', problemWith({ target: TWO_POINTS }, { overPressure: 'computed', jet: JET })],
    ['a table', problemWith({ target: TWO_POINTS }, { programme: TABLE })],
  ])('agrees to 1e-9: %s', (_, problem) => {
    const compiled = compileDesigns(problem)
    let compared = 0
    for (const design of designs(60, 11, false)) {
      const { points } = compiled.evaluate(design)
      for (const point of points) {
        if (point.budget.refillTime <= 0) continue
        expectSame(compiled, compiled.evaluateHeld(point.held, point.speed, point.thrustAsked))
        compared++
      }
    }
    expect(compared).toBeGreaterThan(80)
  })

  it.each<[string, ThrusterVehicle]>([
    ['a drag area', { kind: 'area', dragArea: 0.01 }],
    ['a hull', { kind: 'hull', wettedArea: 1.1, formFactor: 0.2 }],
    [
      'a table of drag',
      {
        kind: 'table',
        rows: [
          { speed: 0.2, drag: 0.2 },
          { speed: 1, drag: 5 },
          { speed: 5, drag: 140 },
        ],
      },
    ],
  ])('finds the speed at which thrust meets drag as the analysis does: %s', (_, drag) => {
    const vehicle = { speed: null, mass: null, addedMass: null, length: 1.2, drag }
    const compiled = compileDesigns(problemWith({ vehicle, search: { ...SEARCH, goal: 'thrust' } }))
    let compared = 0
    for (const design of designs(30, 13, true)) {
      const point = at(compiled.evaluate(design).points, 0)
      if (point.budget.refillTime <= 0) continue
      const input = thrusterInputOf(compiled, point)
      const whole = analyseThruster({ ...input, section: { ...input.section, vehicle } })
      expectClose(whole.speed, point.speed, 1e-9)
      expectClose(whole.meanThrust, point.budget.meanThrust, 1e-9)
      compared++
    }
    expect(compared).toBeGreaterThan(20)
  })

  type ThrusterVehicle = NonNullable<NonNullable<typeof SECTION.vehicle>['drag']>
})

describe('DesignRings', () => {
  it.each<[string, DesignProblem]>([
    ['trapezoid', problemWith({ target: TWO_POINTS })],
    [
      'half-sine, quick starts',
      problemWith(
        { target: TWO_POINTS },
        { overPressure: 'quick-start', programme: { ...PROBLEM.pulse.programme, shape: 'half-sine' } },
      ),
    ],
    ['published formation number', problemWith({ target: TWO_POINTS }, { formationBasis: 'published' })],
    ['table', problemWith({ target: TWO_POINTS }, { programme: TABLE })],
  ])('has formation number and core pressure of the whole pulse within its tables: %s', (_, problem) => {
    const compiled = compileDesigns(problem)
    const rings = new DesignRings(problem.pulse, compiled.planMoments, NO_START)
    let cut = 0
    for (const design of designs(80, 17, false)) {
      for (const point of compiled.evaluate(design).points) {
        const pulse = computePulse(pulseOfDesign(compiled, point))
        const strokeRatio = point.held.stroke / design.diameter
        const adopted = rings.adopted(strokeRatio, point.speed / point.peakSpeed)
        if (pulse.formationNumber.adopted === null) continue
        // The cubic in the stream is exact; straight between nodes a factor 1.26 apart in stroke ratio is good to this.
        expectClose(adopted ?? Number.NaN, pulse.formationNumber.adopted, 5e-4, 'formation number')
        const drop = rings.coreDrop(design.diameter, point.moments, point.speed)
        if (pulse.corePressureDrop === null) continue
        // Pinched-off rings carry the error of the formation number; the others only that of the core's table.
        expectClose(
          drop ?? Number.NaN,
          pulse.corePressureDrop,
          pulse.pinchedOff === true ? 2e-3 : 1e-4,
          'core pressure',
        )
        expect(rings.coreDropAtMost(design.diameter, point.moments)).toBeGreaterThanOrEqual(pulse.corePressureDrop)
        if (pulse.pinchedOff === true) cut++
      }
    }
    expect(cut).toBeGreaterThan(10)
  })
})

describe('compileDesigns: refusals', () => {
  it.each<[DesignProblem, RegExp]>([
    [problemWith({ target: [] }), /thruster\.target must hold a duty point/],
    [problemWith({ target: [{ thrust: 0, share: 1 }] }), /thruster\.target\.0\.thrust must be above 0 N, got 0 N/],
    [problemWith({ target: [{ thrust: 1, share: 0 }] }), /shares of which one is above 0/],
    [problemWith({ vehicle: null, target: [{ speed: 1, share: 1 }] }), /thruster\.vehicle\.drag must be given/],
    [
      problemWith({ search: { ...SEARCH, diameter: [0.05, 0.02] } }),
      /must run from low to high, got 0\.05 before 0\.02/,
    ],
    [problemWith({ search: { ...SEARCH, count: [1.2, 1.8] } }), /must hold a whole number, got 1\.2 to 1\.8/],
  ])('says what must hold: case %#', (problem, message) => {
    expect(() => compileDesigns(problem)).toThrow(message)
  })
})
