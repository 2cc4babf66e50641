/** Made velocity fields: Gaussian cores and their images across the axis, whose vorticity is known exactly. */
import { randomSource } from '../../../../core/base'
import type { FieldFrame } from '../../../../core/tank'

export interface Blob {
  /** [m2/s] */
  readonly circulation: number
  readonly x: number
  readonly radius: number
  /** a of exp(-s^2 / a^2). */
  readonly coreRadius: number
}

export interface MadeGrid {
  readonly x: readonly [number, number]
  readonly y: readonly [number, number]
  readonly columns: number
  readonly rows: number
}

/**
 * Planar flow of blobs at (x, radius) and their opposites at (x, -radius): curl and contour integrals are those of the blobs, which is all an
 * analysis of vorticity sees. Velocity of one: Gamma / (2 pi s) (1 - exp(-s^2 / a^2)).
 */
export function madeFrame(
  time: number,
  blobs: readonly Blob[],
  grid: MadeGrid,
  noise: { readonly sigma: number; readonly seed: number } = { sigma: 0, seed: 1 },
): FieldFrame {
  const count = grid.columns * grid.rows
  const [x, r, u, v] = [0, 1, 2, 3].map(() => new Float64Array(count))
  if (x === undefined || r === undefined || u === undefined || v === undefined) throw new Error('no lists')
  const random = randomSource(noise.seed)
  const vortices = blobs.flatMap((blob) => [
    { ...blob, sign: 1 },
    { ...blob, radius: -blob.radius, sign: -1 },
  ])
  for (let j = 0; j < grid.rows; j++)
    for (let i = 0; i < grid.columns; i++) {
      const k = j * grid.columns + i
      const px = grid.x[0] + ((grid.x[1] - grid.x[0]) * i) / (grid.columns - 1)
      const py = grid.y[0] + ((grid.y[1] - grid.y[0]) * j) / (grid.rows - 1)
      x[k] = px
      r[k] = py
      let [su, sv] = [0, 0]
      for (const { circulation, x: cx, radius, coreRadius, sign } of vortices) {
        const [dx, dy] = [px - cx, py - radius]
        const s2 = dx * dx + dy * dy
        if (s2 === 0) continue
        const share = ((sign * circulation) / (2 * Math.PI * s2)) * -Math.expm1(-s2 / coreRadius ** 2)
        su -= share * dy
        sv += share * dx
      }
      u[k] = su + (noise.sigma === 0 ? 0 : noise.sigma * random.normal())
      v[k] = sv + (noise.sigma === 0 ? 0 : noise.sigma * random.normal())
    }
  return { time, x, r, u, v }
}

/** int omega r^2 dA of a Gaussian core off the axis: Gamma (R^2 + a^2 / 2), times pi for the impulse over rho. */
export function impulseOf({ circulation, radius, coreRadius }: Blob, density: number): number {
  return density * Math.PI * circulation * (radius ** 2 + coreRadius ** 2 / 2)
}
