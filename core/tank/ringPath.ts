/**
 * One ring of the pulse on its way through the tank, until it has passed the last station.
 *
 * The ring is the one a train begins with, and the march is the one that follows rings in a wake: with no walls its arrivals are
 * those of the wake of the same plan.
 */
import { at, bracket, type RunStatus } from '../base'
import {
  LARGEST_TUBE_SHARE,
  marchCoaxialRings,
  THIN_CORE_LIMIT,
  trainRings,
  tubeSlowing,
  type CoaxialRing,
  type CoaxialWake,
  type WakeAgeing,
} from '../coaxial'
import type { Kernel } from '../kernel'
import type { PulseRing } from '../pulse'
import type { TankOptions } from './types'
import { nearestSide, slowingTubes, wallSlowing, type TankWalls } from './walls'

/** Error allowed in a step, as a plan's wake has it by default. */
const TOLERANCE = 1e-8
/** Outputs of a path over its whole march. */
const OUTPUTS = 400
/** First guess of the time over distance / speed at birth, and how often it is doubled. */
const FIRST_GUESS = 1.25
const MOST_DOUBLINGS = 16
/** A ring this much slower than it began has all but stopped. */
const STOPPED_SHARE = 0.005
/** A core wider than this over the ring's radius is no ring any more: Hill's vortex, the thickest steady one, has the root of 2. */
const THICKEST_CORE = Math.SQRT2

export interface RingPathInput {
  readonly ring: PulseRing
  /** rho [kg/m3] */
  readonly density: number
  /** nu [m2/s] */
  readonly kinematicViscosity: number
  /** Duration of the stroke [s]. */
  readonly duration: number
  readonly ageing: WakeAgeing
  /** Stream along the axis [m/s]. */
  readonly axialFlow: number
  readonly walls: TankWalls
  /** Tube that slows a ring of a radius as the walls do; absent: found anew. See `slowingTubes`. */
  readonly tubeFor?: (radius: number) => number | null
  /** x [m], each past the place of birth or not. */
  readonly stations: readonly number[]
  /** How far the path is to go [m]. */
  readonly reach: number
}

/** The ring as it passes a station. */
export interface Passage {
  readonly station: number
  readonly time: number
  readonly speed: number
  readonly radius: number
  readonly coreRadius: number
  readonly circulation: number
}

export interface RingPath {
  readonly ageing: WakeAgeing
  /** Where and when the ring appears. */
  readonly birth: { readonly time: number; readonly x: number; readonly speed: number; readonly circulation: number }
  readonly time: readonly number[]
  readonly x: readonly number[]
  readonly radius: readonly number[]
  readonly coreRadius: readonly number[]
  readonly speed: readonly number[]
  /** In the order of the stations that were passed. */
  readonly passages: readonly Passage[]
  /** Radius of the tube the march went through [m]; null: none. */
  readonly tubeRadius: number | null
  /** Core above 0.3 of the radius, at birth or later: the thin-core law is then a stand-in. */
  readonly thickFrom: number | null
  /** Why the path ends before the reach; null where it gets there. */
  readonly shortOf: string | null
  readonly status: RunStatus
}

/** Follow a ring. @throws {DomainError} for values outside their range */
export async function ringPath(
  input: RingPathInput,
  options: TankOptions & { readonly kernel: Kernel },
): Promise<RingPath> {
  const { ring, density, duration, walls, reach } = input
  const born = at(trainRings({ density, ring, duration, pulses: 1, period: 1 }).rings, 0)
  const tubeRadius = (input.tubeFor ?? slowingTubes(walls))(born.radius)
  // Each march counts from the birth, so that its first output is the ring as it begins.
  const marched: March = (from, stations, time, outputs) =>
    marchCoaxialRings(
      {
        rings: [{ ...from, startTime: 0 }],
        law: 'thin',
        kinematicViscosity: input.kinematicViscosity,
        viscous: true,
        ageing: input.ageing,
        axialFlow: input.axialFlow,
        wall: null,
        tubeRadius,
        stations,
        duration: time,
        outputStep: time / outputs,
        tolerance: TOLERANCE,
      },
      { kernel: options.kernel, ...passedOn(options) },
    )
  const distance = Math.max(reach - born.x, born.radius)
  let time = (FIRST_GUESS * distance) / Math.max(ring.speed + input.axialFlow, 0.1 * ring.speed)
  let wake: CoaxialWake | null = null
  let shortOf: string | null = null
  for (let doubling = 0; ; doubling++) {
    wake = await marched(born, input.stations, time, OUTPUTS)
    const path = at(wake.trajectories, 0)
    if ((path.x.at(-1) ?? born.x) >= reach) break
    shortOf = whyShort(wake, time, ring.speed, path.speed.at(-1) ?? 0)
    if (shortOf !== null) break
    if (doubling === MOST_DOUBLINGS) {
      shortOf = `it has not come that far after ${Number(time.toPrecision(3))} s`
      break
    }
    time *= 2
  }
  const passages = await passagesOf(wake, born, duration, marched)
  const arrivals = wake.events.filter(({ event }) => event === 'arrival').length
  if (passages.length < arrivals) shortOf = 'its core has grown wider than the ring before'
  return pathOf(input, wake, { x: born.x, tubeRadius, shortOf, passages })
}

