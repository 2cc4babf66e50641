/**
 * When the ring came apart, what it was then, and the measured formation number: the formation time at which everything shed had the
 * circulation that the ring has after pinch-off.
 */
import { at, last } from '../../base'
import type { FieldNumbers, FieldOptions, FieldResult, FieldRing, MeasuredValue } from './fieldTypes'
import { mean, median, standardDeviation } from './robust'

/** Density at the cut over that of the ring, below which the ring is apart, as in the computed jet. */
const APART_BELOW = 0.12
/** A stretch of this length, in D / U, is flat where its circulation drifts by less than this, in U D. */
const FLAT_FOR = 1
const FLAT_WITHIN = 0.03
const FEWEST_FRAMES = 4
/** A ring is whole where its circulation differs from the last by less than this share. */
const WHOLE_WITHIN = 0.03
/** Standard error of a median over that of a mean, normal values. */
const MEDIAN_OVER_MEAN = Math.sqrt(Math.PI / 2)
/** Frames within this formation time of the crossing give the line on which it lies. */
const CROSSING_REACH = 0.5
/** Differences of the halves, and of area from contour, from which they are told. */
const TELL_DIFFERENCE = 0.1

interface SeenRing {
  readonly time: number
  readonly ring: FieldRing
  /** Of its frame. */
  readonly index: number
}

interface Line {
  readonly at: number
  readonly value: number
  readonly slope: number
  /** About the line; 0 for two points. */
  readonly scatter: number
}

/** @param frames at rising times */
export function measuredFormation(frames: readonly FieldNumbers[], options: FieldOptions): FieldResult {
  const { diameter, peakSpeed } = options
  const stretch = flatStretch(frames, (FLAT_FOR * diameter) / peakSpeed, FLAT_WITHIN * peakSpeed * diameter)
  const notes: string[] = []
  const used = stretch ?? wholeRing(frames)
  const seen = frames.flatMap(({ time, ring }, index) =>
    ring === null || index < used.from || index > used.to ? [] : [{ time, ring, index }],
  )
  const ring = seen.length === 0 ? null : meanRing(seen)
  const first = stretch === null ? null : at(frames, stretch.from)
  const crossing =
    stretch === null || ring === null
      ? null
      : crossingOf(
          frames,
          seen.map((one) => one.ring.circulation),
        )
  if (frames.length > 0 && stretch === null)
    notes.push(
      frames.some(({ trailingJet }) => trailingJet)
        ? 'No pinch-off is seen: the ring does not stay apart from its trailing jet, with a steady circulation, for one formation time.'
        : 'No trailing jet is seen: the ring takes everything, and the formation number lies above the stroke.',
    )
  else if (crossing === null && stretch !== null)
    notes.push(
      frames.some(({ formationTime }) => formationTime !== null)
        ? 'The frames do not show the total circulation grow through that of the ring, so that no formation number can be told.'
        : 'The formation time of the frames is not known, so that no formation number can be told.',
    )
  notes.push(...qualityNotes(frames))
  return {
    frames,
    pinchOff:
      stretch === null || first === null ? null : { time: first.time, formationTime: first.formationTime, ...stretch },
    ring,
    formationNumber: crossing,
    notes,
  }
}

/** Frames in which the ring is whole: from the end of the stroke on, or from where its circulation has come to that of the last quarter. */
function wholeRing(frames: readonly FieldNumbers[]): { readonly from: number; readonly to: number } {
  const to = frames.length - 1
  if (to < 1) return { from: 0, to }
  const final = last(frames).formationTime
  const stopped = frames.findIndex(({ formationTime }) => formationTime !== null && formationTime === final)
  // One frame at the end of a rise is no plateau.
  if (final !== null && stopped >= 0 && stopped < to) return { from: stopped, to }
  const known = frames.flatMap(({ ring }) => (ring === null ? [] : [ring.circulation]))
  if (known.length === 0) return { from: 0, to }
  const level = median(known.slice(-Math.max(1, Math.ceil(known.length / 4))))
  let from = to
  while (from > 0 && isAt(at(frames, from - 1), level)) from--
  return { from, to }
}

function isAt({ ring, circulationError }: FieldNumbers, level: number): boolean {
  return ring === null || Math.abs(ring.circulation - level) <= Math.max(WHOLE_WITHIN * level, 3 * circulationError)
}

/**
 * The first stretch of one formation time with a ring in every frame, apart at its end, whose circulation does not drift. A ring that takes in
 * another piece of the jet later is not looked for.
 */
