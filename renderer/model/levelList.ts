/**
 * Levels of a field of the matrix as they are typed: a list, or ends and a count; a unit at the end stands for all before it. Pure.
 */
import { equallySpaced } from '../../core/base'
import { formatQuantity, parseQuantity, type Dimension } from '../../core/quantity'
import { outOfRange, type FieldLimits } from './fieldCheck'

export type LevelReading =
  { readonly ok: true; readonly values: readonly number[] } | { readonly ok: false; readonly message: string }

const MOST_LEVELS = 100

/**
 * Read `25, 37.5, 50 mm`, `25 mm; 37,5 mm` or `10 to 40 mm in 4`.
 *
 * @param name what the sentences call the field
 * @param unit of bare numbers
 */
export function readLevels(
  text: string,
  name: string,
  dimension: Dimension,
  unit: string,
  limits: FieldLimits,
): LevelReading {
  const steps = /^(.+?)\s+to\s+(.+?)\s+in\s+(\d+)$/iu.exec(text.trim())
  const pieces = steps === null ? piecesOf(text) : [steps[1] ?? '', steps[2] ?? '']
  if (pieces.length === 0) return { ok: false, message: `${name} needs at least one level.` }
  // The unit of the last stands for bare numbers before it.
  const last = parseQuantity(pieces.at(-1) ?? '', dimension, unit, { name })
  const shared = last.ok ? (last.unit ?? unit) : unit
  const values: number[] = []
  for (const piece of pieces) {
    const parsed = parseQuantity(piece, dimension, shared, { name })
    if (!parsed.ok) return { ok: false, message: unparted(piece, name) ?? parsed.message }
    const message = outOfRange(parsed.value, name, parsed.unit ?? shared, limits)
    if (message !== null) return { ok: false, message }
    values.push(parsed.value)
  }
  if (steps !== null) {
    const count = Number(steps[3])
    if (count < 2 || count > MOST_LEVELS)
      return { ok: false, message: `${name} must be given in 2 to ${MOST_LEVELS} levels. You entered ${count}.` }
    return { ok: true, values: equallySpaced(values[0] ?? 0, values[1] ?? 0, count).map(withoutNoise) }
  }
  if (new Set(values).size < values.length) return { ok: false, message: `${name} has a level twice.` }
  return { ok: true, values }
}

/** Numbers with only spaces between them, which read as one that makes no sense; null for anything else. */
function unparted(piece: string, name: string): string | null {
  return /[\d.]\s+[-+]?[\d.]/u.test(piece)
    ? `${name}: put commas or semicolons between the values. You entered ${piece}.`
    : null
}

/** `25, 37.5, 50 mm`. */
export function levelsText(values: readonly number[], unit: string): string {
  const shown = values.map((value) => formatQuantity(value, unit, 6).split('\u00a0')[0] ?? '')
  return unit === '' ? shown.join(', ') : `${shown.join(', ')} ${unit}`
}

/** A comma with a space after it parts levels; one without is a decimal comma, which the reader of numbers judges. */
function piecesOf(text: string): string[] {
  return text
    .split(/;|,\s+|\n/u)
    .map((piece) => piece.trim())
    .filter((piece) => piece !== '')
}

function withoutNoise(value: number): number {
  return Number(value.toPrecision(12))
}
