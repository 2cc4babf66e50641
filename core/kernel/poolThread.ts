import type { Kernel } from './kernel'
import { loadKernel } from './loadKernel'
import { decodeAttachment } from './decodeAttachment'
import { FLAG, firstClaim, KINDS, sharedArrays, WORD, type Attachment, type SharedArrays } from './poolProtocol'

/** The worker's side of its message channel: `self` in a page, `parentPort` in Node, wrapped by the caller. */
export interface ThreadPort {
  readonly postMessage: (message: unknown) => void
  readonly onMessage: (listener: (message: unknown) => void) => void
}

/** Message of a thread that has its kernel and can take jobs. */
export const READY = 'kernel thread ready'

/**
 * Makes a worker a thread of a kernel pool: call it once, first thing in the worker's script.
 *
 * The thread sleeps in `Atomics.wait` between jobs, so that a worker which serves a pool does nothing else.
 */
export function serveKernelPool(port: ThreadPort): void {
  port.onMessage((message) => {
    const attachment = decodeAttachment(message)
    if (attachment === null) return
    void loadKernel().then((kernel) => {
      port.postMessage(READY)
      serve(kernel, attachment)
    })
  })
}

/** Takes part in jobs until the buffer is replaced. */
function serve(kernel: Kernel, attachment: Attachment): void {
  const { control, generation } = attachment
  const arrays = sharedArrays(attachment.data, attachment.targetCapacity, attachment.sourceCapacity)
  let epoch = attachment.epoch
  while (Atomics.load(control, WORD.generation) === generation) {
    Atomics.wait(control, WORD.epoch, epoch)
    epoch = Atomics.load(control, WORD.epoch)
    takeChunks(kernel, control, arrays, epoch, generation)
  }
}

/** Claims and does chunks of job `epoch` until none is left. */
export function takeChunks(
  kernel: Kernel,
  control: Int32Array,
  arrays: SharedArrays,
  epoch: number,
  generation: number,
): void {
  const job = firstClaim(epoch)
  for (;;) {
    const claim = Atomics.load(control, WORD.claim)
    const chunk = claim - job
    if (Atomics.load(control, WORD.generation) !== generation) return
    if (chunk < 0 || chunk >= Atomics.load(control, WORD.chunks)) return
    if (Atomics.compareExchange(control, WORD.claim, claim, claim + 1) !== claim) continue
    try {
      doChunk(kernel, control, arrays, chunk)
    } catch {
      Atomics.store(control, WORD.failed, 1)
    }
    if (Atomics.sub(control, WORD.remaining, 1) === 1) Atomics.notify(control, WORD.remaining)
  }
}

function doChunk(kernel: Kernel, control: Int32Array, arrays: SharedArrays, chunk: number): void {
  const word = (place: number): number => Atomics.load(control, place)
  const flags = word(WORD.flags)
  const firstTarget = word(WORD.firstTarget) + chunk * word(WORD.size)
  const targetCount = Math.min(firstTarget + word(WORD.size), word(WORD.targetCount))
  const targetDeltaSquared = (flags & FLAG.targetDelta) === 0 ? null : arrays.targetDeltaSquared
  const range = { firstTarget, targetCount, targetDeltaSquared }
  const kind = KINDS[word(WORD.kind)]
  const count = word(WORD.sourceCount)
  if (kind === 'segmentVelocity') {
    const { targets, segments } = arrays
    const precision = (flags & FLAG.mixed) === 0 ? 'double' : 'mixed'
    kernel.segmentVelocity({ ...range, targets, segmentCount: count, segments, precision }, arrays.out)
    return
  }
  const { targetX, targetR, x, r, circulation, deltaSquared } = arrays
  const skipSelf = (flags & FLAG.skipSelf) !== 0
  const input = { ...range, targetX, targetR, rings: { count, x, r, circulation, deltaSquared }, skipSelf }
  if (kind === 'coaxialVelocity') kernel.coaxialVelocity(input, arrays)
  else kernel.coaxialStream(input, arrays.out)
}
