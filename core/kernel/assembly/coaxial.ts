/*
 * Coaxial rings, two targets in the lanes of a v128. Formulas: core/kernel/coaxialReference.ts, whose operations and order
 * these are: change both or neither.
 */
import { BLOCK, STREAM_TABLE, TABLE_OCTAVES, VELOCITY_TABLE, WORK } from './layout'

const FIRST_EXPONENT: i64 = 1023 - TABLE_OCTAVES
const QUARTER_LOG_TWO: f64 = 0.17328679513998632

@inline
function smallestM1(): v128 {
  return i64x2.splat(FIRST_EXPONENT << 52)
}

/** The part of m1 within its interval, as a double of 1..1.125 less the middle of that. */
@inline
function offset(bits: v128): v128 {
  const unit = v128.or(v128.and(bits, i64x2.splat(0x1ffffffffffff)), i64x2.splat(0x3ff0000000000000))
  return f64x2.sub(unit, f64x2.splat(1.0625))
}

/** Bits of m1 lifted by whole octaves into the table, in the lanes that lie below it. */
function liftedBits(m1: v128): v128 {
  const below = f64x2.lt(m1, smallestM1())
  const octaves = i64x2.sub(i64x2.splat(FIRST_EXPONENT), i64x2.shr_s(m1, 52))
  return i64x2.add(m1, v128.and(i64x2.shl(octaves, 52), below))
}

/** What e gains below the table: a quarter of ln 2 an octave. */
function shiftBelow(m1: v128): v128 {
  const below = f64x2.lt(m1, smallestM1())
  const octaves = v128.and(i64x2.sub(i64x2.splat(FIRST_EXPONENT), i64x2.shr_s(m1, 52)), below)
  const first = <f64>i64x2.extract_lane(octaves, 0) * QUARTER_LOG_TWO
  const second = <f64>i64x2.extract_lane(octaves, 1) * QUARTER_LOG_TWO
  return f64x2.replace_lane(f64x2.splat(first), 1, second)
}

/** The pair (e, f) of one target: Horner's rule in t^2 for the odd and the even part, which is the shorter wait. */
@inline
function lookUp(bits: i64, t: v128, t2: v128): v128 {
  const at = VELOCITY_TABLE - (<usize>FIRST_EXPONENT << 10) + (<usize>(bits >> 42) & ~127)
  let odd = f64x2.add(f64x2.mul(v128.load(at), t2), v128.load(at, 32))
  let even = f64x2.add(f64x2.mul(v128.load(at, 16), t2), v128.load(at, 48))
  odd = f64x2.add(f64x2.mul(odd, t2), v128.load(at, 64))
  even = f64x2.add(f64x2.mul(even, t2), v128.load(at, 80))
  odd = f64x2.add(f64x2.mul(odd, t2), v128.load(at, 96))
  even = f64x2.add(f64x2.mul(even, t2), v128.load(at, 112))
  return f64x2.add(f64x2.mul(odd, t), even)
}

/**
 * Adds rings from..to to the sums of two targets.
 *
 * Block by block in two passes: one run through the whole chain of operations would be so long that the processor sees only
 * one or two of them at a time and waits.
 *
 * @param target 48 bytes: x x, r r, half delta^2 twice.
 * @param rings records of 32 bytes: x, r, delta^2 share, Gamma r^2 / pi.
 * @param sums axial sums, then 16 bytes on the radial ones.
 * @param self number of the ring that is the first lane's own and left out, the second lane's is the next; -2 for none.
 */
function sumVelocity(target: usize, rings: usize, from: i32, to: i32, sums: usize, self: i32): void {
  for (let j = from; j < to; j += BLOCK) {
    const end = min(j + BLOCK, to)
    const below = geometry(target, rings + 32 * j, end - j)
    if (below || (self < end && self + 1 >= j)) velocities(target, rings + 32 * j, end - j, sums, true, self - j)
    else velocities(target, rings + 32 * j, end - j, sums, false, -2)
  }
}

