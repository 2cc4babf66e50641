/*
 * The numbers of the tree for segments: Cartesian Taylor expansions of the vector potential
 *
 *   psi(x) = sum_j g_j phi(x - x_j),   phi(s) = (|s|^2 + delta^2)^(-1/2),   u = curl psi,   g_j = Gamma dl / (4 pi)
 *
 * about the middle of a source cell (moments M_n = sum g_j (-xi_j)^n / n!) and of a target cell (psi = sum L_k eta^k / k!),
 * joined by L_k = sum_{|n| + |k| <= order} M_n D_{n+k}, D the derivatives of phi between the two middles.
 * Cells and the lists of which meets which are made in core/kernel/segmentTree.ts; index tables in treeIndices.ts.
 *
 * An expansion holds `terms` coefficients in order of degree, each 32 bytes: x y z and one unused.
 */

/** Tables for one order, written by the caller before any other call: see treeIndices.ts. */
let order: i32 = 0
let terms: i32 = 0
/** i32 for each degree d and one more: how many terms lie below degree d. */
let below: usize = 0
/** i32 for each term: 16 times its place in the cube (order + 1)^3; places of sums are sums of places. */
let places: usize = 0
/** i32 for each place of the cube: number of the term there. */
let termAt: usize = 0
/** For each term 16 bytes: i32 number of the term one degree down, i32 8 times the axis, f64 1 / exponent of that axis. */
let chain: usize = 0
/** For each term 80 bytes: six f64 weights of the derivative recurrence, six i32 places, of which -1 is never read. */
let recurrence: usize = 0
/** Room for one expansion's monomials, the cube of derivatives of two cells and one expansion of the velocity. */
let monomials: usize = 0
let cube: usize = 0
let velocity: usize = 0

export function treeTables(
  newOrder: i32,
  newTerms: i32,
  newBelow: usize,
  newPlaces: usize,
  newTermAt: usize,
  newChain: usize,
  newRecurrence: usize,
  work: usize,
): void {
  order = newOrder
  terms = newTerms
  below = newBelow
  places = newPlaces
  termAt = newTermAt
  chain = newChain
  recurrence = newRecurrence
  monomials = work
  velocity = work + 8 * terms
  velocity = (velocity + 15) & ~15
  cube = velocity + 32 * terms
}

/** Writes v^n / n! for all terms. */
function powers(x: f64, y: f64, z: f64): void {
  const vector = cube
  store<f64>(vector, x)
  store<f64>(vector, y, 8)
  store<f64>(vector, z, 16)
  store<f64>(monomials, 1)
  for (let n = 1, link = chain + 16; n < terms; n++, link += 16) {
    const down = load<f64>(monomials + (<usize>load<i32>(link) << 3))
    store<f64>(monomials + (n << 3), down * load<f64>(vector + load<i32>(link, 4)) * load<f64>(link, 8))
  }
}

