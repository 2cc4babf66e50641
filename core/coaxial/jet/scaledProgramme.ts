/**
 * A speed programme scaled by exit diameter and peak speed, and the time steps that fit it.
 */
import { at } from '../../base'
import type { SpeedProgramme } from '../../pulse'

/** A change of speed at a corner above this share of the peak is a jump, at which a step must end. */
const JUMP = 1e-6
/** How far beside a corner the speed is read, relative to the duration. */
const BESIDE = 1e-9

export interface ScaledProgramme {
  /** End of the stroke, D / U. */
  readonly duration: number
  /** L / D */
  readonly strokeRatio: number
  /** Speed just after and just before a time. */
  readonly after: (time: number) => number
  readonly before: (time: number) => number
  /** Formation time T* at a time. */
  readonly formationTime: (time: number) => number
  /** int U^2 dt and int U^3 dt over the stroke. */
  readonly square: number
  readonly cube: number
  /** Rising times at which a step must end: jumps of the speed, the end of the stroke. */
  readonly stops: readonly number[]
}

export function scaleProgramme(programme: SpeedProgramme, diameter: number): ScaledProgramme {
  const { peakSpeed } = programme
  const unit = diameter / peakSpeed
  const duration = programme.duration / unit
  const speed = (time: number): number => programme.speedAt(time * unit) / peakSpeed
  const nudge = BESIDE * duration
  const after = (time: number): number => speed(time + nudge)
  const before = (time: number): number => speed(time - nudge)
  const jumps = programme.corners
    .map((time) => time / unit)
    .filter((time) => time > 0 && time < duration && Math.abs(after(time) - before(time)) > JUMP)
  return {
    duration,
    strokeRatio: programme.stroke / diameter,
    after,
    before,
    formationTime: (time) => programme.momentsAt(time * unit).displacement / diameter,
    square: programme.moments.square / (diameter * peakSpeed),
    cube: programme.moments.cube / (diameter * peakSpeed * peakSpeed),
    stops: [...jumps, duration],
  }
}

/**
 * Length of the next step: equal steps of at most `longest` up to the next stop, then `longest`.
 *
 * @param stops rising
 */
export function nextStep(time: number, longest: number, stops: readonly number[]): number {
  for (let k = 0; k < stops.length; k++) {
    const left = at(stops, k) - time
    if (left > 1e-9 * longest) return left / Math.ceil(left / longest - 1e-9)
  }
  return longest
}
