/** Reading a plan by the path of one of its fields. */
import { numberAt, type ChoicePath, type FieldPath, type Plan } from '../../core/plan'

/** The number at a path, null where it is not given. */
export function fieldValue(plan: Plan, path: FieldPath): number | null {
  // No train means one pulse.
  if (plan.train === null && (path === 'train.pulses' || path === 'train.period')) return 1
  return numberAt(plan, path)
}

/** The choice at a path. */
export function choiceValue(plan: Plan, path: ChoicePath): string {
  return String(path.split('.').reduce<unknown>((held, key) => (isRecord(held) ? held[key] : undefined), plan))
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null
}
