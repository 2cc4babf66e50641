import { gridPoint, lagrange, MOST_POINTS, proxyGrid, type ProxyGrid } from './coaxialProxies'
import type { KernelExports } from './decodeKernelExports'
import type { CoaxialInput, CoaxialVelocity } from './kernel'
import type { KernelMemory } from './kernelMemory'
import { treeMaker, type PointTree } from './pointTree'

/** How a tree sum of rings is done. */
export interface CoaxialTreeSettings {
  /** Points of a cell's grid along its longer side. */
  readonly points: number
  /** Cells meet through their stand-ins when every point of one is this many radii of the other away from its middle. */
  readonly room: number
  /** Most points in a leaf. */
  readonly leafSize: number
}

/** `Kernel.coaxialVelocity` by a tree; `skipSelf` is not looked at. */
export type CoaxialTree = (input: CoaxialInput, settings: CoaxialTreeSettings, out: CoaxialVelocity) => void

/** Doubles of a source; of a place among targets and among their sums, of which two make a pair. */
const SOURCE = 4
const TARGET = 3
const SUM = 2

/** One tree sum under way. Places are those of the grids, in the module's memory as doubles. */
interface TreeSum {
  readonly module: KernelExports
  readonly settings: CoaxialTreeSettings
  readonly all: Float64Array
  readonly sources: PointTree
  readonly targets: PointTree
  readonly sourceGrid: ProxyGrid
  readonly targetGrid: ProxyGrid
  readonly sourcesAt: number
  readonly targetsAt: number
  readonly sumsAt: number
  /** Gamma of each source place: the module holds Gamma r^2 / pi. */
  readonly circulation: Float64Array
  /** Values of the Lagrange polynomials of the three sides. */
  readonly basis: Float64Array
  readonly handed: Int32Array
  readonly open: Int32Array
}

/**
 * A tree for sources and one for targets in the meridional plane, which meet cell by cell through stand-ins that are
 * ordinary rings and ordinary points: circulations are shared out to the source grid, the sums are taken by the same
 * pair kernel, and velocities are interpolated from the target grid.
 */
export function coaxialTree(module: KernelExports, memory: KernelMemory): CoaxialTree {
  const makeSources = treeMaker(1)
  const makeTargets = treeMaker(1)
  const basis = new Float64Array(3 * MOST_POINTS)
  let points = [new Float64Array(0), new Float64Array(0)]
  let kept = [new Int32Array(0), new Int32Array(0), new Int32Array(0)]
  let circulation = new Float64Array(0)
  return (input, settings, out) => {
    const { rings, targetCount } = input
    const [sourcePoints = basis, targetPoints = basis] = (points = [
      packed(points[0], rings.x, rings.r, rings.count),
      packed(points[1], input.targetX, input.targetR, targetCount),
    ])
    const smoothing = { smoothingStride: 1, smoothingOffset: 0, stride: 3 }
    const from = { count: rings.count, points: sourcePoints, deltaSquared: rings.deltaSquared }
    const at = { count: targetCount, points: targetPoints, deltaSquared: input.targetDeltaSquared }
    const sources = makeSources({ ...from, ...smoothing }, settings.leafSize)
    const targets = makeTargets({ ...at, ...smoothing }, settings.leafSize)
    const cells = Math.max(sources.cellCount, targets.cellCount)
    kept = kept.map((room, k) => roomFor(room, (k < 2 ? 5 : 62) * cells))
    const [sourceRoom = sources.order, targetRoom = sources.order, lists = sources.order] = kept
    const sourceGrid = proxyGrid(sources, settings.points, settings.room, 1, sourceRoom)
    const targetGrid = proxyGrid(targets, settings.points, settings.room, 2, targetRoom)
    if (circulation.length < sourceGrid.places) circulation = new Float64Array(Math.ceil(1.25 * sourceGrid.places))

    const sourcesAt = memory.start
    const targetsAt = sourcesAt + SOURCE * sourceGrid.places
    const sumsAt = targetsAt + Math.ceil((TARGET * targetGrid.places) / 2) * 2
    const end = sumsAt + SUM * targetGrid.places
    const all = memory.doubles(end)
    all.fill(0, sumsAt, end)
    circulation.fill(0, 0, sourceGrid.places)
    const sum: TreeSum = {
      ...{ module, settings, all, sources, targets, sourceGrid, targetGrid, sourcesAt, targetsAt, sumsAt },
      ...{ circulation, basis, handed: lists.subarray(cells), open: lists },
    }
    putSources(sum, input)
    putTargets(sum, input)
    sum.handed[0] = 0
    if (rings.count > 0 && targetCount > 0) walk(sum, 0, 0, 1)
    for (let place = 0; place < targetCount; place++) {
      const target = targets.order[place] ?? 0
      const sumAt = sumsAt + 4 * (place >> 1) + (place & 1)
      out.axial[target] = all[sumAt] ?? NaN
      out.radial[target] = all[sumAt + 2] ?? NaN
    }
  }
}

