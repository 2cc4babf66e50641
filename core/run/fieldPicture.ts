/** One velocity field as a picture: its vorticity in few bytes, so that a whole run can be looked through. */
import { at } from '../base'
import { axialDensity, ringCut } from '../coaxial'
import { frameVorticity, type FieldFrame, type ReadingsCalibration } from '../tank'

export interface FieldPicture {
  /** After calibration [s]. */
  readonly time: number
  /** Places of the first and last column and row [m]; y has its sign. */
  readonly x: readonly [number, number]
  readonly y: readonly [number, number]
  readonly columns: number
  readonly rows: number
  /** Vorticity out of the plane over `peak`, in steps of 1/127, row by row along x from the first y. */
  readonly values: Int8Array
  /** Largest size of the vorticity [1/s]. */
  readonly peak: number
  /** Where the ring is cut from what follows it [m]; null where nothing does. */
  readonly cut: number | null
}

const STEPS = 127

/** Picture of a frame as it was read. @param diameter of the exit [m] @throws {DomainError} for a frame that fills no grid */
export function fieldPicture(frame: FieldFrame, diameter: number, calibration: ReadingsCalibration): FieldPicture {
  const { timeOffset, lengthOffset, lengthScale } = calibration
  const halves = frameVorticity(frame)
  const first = at(halves, 0)
  const columns = first.x.length
  let peak = 0
  for (const { vorticity } of halves) for (const value of vorticity) peak = Math.max(peak, Math.abs(value))
  // Rows from the lowest y upward. Vorticity is that of a ring, positive in both halves: out of the plane the lower one turns round.
  const lines = halves.flatMap(({ r, vorticity }, index) => {
    const upper = index === 0 && (halves.length > 1 || isUpper(frame))
    const sign = upper ? 1 : -1
    return Array.from(r, (radius, row) => ({ y: sign * radius, sign, vorticity, row }))
  })
  lines.sort((a, b) => a.y - b.y)
  // A node row on the axis is in both halves.
  const rows = lines.filter(
    ({ y }, index) => index === 0 || y - at(lines, index - 1).y > 1e-9 * Math.abs(at(lines, 0).y),
  )
  const values = new Int8Array(columns * rows.length)
  if (peak > 0)
    rows.forEach(({ sign, vorticity, row }, j) => {
      for (let i = 0; i < columns; i++)
        values[j * columns + i] = Math.round((STEPS * sign * at(vorticity, row * columns + i)) / peak)
    })
  const placed = (x: number): number => lengthScale * x + lengthOffset
  return {
    time: frame.time + timeOffset,
    x: [placed(at(first.x, 0)), placed(at(first.x, columns - 1))],
    y: [lengthScale * at(rows, 0).y, lengthScale * at(rows, rows.length - 1).y],
    columns,
    rows: rows.length,
    values,
    peak: peak / lengthScale,
    cut: cutOf(halves, diameter / lengthScale, -lengthOffset / lengthScale, placed),
  }
}

/** Where the only half lies. */
function isUpper({ r }: FieldFrame): boolean {
  let sum = 0
  for (let k = 0; k < r.length; k++) sum += at(r, k)
  return sum >= 0
}

/** Mean of the cuts of the halves, by the same sums as the analysis takes. */
function cutOf(
  halves: ReturnType<typeof frameVorticity>,
  diameter: number,
  exit: number,
  placed: (x: number) => number,
): number | null {
  const cuts = halves.flatMap(({ x, r, vorticity }) => {
    const width = x.length
    const along = new Float64Array(width)
    let peak = 0
    for (const value of vorticity) peak = Math.max(peak, value)
    for (let j = 0; j < r.length; j++)
      for (let i = 0; i < width; i++) {
        const value = at(vorticity, j * width + i)
        if (at(x, i) >= exit && value > LEAST_SHARE * peak) along[i] = at(along, i) + value
      }
    const cut = ringCut(
      axialDensity(
        x.map((value) => value / diameter),
        along,
        width,
      ),
    )
    return cut === null || !cut.trailingJet ? [] : [cut.x * diameter]
  })
  return cuts.length === 0 ? null : placed(cuts.reduce((sum, x) => sum + x, 0) / cuts.length)
}

/** Vorticity below this share of the highest is left out of the cut. */
const LEAST_SHARE = 0.05