/** First pass: m1, 1 / A^2, 1 / B^2 and the common factor, into WORK. True when an m1 lies below the table. */
function geometry(target: usize, rings: usize, count: i32): bool {
  const tx = v128.load(target)
  const tr = v128.load(target, 16)
  const smoothing = v128.load(target, 32)
  const end = rings + 32 * count
  let below = i64x2.splat(0)
  for (let ring = rings, work = WORK; ring < end; ring += 32, work += 64) {
    const dx = f64x2.sub(tx, v128.load64_splat(ring))
    const sr = v128.load64_splat(ring, 8)
    const h = f64x2.add(f64x2.mul(dx, dx), f64x2.add(smoothing, v128.load64_splat(ring, 16)))
    const sum = f64x2.add(sr, tr)
    const difference = f64x2.sub(sr, tr)
    const a2 = f64x2.add(h, f64x2.mul(sum, sum))
    const b2 = f64x2.add(h, f64x2.mul(difference, difference))
    const both = f64x2.div(f64x2.splat(1), f64x2.mul(a2, b2))
    const inverseA = f64x2.mul(b2, both)
    const m1 = f64x2.pmin(f64x2.splat(1.0625), f64x2.mul(b2, inverseA))
    below = v128.or(below, f64x2.lt(m1, smallestM1()))
    v128.store(work, m1)
    v128.store(work, inverseA, 16)
    v128.store(work, f64x2.mul(a2, both), 32)
    v128.store(work, f64x2.mul(v128.load64_splat(ring, 24), f64x2.mul(inverseA, f64x2.sqrt(inverseA))), 48)
  }
  return v128.any_true(below)
}

/** Second pass: the elliptic parts and the sums. `special` looks for rings below the table and for the targets' own. */
@inline
function velocities(target: usize, rings: usize, count: i32, sums: usize, special: bool, self: i32): void {
  const tx = v128.load(target)
  const tr = v128.load(target, 16)
  const smoothing = v128.load(target, 32)
  const r4 = f64x2.mul(f64x2.splat(4), tr)
  const r4tr = f64x2.mul(tr, r4)
  let axial = v128.load(sums)
  let radial = v128.load(sums, 16)
  const end = rings + 32 * count
  for (let ring = rings, work = WORK; ring < end; ring += 32, work += 64) {
    const m1 = v128.load(work)
    let bits = m1
    if (special) bits = liftedBits(m1)
    const t = offset(bits)
    const t2 = f64x2.mul(t, t)
    const first = lookUp(i64x2.extract_lane(bits, 0), v128.shuffle<f64>(t, t, 0, 0), v128.shuffle<f64>(t2, t2, 0, 0))
    const second = lookUp(i64x2.extract_lane(bits, 1), v128.shuffle<f64>(t, t, 1, 1), v128.shuffle<f64>(t2, t2, 1, 1))
    let e = v128.shuffle<f64>(first, second, 0, 2)
    let f = v128.shuffle<f64>(first, second, 1, 3)
    if (special) {
      const shift = shiftBelow(m1)
      e = f64x2.add(e, shift)
      f = f64x2.sub(f, f64x2.mul(f64x2.splat(3), shift))
    }
    const dx = f64x2.sub(tx, v128.load64_splat(ring))
    const h = f64x2.add(f64x2.mul(dx, dx), f64x2.add(smoothing, v128.load64_splat(ring, 16)))
    const difference = f64x2.sub(v128.load64_splat(ring, 8), tr)
    const inverseB = v128.load(work, 32)
    const scale = v128.load(work, 48)
    const fa = f64x2.mul(f, v128.load(work, 16))
    const near = f64x2.mul(f64x2.add(h, f64x2.mul(difference, f64x2.add(difference, r4))), inverseB)
    let du = f64x2.mul(scale, f64x2.sub(f64x2.add(near, e), f64x2.mul(r4tr, fa)))
    let dv = f64x2.mul(scale, f64x2.mul(dx, f64x2.add(inverseB, fa)))
    if (special) {
      const own = i64x2.eq(i64x2.splat(<i64>((work - WORK) >> 6) - self), i64x2(0, 1))
      du = v128.andnot(du, own)
      dv = v128.andnot(dv, own)
    }
    axial = f64x2.add(axial, du)
    radial = f64x2.add(radial, dv)
  }
  v128.store(sums, axial)
  v128.store(sums, radial, 16)
}

/**
 * Velocities at pairs of targets.
 *
 * @param targets 48 bytes a pair. @param sums 32 bytes a pair, written: axial axial, radial radial.
 * @param firstSelf ring number of the first target when each target is a ring whose own part is left out; -1 when not.
 */
