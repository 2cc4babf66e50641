import { describe, expect, it } from 'vitest'
import { outOfRange, readField } from '../../../renderer/model/fieldCheck'

const DIAMETER = { min: 1e-4, max: 10 }

describe('readField', () => {
  it('reads a number in the shown unit and one that brings its own', () => {
    expect(readField('30', 'Exit diameter', 'length', 'mm', DIAMETER)).toEqual({ ok: true, value: 0.03 })
    expect(readField('0.5 in', 'Exit diameter', 'length', 'mm', DIAMETER)).toEqual({ ok: true, value: 0.0127 })
  })

  it('refuses a value outside its limits with the limit and the value in one unit', () => {
    expect(readField('40 m', 'Exit diameter', 'length', 'mm', DIAMETER)).toEqual({
      ok: false,
      message: 'Exit diameter must be at most 10\u00A0m. You entered 40\u00A0m.',
    })
    expect(readField('0', 'Stroke', 'length', 'mm', { above: 0 })).toEqual({
      ok: false,
      message: 'Stroke must be above 0\u00A0mm. You entered 0\u00A0mm.',
    })
  })

  it('refuses another dimension by its name', () => {
    const reading = readField('12 mL', 'Exit diameter', 'length', 'mm', DIAMETER)
    expect(reading).toEqual({
      ok: false,
      message: 'Exit diameter needs a length such as 12 mm; 12 mL is a volume.',
    })
  })

  it('takes an empty text only where nothing may be given', () => {
    expect(readField(' ', 'Density', 'density', 'kg/m³', { optional: true })).toEqual({ ok: true, value: null })
    expect(readField(' ', 'Stroke', 'length', 'mm', {}).ok).toBe(false)
  })
})

describe('a length in exit diameters', () => {
  const stroke = (text: string, exitDiameter: number | null = 0.03) =>
    readField(text, 'Stroke', 'length', 'mm', { above: 0, max: 1000 }, exitDiameter)

  it.each([
    ['3.2 D', 0.096],
    ['3.2D', 0.096],
    [' 4 D ', 0.12],
    ['1e1 D', 0.3],
    ['96 mm', 0.096],
    ['96', 0.096],
  ])('reads %j', (text, value) => {
    expect(stroke(text)).toEqual({ ok: true, value })
  })

  it.each([
    ['0 D', 'Stroke must be above 0\u00A0mm. You entered 0\u00A0mm.'],
    ['-1 D', 'Stroke must be above 0\u00A0mm. You entered \u221230\u00A0mm.'],
    ['3.2 d', 'Stroke in exit diameters has a capital D: 3.2 D.'],
    ['3.2 mm D', 'Stroke in exit diameters needs a plain number such as 4; 3.2 mm is a length.'],
    ['1,500 D', /^Stroke in exit diameters is unclear/],
    ['D', /^Stroke needs a length such as 12 mm; "D" does not begin with a number\.$/],
    ['3.2 D mm', /^Stroke does not accept the unit "D mm"/],
  ])('refuses %j in a sentence', (text, message) => {
    const reading = stroke(text)
    expect(reading.ok ? '' : reading.message).toMatch(message)
  })

  it('is told from other lengths, which are not given so', () => {
    expect(stroke('3.2 D', null)).toEqual({
      ok: false,
      message: 'Stroke is not given in exit diameters; it needs a length such as 12 mm.',
    })
  })
})

describe('outOfRange', () => {
  it('is silent at the limits themselves', () => {
    expect(outOfRange(10, 'Exit diameter', 'm', DIAMETER)).toBeNull()
    expect(outOfRange(1e-4, 'Exit diameter', 'm', DIAMETER)).toBeNull()
  })
})
