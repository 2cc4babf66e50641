import type { WakeSection } from './types'

/** Whether a wake follows the rings of the computed jet. Explicit rings replace the train, whatever it starts from. */
export function startsFromJet(wake: WakeSection | null): boolean {
  return wake !== null && wake.start === 'jet' && wake.rings.length === 0
}
