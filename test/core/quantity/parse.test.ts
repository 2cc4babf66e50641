import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../core/base'
import { DIMENSIONS, parseQuantity, siUnit, type Dimension } from '../../../core/quantity'

/** The value in the base unit; fails the test with the sentence where there is none. */
function read(text: string, dimension: Dimension, assumedUnit?: string): number {
  const parsed = parseQuantity(text, dimension, assumedUnit)
  if (!parsed.ok) throw new Error(parsed.message)
  return parsed.value
}

function refusal(text: string, dimension: Dimension, name = 'Ring radius'): string {
  const parsed = parseQuantity(text, dimension, undefined, { name })
  if (parsed.ok) throw new Error(`"${text}" was read as ${parsed.value}`)
  return parsed.message
}

describe('what is accepted', () => {
  // Exact: each value is the double nearest to what is written, so toBe and not a tolerance.
  it.each<[string, Dimension, number]>([
    ['12', 'length', 12],
    ['12 mm', 'length', 0.012],
    ['12mm', 'length', 0.012],
    ['9 mm', 'length', 0.009],
    ['1.2e-2 m', 'length', 0.012],
    ['1.2E-2m', 'length', 0.012],
    ['0.5 in', 'length', 0.0127],
    ['0.5"', 'length', 0.0127],
    ['2 ft', 'length', 0.6096],
    ['.5 m', 'length', 0.5],
    ['5. m', 'length', 5],
    ['+5 m', 'length', 5],
    ['300 rpm', 'frequency', 5],
    ['300 1/min', 'frequency', 5],
    ['20 m/s^3', 'jerk', 20],
    ['5 mm/s³', 'jerk', 0.005],
    ['4 px/mm', 'imageScale', 4000],
    ['4 /mm', 'imageScale', 4000],
    ['25 1/m', 'imageScale', 25],
    ['2 s^-1', 'frequency', 2],
    ['2 s⁻¹', 'frequency', 2],
    ['2.5 mL/s', 'flowRate', 2.5e-6],
    ['2.5 ml/s', 'flowRate', 2.5e-6],
    ['3 L/min', 'flowRate', 5e-5],
    ['5 uL', 'volume', 5e-9],
    ['5 \u00B5L', 'volume', 5e-9],
    ['5 \u03BCL', 'volume', 5e-9],
    ['5 l', 'volume', 5e-3],
    ['5 cm^3', 'volume', 5e-6],
    ['5 cm³', 'volume', 5e-6],
    ['5 cm3', 'volume', 5e-6],
    ['2 m·s⁻¹', 'speed', 2],
    ['2 m s-1', 'speed', 2],
    ['2 m*s^-1', 'speed', 2],
    ['36 km/h', 'speed', 10],
    ['1 kn', 'speed', 1852 / 3600],
    ['9.81 m/s²', 'acceleration', 9.81],
    ['9.81 m/s/s', 'acceleration', 9.81],
    ['0.01 m2/s', 'circulation', 0.01],
    ['120 cm^2/s', 'circulation', 0.012],
    ['1.1 cSt', 'kinematicViscosity', 1.1e-6],
    ['3 mN', 'force', 0.003],
    ['3 MN', 'force', 3e6],
    ['1 lbf', 'force', 4.4482216152605],
    ['2 mW', 'power', 0.002],
    ['2 MW', 'power', 2e6],
    ['2 kW', 'power', 2000],
    ['1 Wh', 'energy', 3600],
    ['5 J', 'energy', 5],
    ['3 N s', 'impulse', 3],
    ['3 N·s', 'impulse', 3],
    ['3 Ns', 'impulse', 3],
    ['3 mN·s', 'impulse', 0.003],
    ['3 mN s', 'impulse', 0.003],
    ['101.325 kPa', 'pressure', 101325],
    ['1 bar', 'pressure', 1e5],
    ['760 mmHg', 'pressure', 101325.0144354],
    ['15', 'temperature', 15],
    ['15 °C', 'temperature', 15],
    ['15 degC', 'temperature', 15],
    ['15 deg C', 'temperature', 15],
    ['15℃', 'temperature', 15],
    ['288.15 K', 'temperature', 15],
    ['59 °F', 'temperature', 15],
    ['35', 'salinity', 35],
    ['35 psu', 'salinity', 35],
    ['35.16504 g/kg', 'salinity', 35],
    ['80 %', 'number', 0.8],
    ['180°', 'angle', Math.PI],
    ['180 deg', 'angle', Math.PI],
    ['1 g/cm³', 'density', 1000],
    ['1.139×10⁻⁶ m²/s', 'kinematicViscosity', 1.139e-6],
    ['1.139 x 10^-6', 'kinematicViscosity', 1.139e-6],
    ['\u22123 mm', 'length', -0.003],
    ['\u20133 mm', 'length', -0.003],
    ['12\u00A0mm', 'length', 0.012],
    ['12\u2009mm', 'length', 0.012],
    ['  12\u202Fmm\u200B ', 'length', 0.012],
    ['１２ ㎜', 'length', 0.012],
  ])('reads "%s" as %s %d', (text, dimension, value) => {
    expect(read(text, dimension)).toBe(value)
  })

  it('reads a bare number in the assumed unit, and says which unit was typed', () => {
    expect(read('12', 'length', 'mm')).toBe(0.012)
    expect(read('12 m', 'length', 'mm')).toBe(12)
    expect(parseQuantity('12', 'length', 'mm')).toEqual({ ok: true, value: 0.012, unit: null })
    expect(parseQuantity('12 ul', 'volume')).toEqual({ ok: true, value: 1.2e-8, unit: 'µL' })
  })

  it('refuses an assumed unit of another dimension as a mistake of the caller', () => {
    expect(() => parseQuantity('12', 'length', 's')).toThrow(DomainError)
    expect(() => parseQuantity('12', 'length', 's')).toThrow(/assumedUnit must be a unit of length/)
  })
})

