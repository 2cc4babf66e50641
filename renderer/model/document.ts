/**
 * The open plan: its history, its file, its shown units. One a window; everything shown follows `plan`.
 */
import { computed, ref, shallowRef, type ComputedRef, type Ref, type ShallowRef } from 'vue'
import type { Plan } from '../../core/plan'
import type { PlanFile } from '../host/types'
import {
  endBurst,
  isEdited,
  markSaved,
  record,
  redo,
  redoName,
  startHistory,
  undo,
  undoName,
  type Burst,
  type History,
} from './history'

/** Pause after which key presses in one field are a new step [ms]. */
export const TYPING_PAUSE = 1000

export interface PlanDocument {
  /** The plan as it is computed: changes only with its content, never with how it is shown. */
  readonly content: ComputedRef<Plan>
  /** The plan as it is saved: content with the units it is shown in. */
  readonly plan: ComputedRef<Plan>
  readonly units: ComputedRef<Readonly<Record<string, string>>>
  /** The file it came from or was saved to; null for an untitled one. */
  readonly file: Readonly<ShallowRef<PlanFile | null>>
  readonly edited: ComputedRef<boolean>
  readonly undoName: ComputedRef<string | null>
  readonly redoName: ComputedRef<string | null>
  /** True until the first change after the program opened with its default plan. */
  readonly untouched: Readonly<Ref<boolean>>
  /** Make the plan into another, as one named step. */
  change(name: string, next: Plan, burst?: Burst | null): void
  endBurst(): void
  undo(): void
  redo(): void
  /** Show a dimension in another unit: saved with the plan, but no step of undo. */
  setUnit(dimension: string, unit: string): void
  /** Open another plan in place of this one; `unsaved` where it is on no disk and would be lost. */
  replace(plan: Plan, file: PlanFile | null, unsaved?: boolean): void
  markSaved(file: PlanFile): void
}

/**
 * @param initial the plan shown first
 * @param now clock [ms], for the pause inside a burst
 */
export function createDocument(initial: Plan, now: () => number = () => Date.now()): PlanDocument {
  const history: ShallowRef<History<Plan>> = shallowRef(startHistory(initial))
  const units = shallowRef(initial.view.units)
  const savedUnits = shallowRef(initial.view.units)
  const file = shallowRef<PlanFile | null>(null)
  const untouched = ref(true)
  const content = computed(() => history.value.present)

  return {
    content,
    plan: computed(() => ({ ...history.value.present, view: { ...history.value.present.view, units: units.value } })),
    units: computed(() => units.value),
    file,
    edited: computed(() => isEdited(history.value) || !sameUnits(units.value, savedUnits.value)),
    undoName: computed(() => undoName(history.value)),
    redoName: computed(() => redoName(history.value)),
    untouched,
    change(name, next, burst = null) {
      history.value = record(history.value, name, next, now(), burst)
      untouched.value = false
    },
    endBurst() {
      history.value = endBurst(history.value)
    },
    undo() {
      history.value = undo(history.value)
    },
    redo() {
      history.value = redo(history.value)
    },
    setUnit(dimension, unit) {
      units.value = { ...units.value, [dimension]: unit }
    },
    replace(plan, opened, unsaved = false) {
      history.value = startHistory(plan, !unsaved)
      units.value = plan.view.units
      savedUnits.value = plan.view.units
      file.value = opened
      untouched.value = false
    },
    markSaved(saved) {
      history.value = markSaved(history.value)
      savedUnits.value = units.value
      file.value = saved
    },
  }
}

function sameUnits(a: Readonly<Record<string, string>>, b: Readonly<Record<string, string>>): boolean {
  const keys = new Set([...Object.keys(a), ...Object.keys(b)])
  return [...keys].every((key) => a[key] === b[key])
}
