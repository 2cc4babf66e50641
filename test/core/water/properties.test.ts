import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../core/base'
import { saturationPressure, waterProperties, type WaterInput } from '../../../core/water'
import { expectClose, expectNear } from '../../support/close'

const SEA: WaterInput = {
  kind: 'sea',
  temperatureCelsius: 15,
  salinity: 35,
  depth: 5,
  atmosphericPressure: 101325,
  density: null,
  kinematicViscosity: null,
  vapourPressure: null,
}

describe('saturationPressure', () => {
  // Check W3: IAPWS R7-97(2012), table 35, nine digits printed. The second and third value: recalled, not re-read.
  it.each([
    [300, 0.353658941e-2],
    [500, 0.263889776e1],
    [600, 0.123443146e2],
  ])('matches IAPWS-IF97 table 35 at %d K', (kelvin, megapascal) => {
    expectClose(saturationPressure(kelvin - 273.15) / 1e6, megapascal, 5e-9)
  })

  // Triple point 273.16 K: 611.657 Pa (IAPWS, Guildner et al. 1976, +- 0.01 Pa); IF97 region 4 states 0.025 %.
  it('gives the triple-point pressure', () => {
    expectClose(saturationPressure(0.01), 611.657, 2.5e-4)
  })

  it('boils water at one atmosphere and 99.974 C', () => {
    // Boiling point on ITS-90, recalled, not re-read; 0.025 % of pressure is 0.007 K.
    expectClose(saturationPressure(99.974), 101325, 2.5e-4)
  })
})

describe('waterProperties', () => {
  it('puts the same functions together for fresh and sea water', () => {
    const sea = waterProperties(SEA)
    // Check W4 (ITTC 7.5-02-01-03): 0.01 % and 0.1 %.
    expectClose(sea.density, 1026.021, 1e-4)
    expectClose(sea.kinematicViscosity, 1.1892e-6, 1e-3)
    const fresh = waterProperties({ ...SEA, kind: 'fresh' })
    expectClose(fresh.density, 999.1026, 1e-4)
    expectClose(fresh.kinematicViscosity, 1.1386e-6, 1e-3)
    for (const water of [sea, fresh]) {
      expectClose(water.dynamicViscosity, water.kinematicViscosity * water.density, 4 * Number.EPSILON)
      expect(water.vapourPressure).toBe(saturationPressure(15))
      expect(water.sources).toHaveLength(3)
    }
  })

  it('adds the head of water to the pressure of the air', () => {
    const water = waterProperties({ ...SEA, depth: 10 })
    expectNear(water.absolutePressure, 101325 + water.density * 9.80665 * 10, 1e-9)
    expect(waterProperties({ ...SEA, depth: 0 }).absolutePressure).toBe(101325)
  })

  it('does without a vapour pressure of given water and says what that means', () => {
    const water = waterProperties({ ...SEA, kind: 'given', density: 1000, kinematicViscosity: 1e-6 })
    expect(water.vapourPressure).toBeNull()
    expect(water.notes.join(' ')).toMatch(/cavitation cannot be judged/)
  })

  it('says that the vapour pressure of sea water is that of fresh water', () => {
    expect(waterProperties(SEA).notes.join(' ')).toMatch(/vapour pressure is that of fresh water.*2 % less/)
    expect(waterProperties({ ...SEA, kind: 'fresh' }).notes).toEqual([])
  })

  it('says at great depth that the density is that of the surface', () => {
    expect(waterProperties({ ...SEA, kind: 'fresh', depth: 100 }).notes.join(' ')).toMatch(/about 0\.05 % denser/)
  })

  it('passes given properties through unchanged', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 500, max: 2000, noNaN: true }),
        fc.double({ min: 1e-7, max: 1e-3, noNaN: true }),
        (density, kinematicViscosity) => {
          const water = waterProperties({ ...SEA, kind: 'given', density, kinematicViscosity, vapourPressure: 0 })
          expect(water.density).toBe(density)
          expect(water.kinematicViscosity).toBe(kinematicViscosity)
          expectClose(water.dynamicViscosity, density * kinematicViscosity, 1e-15)
        },
      ),
    )
  })

  it('does not read temperature and salinity of given water', () => {
    const input: WaterInput = { ...SEA, kind: 'given', density: 850, kinematicViscosity: 1e-5, vapourPressure: 100 }
    expect(waterProperties({ ...input, temperatureCelsius: 80, salinity: 99 }).density).toBe(850)
  })

  it.each<[string, Partial<WaterInput>, RegExp]>([
    ['water.temperatureCelsius', { temperatureCelsius: 41 }, /at most 40 °C, got 41 °C/],
    ['water.temperatureCelsius', { temperatureCelsius: -1 }, /at least 0 °C, got -1 °C/],
    ['water.temperatureCelsius', { temperatureCelsius: NaN }, /finite/],
    ['water.salinity', { salinity: 43 }, /at most 42, got 43/],
    ['water.salinity', { salinity: -0.1 }, /at least 0/],
    ['water.depth', { depth: -1 }, /at least 0 m, got -1 m/],
    ['water.atmosphericPressure', { atmosphericPressure: 0 }, /above 0 Pa/],
    ['water.density', { kind: 'given' }, /must be given in kg\/m3.*missing/],
    ['water.kinematicViscosity', { kind: 'given', density: 1000 }, /must be given in m2\/s.*missing/],
    [
      'water.vapourPressure',
      { kind: 'given', density: 1000, kinematicViscosity: 1e-6, vapourPressure: -1 },
      /at least 0 Pa/,
    ],
    ['water.density', { kind: 'given', density: 0, kinematicViscosity: 1e-6, vapourPressure: 0 }, /above 0 kg\/m3/],
  ])('refuses %s outside its range: %o', (field, change, sentence) => {
    const call = () => waterProperties({ ...SEA, ...change })
    expect(call).toThrow(DomainError)
    expect(call).toThrow(sentence)
    expect(call).toThrow(expect.objectContaining({ field }))
  })
})