export function coaxialVelocity(targets: usize, pairs: i32, rings: usize, ringCount: i32, sums: usize, firstSelf: i32): void {
  for (let p = 0; p < pairs; p++) {
    v128.store(sums, f64x2.splat(0))
    v128.store(sums, f64x2.splat(0), 16)
    sumVelocity(targets, rings, 0, ringCount, sums, firstSelf < 0 ? -2 : firstSelf + 2 * p)
    const r4 = f64x2.mul(f64x2.splat(4), v128.load(targets, 16))
    v128.store(sums, f64x2.mul(r4, v128.load(sums, 16)), 16)
    targets += 48
    sums += 32
  }
}

/** Adds the velocities at pairs of targets, none of which is left out: for the tree. */
export function addCoaxialVelocity(targets: usize, pairs: i32, rings: usize, ringCount: i32, sums: usize): void {
  for (let p = 0; p < pairs; p++) {
    const axial = v128.load(sums)
    const radial = v128.load(sums, 16)
    v128.store(sums, f64x2.splat(0))
    v128.store(sums, f64x2.splat(0), 16)
    sumVelocity(targets, rings, 0, ringCount, sums, -2)
    const r4 = f64x2.mul(f64x2.splat(4), v128.load(targets, 16))
    v128.store(sums, f64x2.add(axial, v128.load(sums)))
    v128.store(sums, f64x2.add(radial, f64x2.mul(r4, v128.load(sums, 16))), 16)
    targets += 48
    sums += 32
  }
}

/** The pairs (c_7 t^2 .. , c_6 t^2 ..) of one target by Horner's rule in t^2: odd and even part of C. */
@inline
function lookUpStream(bits: i64, t2: v128): v128 {
  const at = STREAM_TABLE - (<usize>FIRST_EXPONENT << 9) + (<usize>(bits >> 43) & ~63)
  let value = f64x2.add(f64x2.mul(v128.load(at), t2), v128.load(at, 16))
  value = f64x2.add(f64x2.mul(value, t2), v128.load(at, 32))
  return f64x2.add(f64x2.mul(value, t2), v128.load(at, 48))
}

/** @see coaxialVelocity; sums is 16 bytes a pair. */
export function coaxialStream(targets: usize, pairs: i32, rings: usize, ringCount: i32, sums: usize, firstSelf: i32): void {
  for (let p = 0; p < pairs; p++) {
    const tx = v128.load(targets)
    const tr = v128.load(targets, 16)
    const smoothing = v128.load(targets, 32)
    const self = firstSelf < 0 ? -2 : firstSelf + 2 * p
    let total = f64x2.splat(0)
    for (let j = 0, ring = rings; j < ringCount; j++, ring += 32) {
      const dx = f64x2.sub(tx, v128.load64_splat(ring))
      const sr = v128.load64_splat(ring, 8)
      const h = f64x2.add(f64x2.mul(dx, dx), f64x2.add(smoothing, v128.load64_splat(ring, 16)))
      const sum = f64x2.add(sr, tr)
      const difference = f64x2.sub(sr, tr)
      const inverseA = f64x2.div(f64x2.splat(1), f64x2.add(h, f64x2.mul(sum, sum)))
      const m1 = f64x2.pmin(f64x2.splat(1.0625), f64x2.mul(f64x2.add(h, f64x2.mul(difference, difference)), inverseA))
      let bits = m1
      const below = v128.any_true(f64x2.lt(m1, smallestM1()))
      if (below) bits = liftedBits(m1)
      const t = offset(bits)
      const t2 = f64x2.mul(t, t)
      const first = lookUpStream(i64x2.extract_lane(bits, 0), v128.shuffle<f64>(t2, t2, 0, 0))
      const second = lookUpStream(i64x2.extract_lane(bits, 1), v128.shuffle<f64>(t2, t2, 1, 1))
      const odd = v128.shuffle<f64>(first, second, 0, 2)
      const even = v128.shuffle<f64>(first, second, 1, 3)
      let c = f64x2.add(f64x2.mul(odd, t), even)
      if (below) c = f64x2.add(c, f64x2.mul(f64x2.splat(2), shiftBelow(m1)))
      let part = f64x2.mul(f64x2.mul(v128.load64_splat(ring, 24), f64x2.mul(inverseA, f64x2.sqrt(inverseA))), c)
      if (self >= 0) part = v128.andnot(part, i64x2.eq(i64x2.splat(<i64>(j - self)), i64x2(0, 1)))
      total = f64x2.add(total, part)
    }
    v128.store(sums, f64x2.mul(f64x2.mul(f64x2.mul(f64x2.splat(4), tr), tr), total))
    targets += 48
    sums += 16
  }
}
