/**
 * Rings on one axis that merge where their cores touch instead of ending the run there.
 *
 * Each merger ends one march and begins the next with the rings as they stand, the two now one; the paths are joined. A ring that is
 * swallowed ends its path, the stronger one keeps its number.
 */
import { at } from '../base'
import { checkCoaxialInput } from './checkInput'
import { marchUnchecked } from './marchCoaxial'
import { mergeRings } from './mergeRings'
import type { StandingRing } from './smoothedRing'
import type { CoaxialOptions, CoaxialRing, CoaxialTrajectory, CoaxialWake, CoaxialWakeInput } from './types'
import type { WakeDrift, WakeEvent } from './wakeTypes'

/**
 * As `marchCoaxialRings`, but two rings of one sense whose cores touch become one (`mergeRings`), told as an event `merge`, and the run goes on.
 * Cores of opposite senses that touch, and a core that reaches a wall, end the run as there.
 *
 * The drift told is the largest of any stretch between mergers, and that of circulation and impulse across them; the energy that a merger
 * takes is told in its event.
 *
 * @throws {DomainError}
 */
export async function marchMergingRings(input: CoaxialWakeInput, options: CoaxialOptions): Promise<CoaxialWake> {
  checkCoaxialInput(input)
  let rings = input.rings
  let whole: CoaxialWake | null = null
  const inside: CoaxialOptions = {
    ...options,
    // Every march tells that it is done; only the last one is.
    onProgress: (progress) => (progress.share < 1 ? options.onProgress?.(progress) : undefined),
  }
  for (;;) {
    const part: CoaxialWake = await marchUnchecked({ ...input, rings }, inside)
    const pair = touchingPair(part)
    whole = whole === null ? part : joined(whole, part)
    if (pair === null) break
    const merged = merge(part, rings, pair, input.duration, options)
    rings = merged.rings
    whole = withMerger(whole, merged.event)
  }
  if (whole.status === 'done') options.onProgress?.({ share: 1, what: 'rings in motion' })
  return whole
}

/** Indices of the first two rings of one sense whose touch ended a march; null where none did. */
function touchingPair({ status, events, trajectories }: CoaxialWake): readonly [number, number] | null {
  if (status !== 'done') return null
  for (const { event, rings } of events) {
    const [first, second] = rings
    if (event !== 'cores-touch' || first === undefined || second === undefined) continue
    const sense = (ring: number): number => Math.sign(at(at(trajectories, ring - 1).circulation, 0))
    if (sense(first) === sense(second)) return [first - 1, second - 1]
  }
  return null
}

/** A ring at the end of a march; null where it has not appeared. */
function standing({ trajectories, time }: CoaxialWake, index: number, ring: CoaxialRing): StandingRing | null {
  const { time: times, x, radius, coreRadius, circulation } = at(trajectories, index)
  const k = times.length - 1
  if (k < 0 || at(times, k) !== time) return null
  const read = (column: Float64Array): number => at(column, k)
  return {
    circulation: read(circulation),
    radius: read(radius),
    coreRadius: read(coreRadius),
    core: ring.core,
    x: read(x),
  }
}

function merge(
  part: CoaxialWake,
  rings: readonly CoaxialRing[],
  [i, j]: readonly [number, number],
  duration: number,
  options: CoaxialOptions,
): { readonly rings: readonly CoaxialRing[]; readonly event: WakeEvent } {
  const { time } = part
  const all = rings.map((ring, index) => standing(part, index, ring))
  const [a, b] = [all[i] ?? null, all[j] ?? null]
  if (a === null || b === null) throw new RangeError('rings that touch are there when they do')
  const { ring, energyChange } = mergeRings(a, b, options.kernel)
  const [stays, goes] = Math.abs(a.circulation) >= Math.abs(b.circulation) ? [i, j] : [j, i]
  return {
    rings: rings.map((given, index) => {
      // A ring that is gone keeps its place in the list and never appears, so that the numbers of the others stay.
      if (index === goes) return { ...given, startTime: duration * (2 + index) }
      const now = index === stays ? ring : (all[index] ?? null)
      return now === null ? given : { ...now, startTime: time }
    }),
    event: {
      time,
      event: 'merge',
      rings: [i + 1, j + 1],
      x: ring.x,
      detail: `ring ${goes + 1} goes on in ring ${stays + 1}; ${changeInWords(energyChange)}`,
    },
  }
}

function changeInWords(change: number): string {
  const percent = Number((-100 * change).toPrecision(2))
  return percent < 0.05 ? 'the core is widened to keep their energy' : `their energy falls by ${percent} %`
}

/** The merger in place of the touch and the end that it replaces. */
function withMerger(wake: CoaxialWake, event: WakeEvent): CoaxialWake {
  const events = wake.events.filter(
    (known) => known.event !== 'end' && !(known.event === 'cores-touch' && known.time === event.time),
  )
  const reason = `rings ${event.rings.join(' and ')} merge: one ring of their circulation and impulse stands for what their cores do`
  // The touch is no limit of its own where the merger stands for it; what ended the model before it stays.
  const held = wake.validUntil >= event.time
  return { ...wake, events: [...events, event], ...(held ? { validUntil: event.time, reason } : {}) }
}

/** One march and the next, which begins where the first has ended. */
function joined(first: CoaxialWake, next: CoaxialWake): CoaxialWake {
  const from = first.time
  const limited = first.validUntil <= from
  return {
    ...next,
    outputTimes: Float64Array.from(
      [...first.outputTimes].filter((time) => time < from).concat([...next.outputTimes].filter((time) => time >= from)),
    ),
    events: [...first.events, ...next.events.filter((event) => !isToldAgain(event, first.events))],
    drift: largerDrift(first.drift, next.drift),
    counters: {
      steps: first.counters.steps + next.counters.steps,
      rejected: first.counters.rejected + next.counters.rejected,
      evaluations: first.counters.evaluations + next.counters.evaluations,
    },
    ...(limited ? { validUntil: first.validUntil, reason: first.reason } : {}),
    trajectories: first.trajectories.map((path, i) => joinedPath(path, at(next.trajectories, i), from)),
  }
}

/** Every march tells a near wall anew. */
function isToldAgain({ event, rings }: WakeEvent, told: readonly WakeEvent[]): boolean {
  return event === 'near-wall' && told.some((known) => known.event === event && known.rings[0] === rings[0])
}

function joinedPath(first: CoaxialTrajectory, next: CoaxialTrajectory, from: number): CoaxialTrajectory {
  const before = first.time.findIndex((time) => time >= from)
  const end = before < 0 ? first.time.length : before
  const column = (key: keyof CoaxialTrajectory): Float64Array => {
    const whole = new Float64Array(end + next.time.length)
    whole.set(first[key].subarray(0, end))
    whole.set(next[key], end)
    return whole
  }
  return {
    time: column('time'),
    x: column('x'),
    radius: column('radius'),
    coreRadius: column('coreRadius'),
    circulation: column('circulation'),
    speed: column('speed'),
  }
}

function largerDrift(a: WakeDrift, b: WakeDrift): WakeDrift {
  const larger = (key: keyof WakeDrift): number | null => {
    const [x, y] = [a[key], b[key]]
    return x === null || y === null ? null : Math.max(x, y)
  }
  return { circulation: larger('circulation'), impulse: larger('impulse'), energy: larger('energy') }
}
