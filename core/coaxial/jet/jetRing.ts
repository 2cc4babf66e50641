/**
 * The ring of a run: means of its rows over a stretch of time.
 */
import { at, last } from '../../base'
import { partRadius, type JetRow, type JetScales } from './jetRecorder'
import type { PartSums } from './sheetSums'
import type { JetRing } from './types'

/** The ring over rows that all have one, in SI; null for no rows. */
export function meanRing(rows: readonly JetRow[], scales: JetScales): JetRing | null {
  const known = rows.flatMap(({ time, ring }) => (ring === null ? [] : [{ time, ring }]))
  if (known.length < 2) return null
  const mean = (value: (ring: PartSums) => number): number =>
    known.reduce((sum, { ring }) => sum + value(ring), 0) / known.length
  const circulation = mean((ring) => ring.circulation)
  const impulse = mean((ring) => ring.impulse)
  const energy = mean((ring) => ring.energy)
  const speed = slope(known.map(({ time, ring }) => [time, ring.x]))
  return {
    circulation: circulation * scales.circulation,
    impulse: impulse * scales.impulse,
    energy: energy * scales.energy,
    dimensionlessEnergy: energy / (Math.sqrt(impulse) * circulation ** 1.5),
    radius: mean(partRadius) * scales.length,
    x: last(known).ring.x * scales.length,
    speed: speed * scales.speed,
    limitingCirculation: speed > 0 ? circulation / (Math.cbrt(impulse) * Math.cbrt(speed * speed)) : null,
  }
}

/** Slope of the straight line of least squares. */
function slope(points: readonly (readonly [number, number])[]): number {
  const count = points.length
  const meanOf = (k: 0 | 1): number => points.reduce((sum, point) => sum + at(point, k), 0) / count
  const [x0, y0] = [meanOf(0), meanOf(1)]
  let above = 0
  let below = 0
  for (const [x, y] of points) {
    above += (x - x0) * (y - y0)
    below += (x - x0) ** 2
  }
  return above / below
}
