/**
 * A quantity as typed, read into the base unit, or a sentence that says what is needed and what was found.
 */
import { DomainError } from '../base'
import { describeDimension, dimensionNoun, type Dimension } from './dimensions'
import type { Decimal } from './exact'
import { readNumeral, type Numeral } from './numeral'
import { plainText, unitKey } from './unitSyntax'
import { BASE_UNIT } from './unitTable'
import { decimalToBase, unitsOf, unitsSpelt, type UnitDefinition } from './units'

export type ParsedQuantity =
  | {
      readonly ok: true
      /** In the base unit. */
      readonly value: number
      /** Symbol of the unit that was typed, null for a bare number. */
      readonly unit: string | null
    }
  | {
      readonly ok: false
      /** A sentence for the person who typed. */
      readonly message: string
      /** The two values, in the base unit, of a number that can be read in two ways. */
      readonly readings?: readonly number[]
    }

export interface ParseOptions {
  /** What the sentence calls the field, 'Ring radius'; default 'This value'. */
  readonly name?: string
}

/** A number as read, with the unit it is in: what stepping needs besides the value. */
export type ReadQuantity =
  | { readonly ok: true; readonly decimal: Decimal; readonly unit: UnitDefinition; readonly typedUnit: string | null }
  | { readonly ok: false; readonly message: string; readonly readings?: readonly number[] }

/** Longer text is not a quantity; the cap keeps exact arithmetic short. */
const LONGEST_TEXT = 200
const SHOWN_TEXT = 40
const NEAREST_UNITS = 3

/**
 * Read a quantity such as `12`, `12 mm`, `1.2e-2 m`, `300 rpm`, `1,5 mm`.
 *
 * Case counts where it does in the SI; any kind of space and minus, superscript and both micro signs are read.
 * A comma with two readings (1,500) is refused with both. The stored value is the double nearest to what is written.
 *
 * @param dimension what the field measures
 * @param assumedUnit symbol of the unit a bare number is in; default the base unit
 * @returns never throws on text, whatever it holds
 * @throws {DomainError} if assumedUnit is not a unit of the dimension: the caller's mistake
 */
export function parseQuantity(
  text: string,
  dimension: Dimension,
  assumedUnit: string = BASE_UNIT[dimension],
  options: ParseOptions = {},
): ParsedQuantity {
  const read = readQuantity(text, dimension, assumedUnit, options)
  if (!read.ok) return read
  return { ok: true, value: decimalToBase(read.decimal, read.unit), unit: read.typedUnit }
}

/** As parseQuantity, but the number as written and its unit. */
export function readQuantity(
  text: string,
  dimension: Dimension,
  assumedUnit: string,
  options: ParseOptions,
): ReadQuantity {
  const assumed = unitsSpelt(plainText(assumedUnit)).find((unit) => unit.dimension === dimension)
  if (assumed === undefined)
    throw new DomainError(
      'assumedUnit',
      `assumedUnit must be a unit of ${dimension} (${unitsOf(dimension).join(', ')}), got "${assumedUnit}"`,
    )
  const name = options.name ?? 'This value'
  const needs = `${name} needs ${describeDimension(dimension)}`
  const shown = shorten(text)
  if (text.length > LONGEST_TEXT) return refusal(`${needs}; ${text.length} characters are too many to be one.`)
  const plain = plainText(text)
  if (plain === '') return refusal(`${needs}; the field is empty.`)
  if (/[\t\r\n\v\f\u2028\u2029]/u.test(plain)) return refusal(`${needs}; "${shown}" holds more than one entry.`)
  if (/^[+-]?(?:nan|inf(?:inity)?|∞)\b/iu.test(plain) || plain.includes('∞'))
    return refusal(`${needs}; "${shown}" is not a finite number.`)
  const numeral = readNumeral(plain.replace(/ +/gu, ' '))
  const problem = numeralProblem(numeral, needs, shown)
  if (problem !== null) return refusal(problem)
  if (numeral.kind !== 'number' && numeral.kind !== 'ambiguous') return refusal(`${needs}.`)

  const typed = numeral.rest.trim()
  const unit = typed === '' ? assumed : unitsSpelt(typed).find((candidate) => candidate.dimension === dimension)
  if (unit === undefined) return refusal(unitProblem(typed, dimension, name, needs, shown))
  const symbol = typed === '' ? assumed.symbol : typed
  if (numeral.kind === 'ambiguous') {
    const choices = numeral.readings.map((reading) => `${decimalText(reading)}${symbol === '' ? '' : ` ${symbol}`}`)
    return {
      ok: false,
      message: `${name} is unclear: "${shown}" can be read as ${choices.join(' or as ')}; type the one you mean.`,
      readings: numeral.readings.map((reading) => decimalToBase(reading, unit)),
    }
  }
  const value = decimalToBase(numeral.value, unit)
  if (!Number.isFinite(value)) return refusal(`${needs}; "${shown}" is too large to be held.`)
  if (value === 0 && numeral.value.digits !== 0n && unit.offset === undefined)
    return refusal(`${needs}; "${shown}" is too small to be told from zero.`)
  return { ok: true, decimal: numeral.value, unit, typedUnit: typed === '' ? null : unit.symbol }
}

