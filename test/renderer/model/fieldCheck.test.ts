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

describe('outOfRange', () => {
  it('is silent at the limits themselves', () => {
    expect(outOfRange(10, 'Exit diameter', 'm', DIAMETER)).toBeNull()
    expect(outOfRange(1e-4, 'Exit diameter', 'm', DIAMETER)).toBeNull()
  })
})
