/** What is varied must be there: items of lists that a sweep, a spread or a matrix names and the plan does not have. */
import { refuse, type Problems } from './decodeFields'
import { isFieldPath } from './planPaths'
import { numberAt } from './planNumbers'
import type { Plan } from './types'

/** Refuse every varied path into a list that has no such item. A field that is not given is set by what varies it. */
export function refuseLostPaths(plan: Plan, problems: Problems): void {
  const named = [
    ...(plan.sweep?.fields ?? []).map(({ path }, index) => [`sweep.fields.${index}.path`, path] as const),
    ...(plan.tankRun?.matrix?.fields ?? []).map(
      ({ path }, index) => [`tankRun.matrix.fields.${index}.path`, path] as const,
    ),
    ...Object.keys(plan.spread?.relative ?? {}).map((path) => [`spread.relative.${path}`, path] as const),
    ...Object.keys(plan.spread?.absolute ?? {}).map((path) => [`spread.absolute.${path}`, path] as const),
  ]
  for (const [field, path] of named)
    if (!isFieldPath(path) && numberAt(plan, path) === null)
      refuse(problems, field, path, 'a number the plan holds', `${field} names ${path}, which this plan does not have.`)
}
