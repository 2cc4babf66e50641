/**
 * Where the leading ring ends and the trailing jet begins: a cut across the axis. Scaled by exit diameter.
 */

/** Standard deviation of the smoothing of circulation along the axis. */
const SMOOTHING = 0.15
/** Distance between the places at which it is looked at. */
const GRID = 0.02
/** The leading peak is the most downstream maximum above this share of the highest. */
const PEAK_SHARE = 0.3
/** A minimum counts where the density rises upstream of it by this share of the leading peak. */
const RISE_SHARE = 0.1
/** A ring that takes everything ends where the density has fallen to this share of its peak: behind it is the stopping vortex. */
const END_SHARE = 0.01

/** Circulation per length along the axis on a grid, downstream end first. */
export interface AxialDensity {
  /** Place of the first value; the next ones lie upstream, `step` apart. */
  readonly start: number
  readonly step: number
  readonly values: Float64Array
}

export interface RingCut {
  /** The ring is what lies beyond; -Infinity where it is all there is. */
  readonly x: number
  /** True: the cut lies between the ring and a trailing jet. False: no jet follows. */
  readonly trailingJet: boolean
  /** Density at the cut over that of the leading peak; null without a trailing jet. */
  readonly ratio: number | null
}

/** Circulation per length along the axis, smoothed by a Gaussian of 0.15 D. */
export function axialDensity(x: ArrayLike<number>, circulation: ArrayLike<number>, count: number): AxialDensity {
  let least = Infinity
  let most = -Infinity
  for (let i = 0; i < count; i++) {
    least = Math.min(least, x[i] ?? NaN)
    most = Math.max(most, x[i] ?? NaN)
  }
  if (!(most >= least)) return { start: 0, step: GRID, values: new Float64Array(0) }
  const smoothing = SMOOTHING
  const grid = GRID
  const reach = 4 * smoothing
  const start = most + reach
  const size = Math.ceil((most - least + 2 * reach) / grid) + 1
  const values = new Float64Array(size)
  const scale = 1 / (smoothing * Math.sqrt(2 * Math.PI))
  for (let i = 0; i < count; i++) {
    const from = start - (x[i] ?? NaN)
    const height = (circulation[i] ?? NaN) * scale
    const first = Math.max(0, Math.ceil((from - reach) / grid))
    const end = Math.min(size - 1, Math.floor((from + reach) / grid))
    for (let k = first; k <= end; k++) {
      const s = (k * grid - from) / smoothing
      values[k] = (values[k] ?? NaN) + height * Math.exp(-0.5 * s * s)
    }
  }
  return { start, step: grid, values }
}

/**
 * The cut: the leading peak is the most downstream maximum above 0.3 of the highest; from there upstream the first minimum that
 * is followed by a rise of 0.1 of the peak. Negative density, of a stopping vortex, counts as none: it is no valley of the jet.
 *
 * @returns null where nothing is positive: no ring
 */
export function ringCut(density: AxialDensity): RingCut | null {
  const { start, step } = density
  const values = density.values.map((value) => Math.max(value, 0))
  let highest = 0
  for (const value of values) highest = Math.max(highest, value)
  if (!(highest > 0)) return null
  const place = (k: number): number => start - k * step
  const peak = leadingPeak(values, highest)
  const height = values[peak] ?? NaN
  let lowest = peak
  let end: number | null = null
  for (let k = peak + 1; k < values.length; k++) {
    const value = values[k] ?? NaN
    const low = values[lowest] ?? NaN
    if (value < low) lowest = k
    else if (value - low > RISE_SHARE * height) return { x: place(lowest), trailingJet: true, ratio: low / height }
    if (end === null && value < END_SHARE * height) end = k
  }
  return { x: end === null ? -Infinity : place(end), trailingJet: false, ratio: null }
}

function leadingPeak(values: Float64Array, highest: number): number {
  for (let k = 0; k + 1 < values.length; k++) {
    const value = values[k] ?? NaN
    const before = k === 0 ? 0 : (values[k - 1] ?? NaN)
    if (value >= PEAK_SHARE * highest && value >= before && value > (values[k + 1] ?? NaN)) return k
  }
  return values.length - 1
}
