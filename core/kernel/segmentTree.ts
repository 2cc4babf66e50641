import type { KernelExports } from './decodeKernelExports'
import type { SegmentInput } from './kernel'
import type { KernelMemory } from './kernelMemory'
import { treeMaker, type PointTree } from './pointTree'
import { treeIndices, type TreeIndices } from './treeIndices'
import { CELL, COEFFICIENT, layOut, putCells, putTables, SEGMENT, SUMS, TARGETS, type TreePlaces } from './treeMemory'

/** How a tree sum is done; what gives which error is in `treeSettings`. */
export interface TreeSettings {
  /** Order of the expansions, 2 to 10. */
  readonly order: number
  /** Cells meet by expansion when their radii add up to less than this share of the distance of their middles. */
  readonly opening: number
  /** Most points in a leaf. */
  readonly leafSize: number
  /** Neighbouring leaves in mixed precision. */
  readonly mixed: boolean
}

/** Cells of mixed delta stand for their segments only at distances well above the spread: sort by delta early. */
const SMOOTHING_WEIGHT = 6

/** `Kernel.segmentVelocity` by a tree. */
export type SegmentTree = (input: SegmentInput, settings: TreeSettings, out: Float64Array) => void

/** One tree sum under way. */
interface TreeSum {
  readonly module: KernelExports
  readonly settings: TreeSettings
  readonly sources: PointTree
  readonly targets: PointTree
  readonly places: TreePlaces
  /** First lane of each target cell that is a leaf; its lanes are a multiple of four. */
  readonly firstLane: Int32Array
  /** Bytes of an expansion. */
  readonly expansion: number
  /** Largest accepted (spread of delta^2) / distance^2. */
  readonly smoothingLimit: number
  /** Source cells for the module, in its memory. */
  readonly far: Int32Array
  /** Source cells still to be looked at for one target cell, those near it, and those handed down, level behind level. */
  readonly open: Int32Array
  readonly near: Int32Array
  readonly handed: Int32Array
}

/**
 * A tree for sources and one for targets, which meet cell by cell: near ones segment by segment, far ones by Cartesian
 * Taylor expansions (after Dehnen 2002, J. Comput. Phys. 179:27, for the walk; Duan & Krasny 2001, J. Comput. Chem. 22:184,
 * for the derivatives).
 *
 * The cost of a sum is about proportional to the number of segments. A target's value depends on the others only within the
 * error of the expansions; NaN spreads as in the plain sum.
 */
export function segmentTree(module: KernelExports, memory: KernelMemory): SegmentTree {
  const makeSources = treeMaker(SMOOTHING_WEIGHT)
  const makeTargets = treeMaker(SMOOTHING_WEIGHT)
  const indicesOf = new Map<number, TreeIndices>()
  const scratch = { firstLane: new Int32Array(0), laneTarget: new Int32Array(0), lists: new Int32Array(0) }
  return (input, settings, out) => {
    const { segmentCount, targetCount, segments, targets: points, targetDeltaSquared } = input
    if (targetCount === 0) return
    const of = { count: segmentCount, points: segments, stride: 8, deltaSquared: segments }
    const sources = makeSources({ ...of, smoothingStride: 8, smoothingOffset: 6 }, settings.leafSize)
    const at = { count: targetCount, points, stride: 3, deltaSquared: targetDeltaSquared }
    const targets = makeTargets({ ...at, smoothingStride: 1, smoothingOffset: 0 }, settings.leafSize)
    const indices = indicesOf.get(settings.order) ?? treeIndices(settings.order)
    indicesOf.set(settings.order, indices)

    scratch.firstLane = roomFor(scratch.firstLane, targets.cellCount)
    scratch.laneTarget = roomFor(scratch.laneTarget, targetCount + 4 * targets.cellCount)
    const lanes = assignLanes(targets, scratch.firstLane, scratch.laneTarget)
    const places = layOut(memory, indices, sources, targets, lanes)
    putTables(module, memory, indices)
    const all = memory.doubles(0)
    putSegments(all, places, sources, input)
    putTargets(all, places, scratch.laneTarget, lanes, input)
    putCells(all, places.sourceCells, sources, targetDeltaSquared === null ? 1 : 0.5)
    putCells(all, places.targetCells, targets, targetDeltaSquared === null ? 0 : 0.5)

    // Levels of a tree of halves: well below 60.
    scratch.lists = roomFor(scratch.lists, 62 * sources.cellCount)
    const sum: TreeSum = {
      module,
      settings,
      sources,
      targets,
      places,
      firstLane: scratch.firstLane,
      expansion: 8 * COEFFICIENT * indices.terms,
      // A difference e of delta^2 changes a velocity by about e / distance^2: no more than the expansions may.
      smoothingLimit: settings.opening ** (settings.order + 1),
      far: new Int32Array(all.buffer, places.list, sources.cellCount),
      open: scratch.lists.subarray(0, sources.cellCount),
      near: scratch.lists.subarray(sources.cellCount, 2 * sources.cellCount),
      handed: scratch.lists.subarray(2 * sources.cellCount),
    }
    if (segmentCount > 0) {
      gatherMoments(sum)
      if (settings.mixed) module.shortenSegments(places.segments, segmentCount)
      sum.handed[0] = 0
      walk(sum, 0, 0, 1)
    }
    takeSums(all, places, scratch.laneTarget, lanes, out)
  }
}

