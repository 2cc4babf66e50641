/**
 * Formation number: the stroke ratio at which a pulse stops feeding its ring, by several estimates shown together.
 *
 * Every estimate varies the stroke at fixed peak speed and ramps (a table stretches in time) and uses whole-pulse integrals
 * of the slug. Nothing is clipped into the published band. Sources beside each estimate and in ./formationModifiers.
 */
import { bracketedRoot } from '../base'
import { HILL_DIMENSIONLESS_ENERGY, matchSteadyRing } from '../ring'
import { energyShare, searchFactors } from './exitFactors'
import { formationModifiers, type FormationModifiers } from './formationModifiers'
import { formationNotes } from './formationNotes'
import { dimensionlessEnergy, slugInvariants } from './invariants'
import type { SpeedProgramme } from './programme'
import type { FormationBasis, FormationNumbers, Invariants, PulseInput, StrokeMargin } from './types'

/** Dimensionless energy at which rings stop taking more: Gharib, Rambod & Shariff 1998 (recalled, not re-read). */
export const LIMITING_ENERGY = 0.33
/**
 * Ring speed over jet speed at which vorticity no longer catches up: after Mohseni & Gharib 1998, Phys. Fluids 10:2436. The
 * jet speed is the one its shear layer sees, sqrt(2 dGamma/dt): the exit speed of a parallel uniform jet, the axis speed of
 * a parabolic one, the free-streamline speed of a contracting one.
 */
const LIMITING_SPEED_SHARE = 0.5

/** Longest stroke ratio searched; rings are not formed by jets that long. */
const LONGEST = 30
/** Shortest stroke ratio at which the energy of a slug is asked for. */
const SHORTEST = 0.01
/** The matched estimates are scanned from this share of the stroke of Hill's vortex: thinner rings are thinner than any real core. */
const SCAN_FROM = 0.05
const SCAN_STEPS = 20
/** Formation numbers are good to a few per cent; this is for smooth dragging. */
const ROOT_TOLERANCE = 1e-10
/** Start of at most one formation time at peak speed counts as quick. */
const QUICK_START = 1

/** One value an estimate, null where absent. */
type Estimates = FormationNumbers['unmodified']

/** Estimates and the number of ring matches they cost. */
export interface FormationResult {
  readonly numbers: FormationNumbers
  readonly ringMatches: number
}

/** True where 95 % of the peak comes within one formation time at peak speed. */
export function isQuickStart(startFormationTime: number): boolean {
  return startFormationTime <= QUICK_START
}

/**
 * All estimates for a plan.
 *
 * @param input valid input
 * @param programme its compiled programme
 */
export function formationNumbers(input: PulseInput, programme: SpeedProgramme): FormationResult {
  const modifiers = formationModifiers(input.nozzle, input.axialFlow / programme.peakSpeed)
  const startFormationTime = (programme.peakSpeed * programme.timeTo95PercentOfPeak) / input.nozzle.diameter
  if (!modifiers.ringExpected) return { numbers: noRing(modifiers), ringMatches: 0 }

  const search = new StrokeSearch(input, programme)
  const quick = isQuickStart(startFormationTime)
  const raw: Estimates = {
    energyLimit: search.energyLimit(),
    carriedVolume: quick ? search.carriedVolume() : null,
    speedMatch: quick ? search.speedMatch() : null,
    computed: input.jet?.formationNumber ?? null,
  }
  const share = energyShare(searchFactors(input.nozzle))
  const slug = (value: number | null) => (value === null ? null : modifiers.apply(value, share))
  const jet = (value: number | null) => (value === null ? null : modifiers.applyToJet(value))
  const estimates: Estimates = {
    energyLimit: slug(raw.energyLimit),
    carriedVolume: slug(raw.carriedVolume),
    speedMatch: slug(raw.speedMatch),
    computed: jet(raw.computed),
  }
  const { band } = modifiers
  const ends = [band.low, band.high, estimates.energyLimit, estimates.computed]
    .concat(jet(input.jet?.formationNumberLow ?? null), jet(input.jet?.formationNumberHigh ?? null))
    .filter((value) => value !== null)
  const adopted = adoptedValue(input.formationBasis, estimates, band.centre)
  return {
    numbers: {
      ...estimates,
      published: [band.low, band.high],
      adopted,
      low: Math.min(...ends),
      high: Math.max(...ends),
      unmodified: raw,
      notes: formationNotes({ estimates, adopted, startFormationTime, quick, modifiers }),
    },
    ringMatches: search.matches,
  }
}

/** Stroke left, over every estimate shown and the published band. @param strokeRatio of the plan's own stroke */
export function strokeMargin(numbers: FormationNumbers, strokeRatio: number): StrokeMargin | null {
  const { energyLimit, carriedVolume, speedMatch, computed, published, low, high, adopted } = numbers
  if (published === null || low === null || high === null) return null
  const ends = [energyLimit, carriedVolume, speedMatch, computed, ...published, low, high].filter(
    (value) => value !== null,
  )
  return {
    low: Math.min(...ends) - strokeRatio,
    high: Math.max(...ends) - strokeRatio,
    adopted: adopted === null ? null : adopted - strokeRatio,
  }
}

