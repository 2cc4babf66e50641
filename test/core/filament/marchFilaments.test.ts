import { describe, expect, it } from 'vitest'
import { acrossOf, marchWake, type Vector, type WakeRing } from '../../../core/filament'
import { along, dot, length, scaled } from '../../../core/filament/vector'
import { typescriptKernel } from '../../../core/kernel'
import { expectClose, expectNear } from '../../support/close'
import { marched, nodesOf, ring, scene, stateOf } from './scenes'

const PAIR = [ring({ coreRadius: 0.15 }), ring({ coreRadius: 0.15, centre: [1, 0, 0] })]
/** Two rings that meet at an angle. */
const OBLIQUE = [
  ring({ centre: [0, -1.6, 0], direction: [1, 0.5, 0] }),
  ring({ centre: [0, 1.6, 0], direction: [1, -0.5, 0] }),
]

/** A right-handed set of axes, none of them along x, y or z. */
const AXES: readonly [Vector, Vector, Vector] = (() => {
  const first: Vector = scaled([2, -1, 0.7], 1 / length([2, -1, 0.7]))
  return [first, ...acrossOf(first)]
})()
const turned = (v: Vector): Vector => along(along(scaled(AXES[0], v[0]), AXES[1], v[1]), AXES[2], v[2])

describe('rings in space', () => {
  it('on one axis move as the coaxial engine says, through two passes', async () => {
    const parts = { rings: PAIR, duration: 14, outputStep: 1 }
    const space = await marched(parts)
    const axis = await marched({ ...parts, model: 'coaxial' })
    expect(space.model).toBe('filament')
    expect(axis.model).toBe('coaxial')
    const times = (wake: typeof space): number[] =>
      wake.events.filter(({ event }) => event === 'pass').map(({ time }) => time)
    expect(times(space).length).toBe(2)
    // Segments of 1/1.25 delta err by 1e-6 in speed; a pair stretches that tenfold on the way.
    times(space).forEach((time, k) => expectClose(time, times(axis)[k] ?? NaN, 2e-5))
    for (const i of [0, 1]) {
      expectClose(stateOf(space, i).centre[0], stateOf(axis, i).centre[0], 2e-5)
      expectClose(stateOf(space, i).radius, stateOf(axis, i).radius, 2e-5)
      expectClose(stateOf(space, i).speed, stateOf(axis, i).speed, 1e-4)
      expectClose(stateOf(space, i).coreRadius, stateOf(axis, i).coreRadius, 2e-5)
    }
    expect(space.drift.impulse ?? NaN).toBeLessThan(1e-6)
    expect(space.drift.energy ?? NaN).toBeLessThan(1e-3)
    expect(space.drift.circulation).toBe(0)
  })

  it('move alike when the scene is turned', async () => {
    const base = await marched({ rings: OBLIQUE, duration: 3 })
    const rotated = await marched({
      // A circle has no first node of its own: its nodes may start elsewhere, which tells the discretisation from the physics.
      rings: OBLIQUE.map((one) => ({ ...one, centre: turned(one.centre), direction: turned(one.direction) })),
      duration: 3,
    })
    for (const i of [0, 1]) {
      const expected = turned(stateOf(base, i).centre)
      stateOf(rotated, i).centre.forEach((value, axis) => expectNear(value, expected[axis] ?? NaN, 1e-5))
      expectNear(dot(turned(stateOf(base, i).direction), stateOf(rotated, i).direction), 1, 1e-9)
    }
  })

  it('move as mirror images when the scene is one', async () => {
    const wake = await marched({ rings: OBLIQUE, duration: 3 })
    const [first, second] = [stateOf(wake, 0), stateOf(wake, 1)]
    expectNear(first.centre[0], second.centre[0], 1e-9)
    expectNear(first.centre[1], -second.centre[1], 1e-9)
    // Rounding, grown on the way.
    expectNear(first.centre[2], 0, 1e-10)
  })

  it('go back the way they came when the circulations are reversed', async () => {
    const there = await marched({ rings: OBLIQUE, duration: 2, tolerance: 1e-10 })
    const reversed: WakeRing[] = OBLIQUE.map((one, i) => ({
      ...one,
      coreRadius: stateOf(there, i).coreRadius,
      curve: nodesOf(there, i + 1),
      circulation: -1,
    }))
    const back = await marched({ rings: reversed, duration: 2, tolerance: 1e-10 })
    OBLIQUE.forEach((one, i) => {
      stateOf(back, i).centre.forEach((value, axis) => expectNear(value, one.centre[axis] ?? NaN, 1e-7))
      expectNear(stateOf(back, i).radius, 1, 1e-7)
      expectNear(stateOf(back, i).coreRadius, one.coreRadius, 1e-7)
    })
  })

  it('drift with the stream and keep their shape in it', async () => {
    const still = await marched({ rings: [ring({ axisRatio: 1.5 })], duration: 2 })
    const stream = await marched({ rings: [ring({ axisRatio: 1.5 })], duration: 2, axialFlow: 0.3 })
    expectNear(stateOf(stream).centre[0] - stateOf(still).centre[0], 0.6, 1e-7)
    expectClose(stateOf(stream).length, stateOf(still).length, 1e-7)
    expect(stream.drift).toEqual({ circulation: null, impulse: null, energy: null })
  })

  it('follow a laminar core like the coaxial engine', async () => {
    const parts = { viscous: true, kinematicViscosity: 1e-3, duration: 3 }
    const space = await marched(parts)
    const axis = await marched({ ...parts, model: 'coaxial' })
    expectClose(stateOf(space).coreRadius, Math.sqrt(0.04 + 0.012), 1e-6)
    expectClose(stateOf(space).centre[0], stateOf(axis).centre[0], 2e-5)
  })

  it('give the speed of the centroid', async () => {
    const wake = await marched({ rings: [ring({ axisRatio: 2 })], duration: 0.4, outputStep: 0.2, tolerance: 1e-10 })
    const slope = (stateOf(wake, 0, 2).centre[0] - stateOf(wake, 0, 0).centre[0]) / 0.4
    // Central difference over 0.4 of a motion that swings in about 6.
    expectClose(stateOf(wake, 0, 1).speed, slope, 5e-3)
  })
})

