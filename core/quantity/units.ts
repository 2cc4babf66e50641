/**
 * Units: what is offered, what is accepted, and the conversion to and from the base unit.
 */
import { at, DomainError } from '../base'
import { type Dimension } from './dimensions'
import {
  add,
  binaryToRational,
  decimalToRational,
  divide,
  multiply,
  negate,
  rationalToNumber,
  shortestDecimal,
  type Decimal,
  type Rational,
} from './exact'
import { plainText, unitKey } from './unitSyntax'
import { BASE_UNIT, OFFSETS, UNIT_TABLE } from './unitTable'

export interface UnitDefinition {
  /** As shown: `m/s`, `cm²/s`, `mN·s`; empty for a pure number. */
  readonly symbol: string
  readonly dimension: Dimension
  /** Factor to the base unit: base = (value + offset) toBase. */
  readonly toBase: number
  /** The factor as an exact fraction. */
  readonly numerator: number
  readonly denominator: number
  /** Added before the factor; absent where both scales share their zero. */
  readonly offset?: number
}

/** Every dimension, in the order of the table. */
export const DIMENSIONS: readonly Dimension[] = [
  'length',
  'area',
  'volume',
  'time',
  'speed',
  'acceleration',
  'jerk',
  'temperature',
  'pressure',
  'force',
  'power',
  'energy',
  'mass',
  'density',
  'kinematicViscosity',
  'circulation',
  'frequency',
  'imageScale',
  'flowRate',
  'impulse',
  'angle',
  'salinity',
  'number',
]

const bySymbol = new Map<string, UnitDefinition>()
const byKey = new Map<string, UnitDefinition[]>()
for (const dimension of DIMENSIONS) {
  for (const [symbol, numerator, denominator, ...spellings] of UNIT_TABLE[dimension]) {
    const offset = OFFSETS.get(symbol)
    const factor = { symbol, dimension, toBase: numerator / denominator, numerator, denominator }
    const unit: UnitDefinition = offset === undefined ? factor : { ...factor, offset }
    // The same symbol in two dimensions (m²/s) has the same factor, so the first one serves both.
    if (!bySymbol.has(symbol)) bySymbol.set(symbol, unit)
    for (const key of new Set([symbol, ...spellings].map((spelling) => unitKey(plainText(spelling)) ?? spelling)))
      byKey.set(key, [...(byKey.get(key) ?? []), unit])
  }
}

/** Symbols offered for showing a dimension, the usual one first. */
export function unitsOf(dimension: Dimension): readonly string[] {
  return UNIT_TABLE[dimension].map(([symbol]) => symbol)
}

/** The unit a dimension is shown in unless the user chooses another. */
export function defaultUnit(dimension: Dimension): string {
  return at(UNIT_TABLE[dimension], 0)[0]
}

/** The unit a dimension is stored in: SI, degrees Celsius, practical salinity. */
export function siUnit(dimension: Dimension): string {
  return BASE_UNIT[dimension]
}

/** The units (one a dimension) that a spelling in plain text stands for; none where it is unknown. */
export function unitsSpelt(text: string): readonly UnitDefinition[] {
  const key = unitKey(text)
  return key === null ? [] : (byKey.get(key) ?? [])
}

/** @throws {DomainError} if the symbol is not in the table. */
export function unitOf(symbol: string): UnitDefinition {
  const unit = bySymbol.get(symbol) ?? unitsSpelt(plainText(symbol))[0]
  if (unit === undefined) throw new DomainError('unit', `unit must be a symbol of the unit table, got "${symbol}"`)
  return unit
}

/** A decimal number of a unit, in the base unit, rounded once. */
export function decimalToBase(value: Decimal, unit: UnitDefinition): number {
  return rationalToNumber(multiply(add(decimalToRational(value), offsetOf(unit)), factorOf(unit)))
}

/** A base value in a unit, exactly. */
export function exactInUnit(value: number, unit: UnitDefinition): Rational {
  return add(divide(binaryToRational(value), factorOf(unit)), negate(offsetOf(unit)))
}

/**
 * A number of a unit, in the base unit.
 *
 * @throws {DomainError} if the unit is unknown.
 */
export function toBase(value: number, unit: string): number {
  const definition = unitOf(unit)
  if (definition.offset !== undefined && Number.isFinite(value))
    return decimalToBase(shortestDecimal(value), definition)
  return (value * definition.numerator) / definition.denominator
}

/**
 * A base value in a unit.
 *
 * @throws {DomainError} if the unit is unknown.
 */
export function fromBase(value: number, unit: string): number {
  const definition = unitOf(unit)
  if (definition.offset !== undefined && Number.isFinite(value)) {
    const exact = divide(decimalToRational(shortestDecimal(value)), factorOf(definition))
    return rationalToNumber(add(exact, negate(offsetOf(definition))))
  }
  return (value * definition.denominator) / definition.numerator
}

function factorOf(unit: UnitDefinition): Rational {
  return divide(binaryToRational(unit.numerator), binaryToRational(unit.denominator))
}

function offsetOf(unit: UnitDefinition): Rational {
  return decimalToRational(shortestDecimal(unit.offset ?? 0))
}
