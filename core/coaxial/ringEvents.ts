/**
 * Events of coaxial rings as functions whose sign changes, and what is told when they do.
 */
import { at, type Crossing, type EventFunctions } from '../base'
import { LARGEST_TUBE_SHARE } from './roundTube'
import type { RingFlow } from './ringFlow'
import type { CoaxialRing } from './types'
import type { WakeEvent } from './wakeTypes'

/** Core ratio above which the thin-core law is no longer told as valid; the steady family departs by 1 % there. */
export const THIN_CORE_LIMIT = 0.3

/** What a change of sign means for the march. */
export interface RingEventOutcome {
  readonly event: WakeEvent | null
  /** Sentence that ends the run, or null. */
  readonly stop: string | null
  /** Sentence on why the model no longer holds from here on, or null. */
  readonly limit: string | null
}

interface RingEvent {
  readonly value: (state: Float64Array) => number
  /** Direction of change that counts; 0 for both. */
  readonly direction: -1 | 0 | 1
  /** Told at once where the value is below 0 when a ring appears. A core made too thick is a caution of its maker. */
  readonly holdsFromStart: boolean
  readonly tell: (state: Float64Array, time: number) => RingEventOutcome
}

export interface RingEventSetup {
  readonly flow: RingFlow
  /** Every ring of the march as it begins. */
  readonly rings: readonly CoaxialRing[]
  /** Number of each active ring, from 1, in the order of the state. */
  readonly numbers: readonly number[]
  readonly wall: number | null
  readonly tubeRadius: number | null
  readonly stations: readonly number[]
  /** Numbers of the rings whose near-wall has been told; added to. */
  readonly nearTold: Set<number>
}

const NOTHING: RingEventOutcome = { event: null, stop: null, limit: null }

/** Time in which a ring moves by rounding only, in R^2 / Gamma. */
const AT_ONCE = 1e-9

/** Whether so little time has passed since a ring appeared that it stands where it was put: at a station there it does not arrive. */
export function hasJustAppeared(
  ring: { readonly radius: number; readonly circulation: number; readonly startTime?: number },
  time: number,
): boolean {
  return time - (ring.startTime ?? 0) <= (AT_ONCE * ring.radius ** 2) / Math.abs(ring.circulation)
}

/** The events of one set of active rings. */
export class RingEvents {
  private readonly events: readonly RingEvent[]
  readonly functions: EventFunctions

  constructor(private readonly setup: RingEventSetup) {
    const rings = setup.numbers.map((_, i) => i)
    const pairs = rings.flatMap((i) => rings.slice(i + 1).map((j) => [i, j] as const))
    this.events = [
      ...pairs.flatMap(([i, j]) => [this.pass(i, j), this.touch(i, j)]),
      ...rings.flatMap((i) => [...setup.stations.map((station) => this.arrival(i, station)), this.thickCore(i)]),
      ...(setup.wall === null && setup.tubeRadius === null
        ? []
        : rings.flatMap((i) => [this.nearWall(i), this.wallTouch(i)])),
    ]
    const { events } = this
    this.functions = {
      count: events.length,
      evaluate: (_time, state, out) => {
        for (let k = 0; k < events.length; k++) out[k] = at(events, k).value(state)
      },
    }
  }

  /** What a crossing tells. */
  tell(crossing: Crossing): RingEventOutcome {
    const event = at(this.events, crossing.index)
    if (event.direction !== 0 && crossing.rising !== event.direction > 0) return NOTHING
    return event.tell(crossing.state, crossing.time)
  }

  /** What already holds when the rings of this set start: cores that touch, walls that are near. */
  atStart(time: number, state: Float64Array): readonly RingEventOutcome[] {
    return this.events
      .filter((event) => event.holdsFromStart && event.value(state) < 0)
      .map((event) => event.tell(state, time))
  }

  private x(state: Float64Array, ring: number): number {
    return at(state, ring)
  }

  private radius(state: Float64Array, ring: number): number {
    return at(state, this.setup.flow.count + ring)
  }

  private number(ring: number): number {
    return at(this.setup.numbers, ring)
  }

