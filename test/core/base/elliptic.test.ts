import ellipe from '@stdlib/math-base-special-ellipe'
import ellipk from '@stdlib/math-base-special-ellipk'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { completeElliptic, completeEllipticFromComplement } from '../../../core/base'
import table from '../../published/abramowitz-stegun-1964-table-17-1.json'
import { expectClose } from '../../support/close'

describe('completeElliptic', () => {
  // Tolerance: 15 decimals are printed, half a unit of the last on a value near 1 to 4, plus rounding of a few operations.
  it.each(table.rows)('matches Abramowitz & Stegun table 17.1 at m = $m', ({ m, K, E }) => {
    const got = completeElliptic(m)
    expectClose(got.K, K, 1e-15 + 4 * Number.EPSILON, 'K')
    expectClose(got.E, E, 1e-15 + 4 * Number.EPSILON, 'E')
  })

  // Check R8: Abramowitz & Stegun 1964, table 17.1, as given in the list of checks; 15 digits.
  it('gives K(0.5), E(0.5) and K(0.99) of check R8', () => {
    expectClose(completeElliptic(0.5).K, 1.85407467730137, 5e-15)
    expectClose(completeElliptic(0.5).E, 1.35064388104768, 5e-15)
    expectClose(completeElliptic(0.99).K, 3.69563736298987, 5e-15)
  })

  it('agrees with a second implementation over 0 <= m < 1', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 0.999999, noNaN: true }), (m) => {
        const got = completeElliptic(m)
        // A few epsilon each; the second implementation states up to 25 epsilon in mid range, and both work from
        // 1 - m, whose rounding (epsilon / (1 - m)) moves K by up to epsilon / (2 (1 - m)) / K.
        expectClose(got.K, ellipk(m), (40 + 1 / (1 - m)) * Number.EPSILON, `K(${m})`)
        expectClose(got.E, ellipe(m), 40 * Number.EPSILON, `E(${m})`)
      }),
    )
  })

  it('has the exact ends K(0) = E(0) = pi/2, K(1) infinite, E(1) = 1', () => {
    expectClose(completeElliptic(0).K, Math.PI / 2, 2 * Number.EPSILON)
    expectClose(completeElliptic(0).E, Math.PI / 2, 2 * Number.EPSILON)
    expect(completeElliptic(1)).toEqual({ K: Infinity, E: 1 })
  })

  it('keeps full accuracy for a tiny complement: K -> ln 4 - ln(m1)/2, E -> 1', () => {
    for (const m1 of [1e-20, 1e-30, 1e-100]) {
      const got = completeEllipticFromComplement(m1)
      // Abramowitz & Stegun 17.3.26: the next term is of order m1 ln m1, below epsilon here.
      expectClose(got.K, Math.log(4) - Math.log(m1) / 2, 8 * Number.EPSILON, `K at 1 - ${m1}`)
      expectClose(got.E, 1, 1e-14, `E at 1 - ${m1}`)
    }
  })

  it("keeps Legendre's relation E K' + E' K - K K' = pi/2", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }), (m) => {
        const a = completeEllipticFromComplement(1 - m)
        const b = completeEllipticFromComplement(m)
        // Terms up to about 12 cancel to 1.57; 1 - m is rounded once.
        expectClose(a.E * b.K + b.E * a.K - a.K * b.K, Math.PI / 2, 1e-14)
      }),
    )
  })
})
