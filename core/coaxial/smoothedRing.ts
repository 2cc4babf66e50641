/**
 * Speed and energy of rings under the regularised law, and the cores that give a wanted speed or energy. Unlike those of the thin-core
 * law they keep their meaning for thick cores: speed and energy stay positive.
 */
import { bracketedRoot } from '../base'
import type { CoaxialInput, Kernel } from '../kernel'
import type { CoreModel } from '../ring'
import { THICKEST_CORE } from './checkInput'
import { deltaOverCore } from './ringFlow'

/** A ring as it stands. */
export interface StandingRing {
  readonly circulation: number
  readonly radius: number
  readonly coreRadius: number
  readonly core: CoreModel
  readonly x: number
}

/** Thinnest core looked for, over the radius. */
const THINNEST_CORE = 1e-4
/** Thickest core a merger may leave, over the radius: energies below it are nothing any more. */
export const THICKEST_MERGED = 20
const ROOT_TOLERANCE = 1e-12

/** Kinetic energy over density of rings as smoothed filaments, their mutual energy included: pi sum Gamma psi [m5/s2]. */
export function smoothedEnergy(rings: readonly StandingRing[], kernel: Kernel): number {
  const input = inputOf(rings)
  const stream = new Float64Array(rings.length)
  kernel.coaxialStream(input, stream)
  return Math.PI * rings.reduce((sum, { circulation }, i) => sum + circulation * (stream[i] ?? NaN), 0)
}

/** Speed of one ring alone [m/s]. */
export function smoothedSpeed(ring: StandingRing, kernel: Kernel): number {
  const out = { axial: new Float64Array(1), radial: new Float64Array(1) }
  kernel.coaxialVelocity(inputOf([ring]), out)
  return out.axial[0] ?? NaN
}

/**
 * Uniform core over ring radius with which a ring alone has this speed; the thickest or thinnest looked for where none has.
 *
 * @param speed of the sign of the circulation [m/s]
 */
export function coreRatioOfSpeed(circulation: number, radius: number, speed: number, kernel: Kernel): number {
  // Speeds scale with Gamma / R: one ring of unit size tells.
  const wanted = (speed * radius) / circulation
  return ratioWhere(THICKEST_CORE, (coreRadius) => smoothedSpeed({ ...UNIT_RING, coreRadius }, kernel) - wanted)
}

/** Core over ring radius with which a ring alone has this energy over density; the thickest or thinnest looked for where none has. */
export function coreRatioOfEnergy(
  circulation: number,
  radius: number,
  core: CoreModel,
  energy: number,
  kernel: Kernel,
): number {
  const wanted = energy / (circulation * circulation * radius)
  return ratioWhere(
    THICKEST_MERGED,
    (coreRadius) => smoothedEnergy([{ ...UNIT_RING, core, coreRadius }], kernel) - wanted,
  )
}

const UNIT_RING = { circulation: 1, radius: 1, core: 'uniform', x: 0 } as const

/** Where a falling function of the core ratio is 0, held between the ends. */
function ratioWhere(thickest: number, excess: (ratio: number) => number): number {
  if (excess(thickest) >= 0) return thickest
  return bracketedRoot(excess, THINNEST_CORE, thickest, ROOT_TOLERANCE) ?? THINNEST_CORE
}

function inputOf(rings: readonly StandingRing[]): CoaxialInput {
  const column = (value: (ring: StandingRing) => number): Float64Array => Float64Array.from(rings, value)
  const [x, r] = [column((ring) => ring.x), column(({ radius }) => radius)]
  const deltaSquared = column(({ core, coreRadius }) => (deltaOverCore(core) * coreRadius) ** 2)
  return {
    targetCount: rings.length,
    targetX: x,
    targetR: r,
    targetDeltaSquared: deltaSquared,
    rings: { count: rings.length, x, r, circulation: column(({ circulation }) => circulation), deltaSquared },
    skipSelf: false,
  }
}