/** Adds segments from..to to the moments about a middle, two in the lanes. @param segments 64-byte records. */
export function momentsOfSegments(moments: usize, middle: usize, segments: usize, from: i32, to: i32): void {
  const mx = v128.load64_splat(middle)
  const my = v128.load64_splat(middle, 8)
  const mz = v128.load64_splat(middle, 16)
  const vector = cube
  const power = cube + 48
  const end = segments + 64 * to
  for (let a = segments + 64 * from; a < end; a += 128) {
    // An odd last segment fills both lanes, the second without strength.
    const b = a + 64 < end ? a + 64 : a
    const used = f64x2.splat(b === a ? 0 : 1)
    v128.store(vector, f64x2.sub(mx, v128.load64_lane(b, v128.load64_zero(a), 1)))
    v128.store(vector, f64x2.sub(my, v128.load64_lane(b, v128.load64_zero(a, 8), 1, 8)), 16)
    v128.store(vector, f64x2.sub(mz, v128.load64_lane(b, v128.load64_zero(a, 16), 1, 16)), 32)
    v128.store(power, f64x2.splat(1))
    const axy = v128.load(a, 24)
    const az = v128.load64_zero(a, 40)
    const bxy = f64x2.mul(used, v128.load(b, 24))
    const bz = f64x2.mul(used, v128.load64_zero(b, 40))
    for (let n = 0, link = chain, out = moments; n < terms; n++, link += 16, out += 32) {
      if (n > 0) {
        const down = v128.load(power + (<usize>load<i32>(link) << 4))
        const axis = v128.load(vector + 2 * load<i32>(link, 4))
        v128.store(power + (n << 4), f64x2.mul(f64x2.mul(down, axis), v128.load64_splat(link, 8)))
      }
      const pa = v128.load64_splat(power + (n << 4))
      const pb = v128.load64_splat(power + (n << 4), 8)
      v128.store(out, f64x2.add(v128.load(out), f64x2.add(f64x2.mul(pa, axy), f64x2.mul(pb, bxy))))
      v128.store(out, f64x2.add(v128.load(out, 16), f64x2.add(f64x2.mul(pa, az), f64x2.mul(pb, bz))), 16)
    }
  }
}

/** Adds the moments of a part to those of the whole. @param shift middle of the whole less that of the part. */
export function momentsOfPart(whole: usize, part: usize, x: f64, y: f64, z: f64): void {
  powers(x, y, z)
  for (let n = 0; n < terms; n++) {
    const xy = v128.load(part + (n << 5))
    const zw = v128.load(part + (n << 5), 16)
    const place = load<i32>(places + (n << 2))
    const degree = degreeOf(n)
    const count = load<i32>(below + ((order - degree + 1) << 2))
    for (let j = 0; j < count; j++) {
      const out = whole + (<usize>load<i32>(termAt + ((place + load<i32>(places + (j << 2))) >> 2)) << 5)
      const power = v128.load64_splat(monomials + (j << 3))
      v128.store(out, f64x2.add(v128.load(out), f64x2.mul(power, xy)))
      v128.store(out, f64x2.add(v128.load(out, 16), f64x2.mul(power, zw)), 16)
    }
  }
}

/** Adds the local expansion of a whole cell to that of a part. @param x y z middle of the part less that of the whole. */
export function localOfPart(part: usize, whole: usize, x: f64, y: f64, z: f64): void {
  powers(x, y, z)
  for (let k = 0; k < terms; k++) {
    const place = load<i32>(places + (k << 2))
    const degree = degreeOf(k)
    const count = load<i32>(below + ((order - degree + 1) << 2))
    let xy = v128.load(part + (k << 5))
    let zw = v128.load(part + (k << 5), 16)
    for (let j = 0; j < count; j++) {
      const from = whole + (<usize>load<i32>(termAt + ((place + load<i32>(places + (j << 2))) >> 2)) << 5)
      const power = v128.load64_splat(monomials + (j << 3))
      xy = f64x2.add(xy, f64x2.mul(power, v128.load(from)))
      zw = f64x2.add(zw, f64x2.mul(power, v128.load(from, 16)))
    }
    v128.store(part + (k << 5), xy)
    v128.store(part + (k << 5), zw, 16)
  }
}

function degreeOf(term: i32): i32 {
  let degree = 0
  while (load<i32>(below + ((degree + 1) << 2)) <= term) degree++
  return degree
}

