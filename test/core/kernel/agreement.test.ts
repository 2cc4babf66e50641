import { describe, expect, it } from 'vitest'
import { loadKernel, typescriptKernel, type CoaxialInput } from '../../../core/kernel'
import { filled, mutual, randomRings, streams, uniform, velocities } from './rings'

/**
 * The two implementations are held to 1e-12 relative by the project's rule. They do the same IEEE operations in the same
 * order, so the stronger statement is tested: the same bits, NaN and infinity included.
 */
const wasm = await loadKernel()

function expectSameVelocity(input: CoaxialInput): void {
  expect(velocities(wasm, input)).toEqual(velocities(typescriptKernel, input))
  expect(streams(wasm, input)).toEqual(streams(typescriptKernel, input))
}

describe('WebAssembly against TypeScript', () => {
  it('runs in WebAssembly here', () => {
    expect(wasm.name).toBe('wasm')
  })

  it.each([1, 2, 3, 16, 33, 128])('gives the same bits for %i random rings', (count) => {
    const rings = randomRings(count, count)
    for (const skipSelf of [false, true]) {
      for (const pairMean of [false, true]) expectSameVelocity(mutual(rings, skipSelf, pairMean))
    }
  })

  it('gives the same bits at nasty points', () => {
    const tiny = [0, 5e-324, 1e-300, 1e-160, 1e-20, 1e-12, 1e-7, 1e-3]
    const offsets = [...tiny, ...tiny.map((value) => -value), 1, 1e3, 1e8, 1e150, 1e200, Infinity, NaN]
    const targets = offsets.flatMap((dx) => offsets.map((dr) => [dx, Math.abs(1 + dr)] as const))
    const onAxis = offsets.map((dx) => [dx, 0] as const)
    const all = [...targets, ...onAxis]
    for (const deltaSquared of [0, 5e-324, 1e-30, 1e-24, 1e-6, 0.01, 1e100]) {
      const rings = {
        count: 1,
        x: Float64Array.of(0),
        r: Float64Array.of(1),
        circulation: Float64Array.of(0.7),
        deltaSquared: Float64Array.of(deltaSquared),
      }
      expectSameVelocity({
        targetCount: all.length,
        targetX: filled(all.length, (i) => all[i]?.[0] ?? NaN),
        targetR: filled(all.length, (i) => all[i]?.[1] ?? NaN),
        targetDeltaSquared: null,
        rings,
        skipSelf: false,
      })
    }
  })

  it('gives the same bits for segments, in any number, again and again in one memory', () => {
    const random = uniform(9)
    for (const [targetCount, segmentCount] of [
      [1, 1],
      [2, 7],
      [3, 0],
      [101, 57],
      [4001, 3],
      [5, 9001],
      [6, 10],
    ] as const) {
      const targets = filled(3 * targetCount, random)
      const segments = filled(8 * segmentCount, (i) => (i % 8 === 6 ? 1e-4 * random() : random() - 0.5))
      for (const targetDeltaSquared of [null, filled(targetCount, random)]) {
        const input = { targetCount, targets, targetDeltaSquared, segmentCount, segments }
        const [a, b] = [new Float64Array(3 * targetCount), new Float64Array(3 * targetCount)]
        wasm.segmentVelocity(input, a)
        typescriptKernel.segmentVelocity(input, b)
        expect(a).toEqual(b)
      }
    }
  })

  it('leaves input arrays as they were', () => {
    const rings = randomRings(9, 4)
    const segments = filled(8 * 5, uniform(3))
    const [before, segmentsBefore] = [structuredClone(rings), segments.slice()]
    velocities(wasm, mutual(rings, true))
    const input = { targetCount: 3, targets: rings.x, targetDeltaSquared: rings.r, segmentCount: 5, segments }
    wasm.segmentVelocity({ ...input, precision: 'mixed' }, new Float64Array(9))
    expect(rings).toEqual(before)
    expect(segments).toEqual(segmentsBefore)
  })
})
