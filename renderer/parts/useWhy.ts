/** Asking why a figure is what it is: the panel beside the button that asked, with its explanation. */
import { computed, ref, useTemplateRef, type ComputedRef, type Ref } from 'vue'
import type { Explanation } from '../../core/report'

/** The panel as far as it is opened from here: WhyPanel.vue. */
interface OpenedPanel {
  open(button: HTMLElement): Promise<void>
}

export interface Why<Id> {
  readonly explanation: ComputedRef<Explanation | null>
  why(id: Id, button: HTMLElement): void
  /** The panel has been closed. */
  forget(): void
}

/**
 * @param name of the panel in the template
 * @param explain the answer for one figure; null while there is nothing to explain it by
 */
export function useWhy<Id extends string>(name: string, explain: (id: Id) => Explanation | null): Why<Id> {
  const panel = useTemplateRef<OpenedPanel>(name)
  const asked: Ref<Id | null> = ref(null)
  return {
    explanation: computed(() => (asked.value === null ? null : explain(asked.value))),
    why(id, button) {
      asked.value = id
      void panel.value?.open(button)
    },
    forget() {
      asked.value = null
    },
  }
}
