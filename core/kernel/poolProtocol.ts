/**
 * What the threads of a pool share: a few control words and one buffer of numbers.
 *
 * A job is described in the control words; its chunks are claimed one by one by whoever is awake, the caller included.
 * The claim word holds the job's number and the next chunk, and a claim is a compare-and-exchange on it, so that a thread
 * that wakes late can neither take a chunk of another job nor read a description that does not belong to its claim.
 */

/** Places of the control words. */
export const WORD = {
  /** Counts jobs; threads sleep on it. */
  epoch: 0,
  /** Counts buffers; a thread that holds an older one goes back to its messages for the new one. */
  generation: 1,
  /** (epoch modulo 2^15) 2^16 + next chunk. */
  claim: 2,
  /** Chunks not yet done; the caller sleeps on it. */
  remaining: 3,
  kind: 4,
  targetCount: 5,
  firstTarget: 6,
  sourceCount: 7,
  flags: 8,
  chunks: 9,
  size: 10,
  /** Set by a thread that could not do its chunk. */
  failed: 11,
} as const

export const WORDS = 16

export const FLAG = { targetDelta: 1, skipSelf: 2, mixed: 4 } as const

export const KINDS = ['coaxialVelocity', 'coaxialStream', 'segmentVelocity'] as const

/** Told to a thread at the start, and again when the buffer has grown. */
export interface Attachment {
  readonly control: Int32Array
  readonly data: SharedArrayBuffer
  readonly targetCapacity: number
  readonly sourceCapacity: number
  readonly epoch: number
  readonly generation: number
}

/** The shared numbers under the names the kernel knows. */
export interface SharedArrays {
  readonly targetX: Float64Array
  readonly targetR: Float64Array
  readonly targets: Float64Array
  readonly targetDeltaSquared: Float64Array
  readonly x: Float64Array
  readonly r: Float64Array
  readonly circulation: Float64Array
  readonly deltaSquared: Float64Array
  readonly segments: Float64Array
  readonly axial: Float64Array
  readonly radial: Float64Array
  readonly out: Float64Array
}

/** Doubles in a buffer for that many targets and sources. */
export function sharedLength(targetCapacity: number, sourceCapacity: number): number {
  return 7 * targetCapacity + 8 * sourceCapacity
}

/** Views of the shared buffer; coaxial and segment sums use the same places, one job at a time. */
export function sharedArrays(data: SharedArrayBuffer, targetCapacity: number, sourceCapacity: number): SharedArrays {
  const view = (start: number, length: number): Float64Array => new Float64Array(data, 8 * start, length)
  const [t, s] = [targetCapacity, sourceCapacity]
  const sources = 4 * t
  const out = sources + 8 * s
  return {
    targetX: view(0, t),
    targetR: view(t, t),
    targets: view(0, 3 * t),
    targetDeltaSquared: view(3 * t, t),
    x: view(sources, s),
    r: view(sources + s, s),
    circulation: view(sources + 2 * s, s),
    deltaSquared: view(sources + 3 * s, s),
    segments: view(sources, 8 * s),
    axial: view(out, t),
    radial: view(out + t, t),
    out: view(out, 3 * t),
  }
}

/** The claim word of a job before its first chunk is taken. */
export function firstClaim(epoch: number): number {
  return (epoch & 0x7fff) << 16
}
