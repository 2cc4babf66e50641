import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../core/base'
import { trainRings } from '../../../core/coaxial'
import {
  EVENT_COLUMNS,
  eventRows,
  ringsOfNozzles,
  TRAJECTORY_COLUMNS,
  trajectoryRows,
  wakeFrame,
  wakePolyData,
  wakeSummary,
  type Vector,
  type WakeInput,
} from '../../../core/filament'
import { steadyRing, thinRingSpeed } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'
import { marched, ring, stateOf } from './scenes'

const AUTO = { model: 'auto', law: 'thin' } as const

describe('the choice of engine', () => {
  it('is coaxial where all rings share an axis, whichever way it points', async () => {
    const direction: Vector = [0.6, 0, 0.8]
    const wake = await marched({
      ...AUTO,
      rings: [
        ring({ direction, centre: [1, 2, 3] }),
        ring({ direction: [-0.6, 0, -0.8], centre: [1 + 3, 2, 3 + 4], circulation: 2 }),
      ],
      duration: 0.5,
    })
    expect(wake.model).toBe('coaxial')
    const first = stateOf(wake, 0)
    const second = stateOf(wake, 1)
    // Each moves along its own direction, slowed or sped a little by the other five radii away.
    expectClose(first.speed, thinRingSpeed(1, 1, 0.2), 0.05)
    expectClose(second.speed, thinRingSpeed(2, 1, 0.2), 0.05)
    expect(second.direction).toEqual([-0.6, -0, -0.8])
    expectNear(first.centre[1], 2, 1e-14)
    expectClose((first.centre[2] - 3) / (first.centre[0] - 1), 4 / 3, 1e-9)
  })

  const inSpace: [string, Partial<WakeInput>, RegExp][] = [
    ['side by side', { rings: [ring(), ring({ centre: [0, 4, 0] })] }, /rings 1 and 2 lie side by side/],
    ['at an angle', { rings: [ring(), ring({ centre: [5, 0, 0], direction: [1, 0.1, 0] })] }, /different directions/],
    ['elliptic', { rings: [ring({ axisRatio: 1.2 })] }, /ring 1 is not round/],
    ['before an oblique wall', { wall: { point: [9, 0, 0], normal: [1, 1, 0] } }, /wall is not square/],
    ['across the stream', { rings: [ring({ direction: [0, 1, 0] })], axialFlow: 0.1 }, /stream does not run along/],
  ]
  it.each(inSpace)('is filaments for rings %s, with the reason', async (_what, parts, reason) => {
    const wake = await marched({ ...AUTO, ...parts, duration: 0.01, outputStep: 0.01 })
    expect(wake.model).toBe('filament')
    expect(wake.modelReason).toMatch(reason)
    await expect(marched({ ...AUTO, ...parts, model: 'coaxial' })).rejects.toThrow(
      /wake.model must be auto or filament/,
    )
  })

  it('keeps stations, walls and events where the plan put them', async () => {
    const wake = await marched({
      ...AUTO,
      rings: [ring({ direction: [-1, 0, 0], centre: [2, 0.5, 0] })],
      stations: [1.7, 0.3],
      wall: { point: [-3, 7, 7], normal: [-1, 0, 0] },
      duration: 30,
    })
    const arrivals = wake.events.filter(({ event }) => event === 'arrival')
    expect(arrivals.map(({ x, detail }) => [x, detail])).toEqual([
      [1.7, 'station 1.7 m'],
      [0.3, 'station 0.3 m'],
    ])
    const near = wake.events.find(({ event }) => event === 'near-wall')
    // Mirror images widen the ring a little before it is one radius away.
    expectNear(near?.x ?? NaN, -2, 0.2)
  })

  it('tells of cores that are thick for their law, and of growth that is not modelled', async () => {
    const thick = await marched({ ...AUTO, rings: [ring({ coreRadius: 0.4 })] })
    expect(thick.notes.join(' ')).toMatch(/core of ring 1 is above 0.3 of its radius/)
    const turbulent = await marched({ viscous: true, ageing: 'turbulent', duration: 0.1 })
    expect(turbulent.notes.join(' ')).toMatch(/Turbulent growth is not modelled/)
  })
})

describe('refusals of the wake', () => {
  const bad: [string, Partial<WakeInput>, string, RegExp][] = [
    ['no rings', { rings: [] }, 'wake.rings', /at least one ring/],
    [
      'a radius that is no number',
      { rings: [ring(), ring({ radius: NaN, centre: [5, 0, 0] })] },
      'wake.rings.1.radius',
      /finite/,
    ],
    ['a centre that is no number', { rings: [ring({ centre: [0, NaN, 0] })] }, 'wake.rings.0.centre.1', /finite/],
    ['no direction', { rings: [ring({ direction: [0, 0, 0] })] }, 'wake.rings.0.direction', /must point somewhere/],
    ['a core too wide', { rings: [ring({ coreRadius: 2 })] }, 'wake.rings.0.coreRadius', /at most 1.5 m, got 2 m/],
    ['rings at one place', { rings: [ring(), ring()] }, 'wake.rings.1.centre', /^rings 1 and 2 must not coincide/],
    [
      'a curve of few nodes',
      { rings: [ring({ curve: new Float64Array(12) })] },
      'wake.rings.0.curve',
      /at least 16 nodes/,
    ],
    [
      'a curve without extent',
      { rings: [ring({ curve: new Float64Array(60) })] },
      'wake.rings.0.curve',
      /smooth parameter/,
    ],
    [
      'a ring through the wall',
      { wall: { point: [0.3, 0, 0], normal: [1, 1, 0] } },
      'wake.rings.0.centre',
      /clear of the wall/,
    ],
    [
      'a wall in the stream',
      { wall: { point: [9, 0, 0], normal: [1, 1, 0] }, axialFlow: 1 },
      'wake.wall',
      /across the stream/,
    ],
    ['a tube about rings in space', { tube: 9, rings: [ring({ axisRatio: 2 })] }, 'wake.tube', /not round/],
    ['a tube with filaments asked for', { tube: 9 }, 'wake.tube', /wake.model is filament/],
  ]
  it.each(bad)('name the field and the limit of %s', async (_what, parts, field, words) => {
    const error = await marched(parts).then(
      () => null,
      (reason: unknown) => reason,
    )
    expect(error).toBeInstanceOf(DomainError)
    if (!(error instanceof DomainError)) return
    expect(error.field).toBe(field)
    expect(error.message).toMatch(words)
  })
})

