/**
 * Cruise: the speeds at which thrust meets drag.
 */
import { at, bracketedRoot, last } from '../base'
import type { DragLaw } from './drag'

/** One speed at which the mean thrust equals the drag. */
export interface CruiseSpeed {
  /** [m/s] */
  readonly speed: number
  /** Thrust and drag there [N]. */
  readonly thrust: number
  /** True where more speed meets more drag than thrust: a vehicle pushed off returns. */
  readonly stable: boolean
}

export interface Cruise {
  /** Every crossing of thrust and drag, in rising speed. */
  readonly speeds: readonly CruiseSpeed[]
  /** The stable speed a vehicle reaches from rest; 0 where it does not start; null where no crossing was found. */
  readonly fromRest: number | null
  /** Thrust less drag at rest [N]. */
  readonly excessAtRest: number
  /** Highest speed that was looked at [m/s], and thrust less drag there [N]. */
  readonly searchedTo: number
  readonly excessThere: number
}

/** Places looked at over the whole range, and within each piece of a table. */
const SCAN_STEPS = 256
const STEPS_A_PIECE = 16
/** Doublings from 1 m/s in search of a speed at which drag is larger than thrust. */
const MOST_DOUBLINGS = 40

/**
 * All cruise speeds, by a scan for changes of sign and Brent's method in each.
 *
 * Two crossings closer together than a scan step (1/256 of the range, 1/16 of a table's piece) are missed as a pair.
 *
 * @param thrustAt mean thrust [N] at a speed [m/s]
 * @param zeroThrustSpeed speed at which the thrust ends [m/s]; Infinity where it never does
 */
export function findCruise(thrustAt: (speed: number) => number, drag: DragLaw, zeroThrustSpeed: number): Cruise {
  const excess = (speed: number): number => thrustAt(speed) - drag.dragAt(speed)
  const top = Math.min(drag.highestSpeed, Number.isFinite(zeroThrustSpeed) ? zeroThrustSpeed : pastDrag(excess, drag))
  const grid = scanPoints(top, drag.knots)
  const values = grid.map(excess)
  const speeds: CruiseSpeed[] = []
  for (let i = 0; i + 1 < grid.length; i++) {
    const [low, high] = [at(values, i), at(values, i + 1)]
    // An exact zero at the start of an interval has been taken with the interval before.
    if (low === 0 || (low > 0 && high > 0) || (low < 0 && high < 0)) continue
    const speed = bracketedRoot(excess, at(grid, i), at(grid, i + 1))
    if (speed !== null) speeds.push({ speed, thrust: thrustAt(speed), stable: low > 0 })
  }
  const excessAtRest = at(values, 0)
  const first = speeds[0]
  return {
    speeds,
    fromRest: excessAtRest > 0 ? (first?.speed ?? null) : 0,
    excessAtRest,
    searchedTo: top,
    excessThere: last(values),
  }
}

/** A speed at which drag is larger than thrust, by doubling. */
function pastDrag(excess: (speed: number) => number, drag: DragLaw): number {
  let speed = 1
  for (let i = 0; i < MOST_DOUBLINGS && speed < drag.highestSpeed && excess(speed) >= 0; i++) speed *= 2
  return speed
}

function scanPoints(top: number, knots: readonly number[]): number[] {
  const points = Array.from({ length: SCAN_STEPS + 1 }, (_, i) => (top * i) / SCAN_STEPS)
  for (let k = 0; k + 1 < knots.length; k++) {
    const from = at(knots, k)
    const step = (at(knots, k + 1) - from) / STEPS_A_PIECE
    for (let i = 0; i < STEPS_A_PIECE; i++) if (from + i * step < top) points.push(from + i * step)
  }
  return [...new Set(points)].sort((a, b) => a - b)
}
