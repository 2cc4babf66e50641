/**
 * How closed filaments in space move, and the sums their motion conserves.
 *
 * Rosenhead-Moore kernel with delta = a exp(-(A + 1/2)) of each ring's core; the core keeps a^2 times length, and laminar ageing adds
 * 4 nu dt to a^2. A pair of rings takes the mean of their delta^2. A plane wall is the mirror image of every ring.
 *
 * The sum over nodes is the trapezoidal rule. Its error is known: near a node the integrand is that of an arc, whose Fourier
 * transform at one wave a segment gives, per unit of Gamma / (2 pi), curvature times [z K1(z) - K0(z)] with z = 2 pi delta / segment
 * along the binormal. That is added back. From a ring far away fewer nodes serve (see `SourceStrides`).
 *
 * Sources: Rosenhead 1930, Proc. R. Soc. A 127:590; Moore 1972, Aeronaut. Q. 23:307 (recalled, not re-read); the correction is derived.
 */
import { at } from '../base'
import { deltaOverCore } from '../coaxial'
import { SEGMENT_RECORD, type Kernel } from '../kernel'
import type { CoreModel } from '../ring'
import { curvatures, curveSums, keepSpacing, tangents, type CurveSums } from './closedCurve'
import { SourceStrides } from './sourceStrides'
import type { WakeWall } from './types'
import { dot, length, scaled, type Vector } from './vector'

export interface FilamentSetup {
  readonly rings: readonly { readonly circulation: number; readonly core: CoreModel; readonly nodeCount: number }[]
  /** Along +x [m/s]. */
  readonly axialFlow: number
  /** With a unit normal. */
  readonly wall: WakeWall | null
  /** 4 nu [m2/s], or 0 */
  readonly coreGrowth: number
  readonly kernel: Kernel
}

const FOUR_PI = 4 * Math.PI

/**
 * Filaments in motion. The state is [x y z of every node of every ring, a^2 length of every ring]. Holds scratch arrays: one flow
 * serves one march.
 */
export class FilamentFlow {
  readonly count: number
  readonly nodeCount: number
  /** First node of each ring, and the end. */
  readonly starts: readonly number[]
  private readonly deltaFactors: readonly number[]
  private readonly tangent: Float64Array
  /** Curvatures, then the work of keepSpacing. */
  private readonly scratch: Float64Array
  private readonly records: Float64Array
  private readonly targetDelta: Float64Array
  private readonly strides: SourceStrides

  constructor(private readonly setup: FilamentSetup) {
    this.count = setup.rings.length
    const starts = [0]
    for (const ring of setup.rings) starts.push(at(starts, starts.length - 1) + ring.nodeCount)
    this.starts = starts
    this.nodeCount = at(starts, this.count)
    this.deltaFactors = setup.rings.map((ring) => deltaOverCore(ring.core) ** 2)
    this.tangent = new Float64Array(3 * this.nodeCount)
    this.scratch = new Float64Array(3 * this.nodeCount)
    this.records = new Float64Array(SEGMENT_RECORD * this.nodeCount * (setup.wall === null ? 1 : 2))
    this.targetDelta = new Float64Array(this.nodeCount)
    this.strides = new SourceStrides(this.count, setup.wall)
  }

  get stateSize(): number {
    return 3 * this.nodeCount + this.count
  }

  circulation(ring: number): number {
    return at(this.setup.rings, ring).circulation
  }

  /** Nodes of a ring in a state, as a view. */
  nodes(state: Float64Array, ring: number): Float64Array {
    return state.subarray(3 * at(this.starts, ring), 3 * at(this.starts, ring + 1))
  }

  /** a^2 length of a ring [m3]. */
  volume(state: Float64Array, ring: number): number {
    return at(state, 3 * this.nodeCount + ring)
  }

  coreRadius(state: Float64Array, ring: number, sums: CurveSums): number {
    return Math.sqrt(this.volume(state, ring) / sums.length)
  }

  /** delta of a ring of a core radius [m]. */
  delta(ring: number, coreRadius: number): number {
    return coreRadius * Math.sqrt(at(this.deltaFactors, ring))
  }

  /** Sums over a ring in a state. */
  sums(state: Float64Array, ring: number): CurveSums {
    const nodes = this.nodes(state, ring)
    const tangent = this.ringTangent(ring)
    tangents(nodes, tangent)
    return curveSums(nodes, tangent)
  }

  /** Largest curvature of a ring in a state [1/m]. */
  sharpestBend(state: Float64Array, ring: number): number {
    const nodes = this.nodes(state, ring)
    const tangent = this.ringTangent(ring)
    const curvature = this.scratch.subarray(0, nodes.length)
    tangents(nodes, tangent)
    curvatures(nodes, tangent, curvature)
    let largest = 0
    for (let i = 0; i < curvature.length; i += 3)
      largest = Math.max(largest, read(curvature, i) ** 2 + read(curvature, i + 1) ** 2 + read(curvature, i + 2) ** 2)
    return Math.sqrt(largest)
  }

