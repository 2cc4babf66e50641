import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  defaultUnit,
  describeDimension,
  DIMENSIONS,
  fromBase,
  parseQuantity,
  siUnit,
  stepQuantity,
  toBase,
  unitOf,
  unitsOf,
} from '../../../core/quantity'
import { expectClose } from '../../support/close'

const allUnits = DIMENSIONS.flatMap((dimension) => unitsOf(dimension).map((unit) => ({ dimension, unit })))

describe('the unit table', () => {
  it('offers the default and the stored unit of every dimension, each symbol once', () => {
    for (const dimension of DIMENSIONS) {
      const units = unitsOf(dimension)
      expect(new Set(units).size).toBe(units.length)
      expect(units).toContain(defaultUnit(dimension))
      expect(units).toContain(siUnit(dimension))
      expect(toBase(7, siUnit(dimension))).toBe(7)
    }
  })

  it.each(allUnits)('reads the symbol it shows: "$unit" of $dimension', ({ dimension, unit }) => {
    const parsed = parseQuantity(`1 ${unit}`, dimension)
    expect(parsed).toMatchObject({ ok: true, unit: unit === '' ? null : unit })
    if (parsed.ok) expectClose(parsed.value, toBase(1, unit), 2 * Number.EPSILON)
  })

  it('gives one symbol the same factor in every dimension', () => {
    for (const { dimension, unit } of allUnits) {
      const parsed = parseQuantity('3', dimension, unit)
      if (unitOf(unit).offset === undefined && parsed.ok) expectClose(parsed.value, toBase(3, unit), 2 * Number.EPSILON)
    }
  })

  // NIST Special Publication 811 (2008), appendix B.8: seven digits printed; recalled, not re-read.
  it.each([
    ['psi', 6894.757],
    ['lbf', 4.448222],
    ['kn', 0.5144444],
    ['mmHg', 133.3224],
    ['lb', 0.4535924],
    ['ft²', 0.09290304],
    ['kWh', 3.6e6],
    ['atm', 101325],
  ])('agrees with the published factor of %s', (unit, factor) => {
    expectClose(toBase(1, unit), factor, 1e-7)
  })

  // Fixed points by definition: 0 K, 0 C = 273.15 K = 32 F, and where Celsius and Fahrenheit meet.
  it('shifts temperatures exactly', () => {
    expect(toBase(0, 'K')).toBe(-273.15)
    expect(toBase(288.15, 'K')).toBe(15)
    expect(fromBase(15, 'K')).toBe(288.15)
    expect(toBase(212, '°F')).toBe(100)
    expect(toBase(-40, '°F')).toBe(-40)
    expect(fromBase(0, '°F')).toBe(32)
  })

  it.each(allUnits)('there and back is the same number: $dimension in "$unit"', ({ unit }) => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e6, noNaN: true }), (value) => {
        // Two roundings each way; beside a shifted zero one unit of the last digit of 273 or 460.
        const floor = unitOf(unit).offset === undefined ? 0 : 1e-13 / value
        expectClose(fromBase(toBase(value, unit), unit), value, 4 * Number.EPSILON + floor)
      }),
      { numRuns: 50 },
    )
  })

  it('describes each dimension by an example that it accepts', () => {
    expect(describeDimension('length')).toBe('a length such as 12 mm')
    for (const dimension of DIMENSIONS) {
      const example = describeDimension(dimension).split(' such as ')[1] ?? ''
      expect(parseQuantity(example, dimension).ok, `${dimension}: ${example}`).toBe(true)
    }
  })
})

describe('stepQuantity', () => {
  it.each<[string, 1 | -1, 0.1 | 1 | 10, number | null]>([
    ['12.5 mm', 1, 1, 0.0126],
    ['12.5 mm', -1, 1, 0.0124],
    ['12.5 mm', 1, 10, 0.0135],
    ['12.5 mm', 1, 0.1, 0.01251],
    ['30', 1, 1, 0.031],
    ['30', -1, 0.1, 0.0299],
    ['0', -1, 1, -0.001],
    ['0.050 m', 1, 1, 0.051],
    ['1,5', 1, 1, 0.0016],
    ['1.2e-2 m', 1, 1, 0.013],
    ['9.9', 1, 1, 0.01],
    ['1,500', 1, 1, null],
    ['abc', 1, 1, null],
    ['', 1, 1, null],
    ['12 mL', 1, 1, null],
  ])('takes "%s" by %d x %d to %s', (text, direction, scale, value) => {
    expect(stepQuantity(text, 'length', 'mm', direction, scale)).toBe(value)
  })

  it('steps a shifted scale in its own degrees', () => {
    expect(stepQuantity('288.15 K', 'temperature', '°C', 1, 1)).toBe(15.01)
  })

  it('comes back where it was after one step up and one down', () => {
    fc.assert(
      fc.property(fc.integer({ min: -99999, max: 99999 }), fc.integer({ min: 0, max: 4 }), (n, decimals) => {
        const text = (n / 10 ** decimals).toFixed(decimals)
        const up = stepQuantity(text, 'length', 'mm', 1, 1)
        const typed = ((n + 1) / 10 ** decimals).toFixed(decimals)
        expect(parseQuantity(typed, 'length', 'mm')).toEqual({ ok: true, value: up, unit: null })
        const down = stepQuantity(typed, 'length', 'mm', -1, 1)
        expect(parseQuantity(text, 'length', 'mm')).toEqual({ ok: true, value: down, unit: null })
      }),
    )
  })
})