describe('an elliptic ring', () => {
  it('changes its axes over and back, its impulse kept', async () => {
    const wake = await marched({ rings: [ring({ axisRatio: 2, coreRadius: 0.1 })], duration: 16, outputStep: 0.25 })
    const extent = (output: number, axis: number): number => {
      const nodes = nodesOf(wake, 1, output)
      let largest = 0
      for (let i = axis; i < nodes.length; i += 3) largest = Math.max(largest, Math.abs(nodes[i] ?? NaN))
      return largest
    }
    const ratios = wake.frames.map((_, k) => extent(k, 1) / extent(k, 2))
    expectClose(ratios[0] ?? NaN, 2, 1e-3)
    expect(Math.min(...ratios)).toBeLessThan(0.7)
    const turn = ratios.indexOf(Math.min(...ratios))
    expect(Math.max(...ratios.slice(turn))).toBeGreaterThan(1.4)
    expect(wake.drift.impulse ?? NaN).toBeLessThan(1e-4)
    expectClose(stateOf(wake).radius, 1, 1e-4)
    expect(wake.validUntil).toBe(16)
  })

  // Check P4: Dhanak & de Bernardinis 1981, J. Fluid Mech. 109:189.
  it.each([5, 0.2])(
    'of axis ratio %d is told to split, and the run ends where its sides come nearest',
    async (axisRatio) => {
      const wake = await marched({ rings: [ring({ axisRatio, coreRadius: 0.06 })], duration: 20, tolerance: 1e-6 })
      expect(wake.notes.join(' ')).toMatch(/Ring 1 has an axis ratio of 0.2 or less: such a ring splits in two/)
      expect(wake.status).toBe('done')
      expect(wake.message).toMatch(/the sides of ring 1 come nearest, where a ring so slender splits in two\.$/)
      expect(wake.time).toBeLessThan(12)
      expect(wake.validUntil).toBe(wake.time)
      expect(wake.reason).toContain('splits in two')
    },
  )

  it('of axis ratio 5 and a thick core kinks first, and is told to split all the same', async () => {
    const wake = await marched({ rings: [ring({ axisRatio: 5, coreRadius: 0.12 })], duration: 20, tolerance: 1e-6 })
    expect(wake.time).toBeLessThan(12)
    expect(wake.message).toMatch(/a ring so slender splits in two/)
    expect(wake.reason).toMatch(/bends within its own core radius.*splits in two/)
  })

  it('of axis ratio 3 is not', async () => {
    const wake = await marched({ rings: [ring({ axisRatio: 3, coreRadius: 0.1 })], duration: 1 })
    expect(wake.notes).toEqual([])
    expect(wake.time).toBe(1)
  })

  it('bent within its own core is told not to hold', async () => {
    const wake = await marched({ rings: [ring({ axisRatio: 4, coreRadius: 0.2 })], duration: 0.2 })
    expect(wake.validUntil).toBeLessThan(0.2)
    expect(wake.reason).toBe('ring 1 bends within its own core radius, which a filament cannot describe')
  })
})

