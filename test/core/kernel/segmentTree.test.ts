import { describe, expect, it } from 'vitest'
import { loadKernel, type SegmentInput } from '../../../core/kernel'
import { treeMaker } from '../../../core/kernel/pointTree'
import { at } from '../../../core/base'
import { filled, uniform } from './rings'
import { relativeError, ringScene } from './scene'

const kernel = await loadKernel()

function plain(input: SegmentInput): Float64Array {
  const out = new Float64Array(3 * input.targetCount)
  kernel.segmentVelocity(input, out)
  return out
}

describe('segment tree', () => {
  it.each([1e-3, 1e-4, 1e-5, 1e-6, 1e-7])('keeps to a tolerance of %d and sees its own error', (tolerance) => {
    for (const varied of [false, true]) {
      const input = ringScene(20, 128, varied, 17)
      const out = new Float64Array(3 * input.targetCount)
      const { method, error } = kernel.segmentVelocityWithin(input, tolerance, out)
      expect(method).toBe('tree')
      const actual = relativeError(out, plain(input))
      expect(error).toBeLessThanOrEqual(tolerance)
      // 200 targets estimate the root mean square of all; a factor of two covers their spread and a heavy tail.
      expect(actual).toBeLessThan(2 * tolerance)
      expect(actual / (error ?? NaN)).toBeGreaterThan(0.5)
      expect(actual / (error ?? NaN)).toBeLessThan(2)
    }
  })

  it('handles targets that are no nodes, in any number, and repeats itself to the bit', () => {
    const scene = ringScene(16, 128, false, 5)
    const random = uniform(8)
    for (const targetCount of [1201, 1399, 2005]) {
      const input = { ...scene, targetCount, targets: filled(3 * targetCount, () => 9 * random() - 1) }
      const [out, again] = [new Float64Array(3 * targetCount), new Float64Array(3 * targetCount)]
      expect(kernel.segmentVelocityWithin(input, 1e-4, out).method).toBe('tree')
      expect(relativeError(out, plain(input))).toBeLessThan(2e-4)
      kernel.segmentVelocityWithin(input, 1e-4, again, false)
      expect(again).toEqual(out)
    }
  })

  it('falls back on the plain sum for few points, a finer tolerance and NaN', () => {
    const small = ringScene(2, 64, false, 3)
    const large = ringScene(16, 128, false, 3)
    const out = new Float64Array(3 * large.targetCount)
    expect(kernel.segmentVelocityWithin(small, 1e-4, out)).toEqual({ method: 'plain', error: 0 })
    expect(kernel.segmentVelocityWithin(large, 1e-12, out)).toEqual({ method: 'plain', error: 0 })
    expect(out).toEqual(plain(large))
    const segments = large.segments.slice()
    segments[8 * 77 + 1] = NaN
    expect(kernel.segmentVelocityWithin({ ...large, segments }, 1e-4, out).method).toBe('plain')
    expect(out.every(Number.isNaN)).toBe(true)
  })

  it('spreads NaN as the plain sum does, unchecked as well', () => {
    const scene = ringScene(16, 128, false, 3)
    for (const place of [0, 4, 6]) {
      const segments = scene.segments.slice()
      segments[8 * 901 + place] = NaN
      const out = new Float64Array(3 * scene.targetCount)
      expect(kernel.segmentVelocityWithin({ ...scene, segments }, 1e-4, out, false).method).toBe('tree')
      const expected = plain({ ...scene, segments })
      expect([...out].map(Number.isNaN), `place ${place}`).toEqual([...expected].map(Number.isNaN))
      expect(expected.filter(Number.isNaN).length).toBeGreaterThan(scene.targetCount)
    }
    const targets = scene.targets.slice()
    targets[3 * 500 + 2] = NaN
    const out = new Float64Array(3 * scene.targetCount)
    kernel.segmentVelocityWithin({ ...scene, targets }, 1e-4, out, false)
    const broken = [...out].flatMap((value, i) => (Number.isNaN(value) ? [i] : []))
    expect(broken).toEqual([1500, 1501, 1502])
  })

  it('takes coincident points', () => {
    const scene = ringScene(16, 128, false, 3)
    const input = { ...scene, targets: filled(3 * scene.targetCount, () => 0.25) }
    const out = new Float64Array(3 * scene.targetCount)
    kernel.segmentVelocityWithin(input, 1e-4, out)
    expect(relativeError(out, plain(input))).toBeLessThan(2e-4)
  })
})

describe('point tree', () => {
  it('puts every point into one leaf, inside the radius of all its cells', () => {
    const random = uniform(2)
    const make = treeMaker(6)
    for (const count of [1, 8, 9, 500, 333]) {
      const points = filled(3 * count, random)
      const deltaSquared = filled(count, (i) => (i % 2 === 0 ? 0.01 : 0.5))
      const set = { count, points, stride: 3, deltaSquared, smoothingStride: 1, smoothingOffset: 0 }
      const tree = make(set, 16)
      expect([...tree.order.subarray(0, count)].sort((a, b) => a - b)).toEqual([...points.keys()].slice(0, count))
      let leaves = 0
      for (let cell = 0; cell < tree.cellCount; cell++) {
        const part = at(tree.parts, cell)
        if (part === 0) leaves += at(tree.size, cell)
        else expect(at(tree.size, part) + at(tree.size, part + 1)).toBe(at(tree.size, cell))
        if (part === 0) expect(at(tree.size, cell)).toBeLessThanOrEqual(16)
        for (let place = at(tree.first, cell); place < at(tree.first, cell) + at(tree.size, cell); place++) {
          const point = at(tree.order, place)
          const offsets = [0, 1, 2].map((axis) => at(points, 3 * point + axis) - at(tree.middle, 4 * cell + axis))
          expect(Math.hypot(...offsets)).toBeLessThanOrEqual(at(tree.radius, cell) * (1 + 1e-14))
          const offset = Math.abs(at(deltaSquared, point) - at(tree.middle, 4 * cell + 3))
          expect(offset).toBeLessThanOrEqual(at(tree.smoothingSpread, cell) * (1 + 1e-14))
        }
      }
      expect(leaves).toBe(count)
    }
  })
})
