/**
 * Root of a continuous function inside a bracket, by Brent's method.
 *
 * Source: R. P. Brent, Algorithms for Minimization without Derivatives, 1973, ch. 4.
 *
 * @param f continuous on [low, high]; f(low) and f(high) differ in sign (or one is zero).
 * @param tolerance absolute on x; the last interval is at most 4 eps |x| + tolerance wide.
 * @returns x with f(x) = 0 to the tolerance, or null where the ends have one sign.
 */
export function bracketedRoot(f: (x: number) => number, low: number, high: number, tolerance = 0): number | null {
  let a = low
  let b = high
  let fa = f(a)
  let fb = f(b)
  if (fa === 0) return a
  if (fb === 0) return b
  if (!(fa < 0 !== fb < 0) || Number.isNaN(fa) || Number.isNaN(fb)) return null
  let c = a
  let fc = fa
  let step = b - a
  let previous = step
  for (let i = 0; i < 200; i++) {
    if (Math.abs(fc) < Math.abs(fb)) {
      a = b
      b = c
      c = a
      fa = fb
      fb = fc
      fc = fa
    }
    const width = 2 * Number.EPSILON * Math.abs(b) + tolerance / 2
    const half = (c - b) / 2
    if (Math.abs(half) <= width || fb === 0) return b
    if (Math.abs(previous) >= width && Math.abs(fa) > Math.abs(fb)) {
      const s = fb / fa
      let p: number
      let q: number
      if (a === c) {
        p = 2 * half * s
        q = 1 - s
      } else {
        const t = fa / fc
        const r = fb / fc
        p = s * (2 * half * t * (t - r) - (b - a) * (r - 1))
        q = (t - 1) * (r - 1) * (s - 1)
      }
      if (p > 0) q = -q
      else p = -p
      if (2 * p < Math.min(3 * half * q - Math.abs(width * q), Math.abs(previous * q))) {
        previous = step
        step = p / q
      } else {
        step = half
        previous = half
      }
    } else {
      step = half
      previous = half
    }
    a = b
    fa = fb
    b += Math.abs(step) > width ? step : half > 0 ? width : -width
    fb = f(b)
    if (fb < 0 === fc < 0) {
      c = a
      fc = fa
      step = b - a
      previous = step
    }
  }
  return b
}
