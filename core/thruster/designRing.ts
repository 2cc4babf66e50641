/**
 * The ring of many designs, for its formation number and the pressure in its core: the same sums as `computePulse`, with two
 * tables in the place of its searches.
 *
 * The adopted formation number is tabulated against stroke ratio and stream over peak speed, all it depends on at fixed shares of
 * the ramps. The core of a steady ring over sqrt(I / (rho pi Gamma)) is a function of its dimensionless energy alone.
 */
import { evaluateCubic, monotoneCubic, type CubicCurve } from '../base'
import {
  computePulse,
  dimensionlessEnergy,
  exitFactors,
  isQuickStart,
  quickStartTerms,
  ringOfInvariants,
  slugInvariants,
  wholeClosedPulse,
  type Invariants,
  type PulseInput,
} from '../pulse'
import { HILL_DIMENSIONLESS_ENERGY } from '../ring'
import { rampShare, scaledProgramme } from './designStroke'
import type { StrokeMoments } from './shapeMoments'

/** What a jet computed for the plan's own pulse holds beyond its slug, over rho D^3 U, rho D^3 U^2 and U D. */
export type ComputedStart = Invariants
export const NO_START: ComputedStart = { circulation: 0, impulse: 0, energy: 0 }

/** Stroke ratios at which the formation number is computed; between them its logarithm is straight. */
const STROKE_NODES = 25
const SHORTEST = 0.25
const LONGEST = 64
/** Streams likewise: between a stream of 0 and the strongest the logarithm is a cubic, which four places give exactly. */
const STREAM_NODES = 4
/** Stream over peak speed beyond which the modifier is held. */
const STRONGEST_STREAM = 0.5
/** Energies above Hill's at which the core is tabulated, evenly in their square root; thicker and thinner cores are matched. */
const CORE_NODES = 241
const MOST_EXCESS = 3

/** The rings of one shape of pulse. */
export class DesignRings {
  private readonly numbers = new Map<number, number | null>()
  /** The proportions of the nozzle are kept, and with them its factors. */
  private readonly factors: Invariants
  private readonly rampShare: number

  constructor(
    private readonly pulse: PulseInput,
    private readonly planMoments: StrokeMoments,
    private readonly start: ComputedStart,
  ) {
    this.factors = exitFactors(pulse.nozzle)
    this.rampShare = rampShare(pulse.programme, planMoments)
  }

  /**
   * Formation number by the plan's adopted estimate.
   *
   * @param streamRatio speed of the vehicle over peak exit speed, >= 0
   * @returns null where the estimate has no value
   */
  adopted(strokeRatio: number, streamRatio: number): number | null {
    const held = Math.min(LONGEST, Math.max(SHORTEST, strokeRatio))
    const x = ((STROKE_NODES - 1) * Math.log(held / SHORTEST)) / Math.log(LONGEST / SHORTEST)
    const y = ((STREAM_NODES - 1) * Math.min(streamRatio, STRONGEST_STREAM)) / STRONGEST_STREAM
    const i = Math.min(STROKE_NODES - 2, Math.floor(x))
    let logarithm = 0
    for (let j = 0; j < STREAM_NODES; j++) {
      const weight = lagrange(j, y)
      if (weight === 0) continue
      const below = this.node(i, j)
      const above = this.node(i + 1, j)
      if (below === null || above === null) return null
      logarithm += weight * (Math.log(below) * (1 - (x - i)) + Math.log(above) * (x - i))
    }
    return Math.exp(logarithm)
  }

  /**
   * Fall of pressure in the core of the ring, as `computePulse` has it [Pa].
   *
   * @param diameter of the exit [m]
   * @param moments of the whole stroke
   * @param speed of the vehicle [m/s]
   * @returns null where no ring is known
   */
  coreDrop(diameter: number, moments: StrokeMoments, speed: number): number | null {
    const { density, kinematicViscosity, overPressure } = this.pulse
    const strokeRatio = moments.stroke / diameter
    const adopted = this.adopted(strokeRatio, speed / moments.peakSpeed)
    const cut = adopted !== null && strokeRatio > adopted ? this.cutAt(adopted * diameter, moments) : moments
    const sums = { displacement: cut.stroke, square: cut.integralSpeedSquared, cube: cut.integralSpeedCubed }
    let ring = slugInvariants(sums, density, diameter, this.factors)
    const quick = isQuickStart((moments.peakSpeed * moments.timeTo95PercentOfPeak) / diameter)
    if (overPressure === 'quick-start' && quick) ring = sum(ring, quickStartTerms(cut.peakSpeed, density, diameter))
    if (overPressure === 'computed') ring = sum(ring, scaledStart(this.start, density, diameter, moments.peakSpeed))
    const core = coreOf(ring, density, kinematicViscosity)
    if (core === null) return null
    const thickest = Math.max(core.radius, Math.sqrt(4 * kinematicViscosity * moments.duration))
    return density * (core.circulation / (2 * Math.PI * thickest)) ** 2
  }

