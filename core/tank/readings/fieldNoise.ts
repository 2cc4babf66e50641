/**
 * Noise of a vorticity field, and where the flow stands out of it.
 *
 * A sum over the nodes above a threshold would take in noise that happens to be high and leave out noise that happens to be low. So the
 * nodes are chosen by a smoothed field and the sum is of the field itself.
 */
import { median } from './robust'

/** Half width of the smoothing in nodes, and how often it is done. */
const SMOOTHING = 2
const PASSES = 2
/** Nodes farther apart than this share no vector after smoothing: 2 x 2 x 2 of it, and 2 of the differences. */
const APART = 2 * SMOOTHING * PASSES + 2
/** Standard deviation over median of the absolute second difference of independent normal values, whose variance is 6. */
const OVER_MEDIAN = 1.4826 / Math.sqrt(6)
/** What a piece must reach somewhere over what it must keep to. */
const SEED_OVER_LEVEL = 2
/** Nodes by which a place that stands out is widened. */
const REACH = 3
/** Nodes looked at. */
const SAMPLE = 4000

/**
 * Standard deviation of the noise from second differences along x of values `lag` nodes apart: the flow is smooth over that in most of the
 * plane. 0 where the plane is too narrow to tell.
 */
function noiseOf(values: Float64Array, width: number, lag: number): number {
  if (width <= 2 * lag + 1) return 0
  const step = Math.max(1, Math.floor(values.length / SAMPLE))
  const found: number[] = []
  for (let k = 0; k < values.length; k += step)
    if (k % width >= 2 * lag)
      found.push(Math.abs(read(values, k) - 2 * read(values, k - lag) + read(values, k - 2 * lag)))
  return OVER_MEDIAN * median(found)
}

/** Of a vorticity by central differences: nodes three apart share no vector [1/s]. */
export function vorticityNoise(vorticity: Float64Array, width: number): number {
  return noiseOf(vorticity, width, 3)
}

/** The vorticity smoothed by boxes of 5 x 5 nodes, twice, and the noise left in it [1/s]. */
export function smoothedVorticity(
  vorticity: Float64Array,
  width: number,
): { readonly values: Float64Array; readonly noise: number } {
  let values = vorticity
  for (let pass = 0; pass < PASSES; pass++) values = boxed(boxed(values, width, 1), width, width)
  return { values, noise: noiseOf(values, width, APART) }
}

/**
 * Where the smoothed field is above a level in a piece that reaches twice the level somewhere, and three nodes round about: the tail of a
 * core that the level cuts off lies there. Specks of noise pass the level now and then, and twice the level hardly ever.
 */
export function standingOut(smoothed: Float64Array, width: number, level: number): Float64Array {
  const above = new Float64Array(smoothed.length)
  const open: number[] = []
  const take = (k: number): void => {
    if (read(above, k) === 1 || read(smoothed, k) < level) return
    above[k] = 1
    open.push(k)
  }
  for (let seed = 0; seed < smoothed.length; seed++) {
    if (read(smoothed, seed) < SEED_OVER_LEVEL * level) continue
    take(seed)
    for (let k = open.pop(); k !== undefined; k = open.pop()) {
      const column = k % width
      if (column > 0) take(k - 1)
      if (column < width - 1) take(k + 1)
      if (k >= width) take(k - width)
      if (k + width < smoothed.length) take(k + width)
    }
  }
  return grown(grown(above, width, 1), width, width)
}

/** Nodes that hang together about the highest one right of a column, above a share of it. */
export function regionAbout(smoothed: Float64Array, width: number, begin: number, share: number): readonly number[] {
  let peak = -1
  for (let k = 0; k < smoothed.length; k++)
    if (k % width >= begin && (peak < 0 || read(smoothed, k) > read(smoothed, peak))) peak = k
  if (peak < 0) return []
  const least = share * read(smoothed, peak)
  const seen = new Set<number>([peak])
  const found: number[] = []
  const open = [peak]
  const take = (k: number): void => {
    if (seen.has(k) || read(smoothed, k) < least) return
    seen.add(k)
    open.push(k)
  }
  for (let k = open.pop(); k !== undefined; k = open.pop()) {
    found.push(k)
    const column = k % width
    if (column > begin) take(k - 1)
    if (column < width - 1) take(k + 1)
    if (k >= width) take(k - width)
    if (k + width < smoothed.length) take(k + width)
  }
  return found
}

function grown(mask: Float64Array, width: number, stride: number): Float64Array {
  const height = mask.length / width
  const out = mask.slice()
  for (let k = 0; k < mask.length; k++) {
    if (read(mask, k) === 0) continue
    const index = stride === 1 ? k % width : Math.floor(k / width)
    const count = stride === 1 ? width : height
    for (let n = -Math.min(REACH, index); n <= Math.min(REACH, count - 1 - index); n++) out[k + n * stride] = 1
  }
  return out
}

/** Means of 5 nodes along x (stride 1) or r (stride the width), of fewer at the edges. */
function boxed(values: Float64Array, width: number, stride: number): Float64Array {
  const height = values.length / width
  const out = new Float64Array(values.length)
  for (let k = 0; k < values.length; k++) {
    const index = stride === 1 ? k % width : Math.floor(k / width)
    const count = stride === 1 ? width : height
    const before = Math.min(SMOOTHING, index)
    const after = Math.min(SMOOTHING, count - 1 - index)
    let sum = 0
    for (let n = -before; n <= after; n++) sum += read(values, k + n * stride)
    out[k] = sum / (before + after + 1)
  }
  return out
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
