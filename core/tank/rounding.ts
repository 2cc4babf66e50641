/**
 * The least rounding of a piston's speed that a drive can follow.
 *
 * The way of the piston is read at the controller's step h. Its speed is averaged over the last n1 steps, joined by straight lines, and
 * averaged over the last n2 steps: a box twice, the usual S-curve. The speed is then smooth, its acceleration a chain of straight lines
 * with corners on the steps, its jerk constant within each step; both are exact there, so limits are checked without gaps. A box keeps the
 * integral, so the stroke is kept exactly; it makes the motion n1 + n2 steps longer and half as many later.
 */

/** Ways at steps 0, 1, 2 ...; 0 before the first and constant after the last [m]. */
export interface SampledWay {
  readonly step: number
  readonly way: Float64Array
}

export interface RoundingLimits {
  /** [m/s2]; null: none. */
  readonly acceleration: number | null
  /** [m/s3]; null: none. */
  readonly jerk: number | null
}

/** Steps of the two boxes. */
export interface Boxes {
  readonly first: number
  readonly second: number
}

export interface FoundBoxes extends Boxes {
  /** False: even the longest rounding breaks a limit, and these boxes come nearest. */
  readonly kept: boolean
}

/**
 * Up to this many steps of rounding every total and split is tried in turn. Beyond it both are halved in on, as the jerk falls with a more
 * even split and both limits ease with a longer total: true of whole ramps, and to a step or so of any programme.
 */
const EXHAUSTIVE = 256
/** Splits looked at where no rounding is long enough. */
const CANDIDATES = 33
/** Limits may be broken by rounding of the sums only. */
const SLACK = 1 + 1e-9

/** Smallest n1 + n2 within the limits, and of equals the one with the longer first box. @param longest most steps n1 + n2, at least 2 */
export function smallestRounding(sampled: SampledWay, limits: RoundingLimits, longest: number): FoundBoxes {
  const within = (total: number): Boxes | null => splitWithin(sampled, limits, total)
  const exhausted = Math.min(longest, EXHAUSTIVE)
  for (let total = 2; total <= exhausted; total++) {
    const found = within(total)
    if (found !== null) return { ...found, kept: true }
  }
  if (exhausted === longest) return nearest(sampled, limits, longest)
  let low = exhausted
  let high = exhausted
  let best: Boxes | null = null
  while (best === null && high < longest) {
    low = high
    high = Math.min(longest, 2 * high)
    best = within(high)
  }
  if (best === null) return nearest(sampled, limits, longest)
  while (high - low > 1) {
    const middle = (low + high) >> 1
    const found = within(middle)
    if (found === null) low = middle
    else {
      high = middle
      best = found
    }
  }
  return { ...best, kept: true }
}

/** A split of a total that keeps the limits, the longest first box of those: it bounds the acceleration best, an even split the jerk. */
function splitWithin(sampled: SampledWay, limits: RoundingLimits, total: number): Boxes | null {
  const most = Math.floor(total / 2)
  const split = (second: number): Boxes => ({ first: total - second, second })
  if (total <= EXHAUSTIVE) {
    for (let second = 1; second <= most; second++) if (keepsLimits(sampled, split(second), limits)) return split(second)
    return null
  }
  const jerkOnly = { acceleration: null, jerk: limits.jerk }
  if (!keepsLimits(sampled, split(most), jerkOnly)) return null
  let low = 0
  let high = most
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (keepsLimits(sampled, split(middle), jerkOnly)) high = middle
    else low = middle
  }
  return keepsLimits(sampled, split(high), limits) ? split(high) : null
}

function nearest(sampled: SampledWay, limits: RoundingLimits, longest: number): FoundBoxes {
  const worst = (boxes: Boxes): number => {
    const seen = extremes(sampled, boxes)
    return Math.max(seen.acceleration / (limits.acceleration ?? Infinity), seen.jerk / (limits.jerk ?? Infinity))
  }
  const most = Math.floor(longest / 2)
  const count = Math.min(most, CANDIDATES)
  const candidates = Array.from({ length: count }, (_, i) => {
    const second = 1 + Math.round((i * (most - 1)) / Math.max(1, count - 1))
    return { first: longest - second, second }
  })
  const best = candidates.reduce((a, b) => (worst(b) < worst(a) ? b : a))
  return { ...best, kept: false }
}

/** Number of rows of the rounded motion: from rest to rest. */
export function roundedRows({ way }: SampledWay, { first, second }: Boxes): number {
  return way.length + first + second
}

function wayAt(way: Float64Array, k: number): number {
  if (k <= 0) return way[0] ?? 0
  return way[Math.min(k, way.length - 1)] ?? 0
}

/** Speed after the first box at step k. */
function once({ way, step }: SampledWay, first: number, k: number): number {
  return (wayAt(way, k) - wayAt(way, k - first)) / (first * step)
}

/** Acceleration of the rounded motion at step k. */
function accelerationAt(sampled: SampledWay, { first, second }: Boxes, k: number): number {
  return (once(sampled, first, k) - once(sampled, first, k - second)) / (second * sampled.step)
}

/** Largest acceleration and jerk of the rounded motion, signs apart. */
export function extremes(sampled: SampledWay, boxes: Boxes): { readonly acceleration: number; readonly jerk: number } {
  let acceleration = 0
  let jerk = 0
  let before = 0
  const rows = roundedRows(sampled, boxes)
  for (let k = 1; k < rows; k++) {
    const here = accelerationAt(sampled, boxes, k)
    acceleration = Math.max(acceleration, Math.abs(here))
    jerk = Math.max(jerk, Math.abs(here - before) / sampled.step)
    before = here
  }
  return { acceleration, jerk }
}

function keepsLimits(sampled: SampledWay, boxes: Boxes, limits: RoundingLimits): boolean {
  const most = (limits.acceleration ?? Infinity) * SLACK
  const hardest = (limits.jerk ?? Infinity) * SLACK
  if (most === Infinity && hardest === Infinity) return true
  let before = 0
  const rows = roundedRows(sampled, boxes)
  for (let k = 1; k < rows; k++) {
    const here = accelerationAt(sampled, boxes, k)
    if (Math.abs(here) > most || Math.abs(here - before) > hardest * sampled.step) return false
    before = here
  }
  return true
}

/** The rounded motion at every step: way, speed and acceleration, with constant jerk between. */
export function roundedMotion(
  sampled: SampledWay,
  boxes: Boxes,
): { readonly position: number[]; readonly speed: number[]; readonly acceleration: number[] } {
  const { step } = sampled
  const rows = roundedRows(sampled, boxes)
  const position = [0]
  const speed = [0]
  const acceleration = [0]
  // Sum of the straight lines between the speeds after the first box, over the last `second` steps.
  const sum = new Float64Array(rows)
  for (let k = 1; k < rows; k++)
    sum[k] = (sum[k - 1] ?? 0) + (once(sampled, boxes.first, k - 1) + once(sampled, boxes.first, k)) / 2
  for (let k = 1; k < rows; k++) {
    const atRest = k === rows - 1
    const a = atRest ? 0 : accelerationAt(sampled, boxes, k)
    const v = atRest ? 0 : Math.max(0, ((sum[k] ?? 0) - (sum[Math.max(0, k - boxes.second)] ?? 0)) / boxes.second)
    const vBefore = speed[k - 1] ?? 0
    const aBefore = acceleration[k - 1] ?? 0
    const gain = (step * (vBefore + v)) / 2 - (step * step * (a - aBefore)) / 12
    position.push((position[k - 1] ?? 0) + gain)
    speed.push(v)
    acceleration.push(a)
  }
  return { position, speed, acceleration }
}
