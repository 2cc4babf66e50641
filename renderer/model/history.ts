/**
 * Undo history as a value: named steps, bursts that merge, a bounded length and a remembered saved point. Pure.
 */
import { last } from '../../core/base'

/** Steps kept; the oldest are forgotten first. */
export const HISTORY_LENGTH = 200

/** A burst of small changes that is one step for the user: a drag, a run of key presses in one field. */
export interface Burst {
  /** What is being changed, for instance the field's path or one drag's own number. */
  readonly id: string
  /** Longest pause inside the burst [ms]; Infinity for a drag, which ends when it is let go. */
  readonly pause: number
}

export interface Step<T> {
  /** What was done, in a word or two: "stroke" reads "Undo stroke". */
  readonly name: string
  /** The document before the step (in the past) or after it (in the future). */
  readonly state: T
  readonly burst: Burst | null
  /** When the step was last added to [ms]. */
  readonly time: number
}

export interface History<T> {
  readonly past: readonly Step<T>[]
  readonly present: T
  readonly future: readonly Step<T>[]
  /** The state on disk; compared by identity. Null when the document was never saved or came without a file. */
  readonly saved: T | null
}

/**
 * A history that begins at a state.
 *
 * @param saved false for a state that is on no disk, such as one restored after a crash; else nothing is lost by leaving it
 */
export function startHistory<T>(state: T, saved = true): History<T> {
  return { past: [], present: state, future: [], saved: saved ? state : null }
}

/**
 * Record a change.
 *
 * @param name what undo will be called
 * @param time now [ms], for the length of a pause inside a burst
 * @param burst merged into the last step when that belongs to the same burst and the pause was short
 */
export function record<T>(
  history: History<T>,
  name: string,
  state: T,
  time: number,
  burst: Burst | null = null,
): History<T> {
  if (Object.is(state, history.present)) return history
  if (burst !== null && history.past.length > 0 && history.future.length === 0) {
    const step = last(history.past)
    if (step.burst?.id === burst.id && time - step.time <= burst.pause) {
      const past = [...history.past.slice(0, -1), { ...step, time }]
      return { ...history, past, present: state }
    }
  }
  const past = [...history.past, { name, state: history.present, burst, time }].slice(-HISTORY_LENGTH)
  return { ...history, past, present: state, future: [] }
}

/** End the running burst, so that the next change of the same thing is its own step. */
export function endBurst<T>(history: History<T>): History<T> {
  if (history.past.length === 0 || last(history.past).burst === null) return history
  return { ...history, past: [...history.past.slice(0, -1), { ...last(history.past), burst: null }] }
}

/** Take back the last step; the same history when there is none. */
export function undo<T>(history: History<T>): History<T> {
  if (history.past.length === 0) return history
  const step = last(history.past)
  return {
    ...history,
    past: history.past.slice(0, -1),
    present: step.state,
    future: [...history.future, { ...step, state: history.present, burst: null }],
  }
}

/** Do the last undone step again; the same history when there is none. */
export function redo<T>(history: History<T>): History<T> {
  if (history.future.length === 0) return history
  const step = last(history.future)
  return {
    ...history,
    past: [...history.past, { ...step, state: history.present, burst: null }],
    present: step.state,
    future: history.future.slice(0, -1),
  }
}

/** Name of the step undo would take back, null when there is none. */
export function undoName<T>(history: History<T>): string | null {
  return history.past.length === 0 ? null : last(history.past).name
}

export function redoName<T>(history: History<T>): string | null {
  return history.future.length === 0 ? null : last(history.future).name
}

/** Remember the present as what is on disk. */
export function markSaved<T>(history: History<T>): History<T> {
  return endBurst({ ...history, saved: history.present })
}

/** True when the present is not what is on disk. */
export function isEdited<T>(history: History<T>): boolean {
  return !Object.is(history.saved, history.present)
}
