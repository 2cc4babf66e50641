import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { marchMergingRings, type CoaxialWake, type CoaxialWakeInput } from '../../../core/coaxial'
import { mergeRings } from '../../../core/coaxial/mergeRings'
import { smoothedEnergy, type StandingRing } from '../../../core/coaxial/smoothedRing'
import { typescriptKernel as kernel } from '../../../core/kernel'
import { expectClose } from '../../support/close'
import { marched, ring, scene } from './scenes'

const standing = (parts: Partial<StandingRing> = {}): StandingRing => ring(parts)

async function merging(parts: Partial<CoaxialWakeInput>): Promise<CoaxialWake> {
  return await marchMergingRings(scene({ law: 'regularised', ...parts }), { kernel })
}

/** Two like rings, the one behind the stronger: it catches the one ahead within a second or two. */
const CATCHING = {
  rings: [
    ring({ x: 0.9, circulation: 1, coreRadius: 0.3 }),
    ring({ x: 0, circulation: 3, coreRadius: 0.3 }),
    ring({ x: 6, circulation: 1, coreRadius: 0.1 }),
  ],
  duration: 4,
  outputStep: 0.25,
}

/** Sum of Gamma, of Gamma R^2, and its centroid, over the rings there at an output time. */
function sumsAt({ trajectories }: CoaxialWake, time: number): readonly [number, number] {
  let [circulation, square] = [0, 0]
  for (const path of trajectories) {
    const k = path.time.indexOf(time)
    if (k < 0) continue
    circulation += at(path.circulation, k)
    square += at(path.circulation, k) * at(path.radius, k) ** 2
  }
  return [circulation, square]
}

describe('two rings made one', () => {
  const a = standing({ circulation: 2, radius: 1.2, coreRadius: 0.3, x: 0.4 })
  const b = standing({ circulation: 0.7, radius: 0.8, coreRadius: 0.2, x: 0.1 })

  it('keep circulation, impulse and its centroid', () => {
    const { ring: one } = mergeRings(a, b, kernel)
    const square = (each: StandingRing): number => each.circulation * each.radius ** 2
    // Rounding.
    expectClose(one.circulation, 2.7, 1e-15)
    expectClose(square(one), square(a) + square(b), 1e-15)
    expectClose(square(one) * one.x, square(a) * a.x + square(b) * b.x, 1e-15)
  })

  it('have a core of both volumes where that has no more energy than they had', () => {
    // Far apart on the axis their energy is the sum of their own, far below that of one compact ring: the core is widened instead.
    const near = mergeRings(a, { ...a, x: a.x + 1e-6 }, kernel)
    // On one place with one core: twice the volume, and less energy than two filaments of half its cross-section on one another.
    expectClose(near.ring.coreRadius, a.coreRadius * Math.SQRT2, 1e-9)
    expect(near.energyChange).toBeLessThan(0)
  })

  it('never gain energy', () => {
    for (const apart of [0.1, 0.5, 2, 10]) {
      const { ring: one, energyChange } = mergeRings(a, { ...b, x: apart }, kernel)
      // Tolerance of the root in the core radius.
      expect(energyChange).toBeLessThan(1e-9)
      expectClose(
        smoothedEnergy([one], kernel),
        smoothedEnergy([a, { ...b, x: apart }], kernel) * (1 + energyChange),
        1e-12,
      )
    }
  })
})

