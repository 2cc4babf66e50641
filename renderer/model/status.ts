/** The working status at a glance: water, jet Reynolds number, how fresh the results are. Pure. */
import { formatNumber, formatQuantity } from '../../core/quantity'
import { CHOICES, type Plan } from '../../core/plan'
import type { ResultsStatus } from './results'
import type { Units } from './units'
import type { AskedStatus } from './askedJob'

/** `sea water 15 °C`. */
export function waterInWords(plan: Plan, units: Units): string {
  if (plan.water.kind === 'given') return 'given liquid'
  const kind = CHOICES['water.kind'][plan.water.kind]
  return `${kind} water ${formatQuantity(plan.water.temperatureCelsius, units.temperature)}`
}

/** `jet Reynolds number 5050`. */
export function reynoldsInWords(jetReynolds: number): string {
  return `jet Reynolds number ${formatNumber(jetReynolds, 3)}`
}

/**
 * How the results stand to the plan shown.
 *
 * @param problems refusals of the plan; while there are any nothing new is computed
 */
export function freshnessInWords(status: ResultsStatus, problems: number): string {
  if (problems > 0) return status === 'none' ? 'not computed' : 'results for the previous plan'
  switch (status) {
    case 'current':
      return 'results current'
    case 'running':
      return 'computing'
    case 'failed':
      return 'not computed'
    case 'stale':
      return 'results for the previous plan'
    case 'none':
      return 'no results yet'
  }
}

/**
 * With entries that were refused and stand in their fields, results are those of the plan without them.
 *
 * @param words how the results stand to the plan
 */
export function withUntaken(words: string, untaken: number): string {
  if (untaken === 0) return words
  const standing = words === 'results current' ? 'results for the accepted plan' : words
  return `${standing}, ${untakenInWords(untaken)}`
}

/** `1 entry not taken`. */
export function untakenInWords(untaken: number): string {
  return `${untaken} ${untaken === 1 ? 'entry' : 'entries'} not taken`
}

/** How the rings in motion stand to the plan shown. */
export function wakeFreshnessInWords(status: AskedStatus): string {
  const words: Readonly<Record<AskedStatus, string>> = {
    current: 'results current',
    partial: 'part of the results',
    running: 'computing',
    stale: 'results for the previous plan',
    failed: 'not computed',
    none: 'no results yet',
  }
  return words[status]
}

/** `2 cautions`. */
export function cautionsInWords(count: number): string {
  return count === 0 ? 'no cautions' : count === 1 ? '1 caution' : `${count} cautions`
}
