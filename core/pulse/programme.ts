/**
 * Speed programmes: the exit speed over one stroke and its running moments, in closed form.
 *
 * Time 0 is the first piston motion. The speed at a jump is the one inside the stroke; outside it is zero.
 */
import { DomainError, requireRange } from '../base'
import { NO_MOMENTS, type Moments } from './moments'
import { piecesOfRows, programmeRowProblems, strokeOfRows, stretchRows } from './programmeTable'
import { sineCubeIntegral, sineIntegral, sinePowerIntegral } from './sinePowers'
import {
  cornersOfPieces,
  firstTimeAtSpeed,
  joinPieces,
  momentsOfPieces,
  peakOfPieces,
  speedOfPieces,
  straightPieces,
  type SpeedPiece,
} from './speedPieces'
import type { ClosedShape, ProgrammeInput, ProgrammeShape } from './types'
import { stretchWholePulse, wholeClosedPulse, type WholePulse } from './wholePulse'

/** A programme ready to be read at any time, and at any other stroke of its family. */
export interface SpeedProgramme extends WholePulse {
  readonly shape: ProgrammeShape
  /** Rising times [s] at which the speed or its slope jumps, 0 and duration among them. */
  readonly corners: readonly number[]
  /** First time [s] at which the peak is reached. */
  readonly timeOfPeak: number
  /** How the programme was read: what was shifted or left out. */
  readonly notes: readonly string[]
  /** Exit speed [m/s] at a time [s]. */
  readonly speedAt: (time: number) => number
  /** Moments from time 0 to a time [s], constant after the stroke. */
  readonly momentsAt: (time: number) => Moments
  /** The whole pulse at another stroke [m], peak speed and ramps kept; a table stretches in time. */
  readonly atStroke: (stroke: number) => WholePulse
}

/**
 * Check a programme and make it readable.
 *
 * @throws {DomainError} on programme.stroke, programme.peakSpeed, programme.riseTime, programme.fallTime or
 * programme.rows…; a trapezoid too short for its ramps is no error, see `reducedPeak`.
 */
export function compileProgramme(input: ProgrammeInput): SpeedProgramme {
  return input.shape === 'table' ? compileTable(input) : compileClosed(input.shape, input)
}

/**
 * The same programme with another stroke: a closed shape keeps its peak speed and ramps, a table its speeds.
 *
 * @param stroke slug length [m], > 0
 * @throws {DomainError} on programme.stroke, or programme.rows where a table has no stroke to stretch.
 */
export function withStroke(programme: ProgrammeInput, stroke: number): ProgrammeInput {
  requireRange('programme.stroke', stroke, { above: 0, unit: 'm' })
  if (programme.shape !== 'table') return { ...programme, stroke }
  refuseBadRows(programme)
  return { ...programme, stroke, rows: stretchRows(programme.rows, stroke / strokeOfRows(programme.rows)) }
}

function compileClosed(shape: ClosedShape, input: ProgrammeInput): SpeedProgramme {
  requireRange('programme.stroke', input.stroke, { above: 0, unit: 'm' })
  requireRange('programme.peakSpeed', input.peakSpeed, { above: 0, unit: 'm/s' })
  if (shape === 'trapezoid') {
    requireRange('programme.riseTime', input.riseTime, { min: 0, unit: 's' })
    requireRange('programme.fallTime', input.fallTime, { min: 0, unit: 's' })
  }
  const whole = wholeClosedPulse(shape, input, input.stroke)
  const running =
    shape === 'half-sine' || shape === 'sine-squared'
      ? sineRunning(shape, whole)
      : pieceRunning(closedPieces(shape, whole, input))
  return {
    ...whole,
    ...running,
    shape,
    notes: [],
    atStroke: (stroke) => wholeClosedPulse(shape, input, stroke),
  }
}

function compileTable(input: ProgrammeInput): SpeedProgramme {
  refuseBadRows(input)
  const { pieces, notes } = piecesOfRows(input.rows)
  const joined = joinPieces(pieces)
  const peakSpeed = peakOfPieces(joined).speed
  const whole: WholePulse = {
    stroke: joined.whole.displacement,
    duration: joined.end,
    peakSpeed,
    reducedPeak: false,
    timeTo95PercentOfPeak: firstTimeAtSpeed(joined, 0.95 * peakSpeed),
    moments: joined.whole,
  }
  return {
    ...whole,
    ...pieceRunning(pieces),
    shape: 'table',
    notes,
    atStroke: (stroke) => stretchWholePulse(whole, stroke),
  }
}

function refuseBadRows(input: ProgrammeInput): void {
  const problem = programmeRowProblems(input.rows)[0]
  if (problem !== undefined) throw new DomainError(problem.field, problem.message)
}

type Running = Pick<SpeedProgramme, 'corners' | 'timeOfPeak' | 'speedAt' | 'momentsAt'>

function pieceRunning(pieces: readonly SpeedPiece[]): Running {
  const joined = joinPieces(pieces)
  return {
    corners: cornersOfPieces(joined),
    timeOfPeak: peakOfPieces(joined).time,
    speedAt: (time) => speedOfPieces(joined, time),
    momentsAt: (time) => momentsOfPieces(joined, time),
  }
}

/** Straight pieces of a rectangular pulse, a trapezoid or a ramp. */
function closedPieces(
  shape: 'rectangular' | 'trapezoid' | 'linear-ramp',
  whole: WholePulse,
  input: ProgrammeInput,
): SpeedPiece[] {
  const { duration, peakSpeed } = whole
  if (shape === 'rectangular') return straightPieces([0, duration], [peakSpeed, peakSpeed])
  if (shape === 'linear-ramp') return straightPieces([0, duration], [0, peakSpeed])
  const share = peakSpeed / input.peakSpeed
  // Shorter than this a ramp is a jump, and a plateau is the rounding of a triangle.
  const unless = (length: number) => (length < 1e-14 * duration ? 0 : length)
  const rise = unless(input.riseTime * share)
  const plateau = whole.reducedPeak ? 0 : unless(duration - (input.riseTime + input.fallTime) * share)
  const times = [0, rise, unless(input.fallTime * share) === 0 ? duration : rise + plateau, duration]
  return straightPieces(times, [0, peakSpeed, peakSpeed, 0])
}

function sineRunning(shape: 'half-sine' | 'sine-squared', whole: WholePulse): Running {
  const { duration, peakSpeed } = whole
  const rate = Math.PI / duration
  const unit = shape === 'half-sine' ? halfSineUnit : sineSquaredUnit
  return {
    corners: [0, duration],
    timeOfPeak: duration / 2,
    speedAt: (time) => {
      // The end is exactly at rest; sin(pi) in binary is not.
      if (time <= 0 || time >= duration) return 0
      const sine = Math.sin(rate * time)
      return peakSpeed * (shape === 'half-sine' ? sine : sine * sine)
    },
    momentsAt: (time) => {
      if (time <= 0) return NO_MOMENTS
      if (time >= duration) return whole.moments
      const m = unit(rate * time)
      const scale = peakSpeed / rate
      return {
        displacement: scale * m.displacement,
        square: scale * peakSpeed * m.square,
        cube: scale * peakSpeed * peakSpeed * m.cube,
      }
    },
  }
}

function halfSineUnit(angle: number): Moments {
  return {
    displacement: sineIntegral(angle),
    square: sinePowerIntegral(2, angle),
    cube: sineCubeIntegral(angle),
  }
}

function sineSquaredUnit(angle: number): Moments {
  return {
    displacement: sinePowerIntegral(2, angle),
    square: sinePowerIntegral(4, angle),
    cube: sinePowerIntegral(6, angle),
  }
}
