/**
 * A tree of cells over points that carry a smoothing delta^2: each is cut across its longest side, down to leaves.
 *
 * Cells are numbered so that both parts of a cell come after it. Points of a cell are neighbours in `order`.
 */
export interface PointTree {
  readonly cellCount: number
  /** Number of points; `order` may be longer. */
  readonly count: number
  /** Point at each place of the tree's order. */
  readonly order: Int32Array
  /** Places first[c] .. first[c] + size[c] - 1 are cell c's. */
  readonly first: Int32Array
  readonly size: Int32Array
  /** The first part of a cell, the second is the next number; 0 for a leaf. */
  readonly parts: Int32Array
  /** Middle x y z, m, and middle delta^2, m2, of each cell. */
  readonly middle: Float64Array
  /** Half the sides of the box round the points, x y z, m. */
  readonly half: Float64Array
  /** Distance from the middle to the farthest point, m. */
  readonly radius: Float64Array
  /** Largest difference of a point's delta^2 from the middle one, m2. */
  readonly smoothingSpread: Float64Array
}

/** Where x y z and delta^2 of a point stand: at stride i + 0..2 of `points`, at smoothingStride i + smoothingOffset. */
export interface PointSet {
  readonly count: number
  readonly points: Float64Array
  readonly stride: number
  /** null where delta^2 plays no part. */
  readonly deltaSquared: Float64Array | null
  readonly smoothingStride: number
  readonly smoothingOffset: number
}

/** Parts have a multiple of this many points where they can, so that lanes of targets are not left idle. */
const STEP = 4

/**
 * A cell is cut in the middle of its side, which keeps curves and clusters whole better than the median does (a quarter to
 * a third less time for rings at random places), but neither part gets less than this share of the points.
 */
const LEAST_SHARE = 0.2

/** Arrays of a tree and room to make it in, kept from call to call. */
interface Room extends PointTree {
  readonly coordinates: readonly Float64Array[]
  readonly keys: Float64Array
}

function room(count: number, leafSize: number): Room {
  // The smallest leaf holds LEAST_SHARE of leafSize, rounded to STEP; should there be more cells, some leaves stay larger.
  const cells = 14 * Math.ceil(count / leafSize) + 8
  return {
    cellCount: 0,
    count,
    order: new Int32Array(count),
    first: new Int32Array(cells),
    size: new Int32Array(cells),
    parts: new Int32Array(cells),
    middle: new Float64Array(4 * cells),
    half: new Float64Array(3 * cells),
    radius: new Float64Array(cells),
    smoothingSpread: new Float64Array(cells),
    coordinates: Array.from({ length: 4 }, () => new Float64Array(count)),
    keys: new Float64Array(count),
  }
}

/**
 * Makes trees in the same arrays call after call: a tree is valid until the next is made.
 *
 * @param smoothingWeight a cell is cut by delta^2, not in space, when it is narrower than that many times the square root of
 * its spread of delta^2. Large where mixed cells can stand for their points only far away.
 */
export function treeMaker(smoothingWeight: number): (set: PointSet, leafSize: number) => PointTree {
  let kept: Room | undefined
  let keptLeaf = 0
  return (set, leafSize) => {
    if (kept === undefined || kept.order.length < set.count || keptLeaf > leafSize) {
      kept = room(Math.ceil(1.25 * set.count), leafSize)
      keptLeaf = leafSize
    }
    return build(kept, set, leafSize, smoothingWeight)
  }
}

function build(tree: Room, set: PointSet, leafSize: number, smoothingWeight: number): PointTree {
  const { order, first, size, parts, keys } = tree
  gather(tree, set)
  for (let i = 0; i < set.count; i++) order[i] = i
  let cellCount = 1
  first[0] = 0
  size[0] = set.count
  for (let cell = 0; cell < cellCount; cell++) {
    const start = first[cell] ?? 0
    const end = start + (size[cell] ?? 0)
    const widest = measure(tree, cell, start, end, smoothingWeight)
    parts[cell] = 0
    if (end - start <= leafSize || cellCount + 2 > first.length) continue
    const coordinate = tree.coordinates[widest] ?? keys
    const centre = tree.middle[4 * cell + widest] ?? NaN
    let lower = 0
    for (let place = start; place < end; place++) {
      const key = coordinate[order[place] ?? 0] ?? NaN
      keys[place] = key
      if (key < centre) lower++
    }
    const least = LEAST_SHARE * (end - start)
    const share = Math.min(Math.max(lower, least), end - start - least)
    const cut = start + Math.max(1, Math.round(share / STEP)) * STEP
    select(keys, order, start, end - 1, cut)
    parts[cell] = cellCount
    first[cellCount] = start
    size[cellCount] = cut - start
    first[cellCount + 1] = cut
    size[cellCount + 1] = end - cut
    cellCount += 2
  }
  return { ...tree, cellCount, count: set.count }
}

