import type { CoaxialInput, Kernel, SegmentInput } from './kernel'
import { FLAG, firstClaim, KINDS, sharedArrays, sharedLength, WORD, WORDS, type Attachment } from './poolProtocol'
import { READY, takeChunks } from './poolThread'
import { splitPlan, type SplitKind } from './splitPlan'

/** A worker as its owner sees it; core knows neither Node nor the page, so the caller wraps the worker it has. */
export interface WorkerPort {
  readonly postMessage: (message: unknown) => void
  readonly onMessage: (listener: (message: unknown) => void) => void
  /** Called when the worker could not start or has died. */
  readonly onError: (listener: () => void) => void
  readonly terminate: () => void
}

/** A kernel that shares large sums among threads. `close` ends its workers; after that it runs on the caller's alone. */
export interface ThreadedKernel extends Kernel {
  readonly threads: number
  readonly close: () => void
}

/**
 * Starts `threads - 1` workers, each running `serveKernelPool`, and gives a kernel that splits its targets over them and
 * the caller's own thread. Results are bit for bit those of `kernel`, whatever the number of threads.
 *
 * Calls block until the sum is done, with `Atomics.wait`, which a page allows in workers but not in its window.
 *
 * @param spawn makes a worker whose script calls `serveKernelPool`.
 * @returns null where threads cannot be had: fewer than two asked for, no SharedArrayBuffer (a page that is not
 * cross-origin isolated), or a worker that did not start. The caller then keeps `kernel`.
 */
export async function startKernelPool(
  kernel: Kernel,
  threads: number,
  spawn: () => WorkerPort,
): Promise<ThreadedKernel | null> {
  if (threads < 2 || typeof SharedArrayBuffer === 'undefined') return null
  const control = new Int32Array(new SharedArrayBuffer(4 * WORDS))
  const ports: WorkerPort[] = []
  const close = (): void => {
    Atomics.add(control, WORD.generation, 1)
    Atomics.add(control, WORD.epoch, 1)
    Atomics.notify(control, WORD.epoch)
    for (const port of ports.splice(0)) port.terminate()
  }
  let buffer = attach(control, 1024, 1024)
  try {
    await Promise.all(Array.from({ length: threads - 1 }, () => start(spawn(), ports, buffer.attachment)))
  } catch {
    close()
    return null
  }

  /** Shares one sum; false where it is not worth it or a thread failed, and the caller does it alone. */
  const share = (kind: SplitKind, input: CoaxialInput | SegmentInput, sources: number, fill: Fill): boolean => {
    const first = input.firstTarget ?? 0
    const plan = splitPlan(kind, input.targetCount - first, sources, ports.length + 1)
    if (plan.chunks < 2) return false
    if (input.targetCount > buffer.attachment.targetCapacity || sources > buffer.attachment.sourceCapacity) {
      const { targetCapacity, sourceCapacity } = buffer.attachment
      buffer = attach(control, grown(targetCapacity, input.targetCount), grown(sourceCapacity, sources))
      for (const port of ports) port.postMessage({ kernelAttachment: buffer.attachment })
    }
    const flags = fill(buffer.arrays) | (input.targetDeltaSquared === null ? 0 : FLAG.targetDelta)
    const { targetDeltaSquared } = input
    if (targetDeltaSquared !== null) copy(targetDeltaSquared, buffer.arrays.targetDeltaSquared, input.targetCount)
    const epoch = (Atomics.load(control, WORD.epoch) + 1) | 0
    const words: readonly (readonly [number, number])[] = [
      [WORD.kind, KINDS.indexOf(kind)],
      [WORD.targetCount, input.targetCount],
      [WORD.firstTarget, first],
      [WORD.sourceCount, sources],
      [WORD.flags, flags],
      [WORD.chunks, plan.chunks],
      [WORD.size, plan.size],
      [WORD.failed, 0],
      [WORD.remaining, plan.chunks],
      // The claim opens the job: everything above must stand when it changes.
      [WORD.claim, firstClaim(epoch)],
      [WORD.epoch, epoch],
    ]
    for (const [place, value] of words) Atomics.store(control, place, value)
    Atomics.notify(control, WORD.epoch)
    takeChunks(kernel, control, buffer.arrays, epoch, buffer.attachment.generation)
    for (let left = Atomics.load(control, WORD.remaining); left > 0; left = Atomics.load(control, WORD.remaining)) {
      Atomics.wait(control, WORD.remaining, left)
    }
    return Atomics.load(control, WORD.failed) === 0
  }

  return {
    name: kernel.name,
    threads,
    // A tree runs on the caller's thread alone.
    coaxialVelocityWithin: kernel.coaxialVelocityWithin,
    segmentVelocityWithin: kernel.segmentVelocityWithin,
    close,
    coaxialVelocity: (input, out) => {
      if (!share('coaxialVelocity', input, input.rings.count, (arrays) => fillCoaxial(input, arrays)))
        return kernel.coaxialVelocity(input, out)
      copy(buffer.arrays.axial, out.axial, input.targetCount, input.firstTarget)
      copy(buffer.arrays.radial, out.radial, input.targetCount, input.firstTarget)
    },
    coaxialStream: (input, out) => {
      if (!share('coaxialStream', input, input.rings.count, (arrays) => fillCoaxial(input, arrays)))
        return kernel.coaxialStream(input, out)
      copy(buffer.arrays.out, out, input.targetCount, input.firstTarget)
    },
    segmentVelocity: (input, out) => {
      if (!share('segmentVelocity', input, input.segmentCount, (arrays) => fillSegments(input, arrays)))
        return kernel.segmentVelocity(input, out)
      copy(buffer.arrays.out, out, 3 * input.targetCount, 3 * (input.firstTarget ?? 0))
    },
  }
}