  private node(i: number, j: number): number | null {
    const key = i * STREAM_NODES + j
    const known = this.numbers.get(key)
    if (known !== undefined) return known
    const { nozzle, programme } = this.pulse
    const strokeRatio = SHORTEST * (LONGEST / SHORTEST) ** (i / (STROKE_NODES - 1))
    const stroke = strokeRatio * nozzle.diameter
    // The plan's own peak speed: only ratios matter.
    const duration = (this.planMoments.duration * stroke) / this.planMoments.stroke
    const found = computePulse({
      ...this.pulse,
      programme: scaledProgramme(programme, this.planMoments, stroke, duration),
      axialFlow: (STRONGEST_STREAM * this.planMoments.peakSpeed * j) / (STREAM_NODES - 1),
    }).formationNumber.adopted
    this.numbers.set(key, found)
    return found
  }

  /**
   * A fall of pressure that `coreDrop` does not exceed, for next to nothing: the circulation of the whole stroke about a core no
   * thicker than viscosity makes it.
   */
  coreDropAtMost(diameter: number, moments: StrokeMoments): number {
    const { density, kinematicViscosity } = this.pulse
    const slug = 0.5 * moments.integralSpeedSquared * this.factors.circulation
    // A start counts as quick here whether it is or not.
    const start = (1 / Math.PI + Math.max(0, this.start.circulation)) * moments.peakSpeed * diameter
    const swirl = (slug + start) / (2 * Math.PI)
    return (density * swirl * swirl) / (4 * kinematicViscosity * moments.duration)
  }

  /** The same stroke ended early: peak speed and ramps kept, a table stretched, as everywhere else. */
  private cutAt(stroke: number, moments: StrokeMoments): StrokeMoments {
    const { shape, riseTime, fallTime } = this.pulse.programme
    const share = stroke / moments.stroke
    if (shape === 'table')
      return {
        ...moments,
        stroke,
        integralSpeedSquared: moments.integralSpeedSquared * share,
        integralSpeedCubed: moments.integralSpeedCubed * share,
      }
    const ramps = (this.rampShare * moments.duration) / this.planMoments.duration
    const whole = wholeClosedPulse(
      shape,
      { peakSpeed: moments.peakSpeed, riseTime: riseTime * ramps, fallTime: fallTime * ramps },
      stroke,
    )
    return {
      ...moments,
      stroke,
      peakSpeed: whole.peakSpeed,
      integralSpeedSquared: whole.moments.square,
      integralSpeedCubed: whole.moments.cube,
    }
  }
}

/** What a computed jet adds to a pulse of another size and speed: taken in proportion to a start of its kind. */
export function scaledStart(start: ComputedStart, density: number, diameter: number, peakSpeed: number): Invariants {
  const cube = density * diameter ** 3 * peakSpeed
  return {
    circulation: start.circulation * diameter * peakSpeed,
    impulse: start.impulse * cube,
    energy: start.energy * cube * peakSpeed,
  }
}

/** Weight of node j of 0, 1, 2, 3 in the cubic through all four, at y. */
function lagrange(j: number, y: number): number {
  let weight = 1
  for (let k = 0; k < STREAM_NODES; k++) if (k !== j) weight *= (y - k) / (j - k)
  return weight
}

function sum(a: Invariants, b: Invariants): Invariants {
  return { circulation: a.circulation + b.circulation, impulse: a.impulse + b.impulse, energy: a.energy + b.energy }
}

let coreCurve: CubicCurve | null = null

/** Mean core radius [m] and circulation of the ring that invariants make. */
function coreOf(
  ring: Invariants,
  density: number,
  kinematicViscosity: number,
): { readonly radius: number; readonly circulation: number } | null {
  const excess = dimensionlessEnergy(ring, density) - HILL_DIMENSIONLESS_ENERGY
  if (excess > 0 && excess < MOST_EXCESS) {
    coreCurve ??= tabulateCores()
    const scale = Math.sqrt(ring.impulse / (density * Math.PI * ring.circulation))
    return {
      radius: scale * Math.exp(evaluateCubic(coreCurve, Math.sqrt(excess)).value),
      circulation: ring.circulation,
    }
  }
  const matched = ringOfInvariants(ring, density, kinematicViscosity)
  return matched === null ? null : { radius: matched.meanCoreRadius, circulation: matched.circulation }
}

/** ln(core / sqrt(I / (rho pi Gamma))) against the square root of the energy above Hill's. */
function tabulateCores(): CubicCurve {
  const x = Array.from({ length: CORE_NODES }, (_, i) => (Math.sqrt(MOST_EXCESS) * i) / (CORE_NODES - 1))
  const y = x.map((root) => {
    const energy = (HILL_DIMENSIONLESS_ENERGY + root * root) * Math.sqrt(Math.PI)
    const ring = ringOfInvariants({ circulation: 1, impulse: Math.PI, energy }, 1, 1)
    return Math.log(ring?.meanCoreRadius ?? Number.NaN)
  })
  return monotoneCubic(x, y)
}
