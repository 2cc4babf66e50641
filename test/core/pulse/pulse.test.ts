import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../core/base'
import { computePulse, ringOfInvariants, type PulseInput } from '../../../core/pulse'
import { expectClose, expectNear } from '../../support/close'
import { CONSTANT, PLAIN, TUBE, atStrokeRatio } from './plans'

describe('the ring of a pulse', () => {
  it('takes everything while the stroke is below the adopted formation number', () => {
    const pulse = computePulse(atStrokeRatio(3))
    expect(pulse.pinchedOff).toBe(false)
    expect(pulse.ring).toMatchObject(pulse.total)
    expect(pulse.trailingJet).toEqual({ circulation: 0, impulse: 0, energy: 0 })
    expect(pulse.ring?.model).toBe('steady family')
    expect(pulse.ring).toEqual(pulse.ringFromSlug)
  })

  it('stops growing at the adopted formation number: more stroke adds trailing jet', () => {
    const long = computePulse(atStrokeRatio(8))
    const longer = computePulse(atStrokeRatio(12))
    expect(long.pinchedOff).toBe(true)
    for (const key of ['circulation', 'impulse', 'energy', 'radius', 'speed'] as const)
      expectClose(longer.ring?.[key] ?? NaN, long.ring?.[key] ?? 0, 1e-12, key)
    for (const key of ['circulation', 'impulse', 'energy'] as const) {
      expectClose((long.ring?.[key] ?? NaN) + long.trailingJet[key], long.total[key], 1e-13, key)
      expect(long.trailingJet[key]).toBeGreaterThan(0)
    }
  })

  it('is continuous in the stroke at pinch-off', () => {
    const limit = computePulse(PLAIN).formationNumber.adopted ?? NaN
    const below = computePulse(atStrokeRatio(limit * (1 - 1e-9)))
    const above = computePulse(atStrokeRatio(limit * (1 + 1e-9)))
    expect(below.pinchedOff).toBe(false)
    expect(above.pinchedOff).toBe(true)
    // 2e-9 of stroke; the core ratio is the steepest of them, and moves by a few times that.
    for (const key of ['circulation', 'speed', 'coreRatio', 'radius'] as const)
      expectClose(above.ring?.[key] ?? NaN, below.ring?.[key] ?? 0, 2e-8, key)
  })

  it('at the energy limit is the steady ring of dimensionless energy 0.33', () => {
    const { ring, limitingCirculation } = computePulse(atStrokeRatio(6))
    // R6: eps 0.4858 +- 0.001, definition of Norbury 1973.
    expectNear(ring?.coreRatio ?? NaN, 0.4858, 0.001)
    // J3: between 1.77 and 2.07 (Mohseni & Gharib 1998); 1.97 to two decimals.
    expect(limitingCirculation).toBeGreaterThan(1.77)
    expect(limitingCirculation).toBeLessThan(2.07)
    expectNear(limitingCirculation ?? NaN, 1.97, 0.005)
  })

  it('reaches Hill at L/D = 3.5 sqrt 5 with 0.7 of the exit speed', () => {
    // J2: E_n = sqrt(pi/2)/(L/D) meets that of Hill's vortex there; E/I = U/2 = (5/7) U_ring.
    const strokeRatio = 3.5 * Math.sqrt(5)
    for (const share of [1 - 1e-6, 1 + 1e-6]) {
      const { slug } = computePulse(atStrokeRatio(strokeRatio * share))
      const ring = ringOfInvariants(slug, PLAIN.density, PLAIN.kinematicViscosity)
      expect(ring?.model).toBe(share < 1 ? 'steady family' : 'hill limit')
      // 1e-6 of stroke away from the limit: the speed moves by about that, the core ratio by its root.
      expectClose(ring?.speed ?? NaN, 0.7 * 0.5, 1e-6, 'speed')
      expectNear(ring?.coreRatio ?? NaN, Math.SQRT2, 1e-3, 'core ratio')
      expectClose(ring?.circulation ?? NaN, slug.circulation, 1e-6, 'circulation')
    }
  })

  it("is held at Hill's vortex beyond, which never has more energy than the pulse", () => {
    // A counter-flow moves pinch-off to 9.6, past the stroke of Hill's vortex.
    const pulse = computePulse({ ...atStrokeRatio(9), axialFlow: -0.2 })
    expect(pulse.pinchedOff).toBe(false)
    const { ring, trailingJet, total } = pulse
    expect(ring?.model).toBe('hill limit')
    expect(ring?.energy).toBe(total.energy)
    expect(ring?.impulse).toBe(total.impulse)
    // Gamma = 5 U a and I = 2 pi rho a^3 U of Hill 1894, with a = 2 L_r.
    const sphere = 2 * (ring?.radius ?? NaN)
    expectClose(ring?.circulation ?? NaN, 5 * (ring?.speed ?? NaN) * sphere, 1e-13)
    expectClose(ring?.impulse ?? NaN, 2 * Math.PI * PLAIN.density * sphere ** 3 * (ring?.speed ?? NaN), 1e-13)
    expectClose(
      ring?.energy ?? NaN,
      (10 / 7) * Math.PI * PLAIN.density * sphere ** 3 * (ring?.speed ?? NaN) ** 2,
      1e-13,
    )
    expect(trailingJet.circulation).toBeGreaterThan(0)
    expectClose((ring?.circulation ?? NaN) + trailingJet.circulation, total.circulation, 1e-13)
    expect(trailingJet.impulse).toBe(0)
    expect(pulse.notes.some((note) => note.text.includes("held at Hill's vortex"))).toBe(true)
  })

  it('of a very short stroke is told as thinner than viscosity allows', () => {
    const thin = (strokeRatio: number) =>
      computePulse(atStrokeRatio(strokeRatio)).notes.some((note) => note.text.includes('thinner than viscosity'))
    expect(thin(0.5)).toBe(true)
    expect(thin(2)).toBe(false)
  })

  it('is finite at every stroke that has one, and absent with a note below', () => {
    for (const strokeRatio of [1e-4, 1e-3, 1e-2, 0.1, 1, 10, 100, 1000]) {
      const pulse = computePulse(atStrokeRatio(strokeRatio))
      const { ring, unstableWaveNumber, corePressureDrop, limitingCirculation, notes } = pulse
      if (strokeRatio < 0.005) {
        expect(ring).toBeNull()
        expect(notes.some((note) => note.text.includes('too short to match a ring'))).toBe(true)
        continue
      }
      const values = [ring?.speed, ring?.radius, ring?.meanCoreRadius, ring?.carriedVolume]
      for (const value of [...values, limitingCirculation, unstableWaveNumber, corePressureDrop])
        expect(Number.isFinite(value), `L/D ${strokeRatio}: ${value}`).toBe(true)
    }
  })

  it('has the Reynolds number (U D/nu)(L/D)/2', () => {
    // L2: slug ring at constant speed.
    const { ring } = computePulse(atStrokeRatio(3))
    expectClose(ring?.reynolds ?? NaN, ((0.5 * 0.02) / PLAIN.kinematicViscosity) * 1.5, 1e-13)
  })

  it('with the start over-pressure is the other end of the range, and faster', () => {
    const off = computePulse(atStrokeRatio(2))
    const on = computePulse({ ...atStrokeRatio(2), overPressure: 'quick-start' })
    expect(on.ring).toEqual(off.ringWithOverPressure)
    expect(on.ringFromSlug).toEqual(off.ring)
    expect(on.ringWithOverPressure).toEqual(on.ring)
    expect(on.ring?.speed ?? 0).toBeGreaterThan(off.ring?.speed ?? Infinity)
    // Energy and pinch-off stay those of the slug.
    expect(on.dimensionlessEnergy).toBe(off.dimensionlessEnergy)
    expect(on.formationNumber).toEqual(off.formationNumber)
  })

  it('takes what a computed jet has beyond the slug where that is adopted', () => {
    const jet = {
      formationNumber: 4,
      formationNumberLow: 3.8,
      formationNumberHigh: 4.2,
      circulationBeyondSlug: 1e-3,
      impulseBeyondSlug: 2e-4,
      energyBeyondSlug: 3e-5,
    }
    const pulse = computePulse({ ...atStrokeRatio(2), overPressure: 'computed', jet })
    expectClose(pulse.total.circulation, pulse.slug.circulation + 1e-3, 1e-14)
    expectClose(pulse.ring?.energy ?? NaN, pulse.slug.energy + 3e-5, 1e-14)
  })
})

