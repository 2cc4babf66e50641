/**
 * What the piston is told to do: its way, speed and acceleration at every step of the controller.
 *
 * The exit speed of the programme times exit area over piston area, over the share that does not leak past the piston, rounded by the
 * least S-curve the drive can follow (./rounding). Time 0 is the first motion of the piston; with a lag the first row stands before it.
 */
import { at, DomainError, requireRange } from '../base'
import { compileProgramme, exitPerPiston, type NozzleInput, type ProgrammeInput, type SpeedProgramme } from '../pulse'
import { extremes, roundedMotion, smallestRounding, type Boxes, type SampledWay } from './rounding'
import type { DriveInput } from './types'

export interface ProfileInput {
  readonly programme: ProgrammeInput
  readonly nozzle: NozzleInput
  /** h [s] */
  readonly controllerStep: number
  readonly drive: DriveInput
}

/** Rows of profile.csv; every array has one length. */
export interface ProfileRows {
  readonly time: readonly number[]
  readonly position: readonly number[]
  readonly speed: readonly number[]
  readonly acceleration: readonly number[]
}

export type DriveLimitName = 'travel' | 'speed' | 'acceleration' | 'jerk'

export interface DriveLimit {
  readonly name: DriveLimitName
  readonly value: number
  readonly limit: number | null
  readonly ok: boolean
  readonly text: string
}

/** What the rounding changed. */
export interface ProfileRounding {
  /** Steps averaged over, first and second box. */
  readonly steps: readonly [number, number]
  /** Motion longer by [s]. */
  readonly longerBy: number
  /** Motion later by, in the mean [s]: what arrivals after the piston's start gain. */
  readonly delay: number
  /** Time to 95 % of the peak [s], as planned and as rounded. */
  readonly riseTime: readonly [number, number]
  /** Exit speed at its peak [m/s], as planned and as rounded. */
  readonly peakSpeed: readonly [number, number]
  /** Slug circulation of the rounded motion over the planned one. */
  readonly circulationShare: number
  /** Peak speed x time to 95 % of it / D of the rounded motion. */
  readonly startFormationTime: number
  readonly text: string
}

export interface PistonProfile extends ProfileRows {
  readonly controllerStep: number
  readonly lag: number
  /** Way of the piston, leak included [m]. */
  readonly travel: number
  /** Of the piston [m/s], [m/s2], [m/s3], signs apart. */
  readonly peakSpeed: number
  readonly peakAcceleration: number
  readonly peakJerk: number
  readonly duration: number
  readonly rounding: ProfileRounding
  readonly limits: readonly DriveLimit[]
  readonly ok: boolean
}

const FEWEST_STEPS = 4
const MOST_ROWS = 200_000
/** Accelerations below this share of the highest are rounding. */
const NOISE = 1e-11

/**
 * The profile of a programme. Limits of the drive that are broken are told in `limits`; speed and travel are never cut to them.
 *
 * @throws {DomainError} on tankRun.controllerStep, tankRun.drive… and what the programme refuses
 */
