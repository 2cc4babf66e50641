/**
 * Designs held against the plan as it stands: kept in the plan, computed in the worker, and told as differences beside each figure.
 */
import { computed, ref, shallowRef, watch, type ComputedRef, type Ref, type ShallowRef } from 'vue'
import { planDocument, readPlan, setHeld, type HeldDesign, type JsonObject, type Plan } from '../../core/plan'
import type { ThrusterResult } from '../../core/thruster'
import type { WorkerClient } from '../worker/client'
import type { PlanDocument } from './document'

/** Sections that make a design; title, notes and shown units do not. */
const SECTIONS = ['water', 'nozzle', 'programme', 'ambient', 'models', 'jet', 'train', 'thruster'] as const
const FILE_KEYS = ['format', 'version'] as const

export interface HeldDesigns {
  readonly names: ComputedRef<readonly string[]>
  /** Place in the list of the one that is compared with; null: none. */
  readonly chosen: Ref<number | null>
  /** Its name and figures, where they could be computed. */
  readonly shown: Readonly<ShallowRef<{ readonly name: string; readonly result: ThrusterResult } | null>>
  /** Keep the plan as it stands: one step of undo. */
  hold(): void
  /** Make the chosen one the plan: one step of undo. */
  bringBack(): void
  /** Let the chosen one go: one step of undo. */
  letGo(): void
}

/** @param active whether anybody looks */
export function createHeldDesigns(client: WorkerClient, document: PlanDocument, active: () => boolean): HeldDesigns {
  const chosen = ref<number | null>(null)
  const shown = shallowRef<{ readonly name: string; readonly result: ThrusterResult } | null>(null)
  const plan = (): Plan => document.content.value
  const held = computed((): HeldDesign | null => (chosen.value === null ? null : (plan().held[chosen.value] ?? null)))

  watch([held, active], ([design, looked]) => {
    if (design === null) shown.value = null
    if (design === null || !looked || shown.value?.name === design.name) return
    const whole = planOf(plan(), design)
    if (whole === null) return
    void client.run(whole, ['water', 'thruster'], undefined, 'cached').outcome.then((outcome) => {
      const result = outcome.kind === 'result' ? (outcome.result.data?.thruster?.result ?? null) : null
      if (held.value?.name === design.name) shown.value = result === null ? null : { name: design.name, result }
    })
  })

  return {
    names: computed(() => plan().held.map(({ name }, index) => (name === '' ? `Held ${index + 1}` : name))),
    chosen,
    shown,
    hold() {
      const kept = plan().held
      const name = freshName(kept.map((design) => design.name))
      document.change(`hold ${name}`, setHeld(plan(), [...kept, { name, plan: sectionsOf(plan()) }]))
      chosen.value = kept.length
    },
    bringBack() {
      const design = held.value
      const whole = design === null ? null : planOf(plan(), design)
      if (design === null || whole === null) return
      const { title, notes, view, source } = plan()
      document.change(`bring back ${design.name}`, { ...whole, title, notes, view, source, held: plan().held })
    },
    letGo() {
      const design = held.value
      if (design === null) return
      document.change(
        `let go ${design.name}`,
        setHeld(
          plan(),
          plan().held.filter((one) => one !== design),
        ),
      )
      chosen.value = null
    },
  }
}

function sectionsOf(plan: Plan): JsonObject {
  const whole = planDocument(plan)
  return Object.fromEntries(SECTIONS.flatMap((name) => (whole[name] === undefined ? [] : [[name, whole[name]]])))
}

/** The plan that a held design makes; null where its sections cannot be read. */
function planOf(plan: Plan, design: HeldDesign): Plan | null {
  const whole = planDocument(plan)
  const kept = Object.fromEntries(FILE_KEYS.map((key) => [key, whole[key] ?? null]))
  const reading = readPlan(JSON.stringify({ ...kept, ...design.plan }))
  return reading.ok ? reading.plan : null
}

function freshName(taken: readonly string[]): string {
  for (let number = taken.length + 1; ; number++) {
    const name = `Held ${number}`
    if (!taken.includes(name)) return name
  }
}