describe('quick start', () => {
  it.each([
    // 0.95 of the rise at peak speed over D: 0.5 * 0.95 * rise / 0.02.
    [0.0421, true],
    [0.0422, false],
  ])('a rise of %d s at 0.5 m/s from 20 mm is quick: %s', (riseTime, quick) => {
    const programme = { ...CONSTANT, shape: 'trapezoid', riseTime, stroke: 0.08 } as const
    const pulse = computePulse({ ...PLAIN, programme })
    expectClose(pulse.startFormationTime, (0.5 * 0.95 * riseTime) / 0.02, 1e-13)
    expect(pulse.quickStart).toBe(quick)
    expect(pulse.ringWithOverPressure === null).toBe(!quick)
    expect(pulse.diddenRatio === null).toBe(!quick)
  })
})

describe('numbers beside the result', () => {
  it('mean speed, jet Reynolds number and the boundary layer of the tube', () => {
    const pulse = computePulse(PLAIN)
    expectClose(pulse.meanSpeed, 0.5, 1e-14)
    expectClose(pulse.duration, 0.08, 1e-14)
    expectClose(pulse.jetReynolds, (0.5 * 0.02) / 1.0034e-6, 1e-13)
    // 1 + (8/sqrt pi) sqrt(1.0034e-6 * 0.08)/0.02 by hand.
    expectClose(pulse.boundaryLayerFactor, 1.06394, 1e-5)
  })

  it('a reduced peak is told', () => {
    const programme = { ...CONSTANT, shape: 'trapezoid', riseTime: 0.2, fallTime: 0.2 } as const
    const pulse = computePulse({ ...PLAIN, programme })
    expect(pulse.reducedPeak).toBe(true)
    expectClose(pulse.peakSpeed, Math.sqrt((2 * 0.04 * 0.5) / 0.4), 1e-13)
    expect(pulse.notes.some((note) => note.text.includes('too short for the ramps'))).toBe(true)
  })
})

