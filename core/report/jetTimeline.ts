/**
 * The starting jet along the formation ruler: where its computed shapes stand, what happens when, and its numbers at a time.
 *
 * Formation time stands still when the piston does. So that what follows the stroke has a place too, the ruler counts on from there
 * at the peak speed: T* + U_peak (time since the end of the stroke) / D.
 */
import { at, bracket } from '../base'
import { FORMATION_STROKE_FROM, type JetHistory, type JetRun } from '../coaxial'
import { compileProgramme, type ProgrammeInput } from '../pulse'

export type JetMomentId = 'ring-full' | 'stroke-end' | 'pinch-off'

/** Something that happens to the jet. */
export interface JetMoment {
  readonly id: JetMomentId
  /** [s] */
  readonly time: number
  readonly place: number
  readonly label: string
}

export interface JetTimeline {
  /** End of the stroke [s]. */
  readonly strokeEnd: number
  readonly strokeRatio: number
  /** Of the computed shapes, rising [s]. */
  readonly times: Float64Array
  /** Their places on the ruler. */
  readonly places: Float64Array
  /** Their formation times, constant after the stroke. */
  readonly formationTimes: Float64Array
  /** In the order of their times. */
  readonly moments: readonly JetMoment[]
  /** Place of the last shape or number. */
  readonly end: number
  /** Place of a time [s] whose formation time is known. */
  placeOf(time: number, formationTime: number): number
}

/** Numbers of the jet at one time; null where no ring is cut. SI. */
export interface JetReading {
  readonly time: number
  readonly formationTime: number
  readonly totalCirculation: number
  readonly totalImpulse: number
  readonly ringCirculation: number | null
  readonly ringX: number | null
  readonly ringRadius: number | null
}

/**
 * @param run with its shapes
 * @param diameter of the exit [m]
 * @throws {DomainError} on a programme that breaks its limits
 */
export function jetTimeline(run: JetRun, programme: ProgrammeInput, diameter: number): JetTimeline {
  const { duration, peakSpeed, stroke } = compileProgramme(programme)
  const placeOf = (time: number, formationTime: number): number =>
    formationTime + (Math.max(0, time - duration) * peakSpeed) / diameter
  const { history, snapshots } = run
  const momentAt = (id: JetMomentId, time: number | null, label: string): JetMoment[] => {
    if (time === null || time > run.time * (1 + 1e-9)) return []
    return [{ id, time, place: placeOf(time, valueAt(history, history.formationTime, time) ?? 0), label }]
  }
  const moments = [
    ...momentAt('ring-full', run.formationInstant, fullInWords(stroke / diameter)),
    ...momentAt('stroke-end', duration, 'stroke ends'),
    ...momentAt('pinch-off', run.pinchOff?.time ?? null, 'pinch-off'),
  ].sort((a, b) => a.time - b.time)
  const places = Float64Array.from(snapshots, ({ time, formationTime }) => placeOf(time, formationTime))
  const rows = history.time.length
  const lastPlace = rows === 0 ? 0 : placeOf(at(history.time, rows - 1), at(history.formationTime, rows - 1))
  return {
    strokeEnd: duration,
    strokeRatio: stroke / diameter,
    times: Float64Array.from(snapshots, ({ time }) => time),
    places,
    formationTimes: Float64Array.from(snapshots, ({ formationTime }) => formationTime),
    moments,
    end: Math.max(lastPlace, ...places),
    placeOf,
  }
}

/** The end of a shorter stroke cuts the ring short: what fills it is then not the formation number, which is read from a longer stroke. */
function fullInWords(strokeRatio: number): string {
  return strokeRatio < FORMATION_STROKE_FROM ? 'ring full in this run' : 'ring full'
}

/** Numbers of a run at a time [s], between the rows of its history by straight lines; null where there is no history. */
export function jetReading(run: JetRun, time: number): JetReading | null {
  const { history } = run
  const formationTime = valueAt(history, history.formationTime, time)
  const totalCirculation = valueAt(history, history.totalCirculation, time)
  const totalImpulse = valueAt(history, history.totalImpulse, time)
  if (formationTime === null || totalCirculation === null || totalImpulse === null) return null
  return {
    time,
    formationTime,
    totalCirculation,
    totalImpulse,
    ringCirculation: valueAt(history, history.ringCirculation, time),
    ringX: valueAt(history, history.ringX, time),
    ringRadius: valueAt(history, history.ringRadius, time),
  }
}

/** A column of the history at a time, held to its ends; null where a row it would need has no value. */
function valueAt({ time: times }: JetHistory, column: readonly (number | null)[], time: number): number | null {
  const count = times.length
  if (count === 0) return null
  if (count === 1 || time <= at(times, 0)) return column[0] ?? null
  if (time >= at(times, count - 1)) return column[count - 1] ?? null
  const low = bracket(times, time)
  const [t0, t1] = [at(times, low), at(times, low + 1)]
  const [a, b] = [column[low] ?? null, column[low + 1] ?? null]
  const share = t1 > t0 ? (time - t0) / (t1 - t0) : 0
  // On a row its own value counts, whatever its neighbours hold.
  if (share < 1e-9) return a
  if (share > 1 - 1e-9) return b
  return a === null || b === null ? null : a + share * (b - a)
}
