/**
 * Exact decimal and rational arithmetic, so that what is typed is stored as the nearest double and what is
 * stored is written with the fewest digits that read back as the same double.
 */

/** digits x 10^exponent. */
export interface Decimal {
  readonly digits: bigint
  readonly exponent: number
}

/** numerator / denominator, denominator > 0. */
export interface Rational {
  readonly numerator: bigint
  readonly denominator: bigint
}

/** Digits kept before the sticky digit: far more than the 17 a double can tell apart. */
const GUARD_DIGITS = 40

/** A decimal as a fraction. */
export function decimalToRational(decimal: Decimal): Rational {
  return decimal.exponent >= 0
    ? { numerator: decimal.digits * 10n ** BigInt(decimal.exponent), denominator: 1n }
    : { numerator: decimal.digits, denominator: 10n ** BigInt(-decimal.exponent) }
}

/** The shortest decimal that reads back as x; x finite. */
export function shortestDecimal(x: number): Decimal {
  const [mantissa = '0', exponent = '0'] = x.toExponential().split('e')
  const point = mantissa.indexOf('.')
  const fraction = point < 0 ? 0 : mantissa.length - point - 1
  return { digits: BigInt(mantissa.replace('.', '')), exponent: Number(exponent) - fraction }
}

/** The binary value of x, exactly; x finite. */
export function binaryToRational(x: number): Rational {
  let scaled = x
  let halvings = 0
  // Doubling is exact, and a double with a fraction is below 2^53, so this cannot overflow.
  while (!Number.isInteger(scaled)) {
    scaled *= 2
    halvings++
  }
  return { numerator: BigInt(scaled), denominator: 2n ** BigInt(halvings) }
}

export function add(a: Rational, b: Rational): Rational {
  return {
    numerator: a.numerator * b.denominator + b.numerator * a.denominator,
    denominator: a.denominator * b.denominator,
  }
}

export function multiply(a: Rational, b: Rational): Rational {
  return { numerator: a.numerator * b.numerator, denominator: a.denominator * b.denominator }
}

/** a / b; b > 0. */
export function divide(a: Rational, b: Rational): Rational {
  return { numerator: a.numerator * b.denominator, denominator: a.denominator * b.numerator }
}

export function negate(a: Rational): Rational {
  return { numerator: -a.numerator, denominator: a.denominator }
}

/** The double nearest to a fraction. */
export function rationalToNumber(value: Rational): number {
  if (value.numerator === 0n) return 0
  const size = magnitude(value.numerator)
  const shift = GUARD_DIGITS - orderOf(value)
  const [top, bottom] = scale(size, value.denominator, shift)
  const quotient = top / bottom
  // A sticky last digit keeps a tie apart from a value just above it, so the rounding is that of the exact value.
  const sticky = top % bottom === 0n ? '0' : '1'
  const text = `${quotient}${sticky}e${-shift - 1}`
  return value.numerator < 0n ? -Number(text) : Number(text)
}

/** A fraction rounded to a count of significant digits (halves away from zero). */
export function roundToDigits(value: Rational, count: number): Decimal {
  if (value.numerator === 0n) return { digits: 0n, exponent: 0 }
  const size = magnitude(value.numerator)
  let shift = count - orderOf(value)
  let rounded = roundedQuotient(size, value.denominator, shift)
  if (rounded > 10n ** BigInt(count)) {
    shift--
    rounded = roundedQuotient(size, value.denominator, shift)
  }
  return { digits: value.numerator < 0n ? -rounded : rounded, exponent: -shift }
}

function roundedQuotient(size: bigint, denominator: bigint, shift: number): bigint {
  const [top, bottom] = scale(size, denominator, shift)
  return (2n * top + bottom) / (2n * bottom)
}

function scale(top: bigint, bottom: bigint, shift: number): [bigint, bigint] {
  return shift >= 0 ? [top * 10n ** BigInt(shift), bottom] : [top, bottom * 10n ** BigInt(-shift)]
}

/** n with 10^(n-1) < |value| < 10^(n+1). */
function orderOf(value: Rational): number {
  return magnitude(value.numerator).toString().length - value.denominator.toString().length
}

function magnitude(value: bigint): bigint {
  return value < 0n ? -value : value
}
