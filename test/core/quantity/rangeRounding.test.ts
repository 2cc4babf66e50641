import { describe, expect, it } from 'vitest'
import { formatRange } from '../../../core/quantity'

describe('formatRange', () => {
  it('shows the rounding left of a difference as nothing', () => {
    expect(formatRange(8.9e-16, 0.9, '', 2).text).toBe('0.0 to 0.9')
    expect(formatRange(-8.9e-16, 0.94, '', 2).text).toMatch(/^0(\.0+)? to 0\.94$/)
    expect(formatRange(1e-6, 0.9, '', 2).text).toMatch(/10/)
  })
})