describe('ringsOfNozzles', () => {
  const train = trainRings({
    density: 1000,
    ring: steadyRing(0.01, 0.02, 0.2, 1000),
    duration: 0.5,
    pulses: 2,
    period: 1,
  }).rings

  it('sends the train from the origin along +x where no nozzle is named', () => {
    const rings = ringsOfNozzles(train, [])
    expect(rings.length).toBe(2)
    expect(rings[1]).toMatchObject({ direction: [1, 0, 0], startTime: 1.5 })
    expectClose(rings[0]?.centre[0] ?? NaN, train[0]?.x ?? NaN, 1e-15)
  })

  it('sends it from every nozzle along its direction, later by its delay', () => {
    const rings = ringsOfNozzles(train, [
      { position: [0, 0.1, 0], direction: [2, 0, 0], delay: 0 },
      { position: [0, -0.1, 0], direction: [0, 0, -3], delay: 0.25 },
    ])
    expect(rings.map(({ startTime }) => startTime)).toEqual([0.5, 1.5, 0.75, 1.75])
    expect(rings[2]?.centre[2]).toBe(-(train[0]?.x ?? NaN))
    expect(rings[2]?.direction).toEqual([0, 0, -1])
  })

  it('refuses a nozzle that points nowhere', () => {
    expect(() => ringsOfNozzles(train, [{ position: [0, 0, 0], direction: [0, 0, 0], delay: 0 }])).toThrow(
      /wake.nozzles.0.direction must point somewhere/,
    )
  })
})

describe('what is written of a wake', () => {
  const parts = {
    rings: [ring(), ring({ centre: [3, 0.5, 0], startTime: 0.3 })],
    duration: 0.5,
    outputStep: 0.2,
  }

  it('has a row for every ring at every output of its life, in order', async () => {
    const wake = await marched(parts)
    const rows = [...trajectoryRows(wake)]
    expect(rows.map((row) => row.slice(0, 2))).toEqual([
      [0, 1],
      [0.2, 1],
      [0.4, 1],
      [0.4, 2],
      [0.5, 1],
      [0.5, 2],
    ])
    rows.forEach((row) => {
      expect(row.length).toBe(TRAJECTORY_COLUMNS.length)
      expect(row.every(Number.isFinite)).toBe(true)
    })
    const events = eventRows(wake.events)
    expect(events.at(-1)?.slice(0, 4)).toEqual([0.5, 'end', '', null])
    expect(events[0]?.length).toBe(EVENT_COLUMNS.length)
  })

  it('is summed up as the summary asks', async () => {
    const summary = wakeSummary(await marched(parts))
    expect(summary.model).toBe('filament')
    expect(summary.rings.map((one) => one.ring)).toEqual([1, 2])
    expect(summary.passes).toBe(0)
    expect(summary.validUntil).toBe(0.5)
    expect(Object.keys(summary.drift)).toEqual(['circulation', 'impulse', 'energy'])
  })

  it.each(['filament', 'auto'] as const)('is drawn as closed lines from the %s engine', async (model) => {
    const wake = await marched({ model, rings: [ring(), ring({ centre: [3, 0, 0], startTime: 0.3 })], duration: 0.5 })
    expect(wake.model).toBe(model === 'auto' ? 'coaxial' : 'filament')
    expect(wakeFrame(wake, 0).map(({ number }) => number)).toEqual([1])
    const shapes = wakeFrame(wake, wake.outputTimes.length - 1)
    expect(shapes.length).toBe(2)
    const [first] = shapes
    if (first === undefined) throw new Error('no ring')
    const count = first.nodes.length / 3
    for (let i = 0; i < first.nodes.length; i += 3) {
      expectNear(first.nodes[i] ?? NaN, first.centre[0], 0.02)
      expectClose(Math.hypot(first.nodes[i + 1] ?? NaN, first.nodes[i + 2] ?? NaN), first.radius, 0.01)
    }
    const text = wakePolyData(shapes, 0.5)
    expect(text).toContain('<VTKFile type="PolyData" version="0.1" byte_order="LittleEndian">')
    const total = shapes.reduce((sum, shape) => sum + shape.nodes.length / 3, 0)
    expect(text).toContain(`NumberOfPoints="${total}"`)
    expect(text).toContain('NumberOfLines="2"')
    const array = (name: string): number[] => {
      const found = new RegExp(`Name="${name}"[^>]*>\\n([^<]*)\\n`).exec(text)
      return (found?.[1] ?? '').split(' ').map(Number)
    }
    expect(array('Points').length).toBe(3 * total)
    const connectivity = array('connectivity')
    // Every line closes on its first point.
    expect(connectivity[count]).toBe(0)
    expect(connectivity.length).toBe(total + 2)
    expect(array('offsets')).toEqual([count + 1, total + 2])
    expect(array('ring')).toEqual([1, 2])
    expect(array('TimeValue')).toEqual([0.5])
  })
})
