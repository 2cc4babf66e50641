import { afterEach, describe, expect, it } from 'vitest'
import { loadKernel, splitPlan, startKernelPool, type ThreadedKernel } from '../../../core/kernel'
import { kernelThreads } from '../../bench/kernelThreads'
import { filled, mutual, randomRings, streams, uniform, velocities } from './rings'

const kernel = await loadKernel()
const spawn = await kernelThreads()
let pool: ThreadedKernel | null = null

afterEach(() => pool?.close())

async function started(threads: number): Promise<ThreadedKernel> {
  pool = await startKernelPool(kernel, threads, spawn)
  if (pool === null) throw new Error('no pool')
  return pool
}

describe('splitPlan', () => {
  it('covers every target once, in even chunks of fours', () => {
    for (const targets of [400, 401, 999, 4000, 4003]) {
      for (const threads of [2, 3, 8]) {
        const { chunks, size } = splitPlan('segmentVelocity', targets, 4000, threads)
        expect(size % 4).toBe(0)
        expect((chunks - 1) * size).toBeLessThan(targets)
        expect(chunks * size).toBeGreaterThanOrEqual(targets)
        expect(chunks).toBeGreaterThanOrEqual(threads)
      }
    }
  })

  it('keeps small sums and lone threads whole', () => {
    expect(splitPlan('coaxialVelocity', 100, 100, 4)).toEqual({ chunks: 1, size: 100 })
    expect(splitPlan('segmentVelocity', 300, 300, 4)).toEqual({ chunks: 1, size: 300 })
    expect(splitPlan('coaxialVelocity', 5000, 5000, 1)).toEqual({ chunks: 1, size: 5000 })
    expect(splitPlan('coaxialVelocity', 150, 150, 2).chunks).toBeGreaterThan(1)
    expect(splitPlan('segmentVelocity', 400, 400, 2).chunks).toBeGreaterThan(1)
  })
})

describe('kernel pool', () => {
  it.each([2, 3])('gives the bits of one thread with %i threads, job after job', async (threads) => {
    const threaded = await started(threads)
    // Past the first buffer of 1024 and back; every kind of job, so that descriptions cannot be mixed up.
    for (const count of [200, 1500, 333, 2100, 150]) {
      const rings = randomRings(count, count)
      for (const skipSelf of [false, true]) {
        const input = mutual(rings, skipSelf, skipSelf)
        expect(velocities(threaded, input)).toEqual(velocities(kernel, input))
        expect(streams(threaded, input)).toEqual(streams(kernel, input))
      }
      const random = uniform(count)
      const segments = filled(8 * count, (i) => (i % 8 === 6 ? 1e-3 : random() - 0.5))
      const targets = filled(3 * count, random)
      const [a, b] = [new Float64Array(3 * count), new Float64Array(3 * count)]
      for (const precision of ['double', 'mixed'] as const) {
        const input = { targetCount: count, firstTarget: 5, targets, segmentCount: count, segments, precision }
        threaded.segmentVelocity({ ...input, targetDeltaSquared: rings.deltaSquared }, a)
        kernel.segmentVelocity({ ...input, targetDeltaSquared: rings.deltaSquared }, b)
        expect(a).toEqual(b)
      }
    }
  })

  it('goes on alone after close', async () => {
    const threaded = await started(2)
    const input = mutual(randomRings(300, 1), false)
    threaded.close()
    expect(velocities(threaded, input)).toEqual(velocities(kernel, input))
  })

  it('is refused where a worker cannot start, and with fewer than two threads', async () => {
    const broken = { postMessage: () => {}, onMessage: () => {}, terminate: () => {} }
    const failing = { ...broken, onError: (listener: () => void) => listener() }
    expect(await startKernelPool(kernel, 2, () => failing)).toBeNull()
    expect(
      await startKernelPool(kernel, 2, () => {
        throw new Error('not allowed here')
      }),
    ).toBeNull()
    expect(await startKernelPool(kernel, 1, spawn)).toBeNull()
  })
})
