import { base64Bytes } from './base64'
import { coaxialTree } from './coaxialTree'
import { decodeKernelExports, type KernelExports } from './decodeKernelExports'
import { kernelMemory, type KernelMemory } from './kernelMemory'
import { KERNEL_MODULE } from './kernelModule'
import type { CoaxialInput, Kernel, SegmentInput } from './kernel'
import { segmentTree } from './segmentTree'
import { coaxialVelocityWithin, segmentVelocityWithin } from './treeWithin'
import { startModule } from './webAssembly'

/** Numbers of doubles: a pair of targets, a source, the sums of a pair. */
const COAXIAL_TARGETS = 6
const COAXIAL_SOURCE = 4
const SEGMENT_TARGETS = 8
const SEGMENT_SOURCE = 8
const SEGMENT_SUMS = 6

/** The kernel in WebAssembly with 128-bit SIMD, or null where that cannot be started. Each call starts one of its own. */
export async function wasmKernel(): Promise<Kernel | null> {
  const exports = await startModule(base64Bytes(KERNEL_MODULE))
  if (exports === null) return null
  const module = decodeKernelExports(exports)
  const memory = kernelMemory(module.memory)
  const coaxialVelocity: Kernel['coaxialVelocity'] = (input, out) => {
    const first = input.firstTarget ?? 0
    const sums = coaxial(module.coaxialVelocity, memory, input, 4)
    const all = memory.doubles(0)
    for (let i = first; i < input.targetCount; i++) {
      const lane = i - first
      const at = sums + 4 * (lane >> 1) + (lane & 1)
      out.axial[i] = all[at] ?? NaN
      out.radial[i] = all[at + 2] ?? NaN
    }
  }
  const coaxialStream: Kernel['coaxialStream'] = (input, out) => {
    const first = input.firstTarget ?? 0
    const sums = coaxial(module.coaxialStream, memory, input, 2)
    const all = memory.doubles(0)
    for (let i = first; i < input.targetCount; i++) out[i] = all[sums + i - first] ?? NaN
  }
  const segmentVelocity: Kernel['segmentVelocity'] = (input, out) => segments(module, memory, input, out)
  return {
    name: 'wasm',
    coaxialVelocity,
    coaxialVelocityWithin: coaxialVelocityWithin(coaxialVelocity, coaxialTree(module, memory)),
    coaxialStream,
    segmentVelocity,
    segmentVelocityWithin: segmentVelocityWithin(segmentVelocity, segmentTree(module, memory)),
  }
}

/** Copies the input in, calls the sum, and says where the sums stand. */
function coaxial(
  sum: KernelExports['coaxialVelocity'],
  memory: KernelMemory,
  input: CoaxialInput,
  sumsOfPair: number,
): number {
  const { targetX, targetR, targetDeltaSquared, rings } = input
  const first = input.firstTarget ?? 0
  const pairs = Math.max(0, (input.targetCount - first + 1) >> 1)
  const targets = memory.start
  const sources = targets + COAXIAL_TARGETS * pairs
  const sums = sources + COAXIAL_SOURCE * rings.count
  const all = memory.doubles(sums + sumsOfPair * pairs)
  for (let lane = 0; lane < 2 * pairs; lane++) {
    // An odd last target fills both lanes.
    const i = Math.min(first + lane, input.targetCount - 1)
    const at = targets + COAXIAL_TARGETS * (lane >> 1) + (lane & 1)
    all[at] = targetX[i] ?? NaN
    all[at + 2] = targetR[i] ?? NaN
    all[at + 4] = targetDeltaSquared === null ? 0 : 0.5 * (targetDeltaSquared[i] ?? NaN)
  }
  const share = targetDeltaSquared === null ? 1 : 0.5
  for (let j = 0, at = sources; j < rings.count; j++, at += COAXIAL_SOURCE) {
    const r = rings.r[j] ?? NaN
    all[at] = rings.x[j] ?? NaN
    all[at + 1] = r
    all[at + 2] = share * (rings.deltaSquared[j] ?? NaN)
    all[at + 3] = (rings.circulation[j] ?? NaN) * r * r * (1 / Math.PI)
  }
  sum(targets * 8, pairs, sources * 8, rings.count, sums * 8, input.skipSelf ? first : -1)
  return sums
}

function segments(module: KernelExports, memory: KernelMemory, input: SegmentInput, out: Float64Array): void {
  const { targetCount, targets: points, targetDeltaSquared, segmentCount } = input
  const first = input.firstTarget ?? 0
  const quads = Math.max(0, (targetCount - first + 3) >> 2)
  const sources = memory.start
  const targets = sources + SEGMENT_SOURCE * segmentCount
  const sums = targets + SEGMENT_TARGETS * 2 * quads
  const all = memory.doubles(sums + SEGMENT_SUMS * 2 * quads)
  const values = SEGMENT_SOURCE * segmentCount
  for (let k = 0; k < values; k++) all[sources + k] = input.segments[k] ?? NaN
  if (targetDeltaSquared !== null) {
    for (let k = sources + 6; k < targets; k += SEGMENT_SOURCE) all[k] = 0.5 * (all[k] ?? NaN)
  }
  for (let lane = 0; lane < 4 * quads; lane++) {
    const i = Math.min(first + lane, targetCount - 1)
    const at = targets + SEGMENT_TARGETS * (lane >> 1) + (lane & 1)
    all[at] = points[3 * i] ?? NaN
    all[at + 2] = points[3 * i + 1] ?? NaN
    all[at + 4] = points[3 * i + 2] ?? NaN
    all[at + 6] = targetDeltaSquared === null ? 0 : 0.5 * (targetDeltaSquared[i] ?? NaN)
  }
  all.fill(0, sums, sums + SEGMENT_SUMS * 2 * quads)
  const mixed = input.precision === 'mixed'
  if (mixed) module.shortenSegments(sources * 8, segmentCount)
  const sum = mixed ? module.segmentVelocityMixed : module.segmentVelocity
  sum(targets * 8, quads, sources * 8, segmentCount, sums * 8)
  for (let i = first; i < targetCount; i++) {
    const lane = i - first
    const at = sums + SEGMENT_SUMS * (lane >> 1) + (lane & 1)
    out[3 * i] = all[at] ?? NaN
    out[3 * i + 1] = all[at + 2] ?? NaN
    out[3 * i + 2] = all[at + 4] ?? NaN
  }
}
