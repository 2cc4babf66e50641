/**
 * Integrals round the axis of 1/distance between a point and a circle.
 *
 * With s = (x - x')^2 + r^2 + r'^2 and distance R = sqrt(s - 2 r r' cos phi), phi over 0..2 pi:
 *
 *     J0 = int dphi / R,   J1 = int cos phi dphi / R,   J2 = int cos^2 phi dphi / R,   J3 = int cos phi R dphi
 *
 * K, and (2/m)(K - E) - K which J1 needs, come from one arithmetic-geometric mean in a form without cancellation at small m,
 * so that points near the axis keep full accuracy. J2 and J3 follow from d(sin phi R)/dphi.
 *
 * Source: Abramowitz & Stegun 1964, 17.6; the combination without cancellation is derived from 17.6.4.
 */

/** Written by evaluateKernels: one object is filled again and again, so that the sums allocate nothing. */
export interface RingKernels {
  j0: number
  j1: number
  j2: number
  j3: number
}

export function emptyKernels(): RingKernels {
  return { j0: 0, j1: 0, j2: 0, j3: 0 }
}

/**
 * Fill `out` for a point at radius r and a circle of radius q, `dx` apart along the axis.
 *
 * @param dx axial distance [m]
 * @param dr r - q [m], given separately so that it keeps its digits when the two are close
 * @param r radius of the point, > 0
 * @param q radius of the circle, > 0
 */
export function evaluateKernels(out: RingKernels, dx: number, dr: number, r: number, q: number): void {
  const far2 = dx * dx + (r + q) * (r + q)
  const near2 = dx * dx + dr * dr
  const m = (4 * r * q) / far2
  let a = 1
  let b = Math.sqrt(near2 / far2)
  let c = m / (2 * (1 + b))
  let tail = 0
  let power = 1
  // c falls quadratically; below 1e-9 the next one is below epsilon.
  for (let n = 0; n < 40; n++) {
    tail += power * c * c
    power *= 2
    const mean = (a + b) / 2
    b = Math.sqrt(a * b)
    a = mean
    if (c < 1e-9 * a) break
    c = (c * c) / (4 * ((a + b) / 2))
  }
  const K = Math.PI / (a + b)
  const scale = (4 * K) / Math.sqrt(far2)
  const j0 = scale
  const j1 = (scale * 2 * tail) / m
  const s = near2 + 2 * r * q
  const j2 = (s * j1 + r * q * j0) / (3 * r * q)
  out.j0 = j0
  out.j1 = j1
  out.j2 = j2
  out.j3 = -r * q * (j0 - j2)
}
