/**
 * What one half plane of a velocity field holds: circulation, centroid, radius, core, impulse, of everything and of the leading ring.
 */
import { at } from '../../base'
import { axialDensity, ringCut } from '../../coaxial'
import type { HalfPlane } from './fieldGrid'
import { regionAbout, smoothedVorticity, standingOut } from './fieldNoise'

/**
 * Vorticity below this share of the frame's highest is left out, which a Gaussian core loses of its circulation and gets back. Where
 * noise is higher than a third of that, what counts is where the smoothed field stands out by four times its own noise, in pieces that reach
 * twice that, and three nodes round about; nothing is put back there.
 */
export const THRESHOLD_SHARE = 0.002
const QUIET_BELOW = THRESHOLD_SHARE / 3
const NOISE_TIMES = 4
/** Above this share the rest is no longer a measure of the ring. */
export const LARGEST_THRESHOLD = 0.5

/** The core is measured where the smoothed field is above this share of its peak: half of it would be too few nodes, a tenth takes in noise. */
const CORE_SHARE = 0.2
const FEWEST_OF_CORE = 9
/** Each turn takes a third off what is missing, or more. */
const CORE_TURNS = 60
/** Beyond this over what was seen, a is a guess. */
const LARGEST_SPREAD = 4

export interface FieldPart {
  /** By area [m2/s]. */
  readonly circulation: number
  /** Of the vorticity [m]. */
  readonly x: number
  readonly radius: number
  /** sqrt(second moment of the vorticity about its centroid): a of a Gaussian core exp(-s^2 / a^2) [m]. */
  readonly coreRadius: number
  /** rho pi int omega r^2 [N s] over rho [m4/s]. */
  readonly impulsePerDensity: number
}

export interface HalfSums {
  /** Everything downstream of the exit plane; null where nothing is above the threshold. */
  readonly total: FieldPart | null
  readonly ring: FieldPart | null
  /** Round the edge of the plane, and round the ring [m2/s]. */
  readonly totalByContour: number
  readonly ringByContour: number | null
  /** Density at the cut over that of the ring's peak; null without a cut. */
  readonly cutRatio: number | null
  readonly trailingJet: boolean
  /** Highest vorticity, of the smoothed field where noise asks for one [1/s]. */
  readonly peak: number
  /** Share of the peak below which vorticity was left out. */
  readonly threshold: number
  /** Standard error of the total circulation from the noise [m2/s]. */
  readonly circulationError: number
}

/** @param from x of the exit plane [m]: what lies upstream of it is not counted. @param diameter of the exit [m]: scale of the ring cut */
export function halfSums(
  half: HalfPlane,
  vorticity: Float64Array,
  noise: number,
  { from, diameter }: { readonly from: number; readonly diameter: number },
): HalfSums {
  const { x, r } = half
  const width = x.length
  const first = x.findIndex((value) => value >= from)
  const noisy = noise > QUIET_BELOW * highest(vorticity, width, first)
  const smoothed = noisy ? smoothedVorticity(vorticity, width) : { values: vorticity, noise: 0 }
  const peak = highest(smoothed.values, width, first)
  const threshold = Math.max(THRESHOLD_SHARE, (NOISE_TIMES * smoothed.noise) / peak)
  const nothing = {
    total: null,
    ring: null,
    totalByContour: first >= 0 && first < width - 1 ? contour(half, first) : 0,
    ringByContour: null,
    cutRatio: null,
    trailingJet: false,
    peak,
    threshold,
    circulationError: 0,
  }
  if (first < 0 || !(peak > 0) || threshold > LARGEST_THRESHOLD) return { ...nothing, threshold: 1 }
  const areas = areasOf(half)
  const least = threshold * peak
  const mask = noisy ? standingOut(smoothed.values, width, least) : null
  const chosen = (k: number): boolean => (mask === null ? read(vorticity, k) >= least : read(mask, k) === 1)
  const columns = new Float64Array(width)
  let nodes = 0
  for (let j = 0; j < r.length; j++)
    for (let i = first; i < width; i++) {
      const k = j * width + i
      if (!chosen(k)) continue
      nodes++
      columns[i] = read(columns, i) + read(vorticity, k) * read(areas, j)
    }
  const scaled = x.map((value) => value / diameter)
  const cut = ringCut(axialDensity(scaled.subarray(first), columns.subarray(first), width - first))
  const start =
    cut === null
      ? first
      : Math.max(
          first,
          x.findIndex((value) => value / diameter > cut.x),
        )
  const part = (begin: number): FieldPart | null => {
    const sums = partSums(half, vorticity, areas, { begin, chosen, left: noisy ? 0 : threshold })
    if (!noisy || sums === null) return sums
    const coreRadius = coreAbout(half, vorticity, smoothed.values, areas, begin, threshold)
    return coreRadius === null ? sums : { ...sums, coreRadius }
  }
  return {
    ...nothing,
    total: part(first),
    ring: cut === null ? null : part(start),
    ringByContour: cut === null || start >= width - 1 ? null : contour(half, start),
    cutRatio: cut?.ratio ?? null,
    trailingJet: cut?.trailingJet ?? false,
    circulationError: noise * read(areas, r.length >> 1) * Math.sqrt(nodes),
  }
}

