/**
 * The steady family by continuation: from a circle at small core ratio, in steps, each solved from the one before.
 */
import { byParticleTime, circularCore, solveSteadyRing, type SolvedRing } from './steadySolver'

/** Position on the family: w = ln(eps / (sqrt 2 - eps)). Smooth at both ends, where the family has logarithms of eps and sqrt 2 - eps. */
export function familyCoordinate(coreRatio: number): number {
  return Math.log(coreRatio / (Math.SQRT2 - coreRatio))
}

/** Core ratio at w. */
export function coreRatioAt(w: number): number {
  return Math.SQRT2 / (1 + Math.exp(-w))
}

/** Above this core ratio a circle is no good start. */
const CIRCLE_LIMIT = 0.3
/** Longest step in w. */
const LONGEST_STEP = 0.5

const HARMONICS_ON_THE_WAY = 48
/** Residual at which a ring on the way is left. */
const ENOUGH_ON_THE_WAY = 1e-6

/** Harmonics for 1e-11 in the integrals (found by doubling). */
export function harmonicsFor(coreRatio: number): number {
  if (coreRatio < 0.3) return 32
  if (coreRatio < 0.6) return 48
  if (coreRatio < 1) return 80
  return 112
}

/**
 * Solve at core ratios in rising order.
 *
 * @param visit called with each solved ring
 * @throws {Error} where Newton fails: a fault of the solver, not of the caller
 */
export function solveSteadyFamily(coreRatios: readonly number[], visit: (ring: SolvedRing) => void): void {
  let ring: SolvedRing | null = null
  for (const coreRatio of coreRatios) {
    if (ring === null) ring = circularCore(Math.min(coreRatio, CIRCLE_LIMIT), HARMONICS_ON_THE_WAY)
    const from = familyCoordinate(ring.coreRatio)
    const to = familyCoordinate(coreRatio)
    const count = Math.max(1, Math.ceil((to - from) / LONGEST_STEP))
    for (let step = 1; step <= count; step++) {
      const last = step === count
      ring = solveOne(last ? coreRatio : coreRatioAt(from + ((to - from) * step) / count), ring, last)
    }
    visit(ring)
  }
}

function solveOne(coreRatio: number, start: SolvedRing, fine: boolean): SolvedRing {
  const harmonics = harmonicsFor(coreRatio)
  const few = HARMONICS_ON_THE_WAY
  const rough = solved(coreRatio, byParticleTime(start, few), ENOUGH_ON_THE_WAY)
  if (!fine) return rough
  // The rough ring still has its predecessor's time as parameter, on which its series falls off slowly. Its own time makes it fall fast.
  const nearly = solved(coreRatio, byParticleTime(rough, few), ENOUGH_ON_THE_WAY)
  const resolved = solved(coreRatio, byParticleTime(nearly, harmonics))
  return solved(coreRatio, byParticleTime(resolved, harmonics))
}

function solved(coreRatio: number, guess: SolvedRing, enough?: number): SolvedRing {
  const ring = solveSteadyRing(coreRatio, guess, enough)
  if (ring === null || ring.residual > (enough ?? 1e-10))
    throw new Error(`no steady ring found at core ratio ${coreRatio}`)
  return ring
}