function roomFor(kept: Int32Array<ArrayBuffer>, length: number): Int32Array<ArrayBuffer> {
  return kept.length >= length ? kept : new Int32Array(Math.ceil(1.25 * length))
}

/** Gives each leaf of targets lanes in fours; lanes past its end repeat its last target. Returns the number of lanes. */
function assignLanes(tree: PointTree, firstLane: Int32Array, laneTarget: Int32Array): number {
  let lanes = 0
  for (let cell = 0; cell < tree.cellCount; cell++) {
    if (tree.parts[cell] !== 0) continue
    firstLane[cell] = lanes
    const start = tree.first[cell] ?? 0
    const count = tree.size[cell] ?? 0
    const end = lanes + lanesOf(count)
    for (let k = 0; lanes < end; k++, lanes++) laneTarget[lanes] = tree.order[start + Math.min(k, count - 1)] ?? 0
  }
  return lanes
}

function lanesOf(count: number): number {
  return ((count + 3) >> 2) << 2
}

function putSegments(all: Float64Array, places: TreePlaces, tree: PointTree, input: SegmentInput): void {
  const share = input.targetDeltaSquared === null ? 1 : 0.5
  const { segments } = input
  for (let place = 0, to = places.segments / 8; place < tree.count; place++, to += SEGMENT) {
    const from = SEGMENT * (tree.order[place] ?? 0)
    for (let k = 0; k < 6; k++) all[to + k] = segments[from + k] ?? NaN
    all[to + 6] = share * (segments[from + 6] ?? NaN)
  }
}

function putTargets(
  all: Float64Array,
  places: TreePlaces,
  laneTarget: Int32Array,
  lanes: number,
  input: SegmentInput,
): void {
  const { targets, targetDeltaSquared } = input
  for (let lane = 0; lane < lanes; lane++) {
    const target = laneTarget[lane] ?? 0
    const at = places.targets / 8 + TARGETS * (lane >> 1) + (lane & 1)
    all[at] = targets[3 * target] ?? NaN
    all[at + 2] = targets[3 * target + 1] ?? NaN
    all[at + 4] = targets[3 * target + 2] ?? NaN
    all[at + 6] = targetDeltaSquared === null ? 0 : 0.5 * (targetDeltaSquared[target] ?? NaN)
  }
}

function takeSums(
  all: Float64Array,
  places: TreePlaces,
  laneTarget: Int32Array,
  lanes: number,
  out: Float64Array,
): void {
  for (let lane = 0; lane < lanes; lane++) {
    const target = laneTarget[lane] ?? 0
    const at = places.sums / 8 + SUMS * (lane >> 1) + (lane & 1)
    out[3 * target] = all[at] ?? NaN
    out[3 * target + 1] = all[at + 2] ?? NaN
    out[3 * target + 2] = all[at + 4] ?? NaN
  }
}

/** Moments of the leaves from their segments, of the others from their parts. */
function gatherMoments(sum: TreeSum): void {
  const { module, places, sources, expansion } = sum
  const { middle, parts, first, size } = sources
  for (let cell = sources.cellCount - 1; cell >= 0; cell--) {
    const part = parts[cell] ?? 0
    const whole = places.moments + expansion * cell
    if (part === 0) {
      const start = first[cell] ?? 0
      const end = start + (size[cell] ?? 0)
      module.momentsOfSegments(whole, places.sourceCells + 8 * CELL * cell, places.segments, start, end)
      continue
    }
    for (let from = part; from < part + 2; from++) {
      const x = (middle[4 * cell] ?? NaN) - (middle[4 * from] ?? NaN)
      const y = (middle[4 * cell + 1] ?? NaN) - (middle[4 * from + 1] ?? NaN)
      const z = (middle[4 * cell + 2] ?? NaN) - (middle[4 * from + 2] ?? NaN)
      module.momentsOfPart(whole, places.moments + expansion * from, x, y, z)
    }
  }
}