type March = (from: CoaxialRing, stations: readonly number[], time: number, outputs: number) => Promise<CoaxialWake>

/** The ring at each station: marched on from the output before it, so that what is told there does not hang on where outputs fall. */
async function passagesOf(
  wake: CoaxialWake,
  born: CoaxialRing,
  birth: number,
  marched: March,
): Promise<readonly Passage[]> {
  const passages: Passage[] = []
  for (const event of wake.events) {
    if (event.event !== 'arrival' || event.x === null) continue
    const before = stateBefore(wake, event.time)
    // Nothing of the thin-core law is left then: no time and speed are told.
    if (before.ring.coreRadius > THICKEST_CORE * before.ring.radius) break
    const rest = event.time - before.time
    const path =
      rest > 0
        ? at((await marched({ ...born, ...before.ring }, [], rest, 1)).trajectories, 0)
        : at(wake.trajectories, 0)
    const k = rest > 0 ? path.time.length - 1 : before.index
    passages.push({
      station: event.x,
      time: birth + event.time,
      speed: at(path.speed, k),
      radius: at(path.radius, k),
      coreRadius: at(path.coreRadius, k),
      circulation: at(path.circulation, k),
    })
  }
  return passages
}

/** The last output at or before a time. */
function stateBefore(
  wake: CoaxialWake,
  when: number,
): {
  readonly index: number
  readonly time: number
  readonly ring: Pick<CoaxialRing, 'x' | 'radius' | 'coreRadius' | 'circulation'>
} {
  const path = at(wake.trajectories, 0)
  const k = path.time.length < 2 || when < at(path.time, 1) ? 0 : bracket(path.time, when)
  return {
    index: k,
    time: at(path.time, k),
    ring: {
      x: at(path.x, k),
      radius: at(path.radius, k),
      coreRadius: at(path.coreRadius, k),
      circulation: at(path.circulation, k),
    },
  }
}

function passedOn(options: TankOptions): Pick<TankOptions, 'signal' | 'pause'> {
  return {
    ...(options.signal === undefined ? {} : { signal: options.signal }),
    ...(options.pause === undefined ? {} : { pause: options.pause }),
  }
}

/** Why a march that fell short should not be prolonged; null where it should. */
function whyShort(wake: CoaxialWake, asked: number, speedAtBirth: number, speedAtEnd: number): string | null {
  if (wake.status !== 'done') return wake.message
  if (wake.time < asked) return 'it has grown to the walls of the tank before'
  return speedAtEnd < STOPPED_SHARE * speedAtBirth ? 'it has all but stopped before' : null
}

function pathOf(
  input: RingPathInput,
  wake: CoaxialWake,
  made: Pick<RingPath, 'tubeRadius' | 'shortOf' | 'passages'> & { readonly x: number },
): RingPath {
  const path = at(wake.trajectories, 0)
  const { duration } = input
  const time = Array.from(path.time, (value) => duration + value)
  const radius = Array.from(path.radius)
  const coreRadius = Array.from(path.coreRadius)
  const speed = Array.from(path.speed)
  const thick = time.findIndex((_, k) => at(coreRadius, k) > THIN_CORE_LIMIT * at(radius, k))
  return {
    ageing: input.ageing,
    birth: { time: duration, x: made.x, speed: at(speed, 0), circulation: at(path.circulation, 0) },
    time,
    x: Array.from(path.x),
    radius,
    coreRadius,
    speed,
    passages: made.passages,
    tubeRadius: made.tubeRadius,
    thickFrom: thick < 0 ? null : at(time, thick),
    shortOf: made.shortOf,
    status: wake.status,
  }
}

/** Change of a ring's speed by the walls over its speed without them in still water, at birth; 0 without walls. */
export function wallShare(path: RingPath, walls: TankWalls, axialFlow: number): number {
  const change = wallSlowing(walls, path.birth.circulation, at(path.radius, 0))
  return change === 0 ? 0 : change / (path.birth.speed - axialFlow - change)
}

/**
 * Slowing in the march less that of the tank itself, over the ring's own speed, at the last station passed: what the tube that stands for
 * a rectangular tank leaves unsaid. null where the ring has grown to the walls.
 */
export function wallMisfit({ passages, tubeRadius }: RingPath, walls: TankWalls): number | null {
  const end = passages.at(-1)
  if (end === undefined || tubeRadius === null || walls.bore !== null) return 0
  if (end.radius > LARGEST_TUBE_SHARE * Math.min(nearestSide(walls), tubeRadius)) return null
  const inMarch = tubeSlowing(end.circulation, end.radius, tubeRadius)
  return (inMarch - wallSlowing(walls, end.circulation, end.radius)) / end.speed
}
