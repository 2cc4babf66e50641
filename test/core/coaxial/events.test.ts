import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../core/base'
import { marchCoaxialRings, type CoaxialWakeInput } from '../../../core/coaxial'
import { typescriptKernel } from '../../../core/kernel'
import { thinRingSpeed } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'
import { lastOf, marched, ring, scene, timesOf } from './scenes'

const SPEED = thinRingSpeed(1, 1, 0.1)

describe('events of coaxial rings', () => {
  it('locate the arrival of a lone ring at its stations to the tolerance', async () => {
    const wake = await marched({ stations: [0.1, 0.5, 2, -1], duration: 10, outputStep: 5 })
    const arrivals = wake.events.filter((event) => event.event === 'arrival')
    expect(arrivals.map((event) => event.x)).toEqual([0.1, 0.5, 2])
    arrivals.forEach((event) => expectClose(event.time, (event.x ?? NaN) / SPEED, 1e-9))
  })

  it('end with the last time, always last', async () => {
    const wake = await marched({ stations: [0.1] })
    expect(wake.events.at(-1)).toMatchObject({ event: 'end', time: 1, rings: [], x: null })
  })

  it('end the run where cores touch, naming rings and time', async () => {
    const wake = await marched({ rings: [ring(), ring({ x: 3, circulation: -1 })], duration: 50 })
    const touch = wake.events.find((event) => event.event === 'cores-touch')
    expect(touch?.rings).toEqual([1, 2])
    expect(wake.status).toBe('done')
    expect(wake.time).toBe(touch?.time)
    expect(wake.message).toMatch(/^Ended at t = .* s: the cores of rings 1 and 2 touch\.$/)
    expect(wake.validUntil).toBe(touch?.time)
    const [one, two] = [lastOf(wake, 0), lastOf(wake, 1)]
    expectNear(two.x - one.x, one.coreRadius + two.coreRadius, 1e-7)
    expect(wake.outputTimes.at(-1)).toBe(touch?.time)
  })

  it('tell at once of rings whose cores overlap from the start', async () => {
    const wake = await marched({ rings: [ring(), ring({ x: 0.15 })] })
    expect(wake.time).toBe(0)
    expect(timesOf(wake, 'cores-touch')).toEqual([0])
    expect(wake.trajectories[1]?.time.length).toBe(1)
  })

  it('tell where a growing core leaves the thin-core law, and go on', async () => {
    const wake = await marched({
      rings: [ring({ coreRadius: 0.2 })],
      viscous: true,
      kinematicViscosity: 1e-3,
      duration: 30,
    })
    // a^2 = 0.04 + 0.004 t = 0.09
    expectClose(wake.validUntil, 12.5, 1e-9)
    expect(wake.reason).toContain('thin-core law')
    expect(wake.time).toBe(30)
  })
})

describe('outputs of coaxial rings', () => {
  it('come at every step and at the last time, in numbers without rounding tails', async () => {
    const wake = await marched({ duration: 0.32, outputStep: 0.05 })
    expect([...wake.outputTimes]).toEqual([0, 0.05, 0.1, 0.15, 0.2, 0.25, 0.3, 0.32])
    expect([...(wake.trajectories[0]?.time ?? [])]).toEqual([...wake.outputTimes])
  })

  it('begin with a ring when it appears', async () => {
    const wake = await marched({
      rings: [ring({ startTime: 0.25 }), ring({ x: 5, startTime: 0.6 }), ring({ startTime: 9 })],
      duration: 1,
      outputStep: 0.2,
    })
    expect([...wake.outputTimes]).toEqual([0, 0.2, 0.4, 0.6, 0.8, 1])
    expect([...(wake.trajectories[0]?.time ?? [])]).toEqual([0.4, 0.6, 0.8, 1])
    expect([...(wake.trajectories[1]?.time ?? [])]).toEqual([0.6, 0.8, 1])
    expect(wake.trajectories[2]?.time.length).toBe(0)
    expectClose(wake.trajectories[0]?.x[0] ?? NaN, 0.15 * SPEED, 1e-9)
    expect(wake.trajectories[1]?.x[0]).toBe(5)
  })

  it('give the speed as the slope of the place', async () => {
    const wake = await marched({
      rings: [ring(), ring({ x: 1 })],
      outputStep: 1e-3,
      duration: 2e-3,
      tolerance: 1e-12,
    })
    const path = wake.trajectories[0]
    const slope = ((path?.x[2] ?? NaN) - (path?.x[0] ?? NaN)) / 2e-3
    // Central difference of step 1e-3.
    expectClose(path?.speed[1] ?? NaN, slope, 1e-6)
  })
})

