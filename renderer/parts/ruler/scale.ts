/**
 * The ruler's scale: how far the axis goes, its ticks, and the way between formation time and pixels. Pure.
 */
import { at } from '../../../core/base'
import { formatNumber } from '../../../core/quantity'

/** Shortest axis shown: below it a plan near pinch-off would have no room on either side. */
const SHORTEST_AXIS = 5
/** Room kept beyond the stroke and the published band. */
const ROOM = 1.15

/** Smallest of 1, 2, 5, 10, 20 ... that is at least x; x > 0. */
export function nextRoundNumber(x: number): number {
  const decade = 10 ** Math.floor(Math.log10(x) + 1e-9)
  const mantissa = x / decade
  const step = [1, 2, 5, 10].find((candidate) => mantissa <= candidate * (1 + 1e-9)) ?? 10
  return step * decade
}

/**
 * End of the axis.
 *
 * An estimate far beyond stroke and band does not shrink the scale for everything else: it is shown at the end with an arrow.
 */
export function axisEnd(
  strokeRatio: number,
  band: readonly [number, number] | null,
  estimates: readonly number[],
): number {
  const near = Math.max(strokeRatio, band === null ? 0 : at(band, 1))
  const estimate = Math.max(0, ...estimates.filter((value) => value <= 2 * Math.max(near, SHORTEST_AXIS)))
  return nextRoundNumber(Math.max(SHORTEST_AXIS, ROOM * Math.max(near, estimate)))
}

export interface AxisTick {
  readonly value: number
  readonly major: boolean
}

/** Major ticks at 1-2-5 steps no closer than `spacing` pixels, five minor parts between. */
export function axisTicks(end: number, width: number, spacing = 44): readonly AxisTick[] {
  const count = Math.max(1, Math.min(10, Math.floor(width / spacing)))
  const major = nextRoundNumber(end / count)
  const total = Math.round((end / major) * 5)
  return Array.from({ length: total + 1 }, (_, i) => ({ value: (i * major) / 5, major: i % 5 === 0 })).filter(
    (tick) => tick.value <= end * (1 + 1e-9),
  )
}

/** Text of a major tick, without the noise of binary fractions. */
export function tickText(value: number): string {
  return formatNumber(value, 6)
}

/** Outline of exit speed against formation time as polygon points; height 1 at the fastest. */
export function outlinePoints(
  formationTime: readonly number[],
  exitSpeed: readonly number[],
): readonly (readonly [number, number])[] {
  const fastest = Math.max(...exitSpeed, 0)
  if (fastest === 0) return []
  return formationTime.map((t, i) => [t, at(exitSpeed, i) / fastest])
}
