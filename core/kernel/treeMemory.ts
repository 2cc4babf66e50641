import type { KernelExports } from './decodeKernelExports'
import type { KernelMemory } from './kernelMemory'
import type { PointTree } from './pointTree'
import type { TreeIndices } from './treeIndices'

/** Doubles of a coefficient (x y z, one unused), of a cell, of a segment, of a pair of targets and of their sums. */
export const COEFFICIENT = 4
export const CELL = 4
export const SEGMENT = 8
export const TARGETS = 8
export const SUMS = 6

/** Byte addresses of what a tree sum keeps in the module's memory. */
export interface TreePlaces {
  readonly segments: number
  readonly targets: number
  readonly sums: number
  readonly sourceCells: number
  readonly targetCells: number
  readonly moments: number
  readonly locals: number
  readonly list: number
}

/** Reserves the memory of a tree sum, behind the index tables; sums, moments and local expansions start at 0. */
export function layOut(
  memory: KernelMemory,
  indices: TreeIndices,
  sources: PointTree,
  targets: PointTree,
  lanes: number,
): TreePlaces {
  let next = memory.start + tableLength(indices)
  const take = (doubles: number): number => {
    const at = next
    next += Math.ceil(doubles / 8) * 8
    return 8 * at
  }
  const expansion = COEFFICIENT * indices.terms
  const segments = take(SEGMENT * sources.count)
  const pairs = take((TARGETS / 2) * lanes)
  const sourceCells = take(CELL * sources.cellCount)
  const targetCells = take(CELL * targets.cellCount)
  const list = take((sources.cellCount + 2) / 2)
  const firstZero = next
  const sums = take((SUMS / 2) * lanes)
  const moments = take(expansion * sources.cellCount)
  const locals = take(expansion * targets.cellCount)
  memory.doubles(next).fill(0, firstZero, next)
  return { segments, targets: pairs, sums, sourceCells, targetCells, moments, locals, list }
}

/** Doubles of the index tables and of the room the module works in, a few over, in lines of 64 bytes. */
function tableLength({ order, terms }: TreeIndices): number {
  const tables = order + 3 + terms + (order + 1) ** 3 + 2 * terms + 10 * terms
  const work = terms + 2 + 4 * terms + 2 * (order + 1) ** 3
  return Math.ceil((tables + work + 16) / 8) * 8
}

/** Copies the index tables and tells the module where they stand. */
export function putTables(module: KernelExports, memory: KernelMemory, indices: TreeIndices): void {
  const bytes = new Uint8Array(memory.doubles(0).buffer)
  let next = 8 * memory.start
  const put = (from: Uint8Array): number => {
    const at = next
    bytes.set(from, at)
    next += Math.ceil(from.length / 16) * 16
    return at
  }
  const below = put(indices.below)
  const places = put(indices.places)
  const termAt = put(indices.termAt)
  const chain = put(indices.chain)
  const recurrence = put(indices.recurrence)
  module.treeTables(indices.order, indices.terms, below, places, termAt, chain, recurrence, next)
}

/** Writes middles and shares of delta^2 of cells. */
export function putCells(all: Float64Array, place: number, tree: PointTree, share: number): void {
  for (let k = 0, at = place / 8; k < CELL * tree.cellCount; k += CELL, at += CELL) {
    all[at] = tree.middle[k] ?? NaN
    all[at + 1] = tree.middle[k + 1] ?? NaN
    all[at + 2] = tree.middle[k + 2] ?? NaN
    all[at + 3] = share * (tree.middle[k + 3] ?? NaN)
  }
}