function gather(tree: Room, set: PointSet): void {
  const { points, stride, deltaSquared, smoothingStride, smoothingOffset } = set
  tree.coordinates.forEach((coordinate, axis) => {
    if (axis < 3) for (let i = 0; i < set.count; i++) coordinate[i] = points[stride * i + axis] ?? NaN
    else if (deltaSquared === null) coordinate.fill(0, 0, set.count)
    else for (let i = 0; i < set.count; i++) coordinate[i] = deltaSquared[smoothingStride * i + smoothingOffset] ?? NaN
  })
}

/** Middle, radius and spread of a cell; gives the axis it is to be cut across, 3 for delta^2. */
function measure(tree: Room, cell: number, start: number, end: number, smoothingWeight: number): number {
  const { order, middle, half, radius, smoothingSpread } = tree
  const [xs = order, ys = order, zs = order, ds = order] = tree.coordinates
  let total = 0
  let [xl, yl, zl, dl] = [Infinity, Infinity, Infinity, Infinity]
  let [xh, yh, zh, dh] = [-Infinity, -Infinity, -Infinity, -Infinity]
  for (let place = start; place < end; place++) {
    const point = order[place] ?? 0
    const x = xs[point] ?? NaN
    const y = ys[point] ?? NaN
    const z = zs[point] ?? NaN
    const d = ds[point] ?? NaN
    if (x < xl) xl = x
    if (x > xh) xh = x
    if (y < yl) yl = y
    if (y > yh) yh = y
    if (z < zl) zl = z
    if (z > zh) zh = z
    if (d < dl) dl = d
    if (d > dh) dh = d
    total += d
  }
  const [mx, my, mz] = [0.5 * (xl + xh), 0.5 * (yl + yh), 0.5 * (zl + zh)]
  middle[4 * cell] = mx
  middle[4 * cell + 1] = my
  middle[4 * cell + 2] = mz
  middle[4 * cell + 3] = 0.5 * (dl + dh)
  half[3 * cell] = 0.5 * (xh - xl)
  half[3 * cell + 1] = 0.5 * (yh - yl)
  half[3 * cell + 2] = 0.5 * (zh - zl)
  // NaN and infinity, which the comparisons pass over, must keep the cell from standing for its points.
  smoothingSpread[cell] = 0.5 * (dh - dl) + 0 * total
  let square = 0
  for (let place = start; place < end; place++) {
    const point = order[place] ?? 0
    const dx = (xs[point] ?? NaN) - mx
    const dy = (ys[point] ?? NaN) - my
    const dz = (zs[point] ?? NaN) - mz
    square = Math.max(square, dx * dx + dy * dy + dz * dz)
  }
  radius[cell] = Math.sqrt(square)
  const extents = [xh - xl, yh - yl, zh - zl, smoothingWeight * Math.sqrt(dh - dl)]
  return extents.indexOf(Math.max(...extents))
}

/** Orders keys and their companions so that none before `place` is above any from it on (Hoare 1961). */
function select(keys: Float64Array, order: Int32Array, low: number, high: number, place: number): void {
  while (low < high) {
    const pivot = keys[(low + high) >> 1] ?? NaN
    let i = low
    let j = high
    while (i <= j) {
      while ((keys[i] ?? NaN) < pivot) i++
      while ((keys[j] ?? NaN) > pivot) j--
      if (i > j) break
      const key = keys[i] ?? NaN
      keys[i] = keys[j] ?? NaN
      keys[j] = key
      const point = order[i] ?? 0
      order[i] = order[j] ?? 0
      order[j] = point
      i++
      j--
    }
    if (place <= j) high = j
    else if (place >= i) low = i
    else return
  }
}
