/**
 * One pulse: from nozzle, programme and water to the ring it makes.
 *
 * Rule of use: the slug is the adopted basis of ring, dimensionless energy and pinch-off unless the user adopts another
 * over-pressure basis; the ring with the quick-start terms is always shown beside it for quick starts.
 */
import { DomainError, requireRange } from '../base'
import { corePressureDrop, mostUnstableWaveNumber } from '../ring'
import { exitFactors, exitPerPiston, requireNozzle } from './exitFactors'
import { formationNumbers, isQuickStart, strokeMargin } from './formationNumber'
import { pulseHistory } from './history'
import {
  NOTHING,
  addInvariants,
  diddenRatio,
  dimensionlessEnergy,
  quickStartTerms,
  slugInvariants,
  subtractInvariants,
} from './invariants'
import { compileProgramme } from './programme'
import { pulseNotes } from './pulseNotes'
import { limitingCirculation, ringOfInvariants } from './pulseRing'
import type { Invariants, NozzleInput, OverPressureBasis, PulseInput, PulseResult } from './types'
import type { WholePulse } from './wholePulse'

/**
 * Everything one pulse makes.
 *
 * @throws {DomainError} on a plan field that is not finite or outside its range (nozzle.…, programme.…, ambient.axialFlow,
 * water.density, water.kinematicViscosity), and on models.overPressure or models.formationNumber where the computed jet is
 * asked for and has not been handed in.
 */
export function computePulse(input: PulseInput): PulseResult {
  requireInput(input)
  const { density, kinematicViscosity, nozzle } = input
  const { diameter } = nozzle
  const programme = compileProgramme(input.programme)
  const factors = exitFactors(nozzle)
  const startFormationTime = (programme.peakSpeed * programme.timeTo95PercentOfPeak) / diameter
  const quickStart = isQuickStart(startFormationTime)
  const strokeRatio = programme.stroke / diameter
  // What leaves the exit the piston has swept.
  const areaRatio = 1 / exitPerPiston(nozzle)

  const slugOf = (pulse: WholePulse) => slugInvariants(pulse.moments, density, diameter, factors)
  const totalOf = (pulse: WholePulse, basis: OverPressureBasis) =>
    addInvariants(slugOf(pulse), beyondSlug(pulse, basis, input, quickStart))
  const ringOf = (pulse: WholePulse, basis: OverPressureBasis) =>
    ringOfInvariants(totalOf(pulse, basis), density, kinematicViscosity)

  const formation = formationNumbers(input, programme)
  const { adopted, published } = formation.numbers
  const ringExpected = published !== null
  const pinchedOff = adopted === null ? null : strokeRatio > adopted
  // What the ring takes: all of the pulse, or the same pulse cut at the adopted formation number.
  const taken = adopted !== null && pinchedOff === true ? programme.atStroke(adopted * diameter) : programme
  const ring = ringExpected ? ringOf(taken, input.overPressure) : null
  const ringFromSlug = ringExpected ? (input.overPressure === 'off' ? ring : ringOf(taken, 'off')) : null
  const ringWithOverPressure = ringExpected && quickStart ? ringOf(taken, 'quick-start') : null

  // No core is thinner than viscosity makes a line vortex during the stroke.
  const viscousCore = Math.sqrt(4 * kinematicViscosity * programme.duration)
  const core = ring === null ? null : Math.max(ring.meanCoreRadius, viscousCore)

  const slug = slugOf(programme)
  const total = totalOf(programme, input.overPressure)
  const meanSpeed = programme.stroke / programme.duration
  return {
    stroke: programme.stroke,
    strokeRatio,
    duration: programme.duration,
    peakSpeed: programme.peakSpeed,
    reducedPeak: programme.reducedPeak,
    pistonTravel: programme.stroke * areaRatio,
    pistonPeakSpeed: programme.peakSpeed * areaRatio,
    meanSpeed,
    jetReynolds: (programme.peakSpeed * diameter) / kinematicViscosity,
    quickStart,
    startFormationTime,
    slug,
    overPressure: quickStartTerms(programme.peakSpeed, density, diameter),
    total,
    dimensionlessEnergy: dimensionlessEnergy(slug, density),
    formationNumber: formation.numbers,
    margin: strokeMargin(formation.numbers, strokeRatio),
    pinchedOff,
    ring,
    ringFromSlug,
    ringWithOverPressure,
    trailingJet: ring === null ? total : subtractInvariants(total, ring),
    history: pulseHistory(programme, density, diameter, factors, quickStart),
    // Laminar, started at once: 1 + (8/sqrt pi) sqrt(nu t)/D; recalled, not re-read.
    boundaryLayerFactor: 1 + (8 / Math.sqrt(Math.PI)) * (Math.sqrt(kinematicViscosity * programme.duration) / diameter),
    // Measured on a plain tube.
    diddenRatio: quickStart && isPlainTube(nozzle) ? diddenRatio(strokeRatio) : null,
    unstableWaveNumber: core !== null && ring !== null ? unstableWaves(ring.radius, core) : null,
    corePressureDrop:
      core !== null && ring !== null ? corePressureDrop(density, ring.circulation, core, 'uniform') : null,
    limitingCirculation: ring === null ? null : limitingCirculation(ring, density),
    exitFactors: factors,
    notes: pulseNotes(input, programme, quickStart, { ring, ringExpected, viscousCore }),
    ringMatches: formation.ringMatches + [ringFromSlug, ringWithOverPressure].filter((r) => r !== null).length,
  }
}

function isPlainTube(nozzle: NozzleInput): boolean {
  return (
    nozzle.shape === 'tube' && nozzle.axisRatio === 1 && nozzle.exitProfile === 'uniform' && nozzle.radialRatio === 0
  )
}

/** Waves of a thin core; null for a core thicker than its ring, which the estimate is not made for. */
function unstableWaves(radius: number, core: number): number | null {
  return core <= radius ? mostUnstableWaveNumber(radius, core, 'uniform') : null
}

/** What a basis adds to the slug; the quick-start terms only where the start is quick. */
function beyondSlug(pulse: WholePulse, basis: OverPressureBasis, input: PulseInput, quickStart: boolean): Invariants {
  if (basis === 'quick-start')
    return quickStart ? quickStartTerms(pulse.peakSpeed, input.density, input.nozzle.diameter) : NOTHING
  if (basis === 'computed' && input.jet !== null)
    return {
      circulation: input.jet.circulationBeyondSlug,
      impulse: input.jet.impulseBeyondSlug,
      energy: input.jet.energyBeyondSlug,
    }
  return NOTHING
}

function requireInput(input: PulseInput): void {
  requireRange('water.density', input.density, { above: 0, unit: 'kg/m3' })
  requireRange('water.kinematicViscosity', input.kinematicViscosity, { above: 0, unit: 'm2/s' })
  requireNozzle(input.nozzle)
  requireRange('ambient.axialFlow', input.axialFlow, { unit: 'm/s' })
  if (input.jet !== null) return
  const missing = 'needs the computed starting jet to be handed in, got computed without one'
  if (input.overPressure === 'computed') {
    throw new DomainError('models.overPressure', `models.overPressure ${missing}; off or quick-start can be used`)
  }
  if (input.formationBasis === 'computed') {
    throw new DomainError(
      'models.formationNumber',
      `models.formationNumber ${missing}; energyLimit or published can be used`,
    )
  }
}
