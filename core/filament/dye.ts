/**
 * Dye: passive points carried by the flow of a finished run, placed around the core of every ring when it appears.
 *
 * A picture of where fluid goes. It does not mark vorticity: dye and vorticity part ways as the core diffuses (Maxworthy 1972).
 */
import { at } from '../base'
import type { Wake } from './types'
import { acrossOf, along, type Vector } from './vector'
import { WakeFlow, type FlowSurroundings } from './wakeFlow'
import { wakeFrame, type RingShape } from './wakeFrame'

export interface DyeInput {
  readonly wake: Wake
  readonly surroundings: FlowSurroundings
  /** Points over all rings, up to MOST_DYE. */
  readonly points: number
}

export interface DyeOptions {
  readonly signal?: { readonly aborted: boolean }
  readonly onProgress?: (progress: { readonly share: number; readonly what: string }) => void
  readonly pause?: () => Promise<void>
}

/** Points and output times a picture needs at most; beyond them the memory is better spent. */
export const MOST_DYE = 5000
export const MOST_DYE_OUTPUTS = 2000

/** Parts of an output step the points are carried in; the rings move in straight lines between outputs. */
const SUBSTEPS = 4

/** Radius of the dyed tube around a core: this many core radii, at most this share of the ring's radius. */
const DYED_CORES = 2.5
const DYED_SHARE = 0.6

/** Steps of a low-discrepancy sequence in three dimensions (powers of the inverse of the plastic number's cousin 1.2207). */
const SPREAD = [0.8191725133961645, 0.6710436067037893, 0.5497004779019703] as const

/**
 * Carry dye through a run.
 *
 * @returns x y z of the points at every output time [m], rings that have not appeared without theirs; null where it was cancelled.
 */
export async function carryDye(input: DyeInput, options: DyeOptions = {}): Promise<readonly Float32Array[] | null> {
  const { wake } = input
  const outputs = Math.min(wake.outputTimes.length, MOST_DYE_OUTPUTS)
  const each = Math.floor(Math.min(input.points, MOST_DYE) / Math.max(1, wake.trajectories.length))
  const flow = new WakeFlow(input.surroundings)
  const cloud = new Cloud(each * wake.trajectories.length)
  const positions: Float32Array[] = []
  let before: readonly RingShape[] = []
  for (let index = 0; index < outputs; index++) {
    if (options.signal?.aborted === true) return null
    const rings = wakeFrame(wake, index)
    if (index > 0) cloud.carry(flow, before, rings, at(wake.outputTimes, index) - at(wake.outputTimes, index - 1))
    for (const ring of rings) if (!before.some(({ number }) => number === ring.number)) cloud.place(ring, each)
    positions.push(cloud.snapshot())
    before = rings
    options.onProgress?.({ share: (index + 1) / outputs, what: 'dye' })
    await options.pause?.()
  }
  return positions
}

class Cloud {
  private count = 0
  private readonly places: Float64Array
  private readonly middles: Float64Array
  private readonly velocity: Float64Array

  constructor(capacity: number) {
    this.places = new Float64Array(3 * capacity)
    this.middles = new Float64Array(3 * capacity)
    this.velocity = new Float64Array(3 * capacity)
  }

  /** Points spread evenly over a tube around the core of a ring. */
  place(ring: RingShape, count: number): void {
    const tube = Math.min(DYED_CORES * ring.coreRadius, DYED_SHARE * ring.radius)
    const [first, second] = acrossOf(ring.direction)
    for (let i = 0; i < count; i++) {
      const [a, b, c] = SPREAD.map((step) => (0.5 + step * (i + 1)) % 1)
      const around = 2 * Math.PI * (a ?? 0)
      const turn = 2 * Math.PI * (b ?? 0)
      const away = tube * Math.sqrt(c ?? 0)
      const radial: Vector = along(along([0, 0, 0], first, Math.cos(around)), second, Math.sin(around))
      const core = along(ring.centre, radial, ring.radius + away * Math.cos(turn))
      this.places.set(along(core, ring.direction, away * Math.sin(turn)), 3 * this.count)
      this.count++
    }
  }

  /** Midpoint rule over parts of one output step, the rings on straight lines between their places at its ends. */
  carry(flow: WakeFlow, from: readonly RingShape[], to: readonly RingShape[], duration: number): void {
    const step = duration / SUBSTEPS
    const size = 3 * this.count
    for (let part = 0; part < SUBSTEPS; part++) {
      flow.setRings(between(from, to, part / SUBSTEPS))
      flow.velocity(this.places, this.count, this.velocity)
      for (let i = 0; i < size; i++) this.middles[i] = (this.places[i] ?? 0) + 0.5 * step * (this.velocity[i] ?? 0)
      flow.setRings(between(from, to, (part + 0.5) / SUBSTEPS))
      flow.velocity(this.middles, this.count, this.velocity)
      for (let i = 0; i < size; i++) this.places[i] = (this.places[i] ?? 0) + step * (this.velocity[i] ?? 0)
    }
  }

  snapshot(): Float32Array {
    return Float32Array.from(this.places.subarray(0, 3 * this.count))
  }
}

/** Rings a share of the way between two outputs; one that changed its number of nodes stays at its nearer end. */
function between(from: readonly RingShape[], to: readonly RingShape[], share: number): readonly RingShape[] {
  return from.map((ring) => {
    const next = to.find(({ number }) => number === ring.number)
    if (next === undefined) return ring
    if (next.nodes.length !== ring.nodes.length) return share < 0.5 ? ring : next
    const nodes = ring.nodes.map((value, i) => value + share * ((next.nodes[i] ?? value) - value))
    return { ...ring, nodes, coreRadius: ring.coreRadius + share * (next.coreRadius - ring.coreRadius) }
  })
}