type Arrays = ReturnType<typeof sharedArrays>
type Fill = (arrays: Arrays) => number

interface SharedBuffer {
  readonly attachment: Attachment
  readonly arrays: Arrays
}

/** A new buffer and its number; threads that hold an older one leave it. */
function attach(control: Int32Array, targetCapacity: number, sourceCapacity: number): SharedBuffer {
  const data = new SharedArrayBuffer(8 * sharedLength(targetCapacity, sourceCapacity))
  const generation = Atomics.add(control, WORD.generation, 1) + 1
  const epoch = Atomics.add(control, WORD.epoch, 1) + 1
  Atomics.notify(control, WORD.epoch)
  const attachment = { control, data, targetCapacity, sourceCapacity, epoch, generation }
  return { attachment, arrays: sharedArrays(data, targetCapacity, sourceCapacity) }
}

function start(port: WorkerPort, ports: WorkerPort[], attachment: Attachment): Promise<void> {
  ports.push(port)
  return new Promise((resolve, reject) => {
    port.onMessage((message) => {
      if (message === READY) resolve()
    })
    port.onError(() => reject(new Error('a kernel thread did not start')))
    port.postMessage({ kernelAttachment: attachment })
  })
}

/** Half as much again as needed, so that a growing problem does not replace the buffer at each call. */
function grown(capacity: number, needed: number): number {
  return needed > capacity ? Math.ceil(1.5 * needed) : capacity
}

function copy(from: Float64Array, to: Float64Array, end: number, start = 0): void {
  for (let i = start; i < end; i++) to[i] = from[i] ?? NaN
}

function fillCoaxial(input: CoaxialInput, arrays: Arrays): number {
  copy(input.targetX, arrays.targetX, input.targetCount)
  copy(input.targetR, arrays.targetR, input.targetCount)
  const { rings } = input
  copy(rings.x, arrays.x, rings.count)
  copy(rings.r, arrays.r, rings.count)
  copy(rings.circulation, arrays.circulation, rings.count)
  copy(rings.deltaSquared, arrays.deltaSquared, rings.count)
  return input.skipSelf ? FLAG.skipSelf : 0
}

function fillSegments(input: SegmentInput, arrays: Arrays): number {
  copy(input.targets, arrays.targets, 3 * input.targetCount)
  copy(input.segments, arrays.segments, 8 * input.segmentCount)
  return input.precision === 'mixed' ? FLAG.mixed : 0
}
