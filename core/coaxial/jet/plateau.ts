/**
 * When the ring has pinched off: the first plateau of its circulation. Scaled by exit diameter and peak speed.
 */

/** Density at the cut over that of the peak, below which the ring is apart. */
const APART_BELOW = 0.12
/** The circulation is flat where it stays within this, in U D, over this time, in D / U. */
const FLAT_WITHIN = 0.03
const FLAT_FOR = 1

/** One look at the ring; circulation and ratio are null while there is no cut. */
export interface PlateauRow {
  readonly time: number
  readonly circulation: number | null
  readonly ratio: number | null
}

/** Rows of the plateau, both included; it is seen at the last of them. */
export interface Plateau {
  readonly from: number
  readonly to: number
}

/**
 * The first time at which density at the cut is below 0.12 of the peak and the ring's circulation has been flat within 0.03 U D for
 * one formation time.
 *
 * It is the first on purpose: a ring may swallow another piece of the jet later, which is told apart.
 *
 * @param rows at rising times
 * @returns null where there is none
 */
export function firstPlateau(rows: readonly PlateauRow[]): Plateau | null {
  for (let to = 0; to < rows.length; to++) {
    const row = rows[to]
    if (row === undefined || row.ratio === null || !(row.ratio < APART_BELOW)) continue
    const from = flatFrom(rows, to)
    if (from !== null) return { from, to }
  }
  return null
}

/** First row of a flat stretch of one formation time that ends at row `to`, or null. */
function flatFrom(rows: readonly PlateauRow[], to: number): number | null {
  const end = rows[to]?.time ?? NaN
  let least = Infinity
  let most = -Infinity
  for (let i = to; i >= 0; i--) {
    const row = rows[i]
    if (row === undefined || row.circulation === null) return null
    least = Math.min(least, row.circulation)
    most = Math.max(most, row.circulation)
    if (most - least > FLAT_WITHIN) return null
    // Rounding of the sums of time steps.
    if (end - row.time >= FLAT_FOR - 1e-6) return i
  }
  return null
}
