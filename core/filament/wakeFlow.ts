/**
 * The flow around the rings of a finished run, at any points: for pictures of dye and of the field, not a result path.
 *
 * Every ring is taken as its closed curve of segments with the smoothing that matches its core, with its mirror image behind a plane
 * wall and the uniform stream. The reaction of a round tube is left out.
 */
import { deltaOverCore } from '../coaxial'
import { SEGMENT_RECORD, writeSegmentRecords, type Kernel } from '../kernel'
import type { CoreModel } from '../ring'
import type { WakeWall } from './types'
import { dot, unit, type Vector } from './vector'
import type { RingShape } from './wakeFrame'

export interface FlowSurroundings {
  readonly kernel: Kernel
  /** Core models of the rings, in the order of their numbers. */
  readonly cores: readonly CoreModel[]
  readonly wall: WakeWall | null
  /** Along +x [m/s]. */
  readonly axialFlow: number
}

/** Sums velocities of one set of rings after another; holds the records, so that a run allocates them once. */
export class WakeFlow {
  private readonly surroundings: FlowSurroundings
  private readonly normal: Vector | null
  private segments = new Float64Array(0)
  private count = 0

  constructor(surroundings: FlowSurroundings) {
    this.surroundings = surroundings
    this.normal = surroundings.wall === null ? null : unit(surroundings.wall.normal)
  }

  /** Take these rings as the sources of the next sums. */
  setRings(rings: readonly RingShape[]): void {
    const nodes = rings.reduce((sum, ring) => sum + ring.nodes.length / 3, 0) * (this.normal === null ? 1 : 2)
    if (this.segments.length < nodes * SEGMENT_RECORD) this.segments = new Float64Array(nodes * SEGMENT_RECORD)
    this.count = 0
    for (const ring of rings) {
      const delta = ring.coreRadius * deltaOverCore(this.surroundings.cores[ring.number - 1] ?? 'uniform')
      const curve = { nodeCount: ring.nodes.length / 3, deltaSquared: delta * delta }
      const { nodes: places, circulation } = ring
      this.count = writeSegmentRecords({ ...curve, nodes: places, circulation }, this.segments, this.count)
      const mirrored = this.mirrored(places)
      if (mirrored !== null)
        this.count = writeSegmentRecords(
          { ...curve, nodes: mirrored, circulation: -circulation },
          this.segments,
          this.count,
        )
    }
  }

  /** Velocity x y z at each of `targetCount` points. */
  velocity(targets: Float64Array, targetCount: number, out: Float64Array): void {
    out.fill(0, 0, 3 * targetCount)
    if (this.count > 0)
      this.surroundings.kernel.segmentVelocity(
        {
          targetCount,
          targets,
          targetDeltaSquared: null,
          segmentCount: this.count,
          segments: this.segments,
          precision: 'mixed',
        },
        out,
      )
    const { axialFlow } = this.surroundings
    if (axialFlow !== 0) for (let i = 0; i < targetCount; i++) out[3 * i] = (out[3 * i] ?? 0) + axialFlow
  }

  /** Nodes reflected in the wall; null without one. Reflection turns the sense of the curve, so its circulation changes sign. */
  private mirrored(nodes: Float64Array): Float64Array | null {
    const { wall } = this.surroundings
    const normal = this.normal
    if (wall === null || normal === null) return null
    const offset = dot(wall.point, normal)
    const image = new Float64Array(nodes.length)
    for (let k = 0; k < nodes.length; k += 3) {
      const x = nodes[k] ?? 0
      const y = nodes[k + 1] ?? 0
      const z = nodes[k + 2] ?? 0
      const twice = 2 * (x * normal[0] + y * normal[1] + z * normal[2] - offset)
      image[k] = x - twice * normal[0]
      image[k + 1] = y - twice * normal[1]
      image[k + 2] = z - twice * normal[2]
    }
    return image
  }
}
