/**
 * How a design stands to its limits, as one number and by name.
 */
import type { Limit } from './types'

/** A limit without a measure counts as broken by this much: a speed that jumps, a pulse that has no time. */
const HOPELESS = 1e3
/** What is broken by less than rounding is still broken. */
const LEAST_BROKEN = 1e-15
/** Slack below this, relative, binds. */
export const BINDING_SLACK = 0.01

/** What a limit of 0 is measured against. */
export interface LimitScales {
  /** [s] */
  readonly period: number
  /** Ambient over vapour pressure [Pa]. */
  readonly pressure: number
}

/** Limits met by the way a design is made: the stroke takes the time there is, the frequency gives the thrust asked for. */
export const MET_BY_CONSTRUCTION: ReadonlySet<Limit['name']> = new Set(['eject time', 'thrust'])

/** Limits that a value must be above; all others it must stay below. */
const LOWER: ReadonlySet<Limit['name']> = new Set(['refill time', 'core cavitation', 'intake cavitation', 'thrust'])

/**
 * Room left to a limit, over the limit: negative where it is broken.
 *
 * Refill time is measured against the period, cavitation against ambient less vapour pressure.
 */
export function slackOf(limit: Limit, scales: LimitScales): number {
  const { name, value, limit: end } = limit
  const gap = LOWER.has(name) ? value - end : end - value
  const slack = gap / scaleOf(limit, scales)
  return Number.isFinite(slack) ? slack : gap > 0 ? Infinity : -HOPELESS
}

function scaleOf({ name, limit }: Limit, { period, pressure }: LimitScales): number {
  if (name === 'refill time') return period
  if (name === 'core cavitation' || name === 'intake cavitation') return pressure
  // An eject time may leave nothing at all.
  return Math.abs(limit) > 0 ? Math.abs(limit) : period
}

/**
 * Sum of what is broken, each over its limit; exactly 0 where every limit is kept.
 *
 * A missing thrust is measured against the thrust there is: giving none must not be the nearest to giving enough.
 */
export function violationOf(limits: readonly Limit[], scales: LimitScales): number {
  let sum = 0
  for (const limit of limits) {
    if (limit.ok) continue
    const broken =
      limit.name === 'thrust' ? (limit.value > 0 ? limit.limit / limit.value - 1 : HOPELESS) : -slackOf(limit, scales)
    sum += Math.min(HOPELESS, Math.max(LEAST_BROKEN, broken))
  }
  return sum
}