function roomFor(kept: Int32Array<ArrayBuffer>, length: number): Int32Array<ArrayBuffer> {
  return kept.length >= length ? kept : new Int32Array(Math.ceil(1.25 * length))
}

/** x, r, 0 of points, for the tree. */
function packed(
  kept: Float64Array<ArrayBuffer> | undefined,
  x: Float64Array,
  r: Float64Array,
  count: number,
): Float64Array<ArrayBuffer> {
  const points = kept !== undefined && kept.length >= 3 * count ? kept : new Float64Array(Math.ceil(3.75 * count))
  for (let i = 0; i < count; i++) {
    points[3 * i] = x[i] ?? NaN
    points[3 * i + 1] = r[i] ?? NaN
  }
  return points
}

/** Writes the rings in order, then the grids with the circulations shared out to them, parts before wholes. */
function putSources(sum: TreeSum, input: CoaxialInput): void {
  const { all, sources, sourceGrid, sourcesAt, circulation, basis } = sum
  const { rings } = input
  const side = MOST_POINTS
  const share = input.targetDeltaSquared === null ? 1 : 0.5
  for (let place = 0; place < sources.count; place++) {
    const ring = sources.order[place] ?? 0
    const to = sourcesAt + SOURCE * place
    all[to] = rings.x[ring] ?? NaN
    all[to + 1] = rings.r[ring] ?? NaN
    all[to + 2] = share * (rings.deltaSquared[ring] ?? NaN)
    circulation[place] = rings.circulation[ring] ?? NaN
  }
  for (let cell = sources.cellCount - 1; cell >= 0; cell--) {
    const nx = sourceGrid.counts[3 * cell] ?? 0
    if (nx === 0) continue
    const nr = sourceGrid.counts[3 * cell + 1] ?? 0
    const nd = sourceGrid.counts[3 * cell + 2] ?? 0
    const whole = sourceGrid.first[cell] ?? 0
    eachGridPoint(sources, sourceGrid, cell, (k, x, r, d) => {
      const to = sourcesAt + SOURCE * (whole + k)
      all[to] = x
      all[to + 1] = r
      all[to + 2] = share * d
    })
    const part = sources.parts[cell] ?? 0
    // A leaf takes its own rings, another cell what stands for its parts.
    for (let from = part === 0 ? cell : part; from < (part === 0 ? cell + 1 : part + 2); from++) {
      const start = part === 0 ? (sources.first[cell] ?? 0) : (sourceGrid.first[from] ?? 0)
      const count = part === 0 ? (sources.size[cell] ?? 0) : (sourceGrid.size[from] ?? 0)
      for (let place = start; place < start + count; place++) {
        const at = sourcesAt + SOURCE * place
        fillBasis(sources, sourceGrid, cell, basis, all[at] ?? NaN, all[at + 1] ?? NaN, (all[at + 2] ?? NaN) / share)
        const gamma = circulation[place] ?? NaN
        for (let a = 0, to = whole; a < nx; a++) {
          const ga = gamma * (basis[a] ?? NaN)
          for (let b = 0; b < nr; b++) {
            const gab = ga * (basis[side + b] ?? NaN)
            for (let c = 0; c < nd; c++, to++) {
              circulation[to] = (circulation[to] ?? NaN) + gab * (basis[2 * side + c] ?? NaN)
            }
          }
        }
      }
    }
  }
  for (let place = 0; place < sourceGrid.places; place++) {
    const at = sourcesAt + SOURCE * place
    const r = all[at + 1] ?? NaN
    all[at + 3] = (circulation[place] ?? NaN) * r * r * (1 / Math.PI)
  }
}