describe('a march that merges', () => {
  it('is the plain march, bit for bit, where no cores touch', async () => {
    const parts = { law: 'regularised', rings: [ring(), ring({ x: 5 })] } as const
    expect(await merging(parts)).toEqual(await marched(parts))
  })

  it('goes on with the stronger of two rings and ends the path of the other', async () => {
    const wake = await merging(CATCHING)
    const merger = wake.events.find(({ event }) => event === 'merge')
    expect(merger).toMatchObject({ rings: [1, 2], detail: expect.stringMatching(/^ring 1 goes on in ring 2; /) })
    expect(wake.events.map(({ event }) => event)).not.toContain('cores-touch')
    expect(wake.events.filter(({ event }) => event === 'end')).toHaveLength(1)
    expect(wake.time).toBe(4)
    const time = merger?.time ?? NaN
    const [first, second, third] = wake.trajectories
    expect(Math.max(...(first?.time ?? []))).toBeLessThan(time)
    expect(second?.time.at(-1)).toBe(4)
    expect(third?.time.length).toBe(wake.outputTimes.length)
    // Every output step once, as without a merger.
    expect([...wake.outputTimes]).toEqual(Array.from({ length: 17 }, (_, k) => k / 4))
  })

  it('keeps circulation and impulse over the merger and tells the drift of energy between mergers', async () => {
    const wake = await merging(CATCHING)
    const [circulation, square] = sumsAt(wake, 0)
    for (const time of wake.outputTimes) {
      const now = sumsAt(wake, time)
      expectClose(now[0], circulation, 1e-14, `circulation at ${time}`)
      // The march's own tolerance is 1e-8 a step.
      expectClose(now[1], square, 1e-6, `impulse at ${time}`)
    }
    expect(wake.drift.impulse).toBeLessThan(1e-6)
    expect(wake.drift.energy).not.toBeNull()
    expect(wake.counters.steps).toBeGreaterThan(0)
  })

  it('holds only until the first merger and says why', async () => {
    const wake = await merging(CATCHING)
    expect(wake.validUntil).toBe(wake.events.find(({ event }) => event === 'merge')?.time)
    expect(wake.reason).toMatch(/^rings 1 and 2 merge: /)
  })

  it('merges rings that touch when one appears, off the output times', async () => {
    const rings = [
      ring({ x: 0 }),
      ring({ x: 3.05, startTime: 0.33 }),
      ring({ x: 3, startTime: 0.33, circulation: 0.5 }),
    ]
    const wake = await merging({ rings, duration: 1 })
    expect(wake.events[0]).toMatchObject({ time: 0.33, event: 'merge', rings: [2, 3] })
    expect(wake.trajectories[2]?.time).toHaveLength(0)
    expectClose(wake.trajectories[1]?.circulation.at(-1) ?? NaN, 1.5, 1e-14)
  })

  it('still ends where cores of opposite senses touch', async () => {
    const rings = [ring({ coreRadius: 0.2 }), ring({ x: 1, circulation: -1, coreRadius: 0.2 })]
    const wake = await merging({ rings, duration: 50, outputStep: 1 })
    expect(wake.events.map(({ event }) => event)).toEqual(['cores-touch', 'end'])
    expect(wake.time).toBeLessThan(50)
  })

  it('tells a near wall once, however many mergers follow', async () => {
    const wake = await merging({ ...CATCHING, tubeRadius: 1.9 })
    const near = wake.events.filter(({ event }) => event === 'near-wall').map(({ rings }) => rings[0])
    expect(wake.events.some(({ event }) => event === 'merge')).toBe(true)
    expect(near.length).toBeGreaterThan(0)
    expect(new Set(near).size).toBe(near.length)
  })

  it('reports progress that never falls, and keeps what it has when it is cancelled after a merger', async () => {
    const shares: number[] = []
    await marchMergingRings(scene({ ...CATCHING, law: 'regularised' }), {
      kernel,
      onProgress: ({ share }) => shares.push(share),
    })
    expect(shares).toEqual(shares.toSorted((x, y) => x - y))
    expect(shares.at(-1)).toBe(1)
    const signal = { aborted: false }
    const cancelled = await marchMergingRings(scene({ ...CATCHING, law: 'regularised' }), {
      kernel,
      signal,
      onProgress: ({ share }) => {
        if (share > 0.9) signal.aborted = true
      },
    })
    expect(cancelled.status).toBe('cancelled')
    expect(cancelled.events.map(({ event }) => event)).toContain('merge')
  })
})
