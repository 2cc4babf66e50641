/**
 * Events of filaments in space: passes, arrivals, walls, cores that touch.
 */
import { at, type Crossing, type EventFunctions } from '../base'
import { hasJustAppeared, type WakeEvent } from '../coaxial'
import { distanceBetween, distanceToItself, neighbourhood, reachOf } from './approach'
import type { CurveSums } from './closedCurve'
import type { FilamentFlow } from './filamentFlow'
import type { WakeRing, WakeWall } from './types'
import { dot, length } from './vector'

/** Rings are told to pass only when they part by this share of their radius on the other side: side by side is no pass. */
const PASS_BAND = 1e-6
/** Distances are computed in full only below this many times what would matter. */
const CARE = 4

/** What is known of a ring at an instant. */
export interface RingView {
  readonly nodes: Float64Array
  readonly sums: CurveSums
  readonly reach: number
  readonly coreRadius: number
  /** sqrt(area / pi) [m] */
  readonly radius: number
}

export function viewRings(flow: FilamentFlow, state: Float64Array): RingView[] {
  return Array.from({ length: flow.count }, (_, ring) => {
    const nodes = flow.nodes(state, ring)
    const sums = flow.sums(state, ring)
    return {
      nodes,
      sums,
      reach: reachOf(nodes, sums),
      coreRadius: flow.coreRadius(state, ring, sums),
      radius: Math.sqrt(length(sums.area) / Math.PI),
    }
  })
}

export interface FilamentEventOutcome {
  readonly event: WakeEvent | null
  /** Sentence that ends the run, or null. */
  readonly stop: string | null
  readonly limit: string | null
}

interface FilamentEvent {
  readonly value: (rings: readonly RingView[]) => number
  readonly direction: -1 | 0 | 1
  readonly holdsFromStart: boolean
  readonly tell: (rings: readonly RingView[], time: number) => FilamentEventOutcome
}

export interface FilamentEventSetup {
  readonly flow: FilamentFlow
  /** Every ring of the march as it begins. */
  readonly rings: readonly WakeRing[]
  readonly numbers: readonly number[]
  readonly wall: WakeWall | null
  readonly stations: readonly number[]
  readonly nearTold: Set<number>
  /** Sign of x_i - x_j last seen beyond the band, by "i j" of the numbers; kept from march to march. */
  readonly sides: Map<string, number>
}

export class FilamentEvents {
  private readonly events: readonly FilamentEvent[]
  readonly functions: EventFunctions
  /** Crossings of pairs that have yet to part. */
  private readonly pending = new Map<string, WakeEvent>()

  constructor(private readonly setup: FilamentEventSetup) {
    const rings = setup.numbers.map((_, i) => i)
    const pairs = rings.flatMap((i) => rings.slice(i + 1).map((j) => [i, j] as const))
    this.events = [
      ...pairs.flatMap(([i, j]) => [this.pass(i, j), this.touch(i, j)]),
      ...rings.flatMap((i) => [this.touchSelf(i), ...setup.stations.map((station) => this.arrival(i, station))]),
      ...(setup.wall === null ? [] : rings.flatMap((i) => this.walls(i, setup.wall))),
    ]
    const { events } = this
    this.functions = {
      count: events.length,
      // Stability keeps the steps far shorter than the time in which rings come and go.
      looks: 1,
      evaluate: (_time, state, out) => {
        const views = viewRings(setup.flow, state)
        for (let k = 0; k < events.length; k++) out[k] = at(events, k).value(views)
      },
    }
  }

  tell(crossing: Crossing): FilamentEventOutcome {
    const event = at(this.events, crossing.index)
    if (event.direction !== 0 && crossing.rising !== event.direction > 0) return NOTHING
    return event.tell(viewRings(this.setup.flow, crossing.state), crossing.time)
  }

  atStart(time: number, state: Float64Array): readonly FilamentEventOutcome[] {
    const views = viewRings(this.setup.flow, state)
    return this.events
      .filter((event) => event.holdsFromStart && event.value(views) < 0)
      .map((event) => event.tell(views, time))
  }

  /** Passes that are complete: the rings have parted on the other side. Call after every step and at the start. */
  completed(state: Float64Array): WakeEvent[] {
    const { numbers, sides } = this.setup
    const views = viewRings(this.setup.flow, state)
    const done: WakeEvent[] = []
    for (let i = 0; i < views.length; i++)
      for (let j = i + 1; j < views.length; j++) {
        const apart = at(views, i).sums.centroid[0] - at(views, j).sums.centroid[0]
        if (Math.abs(apart) <= PASS_BAND * (at(views, i).radius + at(views, j).radius)) continue
        const key = `${at(numbers, i)} ${at(numbers, j)}`
        const before = sides.get(key)
        sides.set(key, Math.sign(apart))
        const crossing = this.pending.get(key)
        if (before !== undefined && before !== Math.sign(apart) && crossing !== undefined) done.push(crossing)
        this.pending.delete(key)
      }
    return done
  }