function flatStretch(
  frames: readonly FieldNumbers[],
  duration: number,
  within: number,
): { readonly from: number; readonly to: number } | null {
  for (let to = FEWEST_FRAMES - 1; to < frames.length; to++) {
    const end = at(frames, to)
    if (end.ring === null || end.cutRatio === null || !(end.cutRatio < APART_BELOW)) continue
    let from = to
    while (from > 0 && at(frames, from - 1).ring !== null && end.time - at(frames, from).time < duration * (1 - 1e-6))
      from--
    if (end.time - at(frames, from).time < duration * (1 - 1e-6) || to - from + 1 < FEWEST_FRAMES) continue
    const points = frames.slice(from, to + 1).map(({ time, ring }) => [time, ring?.circulation ?? Number.NaN] as const)
    const line = lineThrough(points)
    if (Math.abs(line.slope) * duration > within) continue
    // A step inside the stretch hides in a scatter no noise explains.
    const noise = mean(frames.slice(from, to + 1).map(({ circulationError }) => circulationError))
    if (line.scatter <= Math.max(within / 2, 4 * noise)) return { from, to }
  }
  return null
}

function meanRing(seen: readonly SeenRing[]): FieldResult['ring'] {
  const over = (value: (ring: FieldRing) => number): MeasuredValue => {
    const values = seen.map(({ ring }) => value(ring))
    return { value: mean(values), standardError: (standardDeviation(values) ?? 0) / Math.sqrt(values.length) }
  }
  // A second moment weighs what lies far out: one frame with a speck would move a mean.
  const cores = seen.map(({ ring }) => ring.coreRadius)
  const speed = seen.length < 2 ? null : lineThrough(seen.map(({ time, ring }) => [time, ring.x] as const)).slope
  return {
    circulation: over(({ circulation }) => circulation),
    radius: over(({ radius }) => radius),
    coreRadius: {
      value: median(cores),
      standardError: ((standardDeviation(cores) ?? 0) * MEDIAN_OVER_MEAN) / Math.sqrt(cores.length),
    },
    impulse: over(({ impulse }) => impulse),
    speed,
    frames: seen.length,
    from: at(seen, 0).index,
    to: last(seen).index,
  }
}

/**
 * Formation time at which the total circulation came to the mean of the ring's: on the line through the frames near the first crossing. Its
 * error is the scatter of the ring and of the total about that line, over the line's slope.
 */
function crossingOf(frames: readonly FieldNumbers[], ringCirculations: readonly number[]): MeasuredValue | null {
  const level = mean(ringCirculations)
  const known = frames.flatMap(({ formationTime, totalCirculation }) =>
    formationTime === null ? [] : [[formationTime, totalCirculation] as const],
  )
  const above = known.findIndex(([, total]) => total >= level)
  if (above < 1) return null
  const [from, to] = [at(known, above - 1), at(known, above)]
  const centre = from[0] + ((to[0] - from[0]) * (level - from[1])) / (to[1] - from[1])
  const near = known.filter(([when]) => Math.abs(when - centre) <= CROSSING_REACH)
  const line = lineThrough(near.length >= 3 ? near : [from, to])
  if (!(line.slope > 0)) return null
  const scatter = standardDeviation(ringCirculations) ?? 0
  return {
    value: line.at + (level - line.value) / line.slope,
    standardError: Math.hypot(scatter, line.scatter) / line.slope,
  }
}

/** Straight line of least squares. */
function lineThrough(points: readonly (readonly [number, number])[]): Line {
  const centre = mean(points.map(([x]) => x))
  const value = mean(points.map(([, y]) => y))
  let [above, below] = [0, 0]
  for (const [x, y] of points) {
    above += (x - centre) * (y - value)
    below += (x - centre) ** 2
  }
  const slope = below === 0 ? 0 : above / below
  const squares = points.reduce((sum, [x, y]) => sum + (y - value - slope * (x - centre)) ** 2, 0)
  return { at: centre, value, slope, scatter: points.length > 2 ? Math.sqrt(squares / (points.length - 2)) : 0 }
}

function qualityNotes(frames: readonly FieldNumbers[]): string[] {
  const notes: string[] = []
  if (frames.length === 0) return notes
  const filled = frames.reduce((sum, frame) => sum + frame.filled, 0)
  if (filled > 0) notes.push(`${filled} missing vectors were filled by the mean of their neighbours.`)
  const uneven = frames.filter(({ asymmetry }) => asymmetry !== null && asymmetry > TELL_DIFFERENCE).length
  if (uneven > 0)
    notes.push(
      `The two halves differ by more than ${100 * TELL_DIFFERENCE} % in circulation in ${uneven} of ${frames.length} frames: check the axis, and whether the ring stays in the plane.`,
    )
  const final = last(frames)
  if (final.threshold > TELL_DIFFERENCE)
    notes.push(
      `Noise hides vorticity below ${(100 * final.threshold).toFixed(0)} % of its peak, away from where it is higher: circulations may be too low by about as much.`,
    )
  return notes
}
