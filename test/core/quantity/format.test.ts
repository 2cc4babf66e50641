import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  DIMENSIONS,
  formatFixed,
  formatFull,
  formatNumber,
  formatQuantity,
  formatRange,
  fromBase,
  parseQuantity,
  unitsOf,
  type Dimension,
} from '../../../core/quantity'

const allUnits = DIMENSIONS.flatMap((dimension) => unitsOf(dimension).map((unit) => ({ dimension, unit })))

function read(text: string, dimension: Dimension, unit: string): number {
  const parsed = parseQuantity(text, dimension, unit)
  if (!parsed.ok) throw new Error(parsed.message)
  return parsed.value
}

describe('formatNumber', () => {
  it.each<[number, string]>([
    [30, '30'],
    [0.0127, '0.0127'],
    [1234567, '1.235×10⁶'],
    [101325, '101300'],
    [999999, '1×10⁶'],
    [99999, '100000'],
    [12.345678, '12.35'],
    [0.0001, '0.0001'],
    [0.00001, '1×10⁻⁵'],
    [1.1386e-6, '1.139×10⁻⁶'],
    [-1.5, '\u22121.5'],
    [0, '0'],
    [-0, '0'],
    [6.02214076e23, '6.022×10²³'],
    [NaN, '—'],
    [Infinity, '—'],
  ])('shows %d as %s', (value, text) => {
    expect(formatNumber(value)).toBe(text)
  })

  it('shows the count of digits asked for', () => {
    expect(formatNumber(Math.PI, 2)).toBe('3.1')
    expect(formatNumber(Math.PI, 7)).toBe('3.141593')
  })
})

describe('formatQuantity', () => {
  it('parts number and unit by a no-break space, the degree sign by none', () => {
    expect(formatQuantity(0.03, 'mm')).toBe('30\u00A0mm')
    expect(formatQuantity(0.009, 'mm')).toBe('9\u00A0mm')
    expect(formatQuantity(Math.PI / 6, '°')).toBe('30°')
    expect(formatQuantity(15, '°C')).toBe('15\u00A0°C')
    expect(formatQuantity(15, 'K')).toBe('288.1\u00A0K')
    expect(formatQuantity(4, '')).toBe('4')
    expect(formatQuantity(0.0125438, 'mN')).toBe('12.54\u00A0mN')
  })

  it('refuses an unknown unit', () => {
    expect(() => formatQuantity(1, 'furlong')).toThrow(/unit must be a symbol of the unit table, got "furlong"/)
  })

  it.each(allUnits)('reads back within half a unit of the last digit: $dimension in "$unit"', ({ dimension, unit }) => {
    fc.assert(
      fc.property(fc.double({ min: 1e-12, max: 1e12, noNaN: true }), fc.boolean(), (size, negative) => {
        const value = negative ? -size : size
        const shown = fromBase(value, unit)
        const back = fromBase(read(formatQuantity(value, unit), dimension, unit), unit)
        // Half a unit of the fourth digit; the rest is rounding of the conversions, larger beside a shifted zero.
        const half = 0.5 * 10 ** (Math.floor(Math.log10(Math.abs(shown))) - 3)
        expect(Math.abs(back - shown)).toBeLessThanOrEqual(half * (1 + 1e-9) + 1e-12 * Math.abs(shown) + 2e-13)
      }),
      { numRuns: 60 },
    )
  })
})

describe('formatFull', () => {
  it('has the fewest digits, in plain ASCII, and a power of ten only at the extremes', () => {
    expect(formatFull(0.03, 'mm')).toBe('30\u00A0mm')
    expect(formatFull(0.1 + 0.2, 'm')).toBe('0.30000000000000004\u00A0m')
    expect(formatFull(0.0127, 'in')).toBe('0.5\u00A0in')
    expect(formatFull(5, 'rpm')).toBe('300\u00A0rpm')
    expect(formatFull(15, 'K')).toBe('288.15\u00A0K')
    expect(formatFull(-0.25, 's')).toBe('-0.25\u00A0s')
    expect(formatFull(1.139e-9, 'm')).toBe('1.139e-9\u00A0m')
    expect(formatFull(0, 'mm')).toBe('0\u00A0mm')
    expect(formatFull(101325, 'Pa')).toBe('101325\u00A0Pa')
    expect(formatFull(1200, '')).toBe('1200')
  })

  it.each(allUnits)('reads back as exactly the same number: $dimension in "$unit"', ({ dimension, unit }) => {
    const anyNumber = fc.oneof(
      fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e300, max: 1e300 }),
      fc.double({ min: -1e4, max: 1e4, noNaN: true }),
      fc.integer({ min: 1, max: 1e6 }).map((n) => n / 1e6),
    )
    fc.assert(
      fc.property(anyNumber, (value) => {
        const text = formatFull(value, unit)
        if (text.length > 200) return // A tiny difference from a shifted zero: longer than a field takes.
        expect(read(text, dimension, unit) === value, text).toBe(true)
      }),
      { numRuns: 150 },
    )
  })
})

describe('formatRange', () => {
  it.each<[number, number, string, string]>([
    [0.0929, 0.1124, 'mm', '92.9 to 112.4'],
    [0.1124, 0.0929, 'mm', '92.9 to 112.4'],
    [0.093, 0.112, 'mm', '93 to 112'],
    [0.03, 0.03, 'mm', '30'],
    [0.030001, 0.03000101, 'mm', '30'],
    [-0.002, 0.0035, 'mm', '\u22122.0 to 3.5'],
    [0, 0.0035, 'mm', '0.0 to 3.5'],
    [0, 0, 'mm', '0'],
    [1e-7, 0.1, 'm', '1×10⁻⁷ to 0.1'],
    [1.1e-6, 1.31e-6, 'm²/s', '(1.10 to 1.31)×10⁻⁶'],
    [123456, 234567, 'Pa', '123500 to 234600'],
  ])('shows %d to %d in %s as %s', (low, high, unit, text) => {
    expect(formatRange(low, high, unit, 4)).toEqual({ text, unit })
  })

  it('shows three digits unless told otherwise, and shows ends that look the same once', () => {
    expect(formatRange(0.0929, 0.1124, 'mm').text).toBe('93 to 112')
    expect(formatRange(0.1121, 0.1124, 'mm').text).toBe('112')
  })
})

describe('formatFixed', () => {
  it.each([
    [3.2, 2, '3.20'],
    [0, 2, '0.00'],
    [-1.005, 1, '\u22121.0'],
    [999.994, 2, '999.99'],
    [0.005, 2, '0.01'],
    [1234.5678, 2, '1235'],
    [1e7, 2, '1×10⁷'],
    [-1.41e10, 3, '\u22121.41×10¹⁰'],
    [0.0012345, 2, '0.001234'],
    [1e-10, 2, '1×10⁻¹⁰'],
    [Number.NaN, 2, '—'],
  ])('%d with %i decimals is %s', (value, decimals, text) => {
    expect(formatFixed(value, decimals)).toBe(text)
  })

  it('is never longer than a column has room for', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        // Sign, four digits with a point, ×10, and a power of three digits with its sign.
        expect(formatFixed(value).length).toBeLessThanOrEqual(1 + 5 + 3 + 4)
      }),
    )
  })
})