  private pass(i: number, j: number): RingEvent {
    return {
      direction: 0,
      holdsFromStart: false,
      value: (state) => this.x(state, i) - this.x(state, j),
      tell: (state, time) => {
        const [inner, outer] = this.radius(state, i) < this.radius(state, j) ? [i, j] : [j, i]
        return {
          ...NOTHING,
          event: {
            time,
            event: 'pass',
            rings: [this.number(i), this.number(j)],
            x: this.x(state, i),
            detail: `ring ${this.number(inner)} inside ring ${this.number(outer)}`,
          },
        }
      },
    }
  }

  private touch(i: number, j: number): RingEvent {
    const { flow } = this.setup
    return {
      direction: -1,
      holdsFromStart: true,
      value: (state) =>
        Math.hypot(this.x(state, i) - this.x(state, j), this.radius(state, i) - this.radius(state, j)) -
        flow.coreRadius(state, i) -
        flow.coreRadius(state, j),
      tell: (state, time) => {
        const rings = [this.number(i), this.number(j)]
        const why = `the cores of rings ${rings.join(' and ')} touch`
        return {
          event: {
            time,
            event: 'cores-touch',
            rings,
            x: (this.x(state, i) + this.x(state, j)) / 2,
            detail: 'distance is the sum of the core radii',
          },
          stop: why,
          limit: `${why}: merging is not modelled`,
        }
      },
    }
  }

  private arrival(i: number, station: number): RingEvent {
    return {
      direction: 0,
      holdsFromStart: false,
      value: (state) => this.x(state, i) - station,
      tell: (_state, time) =>
        hasJustAppeared(at(this.setup.rings, this.number(i) - 1), time)
          ? NOTHING
          : {
              ...NOTHING,
              event: { time, event: 'arrival', rings: [this.number(i)], x: station, detail: `station ${station} m` },
            },
    }
  }

  private thickCore(i: number): RingEvent {
    return {
      direction: -1,
      holdsFromStart: false,
      value: (state) => THIN_CORE_LIMIT * this.radius(state, i) - this.setup.flow.coreRadius(state, i),
      tell: () => ({
        ...NOTHING,
        limit: `the core of ring ${this.number(i)} passes ${THIN_CORE_LIMIT} of its radius, where the thin-core law ends`,
      }),
    }
  }

  /** Distance of a ring from the wall or tube. */
  private wallDistance(state: Float64Array, i: number): number {
    const { wall, tubeRadius } = this.setup
    if (wall !== null) return Math.abs(this.x(state, i) - wall)
    return (tubeRadius ?? Number.NaN) - this.radius(state, i)
  }

  private nearWall(i: number): RingEvent {
    const number = this.number(i)
    return {
      direction: -1,
      holdsFromStart: true,
      value: (state) => this.wallDistance(state, i) - this.radius(state, i),
      tell: (state, time) => {
        if (this.setup.nearTold.has(number)) return NOTHING
        this.setup.nearTold.add(number)
        return {
          event: {
            time,
            event: 'near-wall',
            rings: [number],
            x: this.x(state, i),
            detail: 'nearer than its radius: a real wall sheds vorticity and the ring rebounds',
          },
          stop: null,
          limit: `ring ${number} comes nearer to the wall than its radius, and a real wall sheds vorticity of its own`,
        }
      },
    }
  }

  private wallTouch(i: number): RingEvent {
    const { flow, tubeRadius } = this.setup
    const number = this.number(i)
    return {
      direction: -1,
      holdsFromStart: true,
      value: (state) => {
        const toCore = this.wallDistance(state, i) - flow.coreRadius(state, i)
        return tubeRadius === null ? toCore : Math.min(toCore, LARGEST_TUBE_SHARE * tubeRadius - this.radius(state, i))
      },
      tell: (state, time) => ({
        event: {
          time,
          event: 'cores-touch',
          rings: [number],
          x: this.x(state, i),
          detail: 'the core reaches the wall',
        },
        stop: `the core of ring ${number} reaches the wall`,
        limit: `the core of ring ${number} reaches the wall`,
      }),
    }
  }
}
