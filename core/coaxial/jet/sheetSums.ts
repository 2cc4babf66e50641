/**
 * Circulation, impulse and energy of the shed sheet and of the ring cut from it. Scaled by density, exit diameter and peak speed.
 */
import type { Kernel } from '../../kernel'
import type { Sheet } from './sheet'

export interface PartSums {
  readonly circulation: number
  /** pi sum Gamma r^2 */
  readonly impulse: number
  /** pi sum Gamma psi, psi of the part's own filaments. */
  readonly energy: number
  /** Centroid sum Gamma r^2 x / sum Gamma r^2. */
  readonly x: number
}

export interface SheetSums {
  readonly total: PartSums
  /** Of the filaments beyond the cut. */
  readonly ring: PartSums
}

/**
 * Sums of everything and of what lies beyond a place.
 *
 * @param deltaSquared smoothing of a filament of the sheet
 * @param cutX -Infinity: everything
 */
export function sheetSums(
  sheet: Sheet,
  deltaSquared: (index: number) => number,
  kernel: Kernel,
  cutX: number,
): SheetSums {
  const { count } = sheet
  const order: number[] = []
  for (let i = 0; i < count; i++) if ((sheet.x[i] ?? NaN) > cutX) order.push(i)
  const ringCount = order.length
  for (let i = 0; i < count; i++) if (!((sheet.x[i] ?? NaN) > cutX)) order.push(i)
  const x = new Float64Array(count)
  const r = new Float64Array(count)
  const circulation = new Float64Array(count)
  const smoothing = new Float64Array(count)
  for (let k = 0; k < count; k++) {
    const i = order[k] ?? 0
    x[k] = sheet.x[i] ?? NaN
    r[k] = sheet.r[i] ?? NaN
    circulation[k] = sheet.circulation[i] ?? NaN
    smoothing[k] = deltaSquared(i)
  }
  const psi = new Float64Array(count)

  /** Sum of Gamma psi over targets first..end under the sources given. */
  const work = (sources: readonly [number, number], targets: readonly [number, number]): number => {
    const part = (list: Float64Array): Float64Array => list.subarray(sources[0], sources[1])
    kernel.coaxialStream(
      {
        targetCount: targets[1],
        firstTarget: targets[0],
        targetX: x,
        targetR: r,
        targetDeltaSquared: smoothing,
        rings: {
          count: sources[1] - sources[0],
          x: part(x),
          r: part(r),
          circulation: part(circulation),
          deltaSquared: part(smoothing),
        },
        skipSelf: false,
      },
      psi,
    )
    let sum = 0
    for (let i = targets[0]; i < targets[1]; i++) sum += (circulation[i] ?? NaN) * (psi[i] ?? NaN)
    return sum
  }
  const plain = (from: number, to: number): Omit<PartSums, 'energy'> => {
    let sum = 0
    let square = 0
    let moment = 0
    for (let i = from; i < to; i++) {
      const gamma = circulation[i] ?? NaN
      const area = gamma * (r[i] ?? NaN) ** 2
      sum += gamma
      square += area
      moment += area * (x[i] ?? NaN)
    }
    return { circulation: sum, impulse: Math.PI * square, x: moment / square }
  }

  const own = work([0, ringCount], [0, ringCount])
  const across = ringCount < count ? work([0, ringCount], [ringCount, count]) : 0
  const rest = ringCount < count ? work([ringCount, count], [ringCount, count]) : 0
  return {
    total: { ...plain(0, count), energy: Math.PI * (own + 2 * across + rest) },
    ring: { ...plain(0, ringCount), energy: Math.PI * own },
  }
}