function highest(vorticity: Float64Array, width: number, first: number): number {
  let peak = 0
  if (first < 0) return 0
  for (let k = 0; k < vorticity.length; k++) if (k % width >= first) peak = Math.max(peak, read(vorticity, k))
  return peak
}

/** Area of a node of each row [m2]: halfway to its neighbours, down to the axis and no further. */
function areasOf({ x, r }: HalfPlane): Float64Array {
  const dx = (at(x, x.length - 1) - at(x, 0)) / (x.length - 1)
  const dr = (at(r, r.length - 1) - at(r, 0)) / (r.length - 1)
  return r.map((value) => dx * (Math.min(value, dr / 2) + dr / 2))
}

function partSums(
  { x, r }: HalfPlane,
  vorticity: Float64Array,
  areas: Float64Array,
  {
    begin,
    chosen,
    left,
  }: {
    readonly begin: number
    readonly chosen: (k: number) => boolean
    /** Share of the peak below which a core was cut off. */
    readonly left: number
  },
): FieldPart | null {
  const width = x.length
  let [sum, sumX, sumR, sumXX, sumRR] = [0, 0, 0, 0, 0]
  // Moments about the first column and the axis; lengths are of one size, so that little is lost in the differences.
  const origin = at(x, begin)
  for (let j = 0; j < r.length; j++) {
    const radius = read(r, j)
    for (let i = begin; i < width; i++) {
      const k = j * width + i
      if (!chosen(k)) continue
      const strength = read(vorticity, k) * read(areas, j)
      const place = read(x, i) - origin
      sum += strength
      sumX += strength * place
      sumR += strength * radius
      sumXX += strength * place * place
      sumRR += strength * radius * radius
    }
  }
  if (!(sum > 0)) return null
  const [meanX, meanR] = [sumX / sum, sumR / sum]
  const [dx, dr] = [at(x, 1) - at(x, 0), at(r, 1) - at(r, 0)]
  // Central differences spread a core by h^2/6 in each direction; the tail below the threshold q of a Gaussian holds q (1 - ln q) of it.
  const spread = sumXX / sum - meanX * meanX + sumRR / sum - meanR * meanR
  const tail = left === 0 ? 1 : (1 - left) / (1 - left + left * Math.log(left))
  const core = spread * tail - (dx * dx + dr * dr) / 6
  return {
    circulation: sum / (1 - left),
    x: origin + meanX,
    radius: meanR,
    coreRadius: Math.sqrt(Math.max(0, core)),
    impulsePerDensity: (Math.PI * sumRR) / (1 - left),
  }
}

/**
 * a of a core through noise, from its surroundings alone: a speck of noise far out weighs more in a second moment than the core does.
 *
 * The region hangs together about the peak of the smoothed field, above a share of it. It cuts a Gaussian core off at the radius of its own area
 * A, so that q = exp(-A / (pi a^2)) is missing from its circulation, and a is found by turns from the second moment within.
 *
 * @returns null where the region is too small to tell, or where the turns come to nothing
 */
function coreAbout(
  { x, r }: HalfPlane,
  vorticity: Float64Array,
  smoothed: Float64Array,
  areas: Float64Array,
  begin: number,
  threshold: number,
): number | null {
  const width = x.length
  const inside = regionAbout(smoothed, width, begin, Math.max(CORE_SHARE, threshold))
  if (inside.length < FEWEST_OF_CORE) return null
  let [sum, sumX, sumR, area] = [0, 0, 0, 0]
  for (const k of inside) {
    const strength = read(vorticity, k) * read(areas, Math.floor(k / width))
    area += read(areas, Math.floor(k / width))
    sum += strength
    sumX += strength * read(x, k % width)
    sumR += strength * read(r, Math.floor(k / width))
  }
  if (!(sum > 0)) return null
  const [meanX, meanR] = [sumX / sum, sumR / sum]
  let spread = 0
  for (const k of inside) {
    const row = Math.floor(k / width)
    const square = (read(x, k % width) - meanX) ** 2 + (read(r, row) - meanR) ** 2
    spread += (read(vorticity, k) * read(areas, row) * square) / sum
  }
  let square = spread
  for (let turn = 0; turn < CORE_TURNS; turn++) {
    const cut = Math.exp(-area / (Math.PI * square))
    square = (spread * (1 - cut)) / (1 - cut + cut * Math.log(cut))
    if (!(square < LARGEST_SPREAD * spread)) return null
  }
  const [dx, dr] = [at(x, 1) - at(x, 0), at(r, 1) - at(r, 0)]
  return Math.sqrt(Math.max(0, square - (dx * dx + dr * dr) / 6))
}

/** Line integral round the half plane from a column to its end, trapezoid rule [m2/s]. */
function contour({ x, r, u, v }: HalfPlane, begin: number): number {
  const width = x.length
  const [dx, dr] = [at(x, 1) - at(x, 0), at(r, 1) - at(r, 0)]
  const top = (r.length - 1) * width
  let sum = 0
  for (let i = begin; i < width; i++) {
    const weight = i === begin || i === width - 1 ? 0.5 : 1
    sum += weight * dx * (read(u, i) - read(u, top + i))
  }
  for (let j = 0; j < r.length; j++) {
    const weight = j === 0 || j === r.length - 1 ? 0.5 : 1
    sum += weight * dr * (read(v, j * width + width - 1) - read(v, j * width + begin))
  }
  return sum
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
