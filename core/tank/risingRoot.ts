/**
 * Where a rising function that has to be awaited takes a value: bracketed from a guess, then by false position with halving
 * (the Illinois rule) in the logarithm of both.
 */

export interface RisingRootOptions {
  /** Where to begin, > 0. */
  readonly guess: number
  /** Ends of the search, > 0. */
  readonly least: number
  readonly most: number
  /** Relative, on the value. */
  readonly tolerance: number
}

const FIRST_FACTOR = 1.3
const MOST_STEPS = 80

/**
 * @param f value > 0 at x > 0, null where it has none: no root is sought beyond such a place
 * @returns x, the better end of the last bracket where the value jumps past the target, or null where no bracket is found
 */
export async function risingRoot(
  f: (x: number) => Promise<number | null>,
  target: number,
  options: RisingRootOptions,
): Promise<number | null> {
  const misfit = async (u: number): Promise<number | null> => {
    const value = await f(Math.exp(u))
    return value === null || !(value > 0) ? null : Math.log(value / target)
  }
  const ends = [Math.log(options.least), Math.log(options.most)] as const
  const bracket = await bracketFrom(misfit, Math.min(ends[1], Math.max(ends[0], Math.log(options.guess))), ends)
  if (bracket === null) return null
  let { a, fa, b, fb } = bracket
  let side = 0
  let plain = { fa, fb }
  let width = b - a
  for (let step = 0; step < MOST_STEPS; step++) {
    if (Math.abs(plain.fa) <= options.tolerance) return Math.exp(a)
    if (Math.abs(plain.fb) <= options.tolerance) return Math.exp(b)
    if (Math.abs(b - a) <= 4 * Number.EPSILON * Math.max(1, Math.abs(a))) break
    // Where three steps have not halved the bracket the next one does, so that a jump is closed in on too.
    const slow = step % 4 === 3 && b - a > width / 2
    if (step % 4 === 3) width = b - a
    const c = slow ? (a + b) / 2 : (a * fb - b * fa) / (fb - fa)
    const fc = await misfit(c)
    if (fc === null) return null
    if (fc < 0) {
      a = c
      fa = fc
      plain = { ...plain, fa }
      if (side === -1) fb /= 2
      side = -1
    } else {
      b = c
      fb = fc
      plain = { ...plain, fb }
      if (side === 1) fa /= 2
      side = 1
    }
  }
  return Math.exp(Math.abs(plain.fa) < Math.abs(plain.fb) ? a : b)
}

interface Bracket {
  readonly a: number
  readonly fa: number
  readonly b: number
  readonly fb: number
}

/** Ends with fa <= 0 <= fb, by steps that follow the misfit and grow. */
async function bracketFrom(
  misfit: (u: number) => Promise<number | null>,
  start: number,
  [low, high]: readonly [number, number],
): Promise<Bracket | null> {
  let u = start
  let fu = await misfit(u)
  if (fu === null) return null
  let stride = Math.max(Math.log(FIRST_FACTOR), 1.05 * Math.abs(fu))
  for (;;) {
    const up = fu < 0
    if ((up && u >= high) || (!up && u <= low)) return fu === 0 ? { a: u, fa: fu, b: u, fb: fu } : null
    const next = up ? Math.min(high, u + stride) : Math.max(low, u - stride)
    const fNext = await misfit(next)
    if (fNext === null) return null
    if (fNext < 0 !== up) return up ? { a: u, fa: fu, b: next, fb: fNext } : { a: next, fa: fNext, b: u, fb: fu }
    u = next
    fu = fNext
    stride *= 2
  }
}
