/**
 * The programme of a plan at another stroke and in another time: shape and shares of the ramps kept.
 */
import type { ProgrammeInput } from '../pulse'
import type { StrokeMoments } from './shapeMoments'

/**
 * Moments of a stroke of the same shape, by similarity: exact, and free of a second look at the shape.
 *
 * @param from moments of any stroke of the shape
 * @param stroke slug length [m], > 0
 * @param duration [s], > 0
 */
export function scaledMoments(from: StrokeMoments, stroke: number, duration: number): StrokeMoments {
  const time = duration / from.duration
  const speed = stroke / from.stroke / time
  return {
    stroke,
    duration,
    integralSpeedSquared: from.integralSpeedSquared * speed * speed * time,
    integralSpeedCubed: from.integralSpeedCubed * speed * speed * speed * time,
    peakSpeed: from.peakSpeed * speed,
    timeTo95PercentOfPeak: from.timeTo95PercentOfPeak * time,
    peakAcceleration: (from.peakAcceleration * speed) / time,
    risenSpeedSquared: from.risenSpeedSquared * speed * speed,
    jumpUp: from.jumpUp,
    jumpDown: from.jumpDown,
    course: from.course,
    smoothCourse: from.smoothCourse,
  }
}

/** The programme that makes a stroke in a time, as a plan holds it; `from` are the moments of `programme` itself. */
export function scaledProgramme(
  programme: ProgrammeInput,
  from: StrokeMoments,
  stroke: number,
  duration: number,
): ProgrammeInput {
  const time = duration / from.duration
  const length = stroke / from.stroke
  const reached = rampShare(programme, from)
  return {
    ...programme,
    stroke,
    peakSpeed: (from.peakSpeed * length) / time,
    riseTime: programme.riseTime * reached * time,
    fallTime: programme.fallTime * reached * time,
    rows: programme.rows.map((row) =>
      'speed' in row
        ? { time: row.time * time, speed: (row.speed * length) / time }
        : { time: row.time * time, position: row.position * length },
    ),
  }
}

/**
 * Share of its ramps that a programme uses: a trapezoid whose peak was reduced has shorter ones than it was given, and what it
 * reached becomes what is asked for.
 */
export function rampShare(programme: ProgrammeInput, from: StrokeMoments): number {
  return programme.shape === 'trapezoid' ? Math.min(1, from.peakSpeed / programme.peakSpeed) : 1
}
