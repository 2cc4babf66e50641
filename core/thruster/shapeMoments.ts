/**
 * What one stroke asks of a thruster: the sums of its exit speed over time, and where its force and power can peak.
 *
 * Closed shapes come from the closed forms of `wholeClosedPulse`; a table is read once, piece by piece.
 */
import { at } from '../base'
import { wholeClosedPulse, type ClosedShape, type SpeedProgramme, type WholePulse } from '../pulse'

/** Sums and peaks of one stroke at the exit, before exit factors. */
export interface StrokeMoments {
  /** Slug length L [m]. */
  readonly stroke: number
  /** Of the stroke [s]. */
  readonly duration: number
  /** int U^2 dt [m2/s]. */
  readonly integralSpeedSquared: number
  /** int U^3 dt [m3/s2]. */
  readonly integralSpeedCubed: number
  /** Highest exit speed [m/s]. */
  readonly peakSpeed: number
  /** From rest [s]; a start within one formation time is quick. */
  readonly timeTo95PercentOfPeak: number
  /** Largest |dU/dt| [m/s2]; Infinity where the speed jumps. */
  readonly peakAcceleration: number
  /** U^2 gained in every rise of the speed, summed [m2/s2]: peakSpeed^2 for a single rise. */
  readonly risenSpeedSquared: number
  /** The speed jumps up, at the start or within. */
  readonly jumpUp: boolean
  /** The speed jumps down, at the end or within. */
  readonly jumpDown: boolean
  /** Where force and power can peak: pairs of U / peakSpeed and dU/dt x duration / peakSpeed, in the order of time. */
  readonly course: Float64Array
  /** True where `course` samples a smooth curve at equal steps, so that a peak may lie between two samples. */
  readonly smoothCourse: boolean
}

export interface Ramps {
  readonly peakSpeed: number
  readonly riseTime: number
  readonly fallTime: number
}

/** Samples of a sine along its stroke; a parabola through three of them finds a peak to 1e-6. */
const SINE_SAMPLES = 65
const CONSTANT_COURSE = Float64Array.of(1, 0)
/** A ramp from rest: dU/dt = peakSpeed / duration throughout. */
const RAMP_COURSE = Float64Array.of(0, 1, 1, 1)
const SINE_COURSE = sineCourse((angle) => [Math.sin(angle), Math.PI * Math.cos(angle)])
const SINE_SQUARED_COURSE = sineCourse((angle) => [Math.sin(angle) ** 2, Math.PI * Math.sin(2 * angle)])
/** Largest |dU/dt| x duration / peakSpeed of the shapes without corners. */
const SINE_STEEPEST = Math.PI

/** Stroke over duration and peak speed, of the shapes that only scale. */
const FULLNESS = {
  rectangular: fullness('rectangular'),
  'linear-ramp': fullness('linear-ramp'),
  'half-sine': fullness('half-sine'),
  'sine-squared': fullness('sine-squared'),
} as const

/**
 * Moments of a closed shape at a stroke.
 *
 * @param ramps peakSpeed > 0 [m/s]; riseTime and fallTime >= 0 [s], read for a trapezoid
 * @param stroke slug length [m], > 0
 */
export function shapeMoments(shape: ClosedShape, ramps: Ramps, stroke: number): StrokeMoments {
  const whole = wholeClosedPulse(shape, ramps, stroke)
  switch (shape) {
    case 'rectangular':
      return assemble(whole, Infinity, CONSTANT_COURSE, { up: true, down: true, smooth: false })
    case 'linear-ramp':
      return assemble(whole, Infinity, RAMP_COURSE, { up: false, down: true, smooth: false })
    case 'half-sine':
      return assemble(whole, steepest(whole), SINE_COURSE, { up: false, down: false, smooth: true })
    case 'sine-squared':
      return assemble(whole, steepest(whole), SINE_SQUARED_COURSE, { up: false, down: false, smooth: true })
    case 'trapezoid':
      return trapezoid(whole, ramps)
  }
}

/**
 * Moments of a closed shape that makes a stroke in a given time.
 *
 * @param stroke slug length [m], > 0
 * @param duration [s], > 0
 * @param riseShare and fallShare: ramps over duration, >= 0, together at most 1; read for a trapezoid
 */
export function shapeMomentsInTime(
  shape: ClosedShape,
  stroke: number,
  duration: number,
  riseShare = 0,
  fallShare = 0,
): StrokeMoments {
  return shapeMoments(shape, rampsInTime(shape, stroke, duration, riseShare, fallShare), stroke)
}

/** Peak speed and ramps with which a closed shape makes a stroke in a given time; arguments as above. */
export function rampsInTime(
  shape: ClosedShape,
  stroke: number,
  duration: number,
  riseShare: number,
  fallShare: number,
): Ramps {
  const full = shape === 'trapezoid' ? 1 - (riseShare + fallShare) / 2 : FULLNESS[shape]
  return { peakSpeed: stroke / (full * duration), riseTime: riseShare * duration, fallTime: fallShare * duration }
}

