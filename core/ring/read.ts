/**
 * Element of a Float64Array inside its bounds, for inner loops.
 *
 * `at` of core/base serves every kind of list, which costs it the compiler's special code for one kind; this one sees one kind only and
 * becomes a plain load. Outside the bounds it gives NaN, which shows in every sum.
 */
export function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
