/**
 * What was typed into a field becomes a value or a sentence: pure, in the units shown.
 */
import { formatQuantity, parseQuantity, type Dimension } from '../../core/quantity'

/** What a field's value must keep to; limits in the base unit. */
export interface FieldLimits {
  readonly min?: number
  readonly max?: number
  readonly above?: number
  readonly optional?: boolean
}

export type FieldReading =
  { readonly ok: true; readonly value: number | null } | { readonly ok: false; readonly message: string }

/**
 * Read what was typed.
 *
 * @param name what the sentence calls the field
 * @param unit unit of a bare number, and of the sentence
 */
export function readField(
  text: string,
  name: string,
  dimension: Dimension,
  unit: string,
  limits: FieldLimits,
): FieldReading {
  if (limits.optional === true && text.trim() === '') return { ok: true, value: null }
  const parsed = parseQuantity(text, dimension, unit, { name })
  if (!parsed.ok) return { ok: false, message: parsed.message }
  const message = outOfRange(parsed.value, name, parsed.unit ?? unit, limits)
  return message === null ? { ok: true, value: parsed.value } : { ok: false, message }
}

/** The sentence for a value outside its limits, null inside. */
export function outOfRange(value: number, name: string, unit: string, limits: FieldLimits): string | null {
  const shown = (base: number): string => formatQuantity(base, unit, 6)
  const entered = `You entered ${shown(value)}.`
  if (limits.above !== undefined && value <= limits.above)
    return `${name} must be above ${shown(limits.above)}. ${entered}`
  if (limits.min !== undefined && value < limits.min) return `${name} must be at least ${shown(limits.min)}. ${entered}`
  if (limits.max !== undefined && value > limits.max) return `${name} must be at most ${shown(limits.max)}. ${entered}`
  return null
}