/** Derivatives of phi at two places at once, into the cube. */
function derivatives(x: v128, y: v128, z: v128, deltaSquared: v128): void {
  const square = f64x2.add(f64x2.add(f64x2.mul(x, x), f64x2.mul(y, y)), f64x2.add(f64x2.mul(z, z), deltaSquared))
  const inverse = f64x2.div(f64x2.splat(1), square)
  v128.store(cube, f64x2.sqrt(inverse))
  const sx = f64x2.mul(x, inverse)
  const sy = f64x2.mul(y, inverse)
  const sz = f64x2.mul(z, inverse)
  for (let n = 1, row = recurrence + 80; n < terms; n++, row += 80) {
    let first = f64x2.mul(f64x2.mul(v128.load64_splat(row), sx), v128.load(cube + load<i32>(row, 48)))
    first = f64x2.add(first, f64x2.mul(f64x2.mul(v128.load64_splat(row, 8), sy), v128.load(cube + load<i32>(row, 52))))
    first = f64x2.add(first, f64x2.mul(f64x2.mul(v128.load64_splat(row, 16), sz), v128.load(cube + load<i32>(row, 56))))
    let second = f64x2.mul(v128.load64_splat(row, 24), v128.load(cube + load<i32>(row, 60)))
    second = f64x2.add(second, f64x2.mul(v128.load64_splat(row, 32), v128.load(cube + load<i32>(row, 64))))
    second = f64x2.add(second, f64x2.mul(v128.load64_splat(row, 40), v128.load(cube + load<i32>(row, 68))))
    v128.store(cube + load<i32>(places + (n << 2)), f64x2.add(first, f64x2.mul(second, inverse)))
  }
}

/** Adds one source cell's moments to a local expansion; its derivatives stand in the cube, in the lane `cube` begins at. */
function join(local: usize, moments: usize, derivative: usize): void {
  for (let degree = 1; degree <= order; degree++) {
    const first = load<i32>(below + (degree << 2))
    const last = load<i32>(below + ((degree + 1) << 2))
    const end = moments + (load<i32>(below + ((order - degree + 1) << 2)) << 5)
    let k = first
    for (; k + 3 <= last; k += 3) {
      const da = derivative + load<i32>(places + (k << 2))
      const db = derivative + load<i32>(places + (k << 2), 4)
      const dc = derivative + load<i32>(places + (k << 2), 8)
      const out = local + (k << 5)
      let axy = v128.load(out)
      let az = v128.load(out, 16)
      let bxy = v128.load(out, 32)
      let bz = v128.load(out, 48)
      let cxy = v128.load(out, 64)
      let cz = v128.load(out, 80)
      for (let m = moments, p = places; m < end; m += 32, p += 4) {
        const place = load<i32>(p)
        const xy = v128.load(m)
        const z = v128.load(m, 16)
        const a = v128.load64_splat(da + place)
        const b = v128.load64_splat(db + place)
        const c = v128.load64_splat(dc + place)
        axy = f64x2.add(axy, f64x2.mul(xy, a))
        az = f64x2.add(az, f64x2.mul(z, a))
        bxy = f64x2.add(bxy, f64x2.mul(xy, b))
        bz = f64x2.add(bz, f64x2.mul(z, b))
        cxy = f64x2.add(cxy, f64x2.mul(xy, c))
        cz = f64x2.add(cz, f64x2.mul(z, c))
      }
      v128.store(out, axy)
      v128.store(out, az, 16)
      v128.store(out, bxy, 32)
      v128.store(out, bz, 48)
      v128.store(out, cxy, 64)
      v128.store(out, cz, 80)
    }
    for (; k < last; k++) {
      const da = derivative + load<i32>(places + (k << 2))
      const out = local + (k << 5)
      let axy = v128.load(out)
      let az = v128.load(out, 16)
      for (let m = moments, p = places; m < end; m += 32, p += 4) {
        const a = v128.load64_splat(da + load<i32>(p))
        axy = f64x2.add(axy, f64x2.mul(v128.load(m), a))
        az = f64x2.add(az, f64x2.mul(v128.load(m, 16), a))
      }
      v128.store(out, axy)
      v128.store(out, az, 16)
    }
  }
}

/**
 * Adds source cells to the local expansion of a target cell.
 *
 * @param cells 32 bytes a cell: middle x y z, mean delta^2 share. @param list i32 numbers of source cells.
 */
