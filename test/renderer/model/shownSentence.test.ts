import { describe, expect, it } from 'vitest'
import { shownUnits } from '../../../core/plan'
import { inShownUnits } from '../../../renderer/model/shownSentence'

const UNITS = shownUnits({ length: 'mm', circulation: 'cm²/s', wakeTime: 's', ringSpeed: 'mm/s' }, {})

describe('a sentence of the core in the units shown', () => {
  it.each([
    [
      'wake.rings.0.radius must be above 0 m, got -0.02 m',
      'wake.rings.0.radius must be above 0\u00A0mm, got \u221220\u00A0mm',
    ],
    [
      'at most 0.9 of the tube’s radius (0.013499999999999998 m), got 0.02 m',
      'at most 0.9 of the tube’s radius (13.5\u00A0mm), got 20\u00A0mm',
    ],
    [
      'rings 1 and 2, got both at 0, 0.01, 1e-3 m with radius 0.02 m',
      'rings 1 and 2, got both at 0, 10, 1\u00A0mm with radius 20\u00A0mm',
    ],
    ['must be finite, got 0.01 m2/s at 0.25 m/s', 'must be finite, got 100\u00A0cm²/s at 250\u00A0mm/s'],
    ['from low to high, got 0.04\u00A0m before 0.008\u00A0m', 'from low to high, got 40\u00A0mm before 8\u00A0mm'],
    ['held to 1.23456789 s', 'held to 1.23457\u00A0s'],
    ['at most 20 of 40 rings, 3 modes', 'at most 20 of 40 rings, 3 modes'],
  ])('%s', (sentence, shown) => {
    expect(inShownUnits(sentence, UNITS)).toBe(shown)
  })

  it('has as many digits as are asked for', () => {
    expect(inShownUnits('Ended at t = 6.910123456 s: over.', UNITS, 4)).toBe('Ended at t = 6.91\u00A0s: over.')
  })
})
