/**
 * Rings in motion: one door for both engines.
 */
import { at, DomainError } from '../base'
import { marchCoaxialRings, marchMergingRings, THIN_CORE_LIMIT, type CoaxialTrajectory } from '../coaxial'
import { checkWakeInput } from './checkWake'
import { marchFilaments } from './marchFilaments'
import { sharedAxis, type Axis } from './sharedAxis'
import { trajectoryOf } from './shapeWriter'
import type { Wake, WakeInput, WakeOptions, WakeTrajectory } from './types'
import { along, dot, scaled, unit } from './vector'

/**
 * March rings by the engine that suits them: `auto` takes the coaxial one where all rings share an axis.
 *
 * @returns status 'done' where the duration is reached or an event ends the run; 'cancelled' and 'failed' keep what was computed
 * @throws {DomainError} with the dotted plan path of the first value that breaks its limit
 */
export async function marchWake(input: WakeInput, options: WakeOptions): Promise<Wake> {
  checkWakeInput(input)
  const finding = sharedAxis(input)
  const notes = thickNotes(input)
  if (finding.axis !== null && input.model !== 'filament') {
    const wake = await marchOnAxis(input, finding.axis, options)
    return { ...wake, ...validity(input, wake), notes: [...notes, ...wake.notes] }
  }
  if (finding.axis === null && input.model === 'coaxial')
    throw new DomainError('wake.model', `wake.model must be auto or filament for these rings: ${finding.why}`)
  if (input.tube !== null)
    throw new DomainError(
      'wake.tube',
      `wake.tube must be left out for rings in space: ${finding.axis === null ? finding.why : 'wake.model is filament'}`,
    )
  const wake = await marchFilaments(input, options)
  if (input.viscous && input.ageing === 'turbulent')
    notes.push('Turbulent growth is not modelled for rings in space: their cores grow by viscosity alone.')
  return {
    ...wake,
    ...validity(input, wake),
    model: 'filament',
    modelReason: finding.axis === null ? `Rings in space: ${finding.why}.` : 'Rings in space, as the plan asks.',
    notes: [...notes, ...wake.notes],
  }
}

/** Until when the run holds: not at all from where a ring appears with a core the law is only a stand-in for. */
function validity(
  { rings, law }: WakeInput,
  wake: Pick<Wake, 'validUntil' | 'reason'>,
): Pick<Wake, 'validUntil' | 'reason'> {
  const starts = rings.flatMap((ring, i) =>
    ring.coreRadius > THIN_CORE_LIMIT * ring.radius ? [{ number: i + 1, time: ring.startTime ?? 0 }] : [],
  )
  const first = starts.reduce<(typeof starts)[number] | null>((a, b) => (a === null || b.time < a.time ? b : a), null)
  if (first === null || first.time >= wake.validUntil) return { validUntil: wake.validUntil, reason: wake.reason }
  return {
    validUntil: first.time,
    reason: `ring ${first.number} appears with a core above ${THIN_CORE_LIMIT} of its radius, where the ${LAW_WORDS[law]} law is a stand-in`,
  }
}

const LAW_WORDS = { thin: 'thin-core', regularised: 'regularised' } as const

function thickNotes({ rings, law }: WakeInput): string[] {
  const thick = rings.flatMap((ring, i) => (ring.coreRadius > THIN_CORE_LIMIT * ring.radius ? [i + 1] : []))
  if (thick.length === 0) return []
  return [
    `The core of ring${thick.length > 1 ? 's' : ''} ${thick.join(', ')} is above ${THIN_CORE_LIMIT} of its radius, where the ${LAW_WORDS[law]} law is a stand-in.`,
  ]
}

async function marchOnAxis(input: WakeInput, axis: Axis, options: WakeOptions): Promise<Wake> {
  const { origin, direction } = axis
  const alongX = direction[0]
  /** +1 for a ring that points along the axis, -1 against it. */
  const senses = input.rings.map((ring) => Math.sign(dot(ring.direction, direction)))
  const stations = alongX === 0 ? [] : input.stations.map((station) => (station - origin[0]) / alongX)
  const march = input.merging === true ? marchMergingRings : marchCoaxialRings
  const result = await march(
    {
      ...input,
      rings: input.rings.map((ring, i) => ({
        circulation: ring.circulation * at(senses, i),
        radius: ring.radius,
        coreRadius: ring.coreRadius,
        core: ring.core,
        x: dot(ring.centre, direction),
        startTime: ring.startTime ?? 0,
      })),
      axialFlow: input.axialFlow * alongX,
      wall: input.wall === null ? null : dot(input.wall.point, direction),
      tubeRadius: input.tube,
      stations,
    },
    options,
  )
  const { trajectories, ...rest } = result
  return {
    ...rest,
    events: result.events.map((event) => ({
      ...event,
      x: event.x === null ? null : (stationX(event.x, stations, input.stations) ?? origin[0] + alongX * event.x),
      detail: event.event === 'arrival' ? `station ${stationX(event.x, stations, input.stations)} m` : event.detail,
    })),
    model: 'coaxial',
    modelReason: 'All rings share an axis.',
    trajectories: trajectories.map((path, i) => inSpace(path, at(senses, i), axis)),
    frames: [],
    notes: [],
  }
}

/** x of the station whose place on the axis this is, digit for digit as the plan gave it. */
function stationX(place: number | null, onAxis: readonly number[], given: readonly number[]): number | null {
  return given[onAxis.findIndex((station) => station === place)] ?? null
}

function inSpace(path: CoaxialTrajectory, sense: number, axis: Axis): WakeTrajectory {
  const direction = sense > 0 ? axis.direction : scaled(axis.direction, -1)
  return trajectoryOf(
    Array.from(path.time, (time, k) => ({
      time,
      centre: along(axis.origin, axis.direction, at(path.x, k)),
      radius: at(path.radius, k),
      coreRadius: at(path.coreRadius, k),
      circulation: sense * at(path.circulation, k),
      speed: sense * at(path.speed, k),
      direction: unit(direction),
      length: 2 * Math.PI * at(path.radius, k),
    })),
  )
}
