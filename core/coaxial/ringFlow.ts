/**
 * How a set of coaxial rings moves: the slopes of place, radius and core volume, and the sums the motion conserves.
 *
 * Thin-core law: own speed Gamma/(4 pi R) (ln(8 R/a) + A - 1/2), other rings as plain filaments. Regularised law: the
 * smoothed kernel for all, with delta = a exp(-(A + 1/2)), which gives a lone thin ring the same speed. The core keeps a^2 R.
 * Laminar ageing: a^2 grows by 4 nu dt besides. Turbulent ageing: R grows by a fixed share of the way the ring moves itself, at
 * constant Gamma R^2 and a/R, so that a lone ring slows as the cube of its size. A wall across the axis is the mirror image of
 * every ring.
 */
import { at } from '../base'
import type { CoaxialInput, Kernel } from '../kernel'
import { CORE_CONSTANT, type CoreModel } from '../ring'
import { RoundTube } from './roundTube'
import type { CoaxialLaw } from './types'

export interface FlowRing {
  readonly core: CoreModel
}

export interface FlowSetup {
  readonly rings: readonly FlowRing[]
  readonly law: CoaxialLaw
  readonly axialFlow: number
  readonly wall: number | null
  readonly tubeRadius: number | null
  /** Laminar growth of a^2, 4 nu [m2/s], or 0 */
  readonly coreGrowth: number
  /** Turbulent growth of R over the ring's own way, or 0 */
  readonly sizeGrowth: number
  readonly kernel: Kernel
}

/** delta over a of a core: the smoothing under which a lone thin ring moves like the core. */
export function deltaOverCore(core: CoreModel): number {
  return Math.exp(-(CORE_CONSTANT[core] + 0.5))
}

/**
 * Rings in motion. The state is [x of each, R of each, a^2 R of each, Gamma of each]. Holds scratch arrays: one flow serves one march.
 */
export class RingFlow {
  readonly count: number
  private readonly sources: number
  private readonly circulation: Float64Array
  private readonly constants: Float64Array
  private readonly deltaFactors: Float64Array
  private readonly sourceX: Float64Array
  private readonly sourceR: Float64Array
  private readonly deltaSquared: Float64Array
  private readonly axial: Float64Array
  private readonly radial: Float64Array
  private readonly input: CoaxialInput
  private readonly tube: RoundTube | null

  constructor(private readonly setup: FlowSetup) {
    const { rings, wall, tubeRadius, law } = setup
    const count = rings.length
    this.count = count
    this.sources = wall === null ? count : 2 * count
    this.circulation = new Float64Array(this.sources)
    this.constants = Float64Array.from(rings, (ring) => CORE_CONSTANT[ring.core])
    this.deltaFactors = Float64Array.from(rings, (ring) => deltaOverCore(ring.core) ** 2)
    this.sourceX = new Float64Array(this.sources)
    this.sourceR = new Float64Array(this.sources)
    this.deltaSquared = new Float64Array(this.sources)
    this.axial = new Float64Array(count)
    this.radial = new Float64Array(count)
    this.tube = tubeRadius === null ? null : new RoundTube(tubeRadius)
    this.input = {
      targetCount: count,
      targetX: this.sourceX,
      targetR: this.sourceR,
      targetDeltaSquared: law === 'regularised' ? this.deltaSquared : null,
      rings: {
        count: this.sources,
        x: this.sourceX,
        r: this.sourceR,
        circulation: this.circulation,
        deltaSquared: this.deltaSquared,
      },
      skipSelf: law === 'thin',
    }
  }

  /** Slopes of the state; fit for RungeKuttaStepper. */
  readonly derivative = (_time: number, state: Float64Array, out: Float64Array): void => {
    const { count, setup } = this
    this.place(state)
    if (this.tube === null) setup.kernel.coaxialVelocity(this.input, { axial: this.axial, radial: this.radial })
    else this.velocityInTube(this.tube)
    for (let i = 0; i < count; i++) {
      const radius = read(state, count + i)
      const volume = read(state, 2 * count + i)
      const own = this.ownSpeed(i, radius, volume)
      const growth = setup.sizeGrowth * Math.abs(own)
      out[i] = setup.axialFlow + (setup.law === 'thin' ? own : 0) + read(this.axial, i)
      out[count + i] = read(this.radial, i) + growth
      out[2 * count + i] = setup.coreGrowth * radius + (3 * volume * growth) / radius
      out[3 * count + i] = (-2 * read(this.circulation, i) * growth) / radius
    }
  }

  /** Core radius of a ring in a state [m]. */
  coreRadius(state: Float64Array, ring: number): number {
    return Math.sqrt(read(state, 2 * this.count + ring) / read(state, this.count + ring))
  }