  /** Choose anew how many nodes serve from ring to ring. Call when rings have moved, before the next step. */
  updateStrides(state: Float64Array): void {
    this.strides.update(Array.from({ length: this.count }, (_, ring) => this.nodes(state, ring)))
  }

  /** Slopes of the state; fit for RungeKuttaStepper. */
  readonly derivative = (_time: number, state: Float64Array, out: Float64Array): void => {
    const { setup, nodeCount, count } = this
    const sums = this.place(state)
    for (let ring = 0; ring < count; ring++) {
      const segmentCount = this.gather(ring, state, sums)
      const first = at(this.starts, ring)
      const end = at(this.starts, ring + 1)
      const velocity = out.subarray(3 * first, 3 * end)
      setup.kernel.segmentVelocity(
        {
          targetCount: end - first,
          targets: this.nodes(state, ring),
          targetDeltaSquared: this.targetDelta.subarray(first, end),
          segmentCount,
          segments: this.records,
        },
        velocity,
      )
      this.correct(ring, state, velocity)
      keepSpacing(velocity, this.ringTangent(ring), this.scratch.subarray(3 * first, 3 * end))
      out[3 * nodeCount + ring] = setup.coreGrowth * at(sums, ring).length
    }
    if (setup.axialFlow === 0) return
    for (let i = 0; i < 3 * nodeCount; i += 3) out[i] = read(out, i) + setup.axialFlow
  }

  /** Velocity of the centroid of a ring [m/s], from a state and its slopes. */
  centroidVelocity(state: Float64Array, slope: Float64Array, ring: number): Vector {
    const nodes = this.nodes(state, ring)
    const velocity = this.nodes(slope, ring)
    const tangent = this.ringTangent(ring)
    tangents(nodes, tangent)
    const { centroid, length: whole } = curveSums(nodes, tangent)
    const stretch = new Float64Array(nodes.length)
    tangents(velocity, stretch)
    const sum = [0, 0, 0]
    for (let i = 0; i < nodes.length; i += 3) {
      const piece = Math.hypot(read(tangent, i), read(tangent, i + 1), read(tangent, i + 2))
      let growth = 0
      for (let axis = 0; axis < 3; axis++) growth += (read(tangent, i + axis) * read(stretch, i + axis)) / piece
      for (let axis = 0; axis < 3; axis++)
        sum[axis] =
          at(sum, axis) + read(velocity, i + axis) * piece + (read(nodes, i + axis) - at(centroid, axis)) * growth
    }
    return scaled([at(sum, 0), at(sum, 1), at(sum, 2)], 1 / whole)
  }

  /** 1/2 sum Gamma x cross dl, and the sum of the sizes of its rings' shares: the impulse over rho. */
  impulse(state: Float64Array): { readonly sum: Vector; readonly scale: number } {
    const sum: [number, number, number] = [0, 0, 0]
    let scale = 0
    for (let ring = 0; ring < this.count; ring++) {
      const { circulation } = at(this.setup.rings, ring)
      const { area } = this.sums(state, ring)
      for (const axis of [0, 1, 2] as const) sum[axis] += circulation * area[axis]
      scale += Math.abs(circulation) * length(area)
    }
    return { sum, scale }
  }

  /**
   * Energy over rho in unbounded fluid at rest: 1/(8 pi) sum Gamma Gamma' dl.dl' / sqrt(s^2 + delta^2) less Gamma^2 length / (8 pi) of
   * each ring, the work that changing cores do. Conserved to the order of (delta/R)^2 while rings stretch. Costs a double sum.
   */
  energy(state: Float64Array): number {
    const sums = this.place(state)
    const { records, nodeCount } = this
    for (let ring = 0; ring < this.count; ring++) this.write(ring, 1, at(this.starts, ring), state)
    let sum = 0
    for (let i = 0; i < nodeCount; i++) {
      const a = SEGMENT_RECORD * i
      const x = read(records, a)
      const y = read(records, a + 1)
      const z = read(records, a + 2)
      let potential = 0
      for (let j = 0; j < i; j++) {
        const b = SEGMENT_RECORD * j
        const sx = read(records, b) - x
        const sy = read(records, b + 1) - y
        const sz = read(records, b + 2) - z
        const square = sx * sx + sy * sy + sz * sz + 0.5 * (read(records, a + 6) + read(records, b + 6))
        potential +=
          (read(records, a + 3) * read(records, b + 3) +
            read(records, a + 4) * read(records, b + 4) +
            read(records, a + 5) * read(records, b + 5)) /
          Math.sqrt(square)
      }
      const own = read(records, a + 3) ** 2 + read(records, a + 4) ** 2 + read(records, a + 5) ** 2
      sum += 2 * potential + own / Math.sqrt(read(records, a + 6))
    }
    // The records hold Gamma dl / (4 pi).
    let total = 2 * Math.PI * sum
    this.setup.rings.forEach(({ circulation }, ring) => {
      total -= (circulation * circulation * at(sums, ring).length) / (2 * FOUR_PI)
    })
    return total
  }