function refusal(message: string): { readonly ok: false; readonly message: string } {
  return { ok: false, message }
}

function numeralProblem(numeral: Numeral, needs: string, shown: string): string | null {
  switch (numeral.kind) {
    case 'none':
      return `${needs}; "${shown}" does not begin with a number.`
    case 'marks':
      return `${needs}; the points, commas and spaces in "${shown}" do not form one number.`
    case 'tooLarge':
      return `${needs}; the power of ten in "${shown}" is beyond what can be held.`
    default:
      return null
  }
}

function unitProblem(typed: string, dimension: Dimension, name: string, needs: string, shown: string): string {
  const others = unitsSpelt(typed).map((unit) => dimensionNoun(unit.dimension))
  if (others.length > 0) return `${needs}; ${shown} is ${others.join(' or ')}.`
  const accepted = unitsOf(dimension).filter((symbol) => symbol !== '')
  if (accepted.length === 0) return `${needs}; "${shorten(typed)}" is not a unit of one.`
  const nearest = [...accepted].sort((a, b) => spellingDistance(typed, a) - spellingDistance(typed, b))
  const list = nearest.slice(0, NEAREST_UNITS)
  const last = list.pop() ?? ''
  const named = list.length === 0 ? last : `${list.join(', ')} or ${last}`
  return `${name} does not accept the unit "${shorten(typed)}"; the nearest accepted are ${named}.`
}

/** Edits between two spellings, a change of case counting a tenth. */
function spellingDistance(typed: string, symbol: string): number {
  const a = (unitKey(typed) ?? typed).slice(0, SHOWN_TEXT)
  const b = unitKey(plainText(symbol)) ?? symbol
  let row = Array.from({ length: b.length + 1 }, (_, i) => i)
  for (let i = 0; i < a.length; i++) {
    const next = [i + 1]
    for (let j = 0; j < b.length; j++) {
      const change = a[i] === b[j] ? 0 : a[i]?.toLowerCase() === b[j]?.toLowerCase() ? 0.1 : 1
      next.push(Math.min((row[j] ?? 0) + change, (row[j + 1] ?? 0) + 1, (next[j] ?? 0) + 1))
    }
    row = next
  }
  return row[b.length] ?? 0
}

function shorten(text: string): string {
  const line = text.trim().replace(/\s+/gu, ' ')
  const letters = Array.from(line)
  return letters.length > SHOWN_TEXT ? `${letters.slice(0, SHOWN_TEXT).join('')}…` : line
}

function decimalText(value: Decimal): string {
  const digits = String(value.digits)
    .replace('-', '')
    .padStart(1 - value.exponent, '0')
  const sign = value.digits < 0n ? '-' : ''
  if (value.exponent >= 0) return sign + digits + '0'.repeat(value.exponent)
  const text = `${digits.slice(0, value.exponent)}.${digits.slice(value.exponent)}`
  return sign + text.replace(/\.?0+$/u, '')
}
