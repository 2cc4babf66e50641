/**
 * Element of an array at an index that the caller knows to be inside.
 *
 * @throws {RangeError} if it is not: an internal mistake, never a user's.
 */
export function at<T>(list: ArrayLike<T>, index: number): T {
  const value = list[index]
  if (value === undefined) throw new RangeError(`index ${index} is outside 0..${list.length - 1}`)
  return value
}

/** Last element of a non-empty array. @throws {RangeError} if it is empty. */
export function last<T>(list: ArrayLike<T>): T {
  return at(list, list.length - 1)
}

/** count values from a to b, both ends exact; count >= 2. */
export function equallySpaced(a: number, b: number, count: number): number[] {
  return Array.from({ length: count }, (_, i) => (i === count - 1 ? b : a + ((b - a) * i) / (count - 1)))
}

/** Index i of a rising list with list[i] <= x < list[i + 1], held inside 0..length - 2. */
export function bracket(list: ArrayLike<number>, x: number): number {
  let low = 0
  let high = list.length - 1
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (at(list, middle) <= x) low = middle
    else high = middle
  }
  return low
}
