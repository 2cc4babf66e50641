/**
 * What was typed into a field becomes a value or a sentence: pure, in the units shown.
 */
import { describeDimension, formatQuantity, parseQuantity, type Dimension } from '../../core/quantity'

/** What a field's value must keep to; limits in the base unit. */
export interface FieldLimits {
  readonly min?: number
  readonly max?: number
  readonly above?: number
  readonly optional?: boolean
  /** Only whole numbers are meant. */
  readonly whole?: boolean
}

export type FieldReading =
  { readonly ok: true; readonly value: number | null } | { readonly ok: false; readonly message: string }

/**
 * Read what was typed.
 *
 * @param name what the sentence calls the field
 * @param unit unit of a bare number, and of the sentence
 * @param exitDiameter what a number with D (`3.2 D`) is a multiple of, in the base unit; null where the field takes none
 */
export function readField(
  text: string,
  name: string,
  dimension: Dimension,
  unit: string,
  limits: FieldLimits,
  exitDiameter: number | null = null,
): FieldReading {
  if (limits.optional === true && text.trim() === '') return { ok: true, value: null }
  const parsed = readDiameters(text, name, dimension, exitDiameter) ?? parseQuantity(text, dimension, unit, { name })
  if (!parsed.ok) return { ok: false, message: parsed.message }
  const message =
    outOfRange(parsed.value, name, parsed.unit ?? unit, limits) ??
    (limits.whole === true && !Number.isInteger(parsed.value)
      ? `${name} must be a whole number. You entered ${text.trim()}.`
      : null)
  return message === null ? { ok: true, value: parsed.value } : { ok: false, message }
}

/** What a number with D stands for, or why it cannot stand here; null for anything else. */
function readDiameters(
  text: string,
  name: string,
  dimension: Dimension,
  exitDiameter: number | null,
): { readonly ok: true; readonly value: number; readonly unit: null } | { ok: false; readonly message: string } | null {
  const found = /^(.*\d.*?)\s*([Dd])$/su.exec(text.trim())
  const [, number = '', letter] = found ?? []
  if (exitDiameter === null) {
    if (letter !== 'D' || dimension !== 'length') return null
    return { ok: false, message: `${name} is not given in exit diameters; it needs ${describeDimension('length')}.` }
  }
  if (letter === undefined) return null
  if (letter === 'd') return { ok: false, message: `${name} in exit diameters has a capital D: ${number} D.` }
  const parsed = parseQuantity(number, 'number', '', { name: `${name} in exit diameters` })
  if (!parsed.ok) return parsed
  // What is left of the product in the last digit would show in the full value.
  return { ok: true, value: Number((parsed.value * exitDiameter).toPrecision(15)), unit: null }
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