describe('cores that touch', () => {
  it('end the run of two rings side by side, naming them and the time', async () => {
    const rings = [ring({ centre: [0, -1.5, 0] }), ring({ centre: [0, 1.5, 0] })]
    const wake = await marched({ rings, duration: 30 })
    const touch = wake.events.find(({ event }) => event === 'cores-touch')
    expect(touch?.rings).toEqual([1, 2])
    expect(wake.time).toBe(touch?.time)
    expect(wake.message).toMatch(/^Ended at t = .* s: the cores of rings 1 and 2 touch\.$/)
    expect(wake.reason).toContain('reconnection is not modelled')
    // Equal x at all times: no pass, whatever rounding says.
    expect(wake.events.some(({ event }) => event === 'pass')).toBe(false)
    let least = Infinity
    const first = nodesOf(wake, 1)
    const second = nodesOf(wake, 2)
    for (let i = 0; i < first.length; i += 3)
      for (let j = 0; j < second.length; j += 3)
        least = Math.min(
          least,
          Math.hypot(...[0, 1, 2].map((axis) => (first[i + axis] ?? NaN) - (second[j + axis] ?? NaN))),
        )
    // Nodes may miss the nearest place by half a segment.
    expectClose(least, stateOf(wake, 0).coreRadius + stateOf(wake, 1).coreRadius, 0.02)
  })

  it('are told at once when they do from the start', async () => {
    const wake = await marched({ rings: [ring(), ring({ centre: [0.3, 0.1, 0] })] })
    expect(wake.time).toBe(0)
    expect(wake.events.map(({ event }) => event)).toEqual(['cores-touch', 'end'])
  })

  it('with a wall end the run after the ring is told near', async () => {
    const wake = await marched({
      rings: [ring({ direction: [1, 0.4, 0] })],
      wall: { point: [1.8, 0, 0], normal: [-2, 0, 0] },
      duration: 40,
      tolerance: 1e-6,
    })
    expect(wake.events.map(({ event }) => event)).toEqual(['near-wall', 'cores-touch', 'end'])
    expect(wake.drift.energy).toBeNull()
  })
})

describe('the mesh', () => {
  const headOn = [ring({ circulation: 1 }), ring({ circulation: -1, centre: [1.2, 0.05, 0] })]

  it('grows with a ring that stretches, its core volume kept', async () => {
    const wake = await marched({ rings: headOn, duration: 6 })
    const start = stateOf(wake, 0, 0)
    const end = stateOf(wake, 0)
    expect(end.length).toBeGreaterThan(1.25 * start.length)
    expect(nodesOf(wake).length).toBeGreaterThan(nodesOf(wake, 1, 0).length)
    expectClose(end.coreRadius ** 2 * end.length, start.coreRadius ** 2 * start.length, 1e-7)
  })

  it('says from when on a limit of nodes keeps the segments longer than the smoothing', async () => {
    const wake = await marched({ rings: headOn, duration: 1 }, 96)
    expect(wake.validUntil).toBe(0)
    expect(wake.reason).toMatch(
      /the smoothing length of ring 1 is shorter than a segment: it needs \d+ segments and has 48/,
    )
    expect(nodesOf(wake).length).toBe(3 * 48)
  })
})

describe('cancelling a march of rings in space', () => {
  it('takes effect within 0.2 s, in the middle of a step', async () => {
    const signal = { aborted: false }
    let asked = NaN
    const rings = Array.from({ length: 6 }, (_, k) => ring({ coreRadius: 0.05, centre: [2 * k, 0.1 * k, 0] }))
    setTimeout(() => {
      signal.aborted = true
      asked = performance.now()
    }, 100)
    const wake = await marchWake(scene({ rings, duration: 1e3, outputStep: 1 }), {
      kernel: typescriptKernel,
      signal,
      pause: () => new Promise((resolve) => setImmediate(resolve)),
    })
    expect(wake.status).toBe('cancelled')
    expect(performance.now() - asked).toBeLessThan(200)
    expect(wake.events.at(-1)?.event).toBe('end')
    expect(wake.trajectories[0]?.time.length).toBeGreaterThan(0)
  })
})
