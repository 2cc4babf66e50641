/**
 * Refusals at the door of the starting jet.
 */
import { DomainError, requireRange } from '../../base'
import { compileProgramme, type SpeedProgramme } from '../../pulse'
import type { StartingJetInput } from './types'

/** Smoothing over D: below the first a run takes minutes, above the second nothing rolls up. */
export const LEAST_DELTA = 0.03
export const LARGEST_DELTA = 0.2
/** A stroke this short sheds too few filaments to roll up, L/D. */
const SHORTEST_STROKE = 0.1
/** A longer pulse is a steady jet and would take minutes, D / U_peak. */
const LONGEST_PULSE = 60

/**
 * Check the input and compile its programme.
 *
 * @throws {DomainError} with the dotted plan path of the first value that breaks its limit
 */
export function checkJetInput(input: StartingJetInput): SpeedProgramme {
  requireRange('water.density', input.density, { above: 0, unit: 'kg/m3' })
  requireRange('water.kinematicViscosity', input.kinematicViscosity, { above: 0, unit: 'm2/s' })
  requireRange('nozzle.diameter', input.diameter, { above: 0, unit: 'm' })
  requireRange('jet.delta', input.delta, { min: LEAST_DELTA, max: LARGEST_DELTA })
  const programme = compileProgramme(input.programme)
  const { stroke, peakSpeed } = programme
  if (stroke < SHORTEST_STROKE * input.diameter)
    throw new DomainError(
      'programme.stroke',
      `programme.stroke must be at least ${SHORTEST_STROKE} of the diameter for a starting jet, got ${stroke} m for ${input.diameter} m`,
    )
  const longest = (LONGEST_PULSE * input.diameter) / peakSpeed
  if (programme.duration > longest)
    throw new DomainError(
      'programme.stroke',
      `programme.stroke must end within ${LONGEST_PULSE} diameters at peak speed for a starting jet (${longest} s), got ${programme.duration} s`,
    )
  requireRange('ambient.axialFlow', input.axialFlow, { unit: 'm/s' })
  if (!(Math.abs(input.axialFlow) < peakSpeed))
    throw new DomainError(
      'ambient.axialFlow',
      `ambient.axialFlow must be slower than the jet's peak of ${peakSpeed} m/s, got ${input.axialFlow} m/s`,
    )
  checkSettings(input)
  return programme
}

function checkSettings({ settings = {} }: StartingJetInput): void {
  if (settings.timeStep !== undefined) requireRange('timeStep', settings.timeStep, { above: 0, max: 0.1 })
  if (settings.panelFactor !== undefined) requireRange('panelFactor', settings.panelFactor, { min: 0.25, max: 2 })
  if (settings.filamentLimit !== undefined)
    requireRange('filamentLimit', settings.filamentLimit, { min: 300, max: 20_000 })
  if (settings.snapshotStep !== undefined) requireRange('snapshotStep', settings.snapshotStep, { min: 0 })
  if (settings.followTime !== undefined) requireRange('followTime', settings.followTime, { min: 0, max: 20 })
  if (settings.settleTime !== undefined) requireRange('settleTime', settings.settleTime, { min: 1, max: 60 })
  if (settings.freeFlight !== undefined) requireRange('freeFlight', settings.freeFlight, { min: 0, max: 20 })
}
