/**
 * Drawing plans: normal about the plan's own values, repeatable by seed.
 */
import { DomainError, randomSource } from '../base'
import { checkNumber, numberAt, type Plan, type SpreadSection } from '../plan'
import type { SetValue } from './variedPlan'

/** A number that scatters. */
export interface DrawnField {
  readonly path: string
  readonly value: number
  /** Standard deviation [SI]. */
  readonly deviation: number
  /** Where the plan gives it, for refusals. */
  readonly field: string
}

/**
 * What scatters, in the order of the paths, whatever their order in the plan.
 *
 * @throws {DomainError} on spread.relative or spread.absolute: nothing named, or a number that the plan does not give
 */
export function drawnFields(plan: Plan, { relative, absolute }: SpreadSection): readonly DrawnField[] {
  const named = [
    ...Object.entries(relative).map(([path, share]) => ({ path, share, field: `spread.relative.${path}` })),
    ...Object.entries(absolute).map(([path, deviation]) => ({ path, deviation, field: `spread.absolute.${path}` })),
  ]
  if (named.length === 0)
    throw new DomainError(
      'spread.relative',
      'spread.relative must name at least one number that scatters, or spread.absolute, for instance "relative": { "programme.stroke": 0.01 }, got none',
    )
  return named
    .map((one): DrawnField => {
      const value = numberAt(plan, one.path)
      if (value === null)
        throw new DomainError(
          one.field,
          `${one.field} must name a number that the plan gives; ${one.path} is not given`,
        )
      const deviation = 'share' in one ? one.share * Math.abs(value) : one.deviation
      return { path: one.path, value, deviation, field: one.field }
    })
    .toSorted((a, b) => (a.path < b.path ? -1 : 1))
}

/** Values of one sample; the first that breaks the limits of its field, as a refusal. */
export interface Draw {
  readonly values: readonly SetValue[]
  readonly refused: DomainError | null
}

/** Draws one after another. Sample k is the same for a seed however many are drawn. */
export function drawing(fields: readonly DrawnField[], seed: number): () => Draw {
  const random = randomSource(seed)
  return () => {
    const values = fields.map(({ path, value, deviation }) => ({ path, value: value + deviation * random.normal() }))
    for (const { path, value } of values) {
      const problem = checkNumber(path, value)
      if (problem !== null) return { values, refused: new DomainError(path, problem.message) }
    }
    return { values, refused: null }
  }
}
