/**
 * Single values of an unknown document: numbers, texts with a unit, choices. Every refusal goes on one list, so that the
 * user sees all of them at once.
 */
import type { Problem } from '../base'
import { describeDimension, formatFull, parseQuantity, siUnit, type Dimension } from '../quantity'
import { CHOICES, fieldDefinition, type ChoicePath, type FieldPath } from './fields'
import type { FieldDefinition } from './fieldTypes'
import type { JsonObject } from './json'

export type Problems = Problem[]

export function isObject(value: unknown): value is JsonObject {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

/** A value as it is named in a refusal: short, never the whole document. */
export function describeValue(value: unknown): string {
  if (value === undefined) return 'nothing'
  const text = typeof value === 'string' ? `"${value}"` : JSON.stringify(value)
  return text.length > 60 ? `${text.slice(0, 57)}…` : text
}

export function refuse(problems: Problems, field: string, value: unknown, limit: string, message?: string): void {
  const shown = typeof value === 'string' ? value : describeValue(value)
  problems.push({
    field,
    value: shown,
    limit,
    message: message ?? `${field} must be ${limit}, got ${describeValue(value)}.`,
  })
}

/** The limits of a field in words with its SI unit: "between 0 and 40 °C". */
export function limitInWords(definition: FieldDefinition): string {
  const unit = siUnit(definition.dimension)
  const show = (value: number): string => formatFull(value, unit)
  const { min, max, above } = definition
  if (definition.whole === true) return wholeInWords(definition)
  if (above !== undefined)
    return max === undefined ? `above ${show(above)}` : `above ${show(above)} and at most ${show(max)}`
  if (min !== undefined && max !== undefined) return `between ${show(min)} and ${show(max)}`
  if (min !== undefined) return `at least ${show(min)}`
  return max === undefined ? 'a finite number' : `at most ${show(max)}`
}

function wholeInWords({ min, max }: FieldDefinition): string {
  if (min === undefined) return max === undefined ? 'a whole number' : `a whole number up to ${max}`
  return max === undefined ? `a whole number from ${min}` : `a whole number between ${min} and ${max}`
}

/** Whether a finite number keeps to the limits of its field. */
export function insideLimits(definition: FieldDefinition, value: number): boolean {
  return (
    Number.isFinite(value) &&
    (definition.whole !== true || Number.isInteger(value)) &&
    (definition.above === undefined || value > definition.above) &&
    (definition.min === undefined || value >= definition.min) &&
    (definition.max === undefined || value <= definition.max)
  )
}

/** Check one number against its field and say what is wrong; null when nothing is. */
export function checkField(path: FieldPath, value: number | null): Problem | null {
  return checkAgainst(fieldDefinition(path), path, value)
}

/** As checkField, for a number named `path` with the definition of another, such as an item of a list. */
export function checkAgainst(definition: FieldDefinition, path: string, value: number | null): Problem | null {
  if (value === null) {
    if (definition.optional === true) return null
    return {
      field: path,
      value: 'nothing',
      limit: limitInWords(definition),
      message: `${path} must be given: ${definition.help}`,
    }
  }
  if (insideLimits(definition, value)) return null
  const unit = siUnit(definition.dimension)
  const shown = Number.isFinite(value) ? formatFull(Number(value.toPrecision(12)), unit) : 'a value that is not finite'
  const limit = limitInWords(definition)
  return { field: path, value: shown, limit, message: `${path} must be ${limit}, got ${shown}.` }
}

/**
 * A number of a section: a JSON number in SI, or a text with its unit.
 *
 * @param fallback used where the key is absent; undefined: the value is needed
 */
export function decodeNumber(
  section: JsonObject,
  path: FieldPath,
  fallback: number | undefined,
  problems: Problems,
): number {
  const value = decodeOptionalNumber(section, path, problems)
  if (value !== undefined && value !== null) return value
  if (fallback !== undefined && value === undefined) return fallback
  const failed = problems.some((problem) => problem.field === path)
  if (!failed) refuse(problems, path, value, limitInWords(fieldDefinition(path)), checkField(path, null)?.message)
  return fallback ?? Number.NaN
}

/** As decodeNumber where null means "not given". */
export function decodeOptionalNumber(
  section: JsonObject,
  path: FieldPath,
  problems: Problems,
): number | null | undefined {
  const raw = section[keyOf(path)]
  if (raw === undefined || raw === null) return raw
  return decodeValue(raw, fieldDefinition(path), path, problems)
}

/** The key of a value in the object that holds it: what stands after the last dot of its path. */
function keyOf(path: string): string {
  return path.slice(path.lastIndexOf('.') + 1)
}

/** One number kept to the limits of a definition; null where it is no number at all. A value past a limit is refused and returned. */
export function decodeValue(
  raw: unknown,
  definition: FieldDefinition,
  path: string,
  problems: Problems,
): number | null {
  const value = readQuantity(raw, definition, path, problems)
  if (value === null) return null
  const problem = checkAgainst(definition, path, value)
  if (problem !== null) problems.push(problem)
  return value
}

function readQuantity(raw: unknown, definition: FieldDefinition, path: string, problems: Problems): number | null {
  if (typeof raw === 'number') return raw
  if (typeof raw !== 'string') {
    refuse(problems, path, raw, 'a number in SI units or a text such as "30 mm"')
    return null
  }
  const minutes = definition.minutes === true
  const dimension = minutes ? 'time' : definition.dimension
  const parsed = parseQuantity(raw, dimension, minutes ? 'min' : siUnit(dimension), { name: definition.label })
  if (parsed.ok) return minutes ? parsed.value / 60 : parsed.value
  refuse(problems, path, raw, limitInWords(definition), `${path}: ${parsed.message}`)
  return null
}

/** One quantity outside the table of fields, as a number in SI or a text with its unit; null where it is refused. */
export function decodeQuantity(raw: unknown, field: string, dimension: Dimension, problems: Problems): number | null {
  if (typeof raw === 'number' && Number.isFinite(raw)) return raw
  if (typeof raw === 'string') {
    const parsed = parseQuantity(raw, dimension, siUnit(dimension), { name: field })
    if (parsed.ok) return parsed.value
    // The sentence begins with the field, which is its name here.
    refuse(problems, field, raw, 'a number in SI units or a text with its unit', parsed.message)
    return null
  }
  const limit = `${describeDimension(dimension)}, as a number in SI units or a text with its unit`
  const missing = raw === undefined || raw === null
  refuse(problems, field, raw, limit, missing ? `${field} must be given: ${limit}.` : undefined)
  return null
}

/** True or false. */
export function decodeFlag(section: JsonObject, path: string, fallback: boolean, problems: Problems): boolean {
  const raw = section[keyOf(path)]
  if (typeof raw === 'boolean') return raw
  if (raw !== undefined) refuse(problems, path, raw, 'true or false')
  return fallback
}

/** One of the words a choice allows. */
export function decodeChoice<P extends ChoicePath>(
  section: JsonObject,
  path: P,
  fallback: keyof (typeof CHOICES)[P] | undefined,
  problems: Problems,
): keyof (typeof CHOICES)[P] {
  const words = Object.keys(CHOICES[path])
  const raw = section[keyOf(path)]
  if (typeof raw === 'string' && words.includes(raw)) return raw as keyof (typeof CHOICES)[P]
  if (raw !== undefined || fallback === undefined) refuse(problems, path, raw, `one of ${words.join(', ')}`)
  return fallback ?? (words[0] as keyof (typeof CHOICES)[P])
}

/** A text, '' where absent. */
export function decodeText(document: JsonObject, key: string, problems: Problems): string {
  const raw = document[key]
  if (raw === undefined || raw === null) return ''
  if (typeof raw === 'string') return raw
  refuse(problems, key, raw, 'a text')
  return ''
}
