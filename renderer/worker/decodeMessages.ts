/**
 * Messages arrive untyped; both ends are this program, so the kind and the job number are what is checked.
 */
import type { WorkerAnswer, WorkerRequest } from './messages'

const REQUESTS: readonly unknown[] = ['run', 'picture', 'map', 'fields', 'cancel']
const ANSWERS: readonly unknown[] = ['progress', 'result', 'picture', 'map', 'fields', 'crashed']

/** The request, or null for anything else that reaches the port. */
export function decodeRequest(message: unknown): WorkerRequest | null {
  return hasKind(message, REQUESTS) ? (message as WorkerRequest) : null
}

/** The answer, or null for anything else that reaches the port. */
export function decodeAnswer(message: unknown): WorkerAnswer | null {
  return hasKind(message, ANSWERS) ? (message as WorkerAnswer) : null
}

function hasKind(message: unknown, kinds: readonly unknown[]): boolean {
  if (typeof message !== 'object' || message === null) return false
  if (!('kind' in message) || !('id' in message)) return false
  return kinds.includes(message.kind) && typeof message.id === 'number'
}