export function pistonProfile(input: ProfileInput): PistonProfile {
  const { drive, controllerStep: step } = input
  requireDrive(drive)
  const programme = compileProgramme(input.programme)
  requireStep(step, programme.duration)
  const perExit = 1 / (exitPerPiston(input.nozzle) * (1 - drive.leak))
  const sampled = sampledWay(programme, step, perExit)
  const longest = Math.max(2, Math.floor(programme.duration / step))
  const limits = { acceleration: drive.maxAcceleration, jerk: drive.maxJerk }
  const boxes = smallestRounding(sampled, limits, longest)
  const { position, speed, acceleration } = roundedMotion(sampled, boxes)
  // Steady speed leaves accelerations of rounding only, which a controller should not see.
  const { acceleration: peakAcceleration, jerk: peakJerk } = extremes(sampled, boxes)
  const least = NOISE * peakAcceleration
  const motion = {
    position,
    speed: speed.map(tidy),
    acceleration: acceleration.map((value) => (Math.abs(value) < least ? 0 : tidy(value))),
  }
  const travel = programme.stroke * perExit
  // Sums of many steps leave rounding behind; the end is where the stroke ends.
  motion.position[motion.position.length - 1] = travel
  // Digits enough that differences of times still give the step.
  const time = motion.position.map((_, k) => Number((k * step - drive.lag).toPrecision(15)))
  const peakSpeed = tidy(peakOf(motion, step))
  const rounding = whatChanged(input, programme, { step, boxes, perExit, peakSpeed, motion })
  const values = { travel, speed: peakSpeed, acceleration: peakAcceleration, jerk: peakJerk }
  const told = driveLimits(drive, values, boxes.kept)
  return {
    time,
    ...motion,
    controllerStep: step,
    lag: drive.lag,
    travel,
    peakSpeed,
    peakAcceleration,
    peakJerk,
    duration: (motion.position.length - 1) * step,
    rounding,
    limits: told,
    ok: told.every(({ ok }) => ok),
  }
}

function requireDrive(drive: DriveInput): void {
  requireRange('tankRun.drive.leak', drive.leak, { min: 0, max: 0.5 })
  requireRange('tankRun.drive.lag', drive.lag, { min: 0, unit: 's' })
  const units = { maxTravel: 'm', maxSpeed: 'm/s', maxAcceleration: 'm/s2', maxJerk: 'm/s3' } as const
  for (const key of ['maxTravel', 'maxSpeed', 'maxAcceleration', 'maxJerk'] as const) {
    const value = drive[key]
    if (value !== null) requireRange(`tankRun.drive.${key}`, value, { above: 0, unit: units[key] })
  }
}

function requireStep(step: number, duration: number): void {
  const field = 'tankRun.controllerStep'
  requireRange(field, step, { above: 0, unit: 's' })
  if (step * FEWEST_STEPS > duration)
    throw new DomainError(
      field,
      `${field} must be at most ${tidy(duration / FEWEST_STEPS)} s, a quarter of the stroke's ${tidy(duration)} s, got ${step} s`,
    )
  // Rounding at most doubles the motion.
  if ((2 * duration) / step > MOST_ROWS)
    throw new DomainError(
      field,
      `${field} must leave at most ${MOST_ROWS} rows: ${tidy((2 * duration) / MOST_ROWS)} s or more does, got ${step} s`,
    )
}

function sampledWay(programme: SpeedProgramme, step: number, perExit: number): SampledWay {
  const count = Math.ceil(programme.duration / step - 1e-9)
  const way = Float64Array.from({ length: count + 1 }, (_, k) =>
    k === count ? programme.stroke * perExit : programme.momentsAt(k * step).displacement * perExit,
  )
  return { step, way }
}

/** Largest speed, also between steps, where the straight acceleration passes zero. */
function peakOf(
  { speed, acceleration }: { readonly speed: readonly number[]; readonly acceleration: readonly number[] },
  step: number,
): number {
  let peak = 0
  for (let k = 0; k < speed.length; k++) {
    const a = at(acceleration, k)
    const next = acceleration[k + 1] ?? a
    const turn = a > 0 && next < 0 ? (a * a * step) / (2 * (a - next)) : 0
    peak = Math.max(peak, at(speed, k) + turn)
  }
  return peak
}