describe('commas, points and spaces', () => {
  it.each<[string, number]>([
    ['1,5', 1.5],
    ['1,50', 1.5],
    ['1,5000', 1.5],
    ['0,500', 0.5],
    [',5', 0.5],
    ['1234,567', 1234.567],
    ['-1,5', -1.5],
    ['1,5e-3', 0.0015],
    ['1.500', 1.5],
    ['1,234.5', 1234.5],
    ['12,345.6', 12345.6],
    ['1.234,5', 1234.5],
    ['1,500,000', 1.5e6],
    ['1.500.000', 1.5e6],
    ['1.234.567,8', 1234567.8],
    ['12 000', 12000],
    ['12\u2009000,5', 12000.5],
    ['12\u00A0000.5', 12000.5],
    ['1 234,567', 1234.567],
  ])('reads %s as %d', (text, value) => {
    expect(read(text, 'number')).toBe(value)
  })

  it('refuses a comma that may part thousands, with both readings', () => {
    const parsed = parseQuantity('1,500 mm', 'length', 'm', { name: 'Stroke' })
    expect(parsed).toEqual({
      ok: false,
      message: 'Stroke is unclear: "1,500 mm" can be read as 1.5 mm or as 1500 mm; type the one you mean.',
      readings: [0.0015, 1.5],
    })
    expect(parseQuantity('-12,345', 'length', 'mm')).toMatchObject({ readings: [-0.012345, -12.345] })
  })

  it.each([
    '1,23.4',
    '1,5.2',
    '0,123.4',
    '1.2.3',
    '1,2,3',
    '1,50,000',
    '1.5,0,0',
    '12.34,5',
    '..',
    '1..2',
    '3.141 592',
  ])('refuses %s: the marks do not form one number', (text) => {
    expect(parseQuantity(text, 'number').ok).toBe(false)
  })

  it.each(['1 2', '12 00', '1 2345', '1\t200', '3 4 mm', '5-6 mm', '2¼ in', '½ in', '10² mm', "1'000"])(
    'never joins or guesses: "%s" is refused',
    (text) => {
      expect(parseQuantity(text, 'length').ok).toBe(false)
    },
  )
})

