/** Fields of the plan that a matrix or a spread may vary, by name. */
import { FIELDS, isFieldPath, variedDefinition, type Plan } from '../../core/plan'
import { isUnitKey, unitKeyOf, type Units } from './units'

/** Parts of the plan that a day at the tank turns, in the order of the list. */
const PARTS = ['programme', 'nozzle', 'water', 'ambient', 'tankRun.tank', 'tankRun.drive', 'tankRun.nozzleDepth']

/** Words by path, in the order of the work; `held` paths are listed wherever they come from. */
export function variedFields(plan: Plan, held: readonly string[]): Readonly<Record<string, string>> {
  const paths = PARTS.flatMap((part) =>
    Object.keys(FIELDS).filter((path) => path === part || path.startsWith(`${part}.`)),
  )
  const listed = [...new Set([...paths.filter((path) => isVaried(plan, path)), ...held])]
  return Object.fromEntries(listed.map((path) => [path, fieldName(path)]))
}

function isVaried(plan: Plan, path: string): boolean {
  const definition = variedDefinition(path)
  if (definition === null || definition.whole === true) return false
  const given = plan.water.kind === 'given'
  if (path.startsWith('water.'))
    return given === ['water.density', 'water.kinematicViscosity', 'water.vapourPressure'].includes(path)
  const ruled = ['programme.peakSpeed', 'programme.riseTime', 'programme.fallTime']
  return !(plan.programme.shape === 'table' && ruled.includes(path))
}

export function fieldName(path: string): string {
  return variedDefinition(path)?.label ?? path
}

/** Shown unit of any number of the plan. */
export function unitOfPath(path: string, units: Units): string {
  const dimension = variedDefinition(path)?.dimension ?? 'number'
  const key = isFieldPath(path) ? unitKeyOf(path, dimension) : dimension
  return isUnitKey(key) ? units[key] : ''
}
