/**
 * Where a ring can have started: before it was first seen, not beyond the place it was seen at, and not strokes before the plan's. A fit whose
 * start lies elsewhere has run away along a valley in which the readings cannot tell when from where.
 */
import { at } from '../../base'
import type { HeldParameter } from './identify'
import { spanOf, type Measurement } from './measurements'
import type { RingStart } from './pathModel'
import type { FitName } from './types'

/** The start is not sought earlier than this many strokes before the planned one. */
const STROKES_BEFORE = 5
/** What noise may carry a start beyond a bound: so many standard errors, and at most this share of the record. */
const ERRORS_BEYOND = 4
const SHARE_BEYOND = 0.05
/**
 * Correlation above which start time and start position are one. A record in which the ring slows to half its speed, and tells both to some
 * per cent, has 0.999 already.
 */
const ONE_ABOVE = 0.9998

export interface StartBounds {
  /** [s] */
  readonly earliest: number
  readonly latest: number
  /** Of the record [s]. */
  readonly span: number
  /** Place in the first reading [m], and the way seen. */
  readonly farthest: number
  readonly way: number
}

/** null where no place was read. */
export function startBounds(list: readonly Measurement[], start: RingStart, formedAt: number): StartBounds | null {
  const places = list.filter(({ quantity }) => quantity === 'x')
  if (places.length === 0) return null
  const first = places.reduce((a, b) => (b.time < a.time ? b : a))
  return {
    earliest: Math.min(start.time - STROKES_BEFORE * Math.max(0, formedAt), first.time),
    latest: first.time,
    span: spanOf(places, ({ time }) => time),
    farthest: places.reduce(
      (most, { time, value }) => (time === first.time ? Math.max(most, value) : most),
      first.value,
    ),
    way: spanOf(places, ({ value }) => value),
  }
}

/**
 * The start to hold next, with why; null where it is believable.
 *
 * @param errors standard errors in the order of the names; null where they cannot be told
 */
export function startNotTold(
  names: readonly FitName[],
  fitted: {
    readonly ring: RingStart
    readonly errors: readonly number[] | null
    readonly correlation: readonly (readonly number[])[]
    readonly converged: boolean
  },
  bounds: StartBounds | null,
): HeldParameter | null {
  const [time, place] = [names.indexOf('startTime'), names.indexOf('startPosition')]
  // Radius and core are given up first where nothing can be told apart.
  if (bounds === null || time < 0 || (fitted.errors === null && names.some((name) => /radius/i.test(name)))) return null
  const outside = outsideOf(fitted.ring, fitted.errors, time, place, bounds)
  if (place < 0) return outside === null ? null : { name: 'startTime', reason: `The start time is held: ${outside}.` }
  const held = (why: string): HeldParameter => ({
    name: 'startPosition',
    reason: `The start position is held at the planned one, in every run alike: ${why}.`,
  })
  if (outside !== null) return held(`fitted with the start time, ${outside}`)
  if (!fitted.converged || fitted.errors === null)
    return held('the fit does not converge with both start time and start position free')
  const correlation = Math.abs(fitted.correlation[time]?.[place] ?? 0)
  return correlation > ONE_ABOVE
    ? held(`these readings cannot tell it from the start time, correlation ${correlation.toFixed(5)}`)
    : null
}

function outsideOf(
  ring: RingStart,
  errors: readonly number[] | null,
  time: number,
  place: number,
  { earliest, latest, span, farthest, way }: StartBounds,
): string | null {
  const beyond = (k: number, record: number): number =>
    Math.min(SHARE_BEYOND * record, errors === null ? 0 : ERRORS_BEYOND * at(errors, k))
  if (!(ring.time <= latest + beyond(time, span)))
    return `the start would lie at ${short(ring.time)} s, after the first reading at ${short(latest)} s`
  if (!(ring.time >= earliest - beyond(time, span)))
    return `the start would lie at ${short(ring.time)} s, more than ${STROKES_BEFORE} strokes before the planned one`
  if (place >= 0 && !(ring.x <= farthest + beyond(place, way)))
    return `the start would lie at x = ${short(1000 * ring.x)} mm, beyond the first reading at ${short(1000 * farthest)} mm`
  return null
}

function short(value: number): string {
  return String(Number(value.toPrecision(3)))
}
