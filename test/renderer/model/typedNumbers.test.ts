import { describe, expect, it } from 'vitest'
import { readField } from '../../../renderer/model/fieldCheck'
import { readLevels } from '../../../renderer/model/levelList'

describe('typed numbers that are refused', () => {
  it('keep what was typed where a whole number is meant', () => {
    expect(readField('2048.5', 'Columns', 'number', '', { min: 1, whole: true })).toEqual({
      ok: false,
      message: 'Columns must be a whole number. You entered 2048.5.',
    })
    expect(readField('2048', 'Columns', 'number', '', { min: 1, whole: true })).toEqual({ ok: true, value: 2048 })
  })

  it('say what to put between levels that have only spaces between them', () => {
    const reading = readLevels('50 62.5 75', 'Stroke', 'length', 'mm', {})
    expect(reading.ok ? '' : reading.message).toContain('put commas or semicolons between the values')
    expect(readLevels('50, 62.5, 75', 'Stroke', 'length', 'mm', {})).toMatchObject({ ok: true })
  })
})
