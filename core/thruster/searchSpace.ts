/**
 * Variables of a search, and the unit cube they are searched in.
 *
 * A variable that takes single values (whole numbers, a list of stock) holds an equal slice of 0..1 for each of them.
 */
import { at } from '../base'

/** What one variable may be. */
export type Variable =
  /** Any number from low to high; a log scale gives equal room to equal proportions (low > 0). */
  | { readonly kind: 'real'; readonly low: number; readonly high: number; readonly scale: 'linear' | 'log' }
  /** Whole numbers from low to high, both included. */
  | { readonly kind: 'whole'; readonly low: number; readonly high: number }
  /** One of the values, rising. */
  | { readonly kind: 'list'; readonly values: readonly number[] }

/** Number of single values a variable takes; 0 for a real one, 1 where there is nothing to choose. */
export function choices(variable: Variable): number {
  if (variable.kind === 'whole') return Math.floor(variable.high) - Math.ceil(variable.low) + 1
  if (variable.kind === 'list') return variable.values.length
  return variable.high > variable.low ? 0 : 1
}

/** Value of a variable at a place in 0..1. */
export function valueAt(variable: Variable, place: number): number {
  if (variable.kind === 'real') {
    const { low, high, scale } = variable
    // Both ends exactly: a limit that is met at the end of a range must not be missed by rounding.
    if (place <= 0) return low
    if (place >= 1) return high
    return scale === 'log' ? low * (high / low) ** place : low + (high - low) * place
  }
  const index = choiceAt(variable, place)
  return variable.kind === 'whole' ? Math.ceil(variable.low) + index : at(variable.values, index)
}

/** Which of its single values a variable takes at a place in 0..1. */
export function choiceAt(variable: Variable, place: number): number {
  const count = choices(variable)
  return Math.min(count - 1, Math.max(0, Math.floor(place * count)))
}

/** A place in 0..1 that gives a value; for single values the middle of the slice of the nearest. */
export function placeOf(variable: Variable, value: number): number {
  if (variable.kind === 'real') {
    const { low, high, scale } = variable
    if (!(high > low)) return 0.5
    const place = scale === 'log' ? Math.log(value / low) / Math.log(high / low) : (value - low) / (high - low)
    return Math.min(1, Math.max(0, place))
  }
  const count = choices(variable)
  if (variable.kind === 'whole')
    return (Math.min(count - 1, Math.max(0, Math.round(value - Math.ceil(variable.low)))) + 0.5) / count
  let nearest = 0
  variable.values.forEach((candidate, i) => {
    if (Math.abs(candidate - value) < Math.abs(at(variable.values, nearest) - value)) nearest = i
  })
  return (nearest + 0.5) / count
}

/** Values at a point of the cube, written into `values`. */
export function writeValues(variables: readonly Variable[], point: ArrayLike<number>, values: Float64Array): void {
  for (let i = 0; i < variables.length; i++) values[i] = valueAt(at(variables, i), at(point, i))
}

/** Middle of the slice for variables with single values, so that equal designs are equal points. */
export function tidyPoint(variables: readonly Variable[], point: Float64Array): Float64Array {
  return point.map((place, i) => {
    const variable = at(variables, i)
    const count = choices(variable)
    return count === 0 ? place : (choiceAt(variable, place) + 0.5) / count
  })
}
