/**
 * Whole-pulse moments of every programme as a function of its stroke, at fixed peak speed and ramps.
 *
 * This is the family in which a formation number is searched, and the table from which many designs are priced: a closed
 * shape costs a few multiplications.
 */
import { NO_MOMENTS, stretchMoments, type Moments } from './moments'
import type { ClosedShape, ProgrammeInput } from './types'

/** What a whole stroke comes to. */
export interface WholePulse {
  readonly stroke: number
  readonly duration: number
  /** Speed that is reached [m/s]. */
  readonly peakSpeed: number
  readonly reducedPeak: boolean
  readonly timeTo95PercentOfPeak: number
  readonly moments: Moments
}

/**
 * Shapes that only scale: duration = d L/U, int U^2 dt = s U L, int U^3 dt = c U^2 L, and the share of the duration after
 * which 95 % of the peak is reached. Exact integrals of the shapes in `ProgrammeInput`.
 */
const SHARES = {
  rectangular: { duration: 1, square: 1, cube: 1, rise: 0 },
  'linear-ramp': { duration: 2, square: 2 / 3, cube: 1 / 2, rise: 0.95 },
  'half-sine': { duration: Math.PI / 2, square: Math.PI / 4, cube: 2 / 3, rise: Math.asin(0.95) / Math.PI },
  'sine-squared': { duration: 2, square: 3 / 4, cube: 5 / 8, rise: Math.asin(Math.sqrt(0.95)) / Math.PI },
} as const

/**
 * A closed shape at a stroke.
 *
 * @param programme peakSpeed > 0 [m/s]; riseTime, fallTime >= 0 [s] for a trapezoid
 * @param stroke slug length [m], > 0 (0 gives zero moments)
 */
export function wholeClosedPulse(
  shape: ClosedShape,
  programme: Pick<ProgrammeInput, 'peakSpeed' | 'riseTime' | 'fallTime'>,
  stroke: number,
): WholePulse {
  if (shape === 'trapezoid') return wholeTrapezoid(programme.peakSpeed, programme.riseTime, programme.fallTime, stroke)
  const share = SHARES[shape]
  const speed = programme.peakSpeed
  const duration = (share.duration * stroke) / speed
  return {
    stroke,
    duration,
    peakSpeed: speed,
    reducedPeak: false,
    timeTo95PercentOfPeak: share.rise * duration,
    moments: {
      displacement: stroke,
      square: share.square * speed * stroke,
      cube: share.cube * speed * speed * stroke,
    },
  }
}

/** A table stretched in time to a stroke, from the table as it stands. */
export function stretchWholePulse(whole: WholePulse, stroke: number): WholePulse {
  const factor = stroke / whole.stroke
  return {
    stroke,
    duration: whole.duration * factor,
    peakSpeed: whole.peakSpeed,
    reducedPeak: false,
    timeTo95PercentOfPeak: whole.timeTo95PercentOfPeak * factor,
    moments: stretchMoments(whole.moments, factor),
  }
}

/** Ramps and a plateau; a stroke too short for both ramps keeps their slopes and turns at a lower peak. */
function wholeTrapezoid(nominal: number, riseTime: number, fallTime: number, stroke: number): WholePulse {
  const ramps = riseTime + fallTime
  const reducedPeak = stroke < (nominal * ramps) / 2
  const share = reducedPeak ? Math.sqrt((2 * stroke) / (nominal * ramps)) : 1
  const peakSpeed = nominal * share
  const rise = riseTime * share
  const fall = fallTime * share
  const plateau = reducedPeak ? 0 : stroke / nominal - ramps / 2
  const moments =
    stroke > 0
      ? {
          displacement: stroke,
          square: peakSpeed ** 2 * (plateau + (rise + fall) / 3),
          cube: peakSpeed ** 3 * (plateau + (rise + fall) / 4),
        }
      : NO_MOMENTS
  return {
    stroke,
    duration: plateau + rise + fall,
    peakSpeed,
    reducedPeak,
    timeTo95PercentOfPeak: 0.95 * rise,
    moments,
  }
}
