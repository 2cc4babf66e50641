/** What stands below and above a thruster's map in words. */
import type { Design } from '../thruster'

/** What is read of a design that stands on a map. */
interface Marked {
  readonly kind: 'present' | 'candidate'
  readonly onMap: boolean
  readonly count: number
}

/** What all choices of a map have in common. */
export function mapScope({ count }: Pick<Design, 'count'>): string {
  return `for ${count} ${count === 1 ? 'thruster' : 'thrusters'}, as planned`
}

/**
 * How a map stands to its limits, and where the candidates lie that are not among its choices.
 *
 * @param scope what its choices have in common
 * @param feasibleShare share of them that holds every limit, 0 to 1
 */
export function mapStanding(scope: string, feasibleShare: number, marks: readonly Marked[]): string {
  const held =
    feasibleShare === 0 ? `No choice on this map, ${scope}, holds every limit.` : `${scope.replace(/^f/u, 'F')}.`
  const present = marks.find(({ kind }) => kind === 'present')
  const others = marks.filter(({ kind, onMap }) => kind === 'candidate' && !onMap)
  if (others.length === 0) return held
  const counts = [...new Set(others.map(({ count }) => count))].sort((a, b) => a - b)
  const words = counts.some((count) => count !== present?.count)
    ? `are for ${counts.join(' or ')} ${counts.length === 1 && counts[0] === 1 ? 'thruster' : 'thrusters'}`
    : 'have another eject share or frequency'
  return `${held} Dashed candidates ${words}: they lie on another map.`
}
