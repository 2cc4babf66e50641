/**
 * Room that every choice of a map leaves to each limit: positive where it holds, 0 on its edge, negative where it is broken.
 */
import { limitScales } from './candidates'
import type { CompiledDesigns } from './design'
import { slackOf } from './designLimits'
import type { DesignFigures, PointFigures } from './designTypes'
import type { Limit, LimitName } from './types'

/** Rooms are held to this: a limit without a measure must not drown its neighbours. */
const MOST_ROOM = 2

/** Rooms of a map by limit, a cell of it each; NaN where the limit is not asked. */
export class MapRooms {
  readonly rooms = new Map<LimitName, Float64Array>()
  private readonly fastest: number

  /** @param found true where the duty points set the frequency */
  constructor(
    private readonly designs: CompiledDesigns,
    private readonly cells: number,
    private readonly found: boolean,
  ) {
    this.fastest = designs.problem.section.search?.frequency[1] ?? Infinity
  }

  /** Take the least room of each limit over the duty points of a design. */
  add(cell: number, { points }: DesignFigures): void {
    for (const point of points)
      for (const limit of point.limits) {
        const column = this.column(limit.name)
        const room = Math.min(MOST_ROOM, Math.max(-MOST_ROOM, this.roomOf(limit, point)))
        const before = column[cell] ?? NaN
        column[cell] = Number.isNaN(before) ? room : Math.min(before, room)
      }
  }

  private column(name: LimitName): Float64Array {
    const known = this.rooms.get(name)
    if (known !== undefined) return known
    const fresh = new Float64Array(this.cells).fill(NaN)
    this.rooms.set(name, fresh)
    return fresh
  }

  /**
   * Slack over the limit. Two limits are met exactly wherever they can be: their room is then that of what is left to meet them with,
   * so that it goes through 0 where they begin to be broken. Thrust grows with the square of the frequency, so a thrust that is missing
   * is told as the frequency that is missing: one slope on both sides of the edge.
   */
  private roomOf(limit: Limit, { held }: PointFigures): number {
    const { valveLag } = this.designs.problem.section.actuator
    if (limit.ok && limit.name === 'eject time') return held.ejectShare - valveLag * held.frequency
    if (limit.name === 'thrust' && this.found) {
      if (limit.ok) return 1 - held.frequency / this.fastest
      if (limit.value > 0) return 1 - Math.sqrt(limit.limit / limit.value)
    }
    return slackOf(limit, limitScales(this.designs, held.frequency))
  }
}
