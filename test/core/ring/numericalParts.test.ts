import ellipe from '@stdlib/math-base-special-ellipe'
import ellipk from '@stdlib/math-base-special-ellipk'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { at, gaussLegendre, integrate } from '../../../core/base'
import { chebyshevSlope, chebyshevSum } from '../../../core/ring/chebyshev'
import { contourMoments, contourThrough } from '../../../core/ring/coreContour'
import { coreFlow } from '../../../core/ring/coreFlow'
import { filamentFlow } from '../../../core/ring/filamentFlow'
import { solveLinear } from '../../../core/ring/linearSolver'
import { emptyKernels, evaluateKernels } from '../../../core/ring/ringKernels'
import { expectClose, expectNear } from '../../support/close'

const RULE = gaussLegendre(40)
const ROUND = 200

describe('numerical parts of the ring room', () => {
  it('solves a linear system that needs its rows exchanged', () => {
    const x = solveLinear(Float64Array.of(0, 2, 1, 1, 1, 1, 4, -1, 0), Float64Array.of(7, 6, 2))
    expect(x).not.toBeNull()
    ;[1, 2, 3].forEach((value, i) => expectClose(x?.[i] ?? Number.NaN, value, 1e-14))
  })

  it('says so where a linear system has no solution', () => {
    expect(solveLinear(Float64Array.of(1, 2, 2, 4), Float64Array.of(1, 1))).toBeNull()
  })

  it('sums Chebyshev series and their slopes', () => {
    // T_3 = 4 s^3 - 3 s, T_1 = s
    const series = Float64Array.of(0.5, 2, 0, -1)
    fc.assert(
      fc.property(fc.double({ min: -1, max: 1, noNaN: true }), (s) => {
        expectNear(chebyshevSum(series, s), 0.5 + 5 * s - 4 * s ** 3, 1e-14)
        expectNear(chebyshevSlope(series, s), 5 - 12 * s * s, 1e-13)
      }),
    )
  })

  it('has azimuthal integrals equal to those of a general-purpose library and of plain quadrature', () => {
    const kernels = emptyKernels()
    const cases = [
      [0.3, 1.2, 0.7],
      [0.01, 0.8, 0.81],
      [1.5, 0.02, 1.9],
      [0.2, 3, 0.05],
    ] as const
    for (const [dx, r, q] of cases) {
      evaluateKernels(kernels, dx, r - q, r, q)
      const far2 = dx * dx + (r + q) ** 2
      const m = (4 * r * q) / far2
      expectClose(kernels.j0, (4 * ellipk(m)) / Math.sqrt(far2), 1e-13)
      // The library form loses eps/m^2 by cancellation; m is 1e-2 at least here.
      const j1 = (4 / Math.sqrt(far2)) * ((2 / m - 1) * ellipk(m) - (2 / m) * ellipe(m))
      expectClose(kernels.j1, j1, 1e-11)
      const distance = (phi: number): number => Math.sqrt(dx * dx + (r - q) ** 2 + 4 * r * q * Math.sin(phi / 2) ** 2)
      const round = (f: (phi: number) => number): number => 2 * integrate(f, 0, Math.PI, 1e-12)
      expectClose(
        kernels.j2,
        round((phi) => Math.cos(phi) ** 2 / distance(phi)),
        1e-11,
      )
      expectClose(
        kernels.j3,
        round((phi) => Math.cos(phi) * distance(phi)),
        1e-11,
      )
    }
  })

  // R7. Lamb, Hydrodynamics, art. 161; 12 digits given.
  it('has the velocity of a vortex line', () => {
    const flow = { psi: 0, ux: 0, ur: 0 }
    filamentFlow(0.5, 0.5, flow)
    expectNear(flow.ur, 0.128668084873, 1e-10)
    expectNear(flow.ux, 0.345831670043, 1e-10)
    filamentFlow(0.5, 2, flow)
    expectNear(flow.ur, 0.0303318686696, 1e-10)
    expectNear(flow.ux, -0.0265187584447, 1e-10)
    filamentFlow(0.7, 0, flow)
    expectClose(flow.ux, 0.5 / (1 + 0.49) ** 1.5, 1e-14)
  })

  it('has contour moments of a circle', () => {
    const nodes = Array.from({ length: 9 }, (_, i) => (Math.PI * i) / 8)
    const circle = contourThrough(
      nodes.map((t) => 0.3 * Math.sin(t)),
      nodes.map((t) => 1 + 0.3 * Math.cos(t)),
    )
    const moments = contourMoments(circle)
    const area = Math.PI * 0.09
    expectClose(moments.area, area, 1e-14)
    expectClose(moments.first, area, 1e-14)
    // int r^3 over a disc of radius e about 1: area (1 + 3 e^2 / 4)
    expectClose(moments.third, area * (1 + 0.75 * 0.09), 1e-14)
  })

  it('has the flow of a core by contour equal to the sum over its rings', () => {
    const nodes = Array.from({ length: 17 }, (_, i) => (Math.PI * i) / 16)
    const flow = coreFlow(
      contourThrough(
        nodes.map((t) => 0.3 * Math.sin(t)),
        nodes.map((t) => 1 + 0.3 * Math.cos(t)),
      ),
    )
    const got = { psi: 0, ux: 0, ur: 0 }
    const ring = { psi: 0, ux: 0, ur: 0 }
    for (const [x, r] of [
      [0.5, 0.6],
      [0, 1.5],
      [0.4, 1.3],
    ] as const) {
      flow(x, r, got)
      // A ring of radius q is a unit line scaled: psi with q, velocity with 1/q; its strength is the vorticity q.
      const sum = (pick: (q: number) => number): number => {
        let total = 0
        RULE.nodes.forEach((node, i) => {
          const s = 0.15 * (1 + node)
          for (let j = 0; j < ROUND; j++) {
            const t = (2 * Math.PI * j) / ROUND
            const q = 1 + s * Math.cos(t)
            filamentFlow((x - s * Math.sin(t)) / q, r / q, ring)
            total += ((0.15 * at(RULE.weights, i) * 2 * Math.PI) / ROUND) * s * q * pick(q)
          }
        })
        return total
      }
      // Points are 0.12 and more from the core: 40 x 200 points sum it to rounding.
      expectClose(
        got.psi,
        sum((q) => ring.psi * q),
        1e-9,
      )
      expectClose(
        got.ux,
        sum((q) => ring.ux / q),
        1e-9,
      )
      expectNear(
        got.ur,
        sum((q) => ring.ur / q),
        1e-10,
      )
    }
  })
})