/** Writes the targets in order, then the grids; a lane without a target repeats the one before. */
function putTargets(sum: TreeSum, input: CoaxialInput): void {
  const { targets, targetGrid } = sum
  const own = input.targetDeltaSquared
  for (let place = 0; place < targets.count + (targets.count & 1); place++) {
    const target = targets.order[Math.min(place, targets.count - 1)] ?? 0
    putTarget(sum, place, input.targetX[target] ?? NaN, input.targetR[target] ?? NaN, own?.[target] ?? 0)
  }
  for (let cell = 0; cell < targets.cellCount; cell++) {
    if (targetGrid.counts[3 * cell] === 0) continue
    const first = targetGrid.first[cell] ?? 0
    const last = (targetGrid.size[cell] ?? 0) - 1
    eachGridPoint(targets, targetGrid, cell, (k, x, r, d) => {
      putTarget(sum, first + k, x, r, d)
      if (k === last && (k & 1) === 0) putTarget(sum, first + k + 1, x, r, d)
    })
  }
}

function putTarget(sum: TreeSum, place: number, x: number, r: number, deltaSquared: number): void {
  const to = sum.targetsAt + 2 * TARGET * (place >> 1) + (place & 1)
  sum.all[to] = x
  sum.all[to + 2] = r
  sum.all[to + 4] = 0.5 * deltaSquared
}

function eachGridPoint(
  tree: PointTree,
  grid: ProxyGrid,
  cell: number,
  visit: (k: number, x: number, r: number, deltaSquared: number) => void,
): void {
  const nx = grid.counts[3 * cell] ?? 0
  const nr = grid.counts[3 * cell + 1] ?? 0
  const nd = grid.counts[3 * cell + 2] ?? 0
  let k = 0
  for (let a = 0; a < nx; a++) {
    const x = gridPoint(tree.middle[4 * cell] ?? NaN, tree.half[3 * cell] ?? NaN, nx, a)
    for (let b = 0; b < nr; b++) {
      const r = gridPoint(tree.middle[4 * cell + 1] ?? NaN, tree.half[3 * cell + 1] ?? NaN, nr, b)
      for (let c = 0; c < nd; c++) {
        visit(k++, x, r, gridPoint(tree.middle[4 * cell + 3] ?? NaN, tree.smoothingSpread[cell] ?? NaN, nd, c))
      }
    }
  }
}

/** The polynomials of a cell's grid at a point. */
function fillBasis(
  tree: PointTree,
  grid: ProxyGrid,
  cell: number,
  basis: Float64Array,
  x: number,
  r: number,
  d: number,
): void {
  const { middle, half, smoothingSpread } = tree
  lagrange(basis, 0, middle[4 * cell] ?? NaN, half[3 * cell] ?? NaN, grid.counts[3 * cell] ?? 0, x)
  const r0 = middle[4 * cell + 1] ?? NaN
  lagrange(basis, MOST_POINTS, r0, half[3 * cell + 1] ?? NaN, grid.counts[3 * cell + 1] ?? 0, r)
  const d0 = middle[4 * cell + 3] ?? NaN
  lagrange(basis, 2 * MOST_POINTS, d0, smoothingSpread[cell] ?? NaN, grid.counts[3 * cell + 2] ?? 0, d)
}

