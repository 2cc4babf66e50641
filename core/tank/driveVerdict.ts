/**
 * Whether a drive can make a programme: by the peak that is really reached before any rounding, and by the profile that would run.
 *
 * Rounding lowers the peak, so a profile alone would let a programme through whose own speed the drive does not have.
 */
import { DomainError } from '../base'
import { compileProgramme, exitPerPiston, type NozzleInput, type ProgrammeInput } from '../pulse'
import { driveLimit, pistonProfile, type PistonProfile } from './profile'
import type { DriveInput } from './types'

export interface DriveQuestion {
  readonly programme: ProgrammeInput
  readonly nozzle: NozzleInput
  readonly drive: DriveInput
  /** h [s] */
  readonly controllerStep: number
  /** Circulation that the profile must keep to within a hundredth [m2/s]; absent: it may lose what the rounding costs. */
  readonly circulation?: number
}

export interface DriveVerdict {
  /** Highest speed of the piston before rounding and its way, leak included [m/s], [m]. */
  readonly pistonSpeed: number
  readonly pistonTravel: number
  /** null where none can be made with the controller's step. */
  readonly profile: PistonProfile | null
  readonly ok: boolean
  /** Why the drive cannot; null where it can. */
  readonly reason: string | null
}

/** What the rounding of a profile may change of the circulation that is wanted. */
const CIRCULATION_KEPT = 0.01

/** @throws {DomainError} on tankRun.drive… and what the programme refuses; a controller step that does not fit is a reason */
export function driveVerdict(question: DriveQuestion): DriveVerdict {
  const { drive, nozzle, controllerStep } = question
  const { stroke, peakSpeed } = compileProgramme(question.programme)
  const perExit = 1 / (exitPerPiston(nozzle) * (1 - drive.leak))
  const asked = { pistonSpeed: tidy(peakSpeed * perExit), pistonTravel: tidy(stroke * perExit) }
  const speed = driveLimit('speed', asked.pistonSpeed, drive.maxSpeed)
  try {
    const profile = pistonProfile({ programme: question.programme, nozzle, controllerStep, drive })
    const limits = profile.limits.map((limit) => (limit.name === 'speed' ? speed : limit))
    const broken = limits.filter(({ ok }) => !ok).map(({ text }) => text)
    const lost = circulationLost(question, profile)
    const told = lost === null ? broken : [...broken, lost]
    return { ...asked, profile, ok: told.length === 0, reason: told.length === 0 ? null : told.join(' ') }
  } catch (error) {
    // Too short or too long for the controller's step is one more that the drive cannot follow.
    if (!(error instanceof DomainError) || error.field !== 'tankRun.controllerStep') throw error
    const reason = speed.ok ? error.message : `${speed.text} ${error.message}`
    return { ...asked, profile: null, ok: false, reason }
  }
}

function circulationLost({ circulation }: DriveQuestion, { rounding }: PistonProfile): string | null {
  const share = rounding.circulationShare
  if (circulation === undefined || Math.abs(share - 1) <= CIRCULATION_KEPT) return null
  const steps = rounding.steps[0] + rounding.steps[1]
  return `The profile the drive can follow is rounded over ${steps} steps of the controller and gives a circulation of ${short(share * circulation)} m2/s in place of ${short(circulation)} m2/s, more than 1 % off: longer ramps at a lower peak speed, a faster drive or a shorter step brings it nearer.`
}

function short(value: number): number {
  return Number(value.toPrecision(3))
}

/** Rounding of a product taken off. */
function tidy(value: number): number {
  return Number(value.toPrecision(12))
}
