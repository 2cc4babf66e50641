/**
 * Element of a Float64Array inside its bounds.
 *
 * Unlike `at` of core/base it sees one kind of list only. Outside the bounds it gives NaN, which shows in every sum. Innermost loops write
 * `list[k] ?? NaN` out: a call into another module costs more there than the load.
 */
export function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
