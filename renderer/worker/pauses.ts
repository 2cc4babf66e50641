/** Pauses of a long computation: often enough for a cancellation to arrive, seldom enough to cost nothing. */

/** Computing time between two pauses [ms]. */
export const PAUSE_EVERY = 12

/** A pause for core's marches: returns at once until it is due, then lets one round of messages in. */
export function createPause(now: () => number = () => performance.now()): () => Promise<void> {
  let last = now()
  return async () => {
    if (now() - last < PAUSE_EVERY) return
    await nextTask()
    last = now()
  }
}

/** After the messages that wait now. A timer would be held back by some milliseconds each time. */
function nextTask(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel()
    port1.onmessage = () => {
      port1.close()
      resolve()
    }
    port2.postMessage(null)
  })
}