/** Meets target cell `cell` with the source cells in handed[start..start + count), as in segmentTree.ts. */
function walk(sum: TreeSum, cell: number, start: number, count: number): void {
  const { sources, targets, settings, sourceGrid, targetGrid, handed, open } = sum
  const isLeaf = targets.parts[cell] === 0
  const tx = targets.middle[4 * cell] ?? NaN
  const tr = targets.middle[4 * cell + 1] ?? NaN
  const radius = targets.radius[cell] ?? NaN
  const spread = targets.smoothingSpread[cell] ?? NaN
  const below = start + count
  let keptCount = 0
  let openCount = 0
  for (let k = start; k < below; k++) open[openCount++] = handed[k] ?? 0
  while (openCount > 0) {
    const source = open[--openCount] ?? 0
    const dx = tx - (sources.middle[4 * source] ?? NaN)
    const dr = tr - (sources.middle[4 * source + 1] ?? NaN)
    const square = dx * dx + dr * dr
    const sourceRadius = sources.radius[source] ?? NaN
    const reach = Math.max(radius + settings.room * sourceRadius, sourceRadius + settings.room * radius)
    const spreads = spread + (sources.smoothingSpread[source] ?? NaN)
    const part = sources.parts[source] ?? 0
    if (reach * reach < square && settings.room * spreads <= square) {
      add(
        sum,
        targetGrid.first[cell] ?? 0,
        targetGrid.size[cell] ?? 0,
        sourceGrid.first[source] ?? 0,
        sourceGrid.size[source] ?? 0,
      )
    } else if (part !== 0 && (isLeaf || !(radius > sourceRadius))) {
      open[openCount++] = part
      open[openCount++] = part + 1
    } else if (isLeaf) {
      add(sum, targets.first[cell] ?? 0, targets.size[cell] ?? 0, sources.first[source] ?? 0, sources.size[source] ?? 0)
    } else {
      handed[below + keptCount++] = source
    }
  }
  const part = targets.parts[cell] ?? 0
  if ((targetGrid.counts[3 * cell] ?? 0) > 0) {
    if (isLeaf) interpolate(sum, cell, targets.first[cell] ?? 0, targets.size[cell] ?? 0)
    else
      for (let to = part; to < part + 2; to++)
        interpolate(sum, cell, targetGrid.first[to] ?? 0, targetGrid.size[to] ?? 0)
  }
  if (isLeaf) return
  for (let to = part; to < part + 2; to++) walk(sum, to, below, keptCount)
}

/** Adds the velocities of source places at target places, which begin at an even one. */
function add(sum: TreeSum, target: number, targetSize: number, source: number, sourceSize: number): void {
  const targetAt = 8 * (sum.targetsAt + TARGET * target)
  const sumAt = 8 * (sum.sumsAt + SUM * target)
  sum.module.addCoaxialVelocity(
    targetAt,
    (targetSize + 1) >> 1,
    8 * (sum.sourcesAt + SOURCE * source),
    sourceSize,
    sumAt,
  )
}

/** Adds what stands at a cell's grid to places inside the cell. */
function interpolate(sum: TreeSum, cell: number, first: number, size: number): void {
  const { all, targets, targetGrid, targetsAt, sumsAt, basis } = sum
  const nx = targetGrid.counts[3 * cell] ?? 0
  const nr = targetGrid.counts[3 * cell + 1] ?? 0
  const nd = targetGrid.counts[3 * cell + 2] ?? 0
  const whole = targetGrid.first[cell] ?? 0
  const side = MOST_POINTS
  for (let place = first; place < first + size; place++) {
    const at = targetsAt + 2 * TARGET * (place >> 1) + (place & 1)
    fillBasis(targets, targetGrid, cell, basis, all[at] ?? NaN, all[at + 2] ?? NaN, 2 * (all[at + 4] ?? NaN))
    let axial = 0
    let radial = 0
    for (let a = 0, from = whole; a < nx; a++) {
      for (let b = 0; b < nr; b++) {
        const ab = (basis[a] ?? NaN) * (basis[side + b] ?? NaN)
        for (let c = 0; c < nd; c++, from++) {
          const weight = ab * (basis[2 * side + c] ?? NaN)
          const fromAt = sumsAt + 4 * (from >> 1) + (from & 1)
          axial += weight * (all[fromAt] ?? NaN)
          radial += weight * (all[fromAt + 2] ?? NaN)
        }
      }
    }
    const to = sumsAt + 4 * (place >> 1) + (place & 1)
    all[to] = (all[to] ?? NaN) + axial
    all[to + 2] = (all[to + 2] ?? NaN) + radial
  }
}
