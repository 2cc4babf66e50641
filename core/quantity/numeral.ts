/**
 * Reading a written number: decimal point or comma, groups of thousands, powers of ten.
 *
 * The rule, in the order it is applied:
 * - groups of three set apart by spaces (12 000,5 or 12 000.5): the only other mark is the decimal one;
 * - a point and a comma: the last mark is the decimal one, the others must part whole groups of three;
 * - several marks of one kind (1,500,000): whole groups of three;
 * - one point: decimal point;
 * - one comma: decimal comma, unless it could part a group of thousands (1,500): two readings, the caller refuses.
 *   0,500 and 1234,567 cannot be groups, so they are decimals.
 * Anything else is not read.
 */
import type { Decimal } from './exact'

export type Numeral =
  | { readonly kind: 'number'; readonly value: Decimal; readonly rest: string }
  | { readonly kind: 'ambiguous'; readonly readings: readonly [Decimal, Decimal]; readonly rest: string }
  | { readonly kind: 'marks'; readonly written: string }
  | { readonly kind: 'tooLarge' }
  | { readonly kind: 'none' }

/** A power of ten beyond this is outside the range of a double whatever the digits. */
const LARGEST_POWER = 700

const WRITTEN =
  /^([+-]?) ?([\d.,]*\d[\d.,]*(?: \d{3}(?!\d)(?:[.,]\d*)?)*)(?:[eE]([+-]?\d+)| ?[×x*·⋅] ?10\^([+-]?\d+))? ?(.*)$/u

/** Read the number at the beginning of plain text; `rest` is what follows it. */
export function readNumeral(text: string): Numeral {
  const match = WRITTEN.exec(text)
  if (match === null) return { kind: 'none' }
  const [, sign = '', body = '', plainPower, timesPower, rest = ''] = match
  const power = Number(plainPower ?? timesPower ?? '0')
  const readings = readBody(body)
  if (readings.length === 0) return { kind: 'marks', written: body }
  if (Math.abs(power) > LARGEST_POWER) return { kind: 'tooLarge' }
  const [value, other] = readings.map((plain) => decimalOf(sign, plain, power))
  if (value === undefined) return { kind: 'none' }
  return other === undefined ? { kind: 'number', value, rest } : { kind: 'ambiguous', readings: [value, other], rest }
}

/** The readings of digits and marks, as text with at most one decimal point: none, one or two. */
function readBody(body: string): readonly string[] {
  const points = count(body, '.')
  const commas = count(body, ',')
  if (body.includes(' ')) {
    if (points + commas > 1 || !/^\d{1,3}(?: \d{3})+(?:[.,]\d*)?$/u.test(body)) return []
    return [body.replaceAll(' ', '').replace(',', '.')]
  }
  if (points > 0 && commas > 0) {
    if (commas === 1 && body.lastIndexOf(',') > body.lastIndexOf('.')) return grouped(body, '.', ',')
    return points === 1 && body.indexOf('.') > body.lastIndexOf(',') ? grouped(body, ',', '.') : []
  }
  if (commas > 1) return grouped(body, ',', '.')
  if (points > 1) return grouped(body, '.', ',')
  if (commas === 0) return [body]
  const decimal = body.replace(',', '.')
  return /^[1-9]\d{0,2},\d{3}$/u.test(body) ? [decimal, body.replace(',', '')] : [decimal]
}

/** Groups of three with one mark, the fraction after the other; empty where the groups are not whole. */
function grouped(body: string, group: '.' | ',', decimal: '.' | ','): readonly string[] {
  const [whole = '', fraction] = body.split(decimal)
  const groups = whole.split(group)
  const [first = '', ...others] = groups
  const consistent = /^[1-9]\d{0,2}$/u.test(first) && others.every((digits) => /^\d{3}$/u.test(digits))
  if (!consistent) return []
  return [fraction === undefined ? groups.join('') : `${groups.join('')}.${fraction}`]
}

function decimalOf(sign: string, plain: string, power: number): Decimal {
  const [whole = '', fraction = ''] = plain.split('.')
  const digits = BigInt(whole + fraction)
  return { digits: sign === '-' ? -digits : digits, exponent: power - fraction.length }
}

function count(text: string, letter: string): number {
  return text.split(letter).length - 1
}
