/**
 * A plan with some of its numbers changed by their dotted paths, as sweeps and spread change them.
 */
import { DomainError } from '../base'
import { numberAt, setNumber, type Plan } from '../plan'

export interface SetValue {
  /** Dotted path in the plan. */
  readonly path: string
  readonly value: number
}

/** Relative difference that setting and reading a number again may leave: the stroke of a table is summed from its rows. */
const SAME = 1e-9

/** What the rows of a table of the programme rule, so that setting it would change nothing. */
const RULED_BY_ROWS: readonly string[] = ['programme.peakSpeed', 'programme.riseTime', 'programme.fallTime']

/**
 * The plan with values set, in their order.
 *
 * @param field name of what gave the path, for refusals: `sweep.fields.0.path`
 * @throws {DomainError} on `field` where the plan has no such number to set
 */
export function variedPlan(plan: Plan, values: readonly SetValue[], field: (index: number) => string): Plan {
  const varied = values.reduce((changed, { path, value }, i) => {
    if (plan.programme.shape === 'table' && RULED_BY_ROWS.includes(path))
      throw new DomainError(field(i), `${field(i)} must name a number that acts: the rows of the table rule ${path}`)
    return setNumber(changed, path, value)
  }, plan)
  values.forEach(({ path, value }, i) => {
    const found = numberAt(varied, path)
    if (found === null || Math.abs(found - value) > SAME * Math.abs(value))
      throw new DomainError(field(i), `${field(i)} must name a number that the plan has, got ${path}`)
  })
  return varied
}