/** Every number in a value with its path. */
function leaves(value: unknown, path: string): (readonly [string, number])[] {
  if (typeof value === 'number') return [[path, value]]
  if (typeof value !== 'object' || value === null) return []
  return Object.entries(value).flatMap(([key, inner]) => leaves(inner, `${path}.${key}`))
}

describe('any valid plan', () => {
  const number = (min: number, max: number) => fc.double({ min, max, noNaN: true })
  const plans = fc.record({
    shape: fc.constantFrom('rectangular', 'trapezoid', 'linear-ramp', 'half-sine', 'sine-squared'),
    nozzle: fc.constantFrom('tube', 'converging', 'orifice'),
    exitProfile: fc.constantFrom('uniform', 'parabolic'),
    overPressure: fc.constantFrom('off', 'quick-start'),
    formationBasis: fc.constantFrom('energyLimit', 'carriedVolume', 'speedMatch', 'published'),
    diameter: number(1e-4, 2),
    strokeRatio: number(0.02, 40),
    peakSpeed: number(1e-4, 20),
    riseTime: number(0, 3),
    fallTime: number(0, 3),
    axisRatio: number(1, 8),
    radialRatio: number(0, 0.45),
    stream: number(-0.5, 0.7),
  })

  it('gives finite numbers, a ring and a jet that add up, and a range that holds the band', () => {
    fc.assert(
      fc.property(plans, (plan) => {
        const pulse = computePulse({
          ...PLAIN,
          nozzle: { ...TUBE, ...plan, shape: plan.nozzle, pistonDiameter: 2 * plan.diameter },
          programme: { ...CONSTANT, ...plan, stroke: plan.strokeRatio * plan.diameter },
          axialFlow: plan.stream * plan.peakSpeed,
          overPressure: plan.overPressure,
          formationBasis: plan.formationBasis,
        })
        // JSON writes NaN and infinities as null; nothing here may become one.
        expect(leaves(pulse, '').filter(([, value]) => !Number.isFinite(value))).toEqual([])
        const { ring, total, trailingJet, formationNumber, pinchedOff } = pulse
        for (const key of ['circulation', 'impulse', 'energy'] as const) {
          expectClose((ring?.[key] ?? 0) + trailingJet[key], total[key], 1e-12, key)
          expect(trailingJet[key]).toBeGreaterThanOrEqual(-1e-12 * total[key])
        }
        const { published, low, high, adopted } = formationNumber
        expect(published === null).toBe(ring === null)
        if (published !== null) {
          expect(low).toBeLessThanOrEqual(published[0])
          expect(high).toBeGreaterThanOrEqual(published[1])
        }
        expect(pinchedOff).toBe(adopted === null ? null : pulse.strokeRatio > adopted)
      }),
      { seed: 7, numRuns: 300 },
    )
  })
})