  private number(ring: number): number {
    return at(this.setup.numbers, ring)
  }

  private pass(i: number, j: number): FilamentEvent {
    return {
      direction: 0,
      holdsFromStart: false,
      value: (rings) => at(rings, i).sums.centroid[0] - at(rings, j).sums.centroid[0],
      tell: (rings, time) => {
        const numbers = [this.number(i), this.number(j)]
        const [inner, outer] = at(rings, i).radius < at(rings, j).radius ? numbers : [...numbers].reverse()
        const event: WakeEvent = {
          time,
          event: 'pass',
          rings: numbers,
          x: at(rings, i).sums.centroid[0],
          detail: `ring ${inner} is the smaller, ring ${outer} the larger`,
        }
        this.pending.set(numbers.join(' '), event)
        return NOTHING
      },
    }
  }

  private touch(i: number, j: number): FilamentEvent {
    return {
      direction: -1,
      holdsFromStart: true,
      value: (rings) => {
        const cores = at(rings, i).coreRadius + at(rings, j).coreRadius
        return distanceBetween(at(rings, i), at(rings, j), CARE * cores) - cores
      },
      tell: (rings, time) => {
        const numbers = [this.number(i), this.number(j)]
        const why = `the cores of rings ${numbers.join(' and ')} touch`
        return {
          event: {
            time,
            event: 'cores-touch',
            rings: numbers,
            x: (at(rings, i).sums.centroid[0] + at(rings, j).sums.centroid[0]) / 2,
            detail: 'least distance is the sum of the core radii',
          },
          stop: why,
          limit: `${why}: reconnection is not modelled`,
        }
      },
    }
  }

  private touchSelf(i: number): FilamentEvent {
    return {
      direction: -1,
      holdsFromStart: true,
      value: (rings) => {
        const { nodes, sums, coreRadius } = at(rings, i)
        const distance = distanceToItself(nodes, sums, neighbourhood(sums, coreRadius))
        return Math.min(distance, 1e3 * coreRadius) - 2 * coreRadius
      },
      tell: (rings, time) => {
        const number = this.number(i)
        const why = `two parts of ring ${number} touch`
        return {
          event: { time, event: 'cores-touch', rings: [number], x: at(rings, i).sums.centroid[0], detail: why },
          stop: why,
          limit: `${why}: reconnection is not modelled`,
        }
      },
    }
  }

  private arrival(i: number, station: number): FilamentEvent {
    return {
      direction: 0,
      holdsFromStart: false,
      value: (rings) => at(rings, i).sums.centroid[0] - station,
      tell: (_rings, time) =>
        hasJustAppeared(at(this.setup.rings, this.number(i) - 1), time)
          ? NOTHING
          : {
              ...NOTHING,
              event: { time, event: 'arrival', rings: [this.number(i)], x: station, detail: `station ${station} m` },
            },
    }
  }

  private walls(i: number, wall: WakeWall | null): FilamentEvent[] {
    if (wall === null) return []
    const number = this.number(i)
    const least = ({ nodes }: RingView): number => {
      const level = dot(wall.point, wall.normal)
      let smallest = Infinity
      for (let k = 0; k < nodes.length; k += 3)
        smallest = Math.min(
          smallest,
          Math.abs(
            at(nodes, k) * wall.normal[0] +
              at(nodes, k + 1) * wall.normal[1] +
              at(nodes, k + 2) * wall.normal[2] -
              level,
          ),
        )
      return smallest
    }
    return [
      {
        direction: -1,
        holdsFromStart: true,
        value: (rings) => least(at(rings, i)) - at(rings, i).radius,
        tell: (rings, time) => {
          if (this.setup.nearTold.has(number)) return NOTHING
          this.setup.nearTold.add(number)
          return {
            event: {
              time,
              event: 'near-wall',
              rings: [number],
              x: at(rings, i).sums.centroid[0],
              detail: 'nearer than its radius: a real wall sheds vorticity and the ring rebounds',
            },
            stop: null,
            limit: `ring ${number} comes nearer to the wall than its radius, and a real wall sheds vorticity of its own`,
          }
        },
      },
      {
        direction: -1,
        holdsFromStart: true,
        value: (rings) => least(at(rings, i)) - at(rings, i).coreRadius,
        tell: (rings, time) => ({
          event: {
            time,
            event: 'cores-touch',
            rings: [number],
            x: at(rings, i).sums.centroid[0],
            detail: 'the core reaches the wall',
          },
          stop: `the core of ring ${number} reaches the wall`,
          limit: `the core of ring ${number} reaches the wall`,
        }),
      },
    ]
  }
}

const NOTHING: FilamentEventOutcome = { event: null, stop: null, limit: null }
