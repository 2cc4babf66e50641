/**
 * Numbers and quantities as shown: a few significant digits on the page, all of them where they are copied.
 */
import { rationalToNumber, roundToDigits, decimalToRational, type Decimal } from './exact'
import { decimalToBase, exactInUnit, fromBase, unitOf } from './units'

const NO_BREAK_SPACE = '\u00A0'
const MINUS = '\u2212'
/** Stands where there is no number. */
const NOTHING = '\u2014'

/** Decimal orders shown without a power of ten: 0.0001 to below a million. */
const LOWEST_PLAIN_ORDER = -4
const HIGHEST_PLAIN_ORDER = 5

/** Counts of digits tried for the full value. The long ones are for a tiny difference from a shifted zero. */
const FULL_DIGIT_COUNTS = [...Array.from({ length: 20 }, (_, i) => i + 1), 30, 50, 100, 200, 400, 800, 1200]

/**
 * A number to some significant digits, trailing zeros left out: `30`, `0.0127`, `1.139×10⁻⁶`.
 *
 * @param digits significant digits, 1 to 17
 * @returns a dash where the number is not finite
 */
export function formatNumber(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return NOTHING
  if (value === 0) return '0'
  const [mantissa = '', exponent = '0'] = Math.abs(value)
    .toExponential(heldDigits(digits) - 1)
    .split('e')
  const order = Number(exponent)
  const sign = value < 0 ? MINUS : ''
  if (order >= LOWEST_PLAIN_ORDER && order <= HIGHEST_PLAIN_ORDER)
    return sign + placePoint(mantissa.replace('.', ''), order)
  return sign + trimZeros(mantissa) + powerOfTen(order)
}

/** From here on a pure number has significant digits instead of decimals. */
const LARGEST_FIXED = 1000
const FAR_DIGITS = 4

/**
 * A pure number with some decimals while it has an everyday size, else with its leading digits: `3.20`, `1234`, `1.2×10⁷`, `0.0012`.
 *
 * @param decimals digits after the point, 0 to 10
 */
export function formatFixed(value: number, decimals = 2): string {
  const size = Math.abs(value)
  const everyday = size === 0 || (size < LARGEST_FIXED && size >= 0.5 * 10 ** -decimals)
  return everyday ? value.toFixed(decimals).replace('-', MINUS) : formatNumber(value, FAR_DIGITS)
}

/**
 * A base value with its unit: `30 mm` with a no-break space, `30°` with none.
 *
 * @param value in the base unit
 * @throws {DomainError} if the unit is unknown
 */
export function formatQuantity(value: number, unit: string, digits = 4): string {
  return withUnit(formatNumber(fromBase(value, unit), digits), unit)
}

/**
 * A base value with the fewest digits that read back as the same double in this unit; for tooltips and copies.
 *
 * @throws {DomainError} if the unit is unknown
 */
export function formatFull(value: number, unit: string): string {
  if (!Number.isFinite(value)) return NOTHING
  return withUnit(plainDecimal(fullDecimal(value, unit)), unit)
}

function fullDecimal(value: number, unit: string): Decimal {
  const definition = unitOf(unit)
  const exact = exactInUnit(value, definition)
  let decimal = roundToDigits(exact, 17)
  for (const count of FULL_DIGIT_COUNTS) {
    decimal = roundToDigits(exact, count)
    if (decimalToBase(decimal, definition) === value) break
  }
  return decimal
}

/** An end of a range below this share of the other is rounding. */
const ROUNDING_SHARE = 1e-12

/**
 * Two ends of a range with one number of decimals: `93 to 112`.
 *
 * The larger end has `digits` significant digits; a smaller end that would show as 0 keeps its own. Ends that look
 * the same are shown once. Very large and very small ranges share a power of ten: `(1.10 to 1.31)×10⁻⁶`.
 *
 * @param low in the base unit, in either order with high
 */