describe('refusals', () => {
  it.each<readonly [string, Partial<PulseInput>, string]>([
    ['nozzle.diameter', { nozzle: { ...TUBE, diameter: 0 } }, 'must be above 0 m, got 0 m'],
    ['nozzle.pistonDiameter', { nozzle: { ...TUBE, pistonDiameter: -1 } }, 'must be above 0 m, got -1 m'],
    ['nozzle.axisRatio', { nozzle: { ...TUBE, axisRatio: 0.5 } }, 'must be at least 1, got 0.5'],
    ['nozzle.radialRatio', { nozzle: { ...TUBE, radialRatio: 0.46 } }, 'must be at most 0.45, got 0.46'],
    ['nozzle.radialRatio', { nozzle: { ...TUBE, radialRatio: -0.1 } }, 'must be at least 0, got -0.1'],
    ['nozzle.contraction', { nozzle: { ...TUBE, shape: 'orifice', contraction: 1.2 } }, 'must be at most 1, got 1.2'],
    [
      'nozzle.pistonDiameter',
      { nozzle: { ...TUBE, shape: 'orifice', pistonDiameter: 0.01 } },
      'at least nozzle.diameter',
    ],
    ['nozzle.length', { nozzle: { ...TUBE, length: -1 } }, 'must be at least 0 m, got -1 m'],
    ['nozzle.lossCoefficient', { nozzle: { ...TUBE, lossCoefficient: NaN } }, 'must be a finite number, got NaN'],
    ['programme.stroke', { programme: { ...CONSTANT, stroke: -0.1 } }, 'must be above 0 m, got -0.1 m'],
    ['programme.peakSpeed', { programme: { ...CONSTANT, peakSpeed: 0 } }, 'must be above 0 m/s, got 0 m/s'],
    ['programme.rows', { programme: { ...CONSTANT, shape: 'table' } }, 'at least 3 rows, got 0'],
    ['ambient.axialFlow', { axialFlow: Infinity }, 'must be a finite number, got Infinity m/s'],
    ['water.density', { density: 0 }, 'must be above 0 kg/m3'],
    ['water.kinematicViscosity', { kinematicViscosity: NaN }, 'must be a finite number'],
    ['models.overPressure', { overPressure: 'computed' }, 'needs the computed starting jet'],
    ['models.formationNumber', { formationBasis: 'computed' }, 'needs the computed starting jet'],
  ])('%s is named with its limit', (field, more, message) => {
    const refused = () => computePulse({ ...PLAIN, ...more })
    expect(refused).toThrow(DomainError)
    expect(refused).toThrow(message)
    expect(refused).toThrow(expect.objectContaining({ field }))
  })
})

describe('the stroke left before pinch-off', () => {
  it('spans every estimate that has a value and the published band, and holds the adopted one', () => {
    for (const formationBasis of ['energyLimit', 'carriedVolume', 'speedMatch', 'published'] as const) {
      const { margin, formationNumber, strokeRatio } = computePulse({ ...atStrokeRatio(3.2), formationBasis })
      if (margin === null || margin.adopted === null) throw new Error('no margin')
      expectNear(margin.low, (formationNumber.speedMatch ?? NaN) - strokeRatio, 1e-12, 'lowest')
      expectNear(margin.high, 4.5 - strokeRatio, 1e-12, 'highest')
      expect(margin.adopted).toBeGreaterThanOrEqual(margin.low)
      expect(margin.adopted).toBeLessThanOrEqual(margin.high)
    }
  })

  it('is absent where no ring is expected', () => {
    const pulse = computePulse({ ...atStrokeRatio(2), axialFlow: -10 })
    expect(pulse.margin).toBeNull()
  })
})
