/**
 * Sentences for the person at the window that belong to no field: what happened, why, what can be done.
 */
import { shallowRef, type ShallowRef } from 'vue'

export interface Notice {
  readonly id: number
  /** failure: read out at once; done: read out politely. */
  readonly kind: 'failure' | 'done'
  readonly text: string
  /** More lines for those who want them. */
  readonly details: readonly string[]
}

export interface Notices {
  readonly list: Readonly<ShallowRef<readonly Notice[]>>
  fail(text: string, details?: readonly string[]): void
  tell(text: string): void
  dismiss(id: number): void
  /** Nothing said so far matters any more. */
  clear(): void
}

/** Shown at most at one time; the oldest goes first. */
const MOST = 3

/** A success is shown this long [ms]; failures stay until they are dismissed. */
const SHOWN_FOR = 10_000

/** @param later timer, for tests */
export function createNotices(
  later: (action: () => void, milliseconds: number) => unknown = (action, milliseconds) =>
    setTimeout(action, milliseconds),
): Notices {
  const list = shallowRef<readonly Notice[]>([])
  let nextId = 1
  const add = (kind: Notice['kind'], text: string, details: readonly string[]): void => {
    // A success is worth one line until the next one; the same failure is not stacked.
    const kept = list.value.filter((notice) => notice.kind === 'failure' && notice.text !== text)
    list.value = [...kept, { id: nextId++, kind, text, details }].slice(-MOST)
  }
  const dismiss = (id: number): void => {
    list.value = list.value.filter((notice) => notice.id !== id)
  }
  return {
    list,
    fail: (text, details = []) => add('failure', text, details),
    tell(text) {
      add('done', text, [])
      const told = nextId - 1
      later(() => dismiss(told), SHOWN_FOR)
    },
    dismiss,
    clear() {
      list.value = []
    },
  }
}
