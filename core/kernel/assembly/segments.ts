/*
 * Straight segments, lanes are targets. Formula: core/kernel/segmentReference.ts, whose operations and order the double
 * kernel follows: change both or neither.
 */

/** Writes three components of the sum at two targets. */
@inline
function storeSums(sums: usize, ux: v128, uy: v128, uz: v128): void {
  v128.store(sums, ux)
  v128.store(sums, uy, 16)
  v128.store(sums, uz, 32)
}

/**
 * Adds the velocities at quads of targets: two pairs a step, which share the loads of a source.
 *
 * @param targets 64 bytes a pair: x x, y y, z z, half delta^2 twice.
 * @param segments records of 64 bytes: midpoint, Gamma dl / (4 pi), delta^2 share, unused.
 * @param sums 48 bytes a pair: x x, y y, z z.
 */
export function segmentVelocity(targets: usize, quads: i32, segments: usize, segmentCount: i32, sums: usize): void {
  const end = segments + 64 * segmentCount
  for (let q = 0; q < quads; q++) {
    const txl = v128.load(targets)
    const tyl = v128.load(targets, 16)
    const tzl = v128.load(targets, 32)
    const smoothingl = v128.load(targets, 48)
    const txh = v128.load(targets, 64)
    const tyh = v128.load(targets, 80)
    const tzh = v128.load(targets, 96)
    const smoothingh = v128.load(targets, 112)
    let uxl = v128.load(sums)
    let uyl = v128.load(sums, 16)
    let uzl = v128.load(sums, 32)
    let uxh = v128.load(sums, 48)
    let uyh = v128.load(sums, 64)
    let uzh = v128.load(sums, 80)
    for (let at = segments; at < end; at += 64) {
      const px = v128.load64_splat(at)
      const py = v128.load64_splat(at, 8)
      const pz = v128.load64_splat(at, 16)
      const gx = v128.load64_splat(at, 24)
      const gy = v128.load64_splat(at, 32)
      const gz = v128.load64_splat(at, 40)
      const d2 = v128.load64_splat(at, 48)
      const sxl = f64x2.sub(txl, px)
      const syl = f64x2.sub(tyl, py)
      const szl = f64x2.sub(tzl, pz)
      const sxh = f64x2.sub(txh, px)
      const syh = f64x2.sub(tyh, py)
      const szh = f64x2.sub(tzh, pz)
      const plainl = f64x2.add(f64x2.add(f64x2.mul(sxl, sxl), f64x2.mul(syl, syl)), f64x2.mul(szl, szl))
      const plainh = f64x2.add(f64x2.add(f64x2.mul(sxh, sxh), f64x2.mul(syh, syh)), f64x2.mul(szh, szh))
      const squarel = f64x2.add(plainl, f64x2.add(smoothingl, d2))
      const squareh = f64x2.add(plainh, f64x2.add(smoothingh, d2))
      const weightl = f64x2.div(f64x2.splat(1), f64x2.mul(squarel, f64x2.sqrt(squarel)))
      const weighth = f64x2.div(f64x2.splat(1), f64x2.mul(squareh, f64x2.sqrt(squareh)))
      uxl = f64x2.add(uxl, f64x2.mul(f64x2.sub(f64x2.mul(gy, szl), f64x2.mul(gz, syl)), weightl))
      uyl = f64x2.add(uyl, f64x2.mul(f64x2.sub(f64x2.mul(gz, sxl), f64x2.mul(gx, szl)), weightl))
      uzl = f64x2.add(uzl, f64x2.mul(f64x2.sub(f64x2.mul(gx, syl), f64x2.mul(gy, sxl)), weightl))
      uxh = f64x2.add(uxh, f64x2.mul(f64x2.sub(f64x2.mul(gy, szh), f64x2.mul(gz, syh)), weighth))
      uyh = f64x2.add(uyh, f64x2.mul(f64x2.sub(f64x2.mul(gz, sxh), f64x2.mul(gx, szh)), weighth))
      uzh = f64x2.add(uzh, f64x2.mul(f64x2.sub(f64x2.mul(gx, syh), f64x2.mul(gy, sxh)), weighth))
    }
    storeSums(sums, uxl, uyl, uzl)
    storeSums(sums + 48, uxh, uyh, uzh)
    targets += 128
    sums += 96
  }
}