describe('sentences', () => {
  it('names the dimension that was given in place of the one that is needed', () => {
    expect(refusal('12 mL', 'length')).toBe('Ring radius needs a length such as 12 mm; 12 mL is a volume.')
    expect(refusal('3 MN', 'power', 'Power limit')).toBe('Power limit needs a power such as 2 W; 3 MN is a force.')
    expect(refusal('3 m²/s', 'length')).toBe(
      'Ring radius needs a length such as 12 mm; 3 m²/s is a kinematic viscosity or a circulation.',
    )
    expect(refusal('4 mm', 'number', 'Pulses')).toBe('Pulses needs a plain number such as 4; 4 mm is a length.')
  })

  it('names the nearest units for one that is unknown', () => {
    expect(refusal('12 mmm', 'length')).toBe(
      'Ring radius does not accept the unit "mmm"; the nearest accepted are mm, cm or m.',
    )
    expect(refusal('12 KPA', 'pressure', 'Pressure')).toMatch(/^Pressure does not accept the unit "KPA"; .* kPa/)
    expect(refusal('4 D', 'length', 'Stroke')).toMatch(/^Stroke does not accept the unit "D"/)
    expect(refusal('12 kg/m·s', 'density', 'Density')).toMatch(/does not accept the unit "kg\/m·s"/)
  })

  it('holds to the case of the SI', () => {
    expect(parseQuantity('3 mn', 'force').ok).toBe(false)
    expect(parseQuantity('3 MM', 'length').ok).toBe(false)
    expect(parseQuantity('3 S', 'time').ok).toBe(false)
  })

  it.each<[string, RegExp]>([
    ['', /needs a length such as 12 mm; the field is empty\.$/],
    ['   ', /the field is empty/],
    ['abc', /"abc" does not begin with a number/],
    ['mm', /does not begin with a number/],
    ['NaN', /not a finite number/],
    ['Infinity', /not a finite number/],
    ['-inf', /not a finite number/],
    ['∞', /not a finite number/],
    ['1e999', /beyond what can be held/],
    ['1e309', /too large/],
    ['1e999999999999', /beyond what can be held/],
    ['1e-400', /too small to be told from zero/],
    ['1\n2', /more than one entry/],
    ['1'.repeat(500), /500 characters are too many/],
  ])('refuses %j with a sentence', (text, sentence) => {
    const message = refusal(text, 'length')
    expect(message).toMatch(sentence)
    expect(message).toMatch(/^Ring radius .*\.$/)
  })

  it('never throws, and reads only finite numbers, whatever is typed', () => {
    const typed = fc.oneof(
      fc.string({ unit: 'binary', maxLength: 30 }),
      fc
        .array(fc.constantFrom(...'0123456789.,eE+-−×^ /·²⁻µmMLsNkg°%\u00A0\u2009\t'), { maxLength: 20 })
        .map((letters) => letters.join('')),
    )
    fc.assert(
      fc.property(typed, fc.constantFrom(...DIMENSIONS), (text, dimension) => {
        const parsed = parseQuantity(text, dimension)
        if (parsed.ok) expect(Number.isFinite(parsed.value)).toBe(true)
        else expect(parsed.message).toMatch(/\.$/u)
      }),
      { numRuns: 3000 },
    )
  })

  it('reads every number that the language prints, exactly', () => {
    fc.assert(
      fc.property(
        fc.double({ noNaN: true, noDefaultInfinity: true }),
        fc.constantFrom(...DIMENSIONS),
        (x, dimension) => {
          expect(read(String(x), dimension) === x, `${x} ${siUnit(dimension)}`).toBe(true)
        },
      ),
      { numRuns: 500 },
    )
  })
})
