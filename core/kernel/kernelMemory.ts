import { kernelTables } from './tables'
import type { WasmMemory } from './webAssembly'

/** Where the tables stand in the module's memory: the numbers of assembly/layout.ts. */
const VELOCITY_TABLE = 4096
const PAGE = 65536

/** The module's memory as doubles, which grows and never shrinks. */
export interface KernelMemory {
  /** Index of the first double after the tables. */
  readonly start: number
  /** The memory as doubles, at least `end` of them. Valid until the next call. */
  readonly doubles: (end: number) => Float64Array<ArrayBuffer>
}

/** Puts the tables in place. */
export function kernelMemory(memory: WasmMemory): KernelMemory {
  const tables = kernelTables()
  let view = new Float64Array(0)
  const doubles = (end: number): Float64Array<ArrayBuffer> => {
    const missing = end * 8 - memory.buffer.byteLength
    // Half as much again, so that a growing problem does not grow the memory at each call.
    if (missing > 0) memory.grow(Math.ceil((missing + (end * 8) / 2) / PAGE))
    if (view.buffer !== memory.buffer) view = new Float64Array(memory.buffer)
    return view
  }
  const velocity = VELOCITY_TABLE / 8
  const stream = velocity + tables.velocity.length
  const start = stream + tables.stream.length
  const all = doubles(start)
  all.set(tables.velocity, velocity)
  all.set(tables.stream, stream)
  // Records of 64 bytes start on lines of 64 bytes.
  return { start: Math.ceil(start / 8) * 8, doubles }
}