describe('cancelling a coaxial march', () => {
  it('keeps what was computed', async () => {
    const signal = { aborted: false }
    const shares: number[] = []
    const wake = await marchCoaxialRings(scene({ rings: [ring(), ring({ x: 1 })], duration: 1e5, outputStep: 1 }), {
      kernel: typescriptKernel,
      signal,
      pause: async () => {
        if (shares.length === 20) signal.aborted = true
        await Promise.resolve()
      },
      onProgress: ({ share }) => shares.push(share),
    })
    expect(wake.status).toBe('cancelled')
    expect(wake.message).toMatch(/^Cancelled at t = /)
    expect(wake.time).toBeGreaterThan(0)
    expect(wake.trajectories[0]?.time.length).toBeGreaterThan(1)
    expect(wake.events.at(-1)?.event).toBe('end')
    expect(shares.every((share, i) => i === 0 || share >= (shares[i - 1] ?? NaN))).toBe(true)
  })

  it('takes effect within 0.2 s of a timer going off', async () => {
    const signal = { aborted: false }
    let asked = NaN
    setTimeout(() => {
      signal.aborted = true
      asked = performance.now()
    }, 50)
    const wake = await marchCoaxialRings(scene({ rings: [ring(), ring({ x: 1 })], duration: 1e6, outputStep: 1e3 }), {
      kernel: typescriptKernel,
      signal,
      pause: () => new Promise((resolve) => setImmediate(resolve)),
    })
    expect(wake.status).toBe('cancelled')
    expect(performance.now() - asked).toBeLessThan(200)
  })
})

describe('refusals of the coaxial room', () => {
  const refused: [string, Partial<CoaxialWakeInput>, string, RegExp][] = [
    ['no rings', { rings: [] }, 'wake.rings', /must hold at least one ring/],
    ['a radius that is no number', { rings: [ring(), ring({ radius: NaN, x: 1 })] }, 'wake.rings.1.radius', /finite/],
    ['no circulation', { rings: [ring({ circulation: 0 })] }, 'wake.rings.0.circulation', /must not be 0/],
    ['a core wider than any ring', { rings: [ring({ coreRadius: 1.6 })] }, 'wake.rings.0.coreRadius', /got 1.6 m/],
    ['a start before the first motion', { rings: [ring({ startTime: -1 })] }, 'wake.rings.0.startTime', /at least 0/],
    [
      'rings at one place',
      { rings: [ring(), ring()] },
      'wake.rings.1.centre',
      /^rings 1 and 2 must not coincide, got both at 0 m with radius 1 m$/,
    ],
    ['no duration', { duration: 0 }, 'wake.duration', /above 0 s, got 0 s/],
    ['too many outputs', { outputStep: 1e-9 }, 'wake.outputStep', /at most 200000 outputs of 1 rings/],
    [
      'more rows than can be kept',
      { rings: Array.from({ length: 100 }, (_, k) => ring({ x: k })), outputStep: 1e-5 },
      'wake.outputStep',
      /at most 10000 outputs of 100 rings/,
    ],
    ['a tolerance below rounding', { tolerance: 1e-17 }, 'wake.tolerance', /at least/],
    ['a ring as wide as its tube', { tubeRadius: 1.05 }, 'wake.rings.0.radius', /0.9 of the tube's radius/],
    ['a wall in the stream', { wall: 2, axialFlow: 0.1 }, 'wake.wall', /ambient.axialFlow must be 0/],
    ['a wall between rings', { wall: 0.5, rings: [ring(), ring({ x: 1 })] }, 'wake.wall', /one side/],
    ['wall and tube', { wall: 3, tubeRadius: 5 }, 'wake.wall', /cannot stand together/],
    ['a station that is no number', { stations: [1, Infinity] }, 'wake.stations.1', /finite/],
  ]
  it.each(refused)('name the field and the limit of %s', async (_what, parts, field, words) => {
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
