/** Reading a plan by the path of one of its fields. */
import type { ChoicePath, FieldPath, Plan } from '../../core/plan'

/** The number at a path, null where it is not given. */
export function fieldValue(plan: Plan, path: FieldPath): number | null {
  // No train means one pulse.
  if (plan.train === null && (path === 'train.pulses' || path === 'train.period')) return 1
  const value = valueAt(plan, path)
  return typeof value === 'number' ? value : null
}

/** The choice at a path. */
export function choiceValue(plan: Plan, path: ChoicePath): string {
  return String(valueAt(plan, path))
}

function valueAt(plan: Plan, path: string): unknown {
  return path.split('.').reduce<unknown>((held, key) => (isRecord(held) ? held[key] : undefined), plan)
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null
}