export function localOfCells(local: usize, target: usize, cells: usize, moments: usize, list: usize, count: i32): void {
  const tx = v128.load64_splat(target)
  const ty = v128.load64_splat(target, 8)
  const tz = v128.load64_splat(target, 16)
  const smoothing = v128.load64_splat(target, 24)
  const size = <usize>(terms << 5)
  for (let i = 0; i < count; i += 2) {
    const a = <usize>load<i32>(list + (i << 2))
    const b = i + 1 < count ? <usize>load<i32>(list + (i << 2), 4) : a
    const ca = cells + (a << 5)
    const cb = cells + (b << 5)
    const axy = v128.load(ca)
    const bxy = v128.load(cb)
    const az = v128.load(ca, 16)
    const bz = v128.load(cb, 16)
    derivatives(
      f64x2.sub(tx, v128.shuffle<f64>(axy, bxy, 0, 2)),
      f64x2.sub(ty, v128.shuffle<f64>(axy, bxy, 1, 3)),
      f64x2.sub(tz, v128.shuffle<f64>(az, bz, 0, 2)),
      f64x2.add(smoothing, v128.shuffle<f64>(az, bz, 1, 3)),
    )
    join(local, moments + a * size, cube)
    if (i + 1 < count) join(local, moments + b * size, cube + 8)
  }
}

/**
 * Adds the velocity of a local expansion to targets.
 *
 * @param targets 64 bytes a pair and @param sums 48 bytes a pair, as in segments.ts.
 */
export function velocityOfLocal(local: usize, middle: usize, targets: usize, pairs: i32, sums: usize): void {
  // curl psi: the coefficient of eta^k / k! is L_{k + e_a} of one component less L_{k + e_b} of another.
  const count = load<i32>(below + (order << 2))
  const side = order + 1
  for (let k = 0; k < count; k++) {
    const place = load<i32>(places + (k << 2)) >> 2
    const dx = local + (<usize>load<i32>(termAt + place + 4 * side * side) << 5)
    const dy = local + (<usize>load<i32>(termAt + place + 4 * side) << 5)
    const dz = local + (<usize>load<i32>(termAt + place + 4) << 5)
    const out = velocity + 32 * k
    store<f64>(out, load<f64>(dy, 16) - load<f64>(dz, 8))
    store<f64>(out, load<f64>(dz) - load<f64>(dx, 16), 8)
    store<f64>(out, load<f64>(dx, 8) - load<f64>(dy), 16)
  }
  const mx = v128.load64_splat(middle)
  const my = v128.load64_splat(middle, 8)
  const mz = v128.load64_splat(middle, 16)
  for (let p = 0; p < pairs; p++) {
    // Two targets in the lanes; the cube serves as room for their powers.
    const vector = cube
    v128.store(vector, f64x2.sub(v128.load(targets), mx))
    v128.store(vector, f64x2.sub(v128.load(targets, 16), my), 16)
    v128.store(vector, f64x2.sub(v128.load(targets, 32), mz), 32)
    const power = cube + 48
    v128.store(power, f64x2.splat(1))
    let ux = f64x2.add(v128.load(sums), v128.load64_splat(velocity))
    let uy = f64x2.add(v128.load(sums, 16), v128.load64_splat(velocity, 8))
    let uz = f64x2.add(v128.load(sums, 32), v128.load64_splat(velocity, 16))
    for (let k = 1, link = chain + 16, out = velocity + 32; k < count; k++, link += 16, out += 32) {
      const down = v128.load(power + (<usize>load<i32>(link) << 4))
      const axis = v128.load(vector + 2 * load<i32>(link, 4))
      const value = f64x2.mul(f64x2.mul(down, axis), v128.load64_splat(link, 8))
      v128.store(power + (k << 4), value)
      ux = f64x2.add(ux, f64x2.mul(value, v128.load64_splat(out)))
      uy = f64x2.add(uy, f64x2.mul(value, v128.load64_splat(out, 8)))
      uz = f64x2.add(uz, f64x2.mul(value, v128.load64_splat(out, 16)))
    }
    v128.store(sums, ux)
    v128.store(sums, uy, 16)
    v128.store(sums, uz, 32)
    targets += 64
    sums += 48
  }
}
