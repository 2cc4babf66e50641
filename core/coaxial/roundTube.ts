/**
 * What a round tube about the axis does to rings inside it.
 *
 * The tube has no flow through its wall and no net flow along it, as in a tank closed at its ends. Near a ring its reaction is
 * the Fourier integral
 *
 *     u_x = -(Gamma R / pi) int s I1(s R) I0(s r) cos(s dx) K1(s b) / I1(s b) ds
 *     u_r = -(Gamma R / pi) int s I1(s R) I1(s r) sin(s dx) K1(s b) / I1(s b) ds
 *
 * added to the free ring's velocity. One tube radius and more away from the ring, where both nearly cancel, their sum is taken
 * from the modes of the tube, which decay as exp(-j |dx| / b) with j the zeros of J1.
 *
 * Derived from the Stokes stream function; tested against quadrature, a lattice of images and one another.
 */
import { at, gaussLegendre } from '../base'
import { besselJ, scaledI, scaledK1, zerosOfJ1 } from './bessel'

/** A ring may fill at most this share of the tube's radius: nearer to the wall the integral needs ever more nodes. */
export const LARGEST_TUBE_SHARE = 0.9

/** Distance in tube radii from which the modes serve: e^-j12 is below 1e-16 there. */
const MODES_FROM = 1
const MODE_COUNT = 12
/** Modes past this decay are left out. */
const SMALLEST_DECAY = 1e-18

/**
 * Quadrature sets in s b: the smallest gap (2 b - r - R) / b each serves, upper end and node count. Checked at their smallest gap
 * against sets of 800 nodes: error below 1e-13 of the integral at dx = 0.
 */
const SETS = [
  { gap: 1, end: 40, count: 56 },
  { gap: 0.5, end: 80, count: 72 },
  { gap: 0, end: 200, count: 128 },
] as const

interface QuadratureSet {
  readonly nodes: Float64Array
  /** Weight times s K1e(s) / I1e(s). */
  readonly weights: Float64Array
}

/** Velocity in the meridional plane. */
export interface PlaneVelocity {
  axial: number
  radial: number
}

/** A ring with the Bessel functions its pairs need. */
interface PreparedRing {
  readonly radius: number
  readonly sets: ({ readonly zero: Float64Array; readonly one: Float64Array } | undefined)[]
  modes: { readonly zero: Float64Array; readonly one: Float64Array } | undefined
}

/** The tube: prepares rings and gives what one does to another. Lengths in metres. */
export class RoundTube {
  private readonly sets: (QuadratureSet | undefined)[] = SETS.map(() => undefined)
  private readonly zeros = zerosOfJ1(MODE_COUNT)
  private readonly modeNorms = this.zeros.map((zero) => besselJ(zero).zero ** 2)

  /** @param radius b [m], > 0 */
  constructor(readonly radius: number) {}

  /** A ring of radius R [m], 0 < R < b, ready for `reaction`. */
  prepare(radius: number): PreparedRing {
    return { radius: radius / this.radius, sets: SETS.map(() => undefined), modes: undefined }
  }

  /** True where `reaction` gives the whole flow, free ring included, instead of what the wall adds to it. */
  givesWhole(dx: number): boolean {
    return Math.abs(dx) >= MODES_FROM * this.radius
  }

  /**
   * Add to `out` what a source ring of circulation Gamma does to a target `dx` further along the axis: the wall's part, or the
   * whole where `givesWhole(dx)`.
   */
  reaction(source: PreparedRing, circulation: number, target: PreparedRing, dx: number, out: PlaneVelocity): void {
    if (this.givesWhole(dx)) this.modes(source, circulation, target, dx / this.radius, out)
    else this.integral(source, circulation, target, dx / this.radius, out)
  }

