/*
 * Straight segments in single precision, for previews and the near field of the tree: coordinates are pairs of floats, so
 * that differences of close points keep their digits, and the sums are taken over to double every few segments.
 */

/** Segments summed in single precision before the sums go over to double. */
const BLOCK: usize = 32 * 64

/** Rounds the doubles of a pair of pairs to four floats. */
@inline
function floats(low: v128, high: v128): v128 {
  return v128.shuffle<f64>(f32x4.demote_f64x2_zero(low), f32x4.demote_f64x2_zero(high), 0, 2)
}

/** What rounding left over: as floats again. */
@inline
function remainders(low: v128, high: v128, rounded: v128): v128 {
  const upper = v128.shuffle<f64>(rounded, rounded, 1, 1)
  return floats(
    f64x2.sub(low, f64x2.promote_low_f32x4(rounded)),
    f64x2.sub(high, f64x2.promote_low_f32x4(upper)),
  )
}

/** Differences of four targets and a source, both as pairs of floats. */
@inline
function difference(t: v128, rest: v128, source: v128, sourceRest: v128): v128 {
  return f32x4.add(f32x4.sub(t, source), f32x4.sub(rest, sourceRest))
}

@inline
function addTo(sums: usize, part: v128): void {
  const upper = v128.shuffle<f64>(part, part, 1, 1)
  v128.store(sums, f64x2.add(v128.load(sums), f64x2.promote_low_f32x4(part)))
  v128.store(sums, f64x2.add(v128.load(sums, 48), f64x2.promote_low_f32x4(upper)), 48)
}

/** Rewrites records of eight doubles as floats: x, rest of x, y, .., z, .., Gamma dl / (4 pi) x y z, delta^2 share. */
export function shortenSegments(segments: usize, segmentCount: i32): void {
  const end = segments + 64 * segmentCount
  for (let at = segments; at < end; at += 64) {
    const x = load<f64>(at)
    const y = load<f64>(at, 8)
    const z = load<f64>(at, 16)
    const gx = load<f64>(at, 24)
    const gy = load<f64>(at, 32)
    const gz = load<f64>(at, 40)
    const d2 = load<f64>(at, 48)
    store<f32>(at, <f32>x)
    store<f32>(at, <f32>(x - <f64>(<f32>x)), 4)
    store<f32>(at, <f32>y, 8)
    store<f32>(at, <f32>(y - <f64>(<f32>y)), 12)
    store<f32>(at, <f32>z, 16)
    store<f32>(at, <f32>(z - <f64>(<f32>z)), 20)
    store<f32>(at, <f32>gx, 24)
    store<f32>(at, <f32>gy, 28)
    store<f32>(at, <f32>gz, 32)
    store<f32>(at, <f32>d2, 36)
  }
}

/** As segmentVelocity in segments.ts, from records that shortenSegments has rewritten. */
export function segmentVelocityMixed(targets: usize, quads: i32, segments: usize, segmentCount: i32, sums: usize): void {
  const end = segments + 64 * segmentCount
  for (let q = 0; q < quads; q++) {
    const tx = floats(v128.load(targets), v128.load(targets, 64))
    const ty = floats(v128.load(targets, 16), v128.load(targets, 80))
    const tz = floats(v128.load(targets, 32), v128.load(targets, 96))
    const smoothing = floats(v128.load(targets, 48), v128.load(targets, 112))
    const restX = remainders(v128.load(targets), v128.load(targets, 64), tx)
    const restY = remainders(v128.load(targets, 16), v128.load(targets, 80), ty)
    const restZ = remainders(v128.load(targets, 32), v128.load(targets, 96), tz)
    for (let block = segments; block < end; block += BLOCK) {
      const blockEnd = min(block + BLOCK, end)
      let ux = f32x4.splat(0)
      let uy = f32x4.splat(0)
      let uz = f32x4.splat(0)
      for (let at = block; at < blockEnd; at += 64) {
        const sx = difference(tx, restX, v128.load32_splat(at, 0), v128.load32_splat(at, 4))
        const sy = difference(ty, restY, v128.load32_splat(at, 8), v128.load32_splat(at, 12))
        const sz = difference(tz, restZ, v128.load32_splat(at, 16), v128.load32_splat(at, 20))
        const gx = v128.load32_splat(at, 24)
        const gy = v128.load32_splat(at, 28)
        const gz = v128.load32_splat(at, 32)
        const plain = f32x4.add(f32x4.add(f32x4.mul(sx, sx), f32x4.mul(sy, sy)), f32x4.mul(sz, sz))
        const square = f32x4.add(plain, f32x4.add(smoothing, v128.load32_splat(at, 36)))
        const weight = f32x4.div(f32x4.splat(1), f32x4.mul(square, f32x4.sqrt(square)))
        ux = f32x4.add(ux, f32x4.mul(f32x4.sub(f32x4.mul(gy, sz), f32x4.mul(gz, sy)), weight))
        uy = f32x4.add(uy, f32x4.mul(f32x4.sub(f32x4.mul(gz, sx), f32x4.mul(gx, sz)), weight))
        uz = f32x4.add(uz, f32x4.mul(f32x4.sub(f32x4.mul(gx, sy), f32x4.mul(gy, sx)), weight))
      }
      addTo(sums, ux)
      addTo(sums + 16, uy)
      addTo(sums + 32, uz)
    }
    targets += 128
    sums += 96
  }
}
