import { describe, expect, it, vi } from 'vitest'
import { at } from '../../../core/base'
import { logarithm, NEAR_ONE, partsNearOne, partsNearZero } from '../../../core/kernel/ellipticParts'
import { FIRST_INTERVAL, kernelTables, LARGEST_M1, SMALLEST_M1 } from '../../../core/kernel/tables'
import { expectClose, expectNear } from '../../support/close'
import { preciseParts } from './precise'

const NAMES = ['e', 'f', 'C'] as const
const OCTAVES = 44

/** Points of an octave, y = 1..2, just off its ends: at m1 = 1 the definitions are 0 / 0. */
const PLACES = Array.from({ length: 33 }, (_, i) => 1.001 + (0.998 * i) / 32)

function nearZeroAt(y: number, octaves: number): Float64Array {
  const out = new Float64Array(3)
  const L = 0.5 * ((4 + octaves) * Math.LN2 - logarithm(y))
  partsNearZero()(y * 2 ** -octaves, L, octaves - 1, out)
  return out
}

function nearOneAt(y: number, octaves: number): Float64Array {
  const out = new Float64Array(3)
  partsNearOne()(y * 2 ** -octaves, out)
  return out
}

function expectParts(got: Float64Array, y: number, octaves: number): void {
  // Each function is a sum of a few dozen terms of its own size, or twice that: ten roundings at most, 2.2e-15.
  preciseParts(y, octaves).forEach((expected, k) =>
    expectClose(at(got, k), expected, 2.2e-15, `${NAMES[k]} at ${y} / 2^${octaves}`),
  )
}

/** The polynomial of an interval, summed in the kernels' order. */
function polynomial(table: Float64Array, first: number, step: number, t: number): number {
  const c = (k: number): number => at(table, first + k * step)
  const t2 = t * t
  return (((c(0) * t2 + c(2)) * t2 + c(4)) * t2 + c(6)) * t + (((c(1) * t2 + c(3)) * t2 + c(5)) * t2 + c(7))
}

describe('the parts of the elliptic integrals', () => {
  it('come out of the series about m1 = 1 to ten units of the last digit', () => {
    for (const octaves of [2, 1]) for (const y of PLACES) expectParts(nearOneAt(y, octaves), y, octaves)
    // Above m1 = 1, where the table has one interval.
    for (const y of [1.001, 1.06, 1.125]) expectParts(nearOneAt(y, 0), y, 0)
  })

  it('come out of the series about m1 = 0 to ten units of the last digit, in every octave', () => {
    for (let octaves = 3; octaves <= OCTAVES; octaves++) {
      for (const y of PLACES) expectParts(nearZeroAt(y, octaves), y, octaves)
    }
  })

  it('are the same by either series where these meet', () => {
    expect(NEAR_ONE).toBe(0.25)
    const [below, above] = [nearZeroAt(2, 3), nearOneAt(1, 2)]
    NAMES.forEach((name, k) => expectClose(at(below, k), at(above, k), 3e-15, name))
  })

  it('are pi/2 - 1, 3 pi/16 - 1 and pi/16 at m1 = 1', () => {
    const [e, f, c] = nearOneAt(1, 0)
    expect([e, f, c]).toEqual([Math.PI / 2 - 1, (3 * Math.PI) / 16 - 1, Math.PI / 16])
  })

  it('rest on a logarithm good to a unit of the last digit', () => {
    expect(logarithm(1)).toBe(0)
    for (let i = 1; i <= 1000; i++) {
      const y = 1 + i / 1000
      // The engine's own logarithm is off by one unit more at most.
      expectClose(logarithm(y), Math.log(y), 4.5e-16, `ln ${y}`)
    }
  })
})

describe('the tables of the coaxial kernel', () => {
  it('hold e, f and C at every interval, to what degree 7 can', () => {
    const { velocity, stream } = kernelTables()
    const intervals = 8 * OCTAVES + 1
    expect([velocity.length, stream.length]).toEqual([16 * intervals, 8 * intervals])
    for (let index = 0; index < intervals; index++) {
      const octaves = OCTAVES - Math.floor(index / 8)
      const start = 1 + (index % 8) / 8
      // Nine places for eight coefficients: a wrong one shows. The first and last lie just inside the ends.
      for (let i = 0; i < 9; i++) {
        const y = start + (0.001 + 0.998 * (i / 8)) / 8
        const t = y - (start + 1 / 16)
        const got = [
          polynomial(velocity, 16 * index, 2, t),
          polynomial(velocity, 16 * index + 1, 2, t),
          polynomial(stream, 8 * index, 1, t),
        ]
        // What a polynomial through Chebyshev points leaves, (1/16)^8 / 2^7 times the eighth derivative over 8!: for a
        // multiple of ln y that is the multiple over 8 y^8. The multiples are -1/4, 3/4 and -1/2; five roundings are added.
        const remainder = 16 ** -8 / 128 / (8 * start ** 8)
        preciseParts(y, octaves).forEach((expected, k) => {
          const allowed = [0.25, 0.75, 0.5].map((multiple) => multiple * remainder)
          const what = `${NAMES[k]} at ${y} / 2^${octaves}`
          expectNear(at(got, k), expected, at(allowed, k) + 1.1e-15 * Math.abs(expected), what)
        })
      }
    }
  })

  it('are indexed by the top bits of m1', () => {
    const number = Float64Array.of(SMALLEST_M1, LARGEST_M1)
    const words = new Uint32Array(number.buffer)
    expect(SMALLEST_M1).toBe(2 ** -OCTAVES)
    expect(at(words, 1) >>> 17).toBe(FIRST_INTERVAL)
    expect((at(words, 3) >>> 17) - FIRST_INTERVAL).toBe(8 * OCTAVES)
  })

  it('need no function that engines round each in their own way', async () => {
    const exact = new Set(['sqrt', 'ceil', 'floor', 'abs', 'min', 'max'])
    const inexact = vi.fn((): number => NaN)
    const stub = Object.fromEntries(
      Object.getOwnPropertyNames(Math).map((name) => {
        const value: unknown = Reflect.get(Math, name)
        return [name, typeof value === 'function' && !exact.has(name) ? inexact : value]
      }),
    )
    vi.resetModules()
    const fresh = await import('../../../core/kernel/tables')
    vi.stubGlobal('Math', stub)
    const tables = fresh.kernelTables()
    vi.unstubAllGlobals()
    expect(inexact).not.toHaveBeenCalled()
    expect(tables).toEqual(kernelTables())
    expect(tables).not.toBe(kernelTables())
  })

  it('are computed once', () => {
    expect(kernelTables()).toBe(kernelTables())
  })
})
