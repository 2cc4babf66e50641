import { describe, expect, it } from 'vitest'
import { at, randomSource } from '../../../core/base'
import { limitScales } from '../../../core/thruster/candidates'
import { compileDesigns } from '../../../core/thruster/design'
import { designMap } from '../../../core/thruster/map'
import { sensitivitiesAt, thrustSpreadAt, varied } from '../../../core/thruster/sensitivity'
import { expectClose, expectNear } from '../../support/close'
import { SECTION, problemWith } from './sizingProblem'

const DESIGN = { diameter: 0.03, strokeRatio: 3, count: 2, ejectShare: 0.4, frequency: null }
const BENCH = problemWith({
  vehicle: null,
  target: [{ thrust: 0.5, share: 1 }],
  actuator: { ...SECTION.actuator, valveLag: 0 },
})
const UNDER_WAY = problemWith({ target: [{ speed: 0.4, share: 1 }] })

describe('sensitivitiesAt', () => {
  it('has the powers of the slug at rest: thrust goes with D^2 L^2 f^2 / share, jet power with D^2 L^3 f^3 / share^2', () => {
    const designs = compileDesigns({
      ...BENCH,
      // A wide intake takes no power, so that the jet's law stands alone.
      section: { ...BENCH.section, intake: { area: 100, recoveredShare: 0, lossCoefficient: 0 } },
      pulse: { ...BENCH.pulse, nozzle: { ...BENCH.pulse.nozzle, length: 0 } },
    })
    const point = at(designs.evaluate(DESIGN).points, 0)
    const rows = sensitivitiesAt(designs, point)
    const powers = {
      diameter: [2, 2],
      bore: [-2, -4],
      stroke: [2, 3],
      frequency: [2, 3],
      ejectShare: [-1, -2],
    } as const
    for (const { field, thrust, power } of rows) {
      // Pure powers: a central difference of their logarithms is exact to rounding over the step, 1e-16/1e-4.
      expectNear(thrust ?? Number.NaN, powers[field][0], 1e-9, `thrust by ${field}`)
      // The intake still takes a share of about 1e-9.
      expectNear(power ?? Number.NaN, powers[field][1], 1e-7, `power by ${field}`)
    }
  })

  it('agrees with differences of other widths under way', () => {
    const designs = compileDesigns(UNDER_WAY)
    const point = at(designs.evaluate(DESIGN).points, 0)
    for (const { field, thrust, power } of sensitivitiesAt(designs, point)) {
      const [low, high] = [-1e-3, 1e-3].map((step) =>
        designs.evaluateHeld(varied(point.held, field, Math.exp(step)), point.speed, point.thrustAsked),
      )
      const slope = (a = Number.NaN, b = Number.NaN) => Math.log(b / a) / 2e-3
      // The wider difference is off by its step squared times the third derivative, of order 10.
      expectNear(thrust ?? 0, slope(low?.budget.meanThrust, high?.budget.meanThrust), 2e-5)
      expectNear(power ?? 0, slope(low?.budget.power.total, high?.budget.power.total), 2e-4)
    }
  })
})

describe('thrustSpreadAt', () => {
  const manufacture = { diameter: 0.005, stroke: 0.01, frequency: 0.01 }

  it('is worked by hand at rest: 2 x sqrt(0.005^2 + 0.01^2 + 0.01^2) = 3 %', () => {
    const designs = compileDesigns(BENCH)
    const point = at(designs.evaluate(DESIGN).points, 0)
    const spread = thrustSpreadAt(designs, point, manufacture, limitScales(designs, point.held.frequency))
    expectClose(spread.relative ?? Number.NaN, 0.03, 1e-6) // central differences of a square
    expectClose(spread.low, 0.5 * 0.94, 1e-6)
    expectClose(spread.high, 0.5 * 1.06, 1e-6)
  })

  it('is what a Monte Carlo draw of bore, stroke and frequency gives under way', () => {
    const designs = compileDesigns(UNDER_WAY)
    const point = at(designs.evaluate(DESIGN).points, 0)
    const { relative } = thrustSpreadAt(designs, point, manufacture, limitScales(designs, point.held.frequency))
    const random = randomSource(5)
    const samples = 4000
    let sum = 0
    let squares = 0
    for (let i = 0; i < samples; i++) {
      const bore = varied(point.held, 'bore', 1 + manufacture.diameter * random.normal())
      const stroke = varied(bore, 'stroke', 1 + manufacture.stroke * random.normal())
      const held = varied(stroke, 'frequency', 1 + manufacture.frequency * random.normal())
      const { meanThrust } = designs.evaluateHeld(held, point.speed, null).budget
      sum += meanThrust
      squares += meanThrust * meanThrust
    }
    const mean = sum / samples
    const deviation = Math.sqrt(squares / samples - mean * mean) / mean
    // Standard error of a standard deviation from n draws: 1/sqrt(2 n) = 1.1 %; four of them.
    expectClose(relative ?? Number.NaN, deviation, 0.045)
  })
})

describe('designMap', () => {
  const designs = compileDesigns(UNDER_WAY)
  const map = designMap(designs, DESIGN)

  it('holds in every cell what the design there comes to', () => {
    expect([map.x.length, map.y.length, map.power.length]).toEqual([60, 60, 3600])
    expect([map.x[0], map.x[59], map.y[0], map.y[59]]).toEqual([0.01, 0.08, 1, 6])
    for (const [i, j] of [
      [0, 0],
      [17, 42],
      [59, 59],
    ] as const) {
      const figures = designs.evaluate({ ...DESIGN, diameter: at(map.x, i), strokeRatio: at(map.y, j) })
      expect(map.power[60 * j + i]).toBe(figures.power)
      expect(map.thrust[60 * j + i]).toBe(figures.thrust)
      expect(map.feasible[60 * j + i]).toBe(figures.violation === 0 ? 1 : 0)
    }
  })

  it('names a limit in every cell that breaks one, and only limits that are met or nearly so', () => {
    let broken = 0
    for (let cell = 0; cell < 3600; cell++) {
      if (map.feasible[cell] === 1) continue
      broken++
      expect(map.limit[cell]).not.toBeNull()
    }
    expect(broken).toBeGreaterThan(100)
    expect(broken).toBeLessThan(3500)
    // Exits above 0.054 m have a plunger wider than the bay of 0.09 m.
    expect(map.limit[60 * 10 + 59]).toBe('bay diameter')
  })

  it('takes other fields, and refuses a frequency that the duty points set', () => {
    const other = designMap(
      designs,
      DESIGN,
      { field: 'count', span: [1, 4], count: 4 },
      { field: 'ejectShare', span: [0.3, 0.7], count: 9 },
    )
    expect(other.x).toEqual([1, 2, 3, 4])
    expect(other.y.length).toBe(9)
    expect(() => designMap(designs, DESIGN, { field: 'frequency', span: [1, 2], count: 5 })).toThrow(
      /frequency cannot be an axis of the map where the duty points set it/,
    )
    expect(() => designMap(designs, DESIGN, { field: 'strokeRatio', span: [1, 2], count: 5 })).toThrow(
      /different fields/,
    )
  })
})
