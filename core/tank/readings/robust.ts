/** Middle and spread of numbers that a few wild ones do not move. */
import { at } from '../../base'

/** Standard deviation over median absolute deviation, for a normal distribution. */
const NORMAL_OVER_DEVIATION = 1.4826

/** NaN for an empty list. */
export function median(values: ArrayLike<number>): number {
  const sorted = Float64Array.from(values).sort()
  const { length } = sorted
  if (length === 0) return Number.NaN
  const middle = length >> 1
  return length % 2 === 1 ? at(sorted, middle) : (at(sorted, middle - 1) + at(sorted, middle)) / 2
}

/** Standard deviation from the median absolute deviation about a centre, the median where none is given. */
export function robustDeviation(values: ArrayLike<number>, centre = median(values)): number {
  return NORMAL_OVER_DEVIATION * median(Float64Array.from(values, (value) => Math.abs(value - centre)))
}

export function mean(values: ArrayLike<number>): number {
  let sum = 0
  for (let i = 0; i < values.length; i++) sum += at(values, i)
  return sum / values.length
}

/** Sample standard deviation; null for fewer than two values. */
export function standardDeviation(values: ArrayLike<number>): number | null {
  if (values.length < 2) return null
  const centre = mean(values)
  let sum = 0
  for (let i = 0; i < values.length; i++) sum += (at(values, i) - centre) ** 2
  return Math.sqrt(sum / (values.length - 1))
}