  /** Sum of Gamma R^2, and of its sizes: the impulse over rho pi. */
  impulse(state: Float64Array): { readonly sum: number; readonly scale: number } {
    let sum = 0
    let scale = 0
    for (let i = 0; i < this.count; i++) {
      const term = read(state, 3 * this.count + i) * read(state, this.count + i) ** 2
      sum += term
      scale += Math.abs(term)
    }
    return { sum, scale }
  }

  /**
   * Energy over rho in unbounded fluid at rest, and the size of the rings' own energies.
   *
   * Under the regularised law it is that of the smoothed rings less Gamma^2 R/4 each, the work that changing cores do; this is
   * conserved to the order of (delta/R)^2 while rings stretch, and exactly where they keep their size.
   */
  energy(state: Float64Array): { readonly sum: number; readonly scale: number } {
    const { count, setup } = this
    const stream = new Float64Array(count)
    this.place(state)
    setup.kernel.coaxialStream(this.input, stream)
    let sum = 0
    let scale = 0
    for (let i = 0; i < count; i++) {
      const strength = read(this.circulation, i)
      const radius = read(state, count + i)
      const logarithm = this.logarithm(radius, read(state, 2 * count + i))
      const own = 0.5 * strength * strength * radius * (logarithm + read(this.constants, i) - 2)
      const correction = setup.law === 'thin' ? own : -0.25 * strength * strength * radius
      sum += Math.PI * strength * read(stream, i) + correction
      scale += Math.abs(own)
    }
    return { sum, scale }
  }

  private ownSpeed(ring: number, radius: number, volume: number): number {
    const share = this.logarithm(radius, volume) + read(this.constants, ring) - 0.5
    return (read(this.circulation, ring) / (4 * Math.PI * radius)) * share
  }

  /** ln(8 R/a) */
  private logarithm(radius: number, volume: number): number {
    return 0.5 * Math.log((64 * radius ** 3) / volume)
  }

  /** Put the state, and the images of a wall, where the kernel reads them. */
  private place(state: Float64Array): void {
    const { count, setup } = this
    for (let i = 0; i < count; i++) {
      const x = read(state, i)
      const radius = read(state, count + i)
      this.sourceX[i] = x
      this.sourceR[i] = radius
      this.circulation[i] = read(state, 3 * count + i)
      if (setup.law === 'regularised')
        this.deltaSquared[i] = (read(this.deltaFactors, i) * read(state, 2 * count + i)) / radius
      if (setup.wall === null) continue
      this.sourceX[count + i] = 2 * setup.wall - x
      this.sourceR[count + i] = radius
      this.circulation[count + i] = -read(this.circulation, i)
      this.deltaSquared[count + i] = read(this.deltaSquared, i)
    }
  }

  /** Target by target: of rings further away than the tube is wide the free part must not be summed at all. */
  private velocityInTube(tube: RoundTube): void {
    const { count, setup } = this
    const prepared = Array.from({ length: count }, (_, i) => tube.prepare(read(this.sourceR, i)))
    const near = {
      x: new Float64Array(count),
      r: new Float64Array(count),
      circulation: new Float64Array(count),
      deltaSquared: new Float64Array(count),
    }
    const out = { axial: new Float64Array(1), radial: new Float64Array(1) }
    for (let i = 0; i < count; i++) {
      const velocity = { axial: 0, radial: 0 }
      let nearCount = 0
      for (let j = 0; j < count; j++) {
        const dx = read(this.sourceX, i) - read(this.sourceX, j)
        tube.reaction(at(prepared, j), read(this.circulation, j), at(prepared, i), dx, velocity)
        if (tube.givesWhole(dx) || (i === j && setup.law === 'thin')) continue
        near.x[nearCount] = read(this.sourceX, j)
        near.r[nearCount] = read(this.sourceR, j)
        near.circulation[nearCount] = read(this.circulation, j)
        near.deltaSquared[nearCount] = read(this.deltaSquared, j)
        nearCount++
      }
      setup.kernel.coaxialVelocity(
        {
          targetCount: 1,
          targetX: this.sourceX.subarray(i, i + 1),
          targetR: this.sourceR.subarray(i, i + 1),
          targetDeltaSquared: setup.law === 'regularised' ? this.deltaSquared.subarray(i, i + 1) : null,
          rings: { count: nearCount, ...near },
          skipSelf: false,
        },
        out,
      )
      this.axial[i] = velocity.axial + read(out.axial, 0)
      this.radial[i] = velocity.radial + read(out.radial, 0)
    }
  }
}

function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
