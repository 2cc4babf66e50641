import { describe, expect, it } from 'vitest'
import { loadKernel, type CoaxialInput } from '../../../core/kernel'
import { at } from '../../../core/base'
import { lagrange, gridPoint } from '../../../core/kernel/coaxialProxies'
import { expectNear } from '../../support/close'
import { filled, randomRings, uniform, velocities } from './rings'
import { relativeError, rolledSheet } from './scene'

const kernel = await loadKernel()

function room(input: CoaxialInput): { axial: Float64Array; radial: Float64Array } {
  return { axial: new Float64Array(input.targetCount), radial: new Float64Array(input.targetCount) }
}

function joined(u: { axial: Float64Array; radial: Float64Array }): Float64Array {
  return Float64Array.from([...u.axial, ...u.radial])
}

describe('coaxial tree', () => {
  it.each([1e-3, 1e-4, 1e-5, 1e-6, 3e-8, 1e-9])('keeps to a tolerance of %d and sees its own error', (tolerance) => {
    for (const varied of [false, true]) {
      const input = rolledSheet(2500, varied)
      const out = room(input)
      const { method, error } = kernel.coaxialVelocityWithin(input, tolerance, out)
      expect(method).toBe('tree')
      const actual = relativeError(joined(out), joined(velocities(kernel, input)))
      expect(error).toBeLessThanOrEqual(tolerance)
      // 200 targets estimate the root mean square of all; the error sits in patches, hence a factor of three.
      expect(actual).toBeLessThan(3 * tolerance)
      expect(actual / (error ?? NaN)).toBeGreaterThan(1 / 3)
    }
  })

  it('handles rings all over the half plane, targets on the axis, odd numbers, and repeats itself to the bit', () => {
    const rings = randomRings(1501, 6)
    const random = uniform(4)
    const targetCount = 1403
    const targetX = filled(targetCount, () => 3 * random() - 0.5)
    const targetR = filled(targetCount, (i) => (i % 10 === 0 ? 0 : 2 * random()))
    const input = { targetCount, targetX, targetR, targetDeltaSquared: null, rings, skipSelf: false }
    const [out, again] = [room(input), room(input)]
    expect(kernel.coaxialVelocityWithin(input, 1e-6, out).method).toBe('tree')
    expect(relativeError(joined(out), joined(velocities(kernel, input)))).toBeLessThan(3e-6)
    kernel.coaxialVelocityWithin(input, 1e-6, again)
    expect(again).toEqual(out)
  })

  it('falls back on the plain sum for few rings, a finer tolerance, skipSelf and NaN', () => {
    const input = rolledSheet(1500, false)
    const out = room(input)
    expect(kernel.coaxialVelocityWithin(rolledSheet(300, false), 1e-4, out).method).toBe('plain')
    expect(kernel.coaxialVelocityWithin({ ...input, skipSelf: true }, 1e-4, out).method).toBe('plain')
    expect(kernel.coaxialVelocityWithin(input, 1e-13, out)).toEqual({ method: 'plain', error: 0 })
    expect(out).toEqual(velocities(kernel, input))
    const circulation = input.rings.circulation.slice()
    circulation[700] = NaN
    const broken = { ...input, rings: { ...input.rings, circulation } }
    expect(kernel.coaxialVelocityWithin(broken, 1e-4, out).method).toBe('plain')
    expect(out.axial.every(Number.isNaN)).toBe(true)
  })

  it('spreads NaN as the plain sum does, unchecked as well', () => {
    const input = rolledSheet(1500, true)
    for (const field of ['x', 'r', 'circulation', 'deltaSquared'] as const) {
      const values = input.rings[field].slice()
      values[400] = NaN
      // Targets keep their own arrays: only the source is broken.
      const broken = { ...input, rings: { ...input.rings, [field]: values } }
      const out = room(input)
      expect(kernel.coaxialVelocityWithin(broken, 1e-4, out, false).method).toBe('tree')
      expect(out.axial.every(Number.isNaN), field).toBe(true)
    }
    const targetR = input.targetR.slice()
    targetR[9] = NaN
    const out = room(input)
    kernel.coaxialVelocityWithin({ ...input, targetR }, 1e-4, out, false)
    expect([...out.axial].flatMap((value, i) => (Number.isNaN(value) ? [i] : []))).toEqual([9])
  })
})

describe('lagrange', () => {
  it('reproduces polynomials below its degree, between and at the points', () => {
    const basis = new Float64Array(20)
    for (const count of [1, 2, 5, 9, 16]) {
      const nodes = Array.from({ length: count }, (_, k) => gridPoint(2, 0.3, count, k))
      const power = (x: number): number => ((x - 2) / 0.3) ** (count - 1)
      for (const x of [1.7, 1.93, 2.2999, ...nodes]) {
        lagrange(basis, 3, 2, 0.3, count, x)
        const value = nodes.reduce((sum, node, k) => sum + power(node) * at(basis, 3 + k), 0)
        // Barycentric interpolation at Chebyshev points is stable: a few epsilon, and rounding of (x - 2) / 0.3.
        expectNear(value, power(x), 1e-13, `${count} points at ${x}`)
      }
    }
  })
})
