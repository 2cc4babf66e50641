/**
 * Tables of a tank run written out: the piston's profile with what to read first, the run matrix, arrivals and triggers.
 */
import { at } from '../base'
import type { PistonProfile, ProfileRows, RunMatrix, TankArrival, TriggerRow } from '../tank'
import { writeCsv } from './csvWriter'
import { pathHeading } from './planPaths'
import type { Caution } from './types'

export const PROFILE_COLUMNS = [
  'time (s)',
  'piston position (m)',
  'piston speed (m/s)',
  'piston acceleration (m/s2)',
] as const

/** profile.csv: every step of the controller. */
export function profileTable({ time, position, speed, acceleration }: ProfileRows): string {
  return writeCsv(
    PROFILE_COLUMNS,
    time.map((t, k) => [t, at(position, k), at(speed, k), at(acceleration, k)]),
  )
}

/**
 * profile-read-first.txt: what the file moves, and the cautions for a machine that will move.
 *
 * @param cautions those of the table that hold for the plan; the ones for machines are printed
 */
export function profileReadFirst(profile: PistonProfile, cautions: readonly Caution[]): string {
  const short = (value: number): string => String(Number(value.toPrecision(4)))
  const machine = cautions.filter(({ group }) => group === 'machine')
  const lines = [
    'READ FIRST: profile.csv moves a machine.',
    '',
    'Columns: time in seconds, position in metres, speed in metres a second, acceleration in metres a second squared, all of the piston, positive when it pushes water out.',
    `Time 0 is the first motion of the piston.${profile.lag > 0 ? ` The first row stands ${short(profile.lag)} s before it, the lag from command to motion.` : ''}`,
    `Rows: ${profile.time.length}, one each ${profile.controllerStep} s. Travel ${short(profile.travel)} m, highest speed ${short(profile.peakSpeed)} m/s, highest acceleration ${short(profile.peakAcceleration)} m/s2, highest jerk ${short(profile.peakJerk)} m/s3.`,
    'Between rows the acceleration is a straight line: sum it twice to check a controller.',
    profile.rounding.text,
    '',
    'Limits of the drive:',
    ...profile.limits.map(({ ok, text }) => `- ${ok ? '' : 'BROKEN: '}${text}`),
    '',
    'Before it runs:',
    ...machine.map(({ text }) => `- ${text}`),
  ]
  return `${lines.join('\r\n')}\r\n`
}

/** run-matrix.csv: one row a run, in the order of the day. */
export function runMatrixTable({ paths, runs }: RunMatrix): string {
  return writeCsv(
    ['run', 'block', 'repeat', ...paths.map(pathHeading)],
    runs.map(({ run, block, repeat, values }) => [run, block, repeat, ...values]),
  )
}

export const ARRIVAL_COLUMNS = [
  'station (m)',
  'time (s)',
  'earliest (s)',
  'latest (s)',
  'speed (m/s)',
  'lowest speed (m/s)',
  'highest speed (m/s)',
  'radius (m)',
  'note',
] as const

/** Arrivals at the stations; empty cells where the ring is not seen, and why. */
export function arrivalsTable(arrivals: readonly TankArrival[]): string {
  return writeCsv(
    ARRIVAL_COLUMNS,
    arrivals.map(({ station, time, timeLow, timeHigh, speed, speedLow, speedHigh, radius, reason }) => [
      station,
      time,
      timeLow,
      timeHigh,
      speed,
      speedLow,
      speedHigh,
      radius,
      reason ?? '',
    ]),
  )
}

export const TRIGGER_COLUMNS = [
  'device',
  'time (s)',
  'after command (s)',
  'earliest (s)',
  'latest (s)',
  'note',
] as const

/** When each device acts. */
export function triggerTableText(rows: readonly TriggerRow[]): string {
  return writeCsv(
    TRIGGER_COLUMNS,
    rows.map(({ device, time, afterCommand, early, late, text }) => [device, time, afterCommand, early, late, text]),
  )
}
