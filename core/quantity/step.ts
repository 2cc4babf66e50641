/**
 * Stepping a quantity with the arrow keys.
 */
import { readQuantity } from './parse'
import { decimalToBase } from './units'
import type { Dimension } from './dimensions'

/**
 * The value one step up or down from what is typed: a step is one unit of the last digit written.
 *
 * @param text what is in the field
 * @param unit unit a bare number is in
 * @param direction 1 up, -1 down
 * @param scale 1, or 10 (Shift), or 0.1 (Alt)
 * @returns in the base unit, or null where the text cannot be read
 * @example stepQuantity('12.5 mm', 'length', 'mm', 1, 1) // 0.0126
 */
export function stepQuantity(
  text: string,
  dimension: Dimension,
  unit: string,
  direction: 1 | -1,
  scale: 0.1 | 1 | 10,
): number | null {
  const read = readQuantity(text, dimension, unit, {})
  if (!read.ok) return null
  // One digit more is carried so that a tenth of a step is whole.
  const tenths = BigInt(Math.round(scale * 10)) * BigInt(direction)
  const next = { digits: read.decimal.digits * 10n + tenths, exponent: read.decimal.exponent - 1 }
  const value = decimalToBase(next, read.unit)
  return Number.isFinite(value) ? value : null
}