  private integral(
    source: PreparedRing,
    circulation: number,
    target: PreparedRing,
    dx: number,
    out: PlaneVelocity,
  ): void {
    const gap = 2 - source.radius - target.radius
    // A trial step may look past the wall: the widest set then gives a number to turn back from.
    const fitting = SETS.findIndex((set) => gap >= set.gap)
    const index = fitting < 0 ? SETS.length - 1 : fitting
    const { nodes, weights } = this.quadrature(index)
    const from = this.growing(source, index)
    const to = source === target ? from : this.growing(target, index)
    let axial = 0
    let radial = 0
    for (let k = 0; k < nodes.length; k++) {
      const s = read(nodes, k)
      const weight = read(weights, k) * read(from.one, k) * Math.exp(-s * gap)
      axial += weight * read(to.zero, k) * Math.cos(s * dx)
      radial += weight * read(to.one, k) * Math.sin(s * dx)
    }
    const scale = (-circulation * source.radius) / (Math.PI * this.radius)
    out.axial += scale * axial
    out.radial += scale * radial
  }

  private modes(source: PreparedRing, circulation: number, target: PreparedRing, dx: number, out: PlaneVelocity): void {
    const from = this.standing(source)
    const to = this.standing(target)
    let axial = 0
    let radial = 0
    for (let n = 0; n < MODE_COUNT; n++) {
      const decay = Math.exp(-at(this.zeros, n) * Math.abs(dx))
      if (decay < SMALLEST_DECAY) break
      const amplitude = (read(from.one, n) * decay) / at(this.modeNorms, n)
      axial += amplitude * read(to.zero, n)
      radial += amplitude * read(to.one, n)
    }
    const scale = (circulation * source.radius) / this.radius
    out.axial += scale * axial
    out.radial += scale * Math.sign(dx) * radial
  }

  private quadrature(index: number): QuadratureSet {
    const known = this.sets[index]
    if (known !== undefined) return known
    const { end, count } = at(SETS, index)
    const rule = gaussLegendre(count)
    // s = end t^2 takes the s^2 ln s of K1 at the origin, which a Gauss rule resolves badly, down to t^5 ln t in the sum.
    const share = Float64Array.from(rule.nodes, (node) => (node + 1) / 2)
    const nodes = share.map((t) => end * t * t)
    const weights = nodes.map((s, k) => at(rule.weights, k) * end * at(share, k) * s * (scaledK1(s) / scaledI(s).one))
    const made = { nodes, weights }
    this.sets[index] = made
    return made
  }

  private growing(ring: PreparedRing, index: number): { readonly zero: Float64Array; readonly one: Float64Array } {
    const known = ring.sets[index]
    if (known !== undefined) return known
    const { nodes } = this.quadrature(index)
    const zero = new Float64Array(nodes.length)
    const one = new Float64Array(nodes.length)
    for (let k = 0; k < nodes.length; k++) {
      const value = scaledI(read(nodes, k) * ring.radius)
      zero[k] = value.zero
      one[k] = value.one
    }
    const made = { zero, one }
    ring.sets[index] = made
    return made
  }

  private standing(ring: PreparedRing): { readonly zero: Float64Array; readonly one: Float64Array } {
    if (ring.modes !== undefined) return ring.modes
    const zero = new Float64Array(MODE_COUNT)
    const one = new Float64Array(MODE_COUNT)
    for (let n = 0; n < MODE_COUNT; n++) {
      const value = besselJ(at(this.zeros, n) * ring.radius)
      zero[n] = value.zero
      one[n] = value.one
    }
    ring.modes = { zero, one }
    return ring.modes
  }
}

/**
 * Change of a ring's own speed [m/s] in a round tube, against the direction of its motion.
 *
 * @param circulation Gamma [m2/s]
 * @param radius R [m], 0 < R <= 0.9 tubeRadius
 * @param tubeRadius b [m]
 */
export function tubeSlowing(circulation: number, radius: number, tubeRadius: number): number {
  const tube = new RoundTube(tubeRadius)
  const ring = tube.prepare(radius)
  const out = { axial: 0, radial: 0 }
  tube.reaction(ring, circulation, ring, 0, out)
  return out.axial
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