/**
 * Moments of a compiled programme; a table of rows among them.
 *
 * @param ramps of the plan, read for a trapezoid; the peak may be reduced as in `wholeClosedPulse`
 */
export function programmeMoments(programme: SpeedProgramme, ramps: Ramps): StrokeMoments {
  return programme.shape === 'table' ? tableMoments(programme) : shapeMoments(programme.shape, ramps, programme.stroke)
}

interface CourseKind {
  readonly up: boolean
  readonly down: boolean
  readonly smooth: boolean
}

function assemble(
  whole: WholePulse,
  peakAcceleration: number,
  course: Float64Array,
  kind: CourseKind,
  risenSpeedSquared = whole.peakSpeed * whole.peakSpeed,
): StrokeMoments {
  return {
    stroke: whole.stroke,
    duration: whole.duration,
    integralSpeedSquared: whole.moments.square,
    integralSpeedCubed: whole.moments.cube,
    peakSpeed: whole.peakSpeed,
    timeTo95PercentOfPeak: whole.timeTo95PercentOfPeak,
    peakAcceleration,
    risenSpeedSquared,
    jumpUp: kind.up,
    jumpDown: kind.down,
    course,
    smoothCourse: kind.smooth,
  }
}

function trapezoid(whole: WholePulse, ramps: Ramps): StrokeMoments {
  const { duration, peakSpeed } = whole
  // A reduced peak keeps the slopes of its ramps.
  const share = peakSpeed / ramps.peakSpeed
  const rise = ramps.riseTime * share
  const fall = ramps.fallTime * share
  const up = rise > 0 ? duration / rise : 0
  const down = fall > 0 ? duration / fall : 0
  const course = Float64Array.of(0, up, 1, up, 1, 0, 1, -down, 0, -down)
  const steepestRamp = Math.max(rise > 0 ? peakSpeed / rise : Infinity, fall > 0 ? peakSpeed / fall : Infinity)
  return assemble(whole, steepestRamp, course, { up: rise === 0, down: fall === 0, smooth: false })
}

function steepest(whole: WholePulse): number {
  return (SINE_STEEPEST * whole.peakSpeed) / whole.duration
}

function sineCourse(at: (angle: number) => readonly [number, number]): Float64Array {
  return Float64Array.from(
    Array.from({ length: SINE_SAMPLES }, (_, i) => at((Math.PI * i) / (SINE_SAMPLES - 1))).flat(),
  )
}

function fullness(shape: ClosedShape): number {
  return 1 / wholeClosedPulse(shape, { peakSpeed: 1, riseTime: 0, fallTime: 0 }, 1).duration
}

/** Parts each stretch between two corners of a table is cut into at least, and the parts of the whole. */
const PARTS_A_STRETCH = 4
const PARTS = 200
/** A change of speed at one time that is less than this share of the peak is rounding. */
const JUMP = 1e-9

/**
 * A table of rows: its speed is a quadratic at most between two corners, so three places inside each part give speed and slope
 * at its ends exactly, and on the right side of a jump.
 */
function tableMoments(programme: SpeedProgramme): StrokeMoments {
  const { duration, peakSpeed, corners } = programme
  const course: number[] = []
  let before = 0
  let risen = 0
  let steepestSlope = 0
  let up = false
  let down = false
  const arrive = (speed: number): void => {
    const jump = speed - before
    if (jump > JUMP * peakSpeed) up = true
    if (jump < -JUMP * peakSpeed) down = true
    risen += Math.max(0, speed * speed - before * before)
    before = speed
  }
  for (let i = 0; i + 1 < corners.length; i++) {
    const start = at(corners, i)
    const length = at(corners, i + 1) - start
    const parts = Math.max(PARTS_A_STRETCH, Math.ceil((PARTS * length) / duration))
    const quarter = length / parts / 4
    for (let part = 0; part < parts; part++) {
      const from = start + (part * length) / parts
      const u1 = programme.speedAt(from + quarter)
      const u2 = programme.speedAt(from + 2 * quarter)
      const u3 = programme.speedAt(from + 3 * quarter)
      const first = Math.max(0, 3 * u1 - 3 * u2 + u3)
      const final = Math.max(0, u1 - 3 * u2 + 3 * u3)
      const firstSlope = (-5 * u1 + 8 * u2 - 3 * u3) / (2 * quarter)
      const finalSlope = (3 * u1 - 8 * u2 + 5 * u3) / (2 * quarter)
      arrive(first)
      risen += Math.max(0, final * final - before * before)
      before = final
      steepestSlope = Math.max(steepestSlope, Math.abs(firstSlope), Math.abs(finalSlope))
      const unit = duration / peakSpeed
      course.push(first / peakSpeed, firstSlope * unit, final / peakSpeed, finalSlope * unit)
    }
  }
  arrive(0)
  const kind = { up, down, smooth: false }
  return assemble(programme, up || down ? Infinity : steepestSlope, Float64Array.from(course), kind, risen)
}