  private ringTangent(ring: number): Float64Array {
    return this.tangent.subarray(3 * at(this.starts, ring), 3 * at(this.starts, ring + 1))
  }

  /** Tangents and delta^2 of every node of a state. */
  private place(state: Float64Array): CurveSums[] {
    return this.setup.rings.map((_, ring) => {
      const sums = this.sums(state, ring)
      const deltaSquared = (at(this.deltaFactors, ring) * this.volume(state, ring)) / sums.length
      this.targetDelta.fill(deltaSquared, at(this.starts, ring), at(this.starts, ring + 1))
      return sums
    })
  }

  /** Records of all that moves a ring; returns how many. */
  private gather(target: number, state: Float64Array, sums: readonly CurveSums[]): number {
    const { wall } = this.setup
    let filled = 0
    for (let source = 0; source < sums.length; source++)
      filled = this.write(source, this.strides.between(target, source), filled, state)
    if (wall === null) return filled
    for (let source = 0; source < sums.length; source++) {
      const first = filled
      filled = this.write(source, this.strides.toImage(target, source), filled, state)
      this.mirror(wall, first, filled)
    }
    return filled
  }

  /** Records of every `stride`-th node of a ring; returns the next free record. */
  private write(ring: number, stride: number, first: number, state: Float64Array): number {
    const { records, tangent, targetDelta } = this
    const strength = (stride * at(this.setup.rings, ring).circulation) / FOUR_PI
    const end = at(this.starts, ring + 1)
    let to = SEGMENT_RECORD * first
    for (let node = at(this.starts, ring); node < end; node += stride) {
      for (let axis = 0; axis < 3; axis++) {
        records[to + axis] = read(state, 3 * node + axis)
        records[to + 3 + axis] = strength * read(tangent, 3 * node + axis)
      }
      records[to + 6] = read(targetDelta, node)
      to += SEGMENT_RECORD
    }
    return to / SEGMENT_RECORD
  }

  /** Turn records into those of the mirror image. */
  private mirror(wall: WakeWall, first: number, end: number): void {
    const { records } = this
    const [nx, ny, nz] = wall.normal
    const level = dot(wall.point, wall.normal)
    for (let to = SEGMENT_RECORD * first; to < SEGMENT_RECORD * end; to += SEGMENT_RECORD) {
      const height = 2 * (read(records, to) * nx + read(records, to + 1) * ny + read(records, to + 2) * nz - level)
      records[to] = read(records, to) - height * nx
      records[to + 1] = read(records, to + 1) - height * ny
      records[to + 2] = read(records, to + 2) - height * nz
      const gx = read(records, to + 3)
      const gy = read(records, to + 4)
      const gz = read(records, to + 5)
      // Vorticity is mirrored with the opposite sign, so that no fluid crosses the wall.
      const normal = 2 * (gx * nx + gy * ny + gz * nz)
      records[to + 3] = normal * nx - gx
      records[to + 4] = normal * ny - gy
      records[to + 5] = normal * nz - gz
    }
  }

  /** Add back what the trapezoidal rule leaves out of the ring's own velocity. */
  private correct(ring: number, state: Float64Array, velocity: Float64Array): void {
    const first = at(this.starts, ring)
    const tangent = this.ringTangent(ring)
    const curvature = this.scratch.subarray(3 * first, 3 * at(this.starts, ring + 1))
    curvatures(this.nodes(state, ring), tangent, curvature)
    const delta = Math.sqrt(read(this.targetDelta, first))
    const strength = at(this.setup.rings, ring).circulation / (2 * Math.PI)
    for (let i = 0; i < tangent.length; i += 3) {
      const segment = Math.hypot(read(tangent, i), read(tangent, i + 1), read(tangent, i + 2))
      const factor = strength * trapezoidLoss((2 * Math.PI * delta) / segment)
      for (let axis = 0; axis < 3; axis++)
        velocity[i + axis] = read(velocity, i + axis) + factor * read(curvature, i + axis)
    }
  }
}

/**
 * z K1(z) - K0(z) by the asymptotic series (Abramowitz & Stegun 1964, 9.7.2), for z above about 4: 1e-4 of itself at 2 pi.
 */
function trapezoidLoss(z: number): number {
  if (z > 40) return 0
  const q = 1 / (8 * z)
  const zero = 1 - q * (1 - (9 * q) / 2 + (225 * q * q) / 6 - (11025 * q * q * q) / 24)
  const one = 1 + q * (3 + (15 * q) / -2 + (315 * q * q) / 6 - (14175 * q * q * q) / 24)
  return Math.sqrt(Math.PI / (2 * z)) * Math.exp(-z) * (z * one - zero)
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