export function formatRange(low: number, high: number, unit: string, digits = 3): { text: string; unit: string } {
  const both = [fromBase(low, unit), fromBase(high, unit)].sort((a, b) => a - b)
  const largest = Math.max(...both.map(Math.abs))
  // What is left of a difference that should have been nothing is shown as nothing.
  const [from = low, to = high] = both.map((end) => (Math.abs(end) < ROUNDING_SHARE * largest ? 0 : end))
  if (!Number.isFinite(largest) || largest === 0) return { text: joined(formatNumber(from), formatNumber(to)), unit }
  const order = Number(largest.toExponential(heldDigits(digits) - 1).split('e')[1])
  const plain = order >= LOWEST_PLAIN_ORDER && order <= HIGHEST_PLAIN_ORDER
  const shift = plain ? 0 : order
  const decimals = heldDigits(digits) - 1 - (order - shift)
  const ends = [from, to].map((end) => fixed(end, shift, decimals))
  if ([from, to].some((end, i) => end !== 0 && Number(ends[i]) === 0))
    return { text: joined(formatNumber(from, digits), formatNumber(to, digits)), unit }
  const spare = Math.min(...ends.map(trailingZeros))
  const text = joined(...ends.map((end) => signed(dropDecimals(end, spare))))
  if (plain) return { text, unit }
  return { text: (text.includes(' ') ? `(${text})` : text) + powerOfTen(shift), unit }
}

/** value / 10^shift with a number of decimals; a negative number rounds to tens, hundreds and so on. */
function fixed(value: number, shift: number, decimals: number): string {
  const scaled = rationalToNumber(decimalToRational({ digits: 1n, exponent: -shift })) * value
  if (decimals >= 0) return scaled.toFixed(decimals)
  const unit = 10 ** -decimals
  return (Math.round(scaled / unit) * unit).toFixed(0)
}

function joined(...ends: readonly string[]): string {
  return ends[0] === ends[1] ? (ends[0] ?? '') : ends.join(' to ')
}

function signed(text: string): string {
  if (/^-?0(?:\.0*)?$/u.test(text)) return text.replace('-', '')
  return text.replace('-', MINUS)
}

function trailingZeros(text: string): number {
  return text.includes('.') ? (/0*$/u.exec(text)?.[0].length ?? 0) : 0
}

function dropDecimals(text: string, count: number): string {
  return count === 0 ? text : text.slice(0, -count).replace(/\.$/u, '')
}

function withUnit(number: string, unit: string): string {
  if (unit === '' || number === NOTHING) return number
  return unit === '°' ? number + unit : number + NO_BREAK_SPACE + unit
}

function heldDigits(digits: number): number {
  return Math.min(17, Math.max(1, Math.round(digits)))
}

/** Digits d1d2d3… of order n as a plain number, trailing zeros of the fraction left out. */
function placePoint(digits: string, order: number): string {
  if (order < 0) return trimZeros(`0.${'0'.repeat(-order - 1)}${digits}`)
  const whole = digits.padEnd(order + 1, '0').slice(0, order + 1)
  return trimZeros(`${whole}.${digits.slice(order + 1)}`)
}

function trimZeros(text: string): string {
  return text.includes('.') ? text.replace(/\.?0*$/u, '') : text
}

function powerOfTen(order: number): string {
  const digits = Array.from(String(Math.abs(order)), (digit) => '⁰¹²³⁴⁵⁶⁷⁸⁹'.charAt(Number(digit)))
  return `×10${order < 0 ? '⁻' : ''}${digits.join('')}`
}

/** Plain ASCII, as other programs read it: `0.03`, `-1.5`, `1.139e-7`. */
function plainDecimal(decimal: Decimal): string {
  const sign = decimal.digits < 0n ? '-' : ''
  const digits = String(decimal.digits).replace('-', '').replace(/0+$/u, '')
  if (digits === '') return '0'
  const order = String(decimal.digits).replace('-', '').length - 1 + decimal.exponent
  if (order >= -6 && order < 16) return sign + placePoint(digits, order)
  return `${sign}${trimZeros(`${digits.charAt(0)}.${digits.slice(1)}`)}e${order}`
}
