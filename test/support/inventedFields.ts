/** Invented planar velocity fields: a ring of Gaussian cores on its way, noise included. */
import { randomSource } from '../../core/base'

/** Circulation [m2/s], ring radius and core radius [m] of the frames below, once the ring is formed. */
export const INVENTED_RING = { circulation: 28.7e-4, radius: 0.0177, coreRadius: 0.005 } as const
/** Frames are this far apart, the first at this time [s]. */
export const INVENTED_TIMES = { first: 0.1, step: 0.25 } as const

/**
 * One frame as CSV: x and y in millimetres, velocities in metres a second, noise of 0.5 mm/s. The circulation grows with time to
 * that of the ring at 0.65 s.
 */
export function inventedFrame(index: number): string {
  const { circulation, radius, coreRadius } = INVENTED_RING
  const time = INVENTED_TIMES.first + INVENTED_TIMES.step * index
  const strength = circulation * Math.min(1, time / 0.65)
  const place = time < 0.65 ? 0.031 * time : 0.02 + 0.04 * (time - 0.65)
  const random = randomSource(100 + index)
  const lines = ['x (mm),y (mm),u (m/s),v (m/s)']
  for (let j = -25; j <= 25; j++)
    for (let i = 0; i <= 80; i++) {
      const [x, y] = [0.0018 * i - 0.006, 0.0016 * j]
      let [u, v] = [0.0005 * random.normal(), 0.0005 * random.normal()]
      for (const side of [1, -1]) {
        const [dx, dy] = [x - place, y - side * radius]
        const square = dx * dx + dy * dy
        const spin = (side * strength) / (2 * Math.PI)
        const turn = square < 1e-12 ? 0 : (spin / square) * -Math.expm1(-square / coreRadius ** 2)
        u -= turn * dy
        v += turn * dx
      }
      lines.push(`${(1000 * x).toFixed(1)},${(1000 * y).toFixed(1)},${u.toFixed(5)},${v.toFixed(5)}`)
    }
  return `${lines.join('\n')}\n`
}
