/**
 * Memory of an answer that can move to the window instead of being copied: the paths and shapes of a wake, its dye and its field,
 * which are made for one answer and kept by nobody else. All other arrays may be tables of the core and are copied.
 */
import type { Wake } from '../../core/filament'
import type { RunResult, WakePicture } from '../../core/run'
import type { FieldAnswer } from './fieldSteps'
import type { WorkerAnswer } from './messages'

export function buffersOf(answer: WorkerAnswer): readonly ArrayBuffer[] {
  if (answer.kind === 'result') return buffersOfResult(answer.result)
  if (answer.kind === 'fields') return buffersOfFile(answer.answer)
  return answer.kind === 'picture' ? buffersOfPicture(answer.picture) : []
}

function buffersOfFile(answer: FieldAnswer): readonly ArrayBuffer[] {
  const frames = answer.ok ? (answer.file?.frames ?? []) : []
  return whole(frames.flatMap(({ picture }) => (picture === null ? [] : [picture.values])))
}

function buffersOfPicture({ dye, plane }: WakePicture): readonly ArrayBuffer[] {
  return whole([...(dye ?? []), ...(plane?.values ?? [])])
}

function buffersOfResult({ data }: RunResult): readonly ArrayBuffer[] {
  const wake = data?.wake ?? null
  if (wake === null) return []
  const arrays = [wake.wake, wake.turbulent].filter((march) => march !== null).flatMap(arraysOf)
  return whole(arrays)
}

/** Their memory, each piece once; shared memory cannot be handed over. */
function whole(arrays: readonly (Float64Array | Float32Array | Int8Array)[]): readonly ArrayBuffer[] {
  const buffers = arrays.map(({ buffer }) => buffer).filter((buffer) => buffer instanceof ArrayBuffer)
  return [...new Set(buffers)]
}

function arraysOf(wake: Wake): readonly Float64Array[] {
  return [
    wake.outputTimes,
    ...wake.trajectories.flatMap((path) => Object.values(path).filter((column) => column instanceof Float64Array)),
    ...wake.frames.flatMap((frame) => frame.curves),
  ]
}