/**
 * Meets target cell `cell` with the source cells in handed[start..start + count): far ones at once, the others are handed
 * to its parts or, at a leaf, opened until they are far or leaves themselves.
 */
function walk(sum: TreeSum, cell: number, start: number, count: number): void {
  const { module, places, sources, targets, settings, smoothingLimit, far, open, near, handed } = sum
  const { middle, radius: radii, smoothingSpread, parts } = sources
  const isLeaf = targets.parts[cell] === 0
  const tx = targets.middle[4 * cell] ?? NaN
  const ty = targets.middle[4 * cell + 1] ?? NaN
  const tz = targets.middle[4 * cell + 2] ?? NaN
  const radius = targets.radius[cell] ?? NaN
  const spread = targets.smoothingSpread[cell] ?? NaN
  const opening = settings.opening * settings.opening
  const below = start + count
  let farCount = 0
  let nearCount = 0
  let keptCount = 0
  let openCount = 0
  for (let k = start; k < below; k++) open[openCount++] = handed[k] ?? 0
  while (openCount > 0) {
    const source = open[--openCount] ?? 0
    const dx = tx - (middle[4 * source] ?? NaN)
    const dy = ty - (middle[4 * source + 1] ?? NaN)
    const dz = tz - (middle[4 * source + 2] ?? NaN)
    const square = dx * dx + dy * dy + dz * dz
    const sourceRadius = radii[source] ?? NaN
    const reach = radius + sourceRadius
    const part = parts[source] ?? 0
    if (reach * reach < opening * square && spread + (smoothingSpread[source] ?? NaN) <= smoothingLimit * square) {
      far[farCount++] = source
    } else if (part !== 0 && (isLeaf || !(radius > sourceRadius))) {
      open[openCount++] = part
      open[openCount++] = part + 1
    } else if (isLeaf) {
      near[nearCount++] = source
    } else {
      handed[below + keptCount++] = source
    }
  }
  const local = places.locals + sum.expansion * cell
  const middleAt = places.targetCells + 8 * CELL * cell
  if (farCount > 0) module.localOfCells(local, middleAt, places.sourceCells, places.moments, places.list, farCount)
  if (isLeaf) {
    nearSums(sum, cell, nearCount)
    const lane = sum.firstLane[cell] ?? 0
    const pairs = lanesOf(targets.size[cell] ?? 0) / 2
    module.velocityOfLocal(local, middleAt, places.targets + 32 * lane, pairs, places.sums + 24 * lane)
    return
  }
  const part = targets.parts[cell] ?? 0
  for (let to = part; to < part + 2; to++) {
    const x = (targets.middle[4 * to] ?? NaN) - tx
    const y = (targets.middle[4 * to + 1] ?? NaN) - ty
    const z = (targets.middle[4 * to + 2] ?? NaN) - tz
    module.localOfPart(places.locals + sum.expansion * to, local, x, y, z)
    walk(sum, to, below, keptCount)
  }
}

/** Neighbouring leaves one by one; leaves that follow each other in the order are one run of segments. */
function nearSums(sum: TreeSum, cell: number, nearCount: number): void {
  const { module, places, sources, near } = sum
  const { first, size } = sources
  const add = sum.settings.mixed ? module.segmentVelocityMixed : module.segmentVelocity
  const lane = sum.firstLane[cell] ?? 0
  const quads = lanesOf(sum.targets.size[cell] ?? 0) / 4
  // Insertion sort by place: the list is short and nearly in order.
  for (let k = 1; k < nearCount; k++) {
    const source = near[k] ?? 0
    let to = k
    for (; to > 0 && (first[near[to - 1] ?? 0] ?? 0) > (first[source] ?? 0); to--) near[to] = near[to - 1] ?? 0
    near[to] = source
  }
  for (let k = 0; k < nearCount;) {
    const from = first[near[k] ?? 0] ?? 0
    let end = from
    for (; k < nearCount && first[near[k] ?? 0] === end; k++) end += size[near[k] ?? 0] ?? 0
    add(places.targets + 32 * lane, quads, places.segments + 8 * SEGMENT * from, end - from, places.sums + 24 * lane)
  }
}
