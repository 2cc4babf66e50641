import { describe, expect, it } from 'vitest'
import { DomainError, requireRange } from '../../../core/base'

describe('requireRange', () => {
  it('lets a value inside through, ends included where the range includes them', () => {
    expect(() => requireRange('depth', 0, { min: 0, max: 5, unit: 'm' })).not.toThrow()
    expect(() => requireRange('depth', 5, { min: 0, max: 5, unit: 'm' })).not.toThrow()
  })

  it.each([
    [NaN, {}, /depth must be a finite number, got NaN m/],
    [Infinity, {}, /finite/],
    [0, { above: 0 }, /depth must be above 0 m, got 0 m/],
    [-1, { min: 0 }, /depth must be at least 0 m, got -1 m/],
    [7, { max: 5 }, /depth must be at most 5 m, got 7 m/],
  ])('refuses %d with a sentence', (value, range, sentence) => {
    expect(() => requireRange('depth', value, { ...range, unit: 'm' })).toThrow(sentence)
  })

  it('names the field on the error', () => {
    const error = new DomainError('water.depth', 'water.depth must be at least 0 m, got -1 m')
    expect(error.field).toBe('water.depth')
    expect(error.name).toBe('DomainError')
  })
})
