/**
 * Speeds of the shed sheet under itself, the tube and the stream, and the rate at which the lip sheds. Scaled by exit diameter and
 * peak speed.
 */
import type { CoaxialRings, Kernel } from '../../kernel'
import { LIP_AVERAGE, sheddingRate } from './shedding'
import type { Sheet } from './sheet'
import { TUBE_RADIUS, type TubeWall } from './tubeWall'

export interface JetFlowOptions {
  readonly kernel: Kernel
  readonly delta: number
  /** delta^2 gained a unit of age; 0 without core growth. */
  readonly deltaGrowth: number
  /** Stream along the axis, in peak speeds. */
  readonly stream: number
  /** null: the free sheet without its tube. */
  readonly wall: TubeWall | null
}

export class JetFlow {
  axial = new Float64Array(0)
  radial = new Float64Array(0)
  /** Bound strengths of the last evaluation. */
  readonly strengths: Float64Array
  evaluations = 0
  private heldTime: number | null = null
  private readonly freeStream: Float64Array
  private readonly middleR: Float64Array
  private x = new Float64Array(0)
  private r = new Float64Array(0)
  private circulation = new Float64Array(0)
  private deltaSquared = new Float64Array(0)

  constructor(private readonly options: JetFlowOptions) {
    const panels = options.wall?.panelCount ?? 0
    this.strengths = new Float64Array(panels)
    this.freeStream = new Float64Array(panels)
    this.middleR = new Float64Array(panels).fill(TUBE_RADIUS)
  }

  /**
   * Writes the speeds of every filament to `axial` and `radial`.
   *
   * @param speed in the tube, in peak speeds
   * @returns rate of shedding, U^2
   */
  evaluate(sheet: Sheet, time: number, speed: number): number {
    const { wall, stream, kernel } = this.options
    const free = this.gather(sheet, time)
    const count = sheet.count
    let total = count
    if (wall !== null) {
      this.bind(wall, free, speed)
      wall.spread(speed - stream, this.strengths, this.circulation, count)
      total += wall.ringX.length
    }
    kernel.coaxialVelocity(
      {
        targetCount: count,
        targetX: this.x,
        targetR: this.r,
        targetDeltaSquared: this.deltaSquared,
        rings: { ...free, count: total },
        skipSelf: false,
      },
      this,
    )
    this.evaluations++
    if (stream !== 0) for (let i = 0; i < count; i++) this.axial[i] = (this.axial[i] ?? NaN) + stream
    if (wall === null) return 0
    const strength = wall.meanStrength(LIP_AVERAGE * this.options.delta, this.strengths)
    return sheddingRate(strength, this.axial[sheet.lip] ?? NaN)
  }

  /** From now on the smoothing stays what it is at a time. */
  holdTime(time: number): void {
    this.heldTime = time
  }

  /** delta^2 of a filament at a time. */
  deltaSquaredOf(sheet: Sheet, index: number, time: number): number {
    const { delta, deltaGrowth } = this.options
    return delta * delta + deltaGrowth * Math.max(0, time - (sheet.birth[index] ?? NaN))
  }

  /** Bound strengths under the sheet as it stands. */
  solveWall(sheet: Sheet, time: number, speed: number): Float64Array {
    const { wall } = this.options
    if (wall !== null) this.bind(wall, this.gather(sheet, time), speed)
    return this.strengths
  }

  private bind(wall: TubeWall, free: CoaxialRings, speed: number): void {
    this.options.kernel.coaxialStream(
      {
        targetCount: wall.panelCount,
        targetX: wall.middles,
        targetR: this.middleR,
        targetDeltaSquared: null,
        rings: free,
        skipSelf: false,
      },
      this.freeStream,
    )
    wall.solve(speed - this.options.stream, this.freeStream, this.strengths)
  }

  /** Copies the sheet in, with room for the wall after it. */
  private gather(sheet: Sheet, time: number): CoaxialRings {
    const { wall, delta, deltaGrowth } = this.options
    const { count, birth } = sheet
    const extra = wall?.ringX.length ?? 0
    if (this.x.length < count + extra) this.resize(sheet.x.length + extra)
    const { x, r, circulation, deltaSquared } = this
    x.set(sheet.x.subarray(0, count))
    r.set(sheet.r.subarray(0, count))
    circulation.set(sheet.circulation.subarray(0, count))
    const least = delta * delta
    const clock = this.heldTime ?? time
    for (let i = 0; i < count; i++) deltaSquared[i] = least + deltaGrowth * Math.max(0, clock - (birth[i] ?? NaN))
    if (wall !== null) {
      x.set(wall.ringX, count)
      r.fill(TUBE_RADIUS, count, count + extra)
      deltaSquared.fill(least, count, count + extra)
    }
    return { count, x, r, circulation, deltaSquared }
  }

  private resize(length: number): void {
    this.x = new Float64Array(length)
    this.r = new Float64Array(length)
    this.circulation = new Float64Array(length)
    this.deltaSquared = new Float64Array(length)
    this.axial = new Float64Array(length)
    this.radial = new Float64Array(length)
  }
}