function adoptedValue(basis: FormationBasis, estimates: Estimates, centre: number): number | null {
  return basis === 'published' ? centre : estimates[basis]
}

function noRing(modifiers: FormationModifiers): FormationNumbers {
  const none = { energyLimit: null, carriedVolume: null, speedMatch: null, computed: null }
  return {
    ...none,
    published: null,
    adopted: null,
    low: null,
    high: null,
    unmodified: none,
    notes: modifiers.notes.map((text) => ({ estimate: 'modifier', text })),
  }
}

/** One point of the family: what the pulse with this stroke ratio makes, and the steady ring that holds it. */
interface MatchedPoint {
  readonly strokeRatio: number
  /** Fluid the ring carries less the slug's volume, over D^3. */
  readonly spareVolume: number
  /** Ring speed over peak jet speed, less the limiting share. */
  readonly excessSpeed: number
}

/** The pulse's family in stroke ratio, searched; counts the matches it makes. */
class StrokeSearch {
  matches = 0
  private readonly factors: Invariants
  private scanned: readonly MatchedPoint[] | null = null

  constructor(
    private readonly input: PulseInput,
    private readonly programme: SpeedProgramme,
  ) {
    this.factors = searchFactors(input.nozzle)
  }

  /** The slug's energy falls to 0.33; it falls with the stroke in every family. */
  energyLimit(): number | null {
    return this.strokeOfEnergy(LIMITING_ENERGY)
  }

  /** The slug no longer fits into the fluid its ring carries (after Linden & Turner 2001, J. Fluid Mech. 427:61). */
  carriedVolume(): number | null {
    return this.crossing((point) => -point.spareVolume)
  }

  /** The ring's speed reaches half the jet's speed (after Mohseni & Gharib 1998; Shusser & Gharib 2000). */
  speedMatch(): number | null {
    return this.crossing((point) => point.excessSpeed)
  }

  /** First rise of a quantity through zero along the scan; null without one, or where the start there is not quick. */
  private crossing(quantity: (point: MatchedPoint) => number): number | null {
    let before: MatchedPoint | null = null
    for (const point of this.scan()) {
      if (before !== null && quantity(before) < 0 && quantity(point) >= 0) {
        const found = bracketedRoot(
          (strokeRatio) => {
            const matched = this.match(strokeRatio)
            // Inside the scan every stroke has a ring; at its very end rounding may say otherwise, and the end is above zero.
            return matched === null ? 1 : quantity(matched)
          },
          before.strokeRatio,
          point.strokeRatio,
          ROOT_TOLERANCE,
        )
        return found !== null && this.isQuickAt(found) ? found : null
      }
      before = point
    }
    return null
  }

  /** Matched points at stroke ratios in equal proportion, up to Hill's vortex: beyond it there is no ring to match. */
  private scan(): readonly MatchedPoint[] {
    if (this.scanned !== null) return this.scanned
    const end = (this.strokeOfEnergy(HILL_DIMENSIONLESS_ENERGY) ?? LONGEST) * (1 - 1e-9)
    const points: MatchedPoint[] = []
    for (let i = 0; i <= SCAN_STEPS; i++) {
      const point = this.match(end * SCAN_FROM ** (1 - i / SCAN_STEPS))
      if (point !== null) points.push(point)
    }
    this.scanned = points
    return points
  }

  private match(strokeRatio: number): MatchedPoint | null {
    const { density, nozzle } = this.input
    this.matches++
    const { ring } = matchSteadyRing({ density, ...this.slugAt(strokeRatio) })
    if (ring === null) return null
    const { peakSpeed } = this.programme.atStroke(strokeRatio * nozzle.diameter)
    const jetSpeed = peakSpeed * Math.sqrt(this.factors.circulation)
    return {
      strokeRatio,
      spareVolume: ring.carriedVolume / nozzle.diameter ** 3 - (Math.PI / 4) * strokeRatio,
      excessSpeed: ring.speed / jetSpeed - LIMITING_SPEED_SHARE,
    }
  }

  private strokeOfEnergy(limit: number): number | null {
    const { density } = this.input
    const excess = (strokeRatio: number) => dimensionlessEnergy(this.slugAt(strokeRatio), density) - limit
    return bracketedRoot(excess, SHORTEST, LONGEST, ROOT_TOLERANCE)
  }

  private slugAt(strokeRatio: number): Invariants {
    const { density, nozzle } = this.input
    const { moments } = this.programme.atStroke(strokeRatio * nozzle.diameter)
    return slugInvariants(moments, density, nozzle.diameter, this.factors)
  }

  private isQuickAt(strokeRatio: number): boolean {
    const { diameter } = this.input.nozzle
    const pulse = this.programme.atStroke(strokeRatio * diameter)
    return isQuickStart((pulse.peakSpeed * pulse.timeTo95PercentOfPeak) / diameter)
  }
}