function whatChanged(
  input: ProfileInput,
  programme: SpeedProgramme,
  made: {
    readonly step: number
    readonly boxes: Boxes
    readonly perExit: number
    readonly peakSpeed: number
    readonly motion: { readonly speed: readonly number[]; readonly acceleration: readonly number[] }
  },
): ProfileRounding {
  const { step, boxes, perExit, peakSpeed, motion } = made
  const longerBy = (boxes.first + boxes.second) * step
  const exitPeak = tidy(peakSpeed / perExit)
  const rise = timeTo(motion.speed, 0.95 * peakSpeed, step)
  const planned = programme.timeTo95PercentOfPeak
  const circulationShare = squareOf(motion, step) / (programme.moments.square * perExit * perExit)
  const text = `The corners are rounded over ${boxes.first} and ${boxes.second} steps of the controller: the motion is ${tidy(longerBy)} s longer and ${tidy(longerBy / 2)} s later in the mean, 95 % of the peak comes after ${short(rise)} s in place of ${short(planned)} s, the peak is ${short(exitPeak)} m/s at the exit in place of ${short(programme.peakSpeed)} m/s, and the slug's circulation ${short(100 * circulationShare)} % of the planned.`
  return {
    steps: [boxes.first, boxes.second],
    longerBy,
    delay: longerBy / 2,
    riseTime: [planned, rise],
    peakSpeed: [programme.peakSpeed, exitPeak],
    circulationShare,
    startFormationTime: (exitPeak * rise) / input.nozzle.diameter,
    text,
  }
}

/** First time at which a speed is reached, straight between steps. */
function timeTo(speed: readonly number[], target: number, step: number): number {
  const k = speed.findIndex((value) => value >= target)
  if (k <= 0) return 0
  const before = at(speed, k - 1)
  return (k - 1 + (target - before) / (at(speed, k) - before)) * step
}

/** int v^2 dt of a motion with straight accelerations: exact, Gauss at three points for a quartic. */
function squareOf(
  { speed, acceleration }: { readonly speed: readonly number[]; readonly acceleration: readonly number[] },
  step: number,
): number {
  const away = Math.sqrt(0.6) / 2
  const points = [0.5 - away, 0.5, 0.5 + away] as const
  const weights = [5 / 18, 8 / 18, 5 / 18] as const
  let sum = 0
  for (let k = 0; k + 1 < speed.length; k++) {
    const a = at(acceleration, k)
    const change = at(acceleration, k + 1) - a
    points.forEach((share, i) => {
      const v = at(speed, k) + step * share * (a + (share * change) / 2)
      sum += step * at(weights, i) * v * v
    })
  }
  return sum
}

function driveLimits(
  drive: DriveInput,
  values: Readonly<Record<DriveLimitName, number>>,
  rounded: boolean,
): readonly DriveLimit[] {
  return [
    driveLimit('travel', values.travel, drive.maxTravel),
    driveLimit('speed', values.speed, drive.maxSpeed),
    driveLimit('acceleration', values.acceleration, drive.maxAcceleration, rounded),
    driveLimit('jerk', values.jerk, drive.maxJerk, rounded),
  ]
}

const LIMIT_WORDS: Readonly<Record<DriveLimitName, readonly [unit: string, help: string]>> = {
  travel: ['m', 'a shorter stroke or a wider piston'],
  speed: ['m/s', 'a lower peak speed or a wider piston'],
  acceleration: ['m/s2', 'longer ramps or a lower peak speed'],
  jerk: ['m/s3', 'longer ramps or a lower peak speed'],
}

/** One limit of a drive held against a value [SI]. @param rounded false: the longest rounding was not enough */
export function driveLimit(name: DriveLimitName, value: number, limit: number | null, rounded = true): DriveLimit {
  const [unit, help] = LIMIT_WORDS[name]
  // The rounding keeps its two limits to the rounding of sums.
  const ok = limit === null || value <= limit * (1 + 1e-9)
  const least = rounded ? '' : ' even with ramps as long as the stroke'
  const text =
    limit === null
      ? `Piston ${name} ${short(value)} ${unit}; no limit is told.`
      : ok
        ? `Piston ${name} ${short(value)} ${unit} is within the drive's ${short(limit)} ${unit}.`
        : `Piston ${name} ${short(value)} ${unit} is above the drive's ${short(limit)} ${unit}${least}: ${help} keeps it.`
  return { name, value, limit, ok, text }
}

/** Rounding of a product taken off: 0.15, not 0.15000000000000002. */
function tidy(value: number): number {
  return Number(value.toPrecision(12))
}

function short(value: number): number {
  return Number(value.toPrecision(4))
}
