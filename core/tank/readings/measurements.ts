/** Rows of readings taken apart into single measured numbers, each with its uncertainty. */
import { at } from '../../base'
import { median } from './robust'
import type { ReadingRow } from './types'

export type MeasuredQuantity = 'x' | 'radius' | 'circulation'

export const MEASURED: readonly MeasuredQuantity[] = ['x', 'radius', 'circulation']

export interface Measurement {
  /** Index in the rows. */
  readonly row: number
  readonly quantity: MeasuredQuantity
  readonly time: number
  readonly value: number
  /** Standard uncertainty; null: not told in this row nor in another of the quantity. */
  readonly sigma: number | null
}

const SIGMA = { x: 'sigmaX', radius: 'sigmaRadius', circulation: 'sigmaCirculation' } as const

/**
 * Every measured number of rows that are used. A row that tells no uncertainty takes the median of those its quantity has elsewhere.
 *
 * @returns the numbers, and for which quantities an uncertainty was taken from other rows
 */
export function measurementsOf(
  rows: readonly ReadingRow[],
  used: (row: ReadingRow) => boolean = () => true,
): { readonly list: readonly Measurement[]; readonly borrowed: readonly MeasuredQuantity[] } {
  const borrowed: MeasuredQuantity[] = []
  const list = MEASURED.flatMap((quantity) => {
    const told = rows.flatMap((row) => {
      const sigma = row[SIGMA[quantity]]
      return row[quantity] !== null && used(row) && sigma !== null && sigma > 0 ? [sigma] : []
    })
    const usual = told.length === 0 ? null : median(told)
    let lent = false
    const found = rows.flatMap((row, index): Measurement[] => {
      const value = row[quantity]
      if (value === null || !used(row)) return []
      const own = row[SIGMA[quantity]]
      const sigma = own !== null && own > 0 ? own : usual
      if (sigma !== null && sigma !== own) lent = true
      return [{ row: index, quantity, time: row.time, value, sigma }]
    })
    if (lent) borrowed.push(quantity)
    return found
  })
  return { list, borrowed }
}

export function countOf(list: readonly Measurement[], quantity: MeasuredQuantity): number {
  return list.reduce((count, one) => count + (one.quantity === quantity ? 1 : 0), 0)
}

/** From the first to the last time [s]; 0 for none. */
export function spanOf(list: readonly Measurement[], value: (one: Measurement) => number): number {
  if (list.length === 0) return 0
  let least = value(at(list, 0))
  let most = least
  for (const one of list) {
    least = Math.min(least, value(one))
    most = Math.max(most, value(one))
  }
  return most - least
}
