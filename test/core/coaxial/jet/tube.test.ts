import { describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { FactoredMatrix } from '../../../../core/coaxial/jet/factoredMatrix'
import { LIP_AVERAGE, sheddingRate } from '../../../../core/coaxial/jet/shedding'
import { TUBE_RADIUS, TubeWall } from '../../../../core/coaxial/jet/tubeWall'
import { loadKernel } from '../../../../core/kernel'
import { expectClose, expectNear } from '../../../support/close'

describe('the tube before anything is shed', () => {
  // J9: H. Levine & J. Schwinger 1948, Phys. Rev. 73:383: end correction of an unflanged pipe, 0.613 radius.
  it.each([0.05, 0.08, 0.1, 0.12])('delta = %d D: carries 0.613 U R beyond the uniform flow (J9)', (delta) => {
    const { wall, strengths } = atRest(delta)
    expectNear(wall.excess(1, strengths) / TUBE_RADIUS, 0.613, 0.01)
  })

  it('comes closer to it with finer panels', () => {
    const coarse = atRest(0.1, 1)
    const fine = atRest(0.1, 0.25)
    const error = ({ wall, strengths }: ReturnType<typeof atRest>) =>
      Math.abs(wall.excess(1, strengths) / TUBE_RADIUS - 0.613)
    expect(error(fine)).toBeLessThan(0.2 * error(coarse))
  })

  it('moves the water inside at the piston speed and is a source from afar', async () => {
    const kernel = await loadKernel()
    const { wall, strengths } = atRest(0.1)
    const count = wall.ringX.length
    const circulation = new Float64Array(count)
    wall.spread(1, strengths, circulation, 0)
    const x = [-3, -2, -1.5, 4, 8]
    const axial = new Float64Array(x.length)
    kernel.coaxialVelocity(
      {
        targetCount: x.length,
        targetX: Float64Array.from(x),
        targetR: new Float64Array(x.length),
        targetDeltaSquared: null,
        rings: {
          count,
          x: wall.ringX,
          r: new Float64Array(count).fill(TUBE_RADIUS),
          circulation,
          deltaSquared: new Float64Array(count),
        },
        skipSelf: false,
      },
      { axial, radial: new Float64Array(x.length) },
    )
    // The stream function is fixed at the panels' middles, not between: 0.3 % is what panels half a radius long leave.
    for (const k of [0, 1, 2]) expectClose(at(axial, k), 1, 0.003, `inside at x = ${at(x, k)}`)
    // Flux pi R^2 U into all directions; the next term of the field is of order R / x = 6 % at x = 8 D.
    const source = (distance: number): number => TUBE_RADIUS ** 2 / (4 * distance ** 2)
    expectClose(at(axial, 4), source(8), 0.07)
    expect(Math.abs(at(axial, 4) / source(8) - 1)).toBeLessThan(Math.abs(at(axial, 3) / source(4) - 1))
  })

  it('is singular at the lip as the flow round an edge is: 1 / sqrt of the distance', () => {
    const { wall, strengths } = atRest(0.02, 0.5)
    // Third to ninth panel: the first two feel the end of the constant panels.
    const product = (k: number): number => at(strengths, k) * Math.sqrt(-at(wall.middles, k))
    expectClose(product(8), product(3), 0.05)
  })
})

describe('shedding at the lip', () => {
  it('is half the difference of the squares of the speeds inside and outside', () => {
    expect(sheddingRate(1, 0.5)).toBe(0.5)
    expectClose(sheddingRate(0.6, 0.7), (1 * 1 - 0.4 * 0.4) / 2, 1e-14)
  })

  it('brings nothing back from a stream that flows towards the tube', () => {
    expect(sheddingRate(1, -0.6)).toBe(0)
    expect(sheddingRate(1, 0.1)).toBeCloseTo(0.18, 12)
  })

  it('sheds the other sign when the flow outside is the faster: the stopping vortex', () => {
    expectClose(sheddingRate(-0.4, 0.1), -(0.3 ** 2) / 2, 1e-12)
  })

  it('averages over one delta of wall, the one constant that was chosen', () => {
    expect(LIP_AVERAGE).toBe(1)
    const { wall, strengths } = atRest(0.1)
    let sum = 0
    let reach = 0
    for (let k = 0; reach < 1e9 && k < wall.panelCount; k++) {
      const half = -at(wall.middles, k) - reach
      sum += at(strengths, k) * 2 * half
      reach += 2 * half
    }
    // Over the whole wall the mean is the sum of the panels over their length.
    expectClose(wall.meanStrength(reach, strengths), sum / reach, 1e-12)
    expect(wall.meanStrength(0.1, strengths)).toBeGreaterThan(wall.meanStrength(0.2, strengths))
  })
})

describe('a factored matrix', () => {
  it('solves a system that needs its rows exchanged', () => {
    const matrix = new FactoredMatrix(Float64Array.from([0, 2, 1, 1, 1, 1, 4, -3, 2]))
    const x = new Float64Array(3)
    // Made from x = (1, -2, 3).
    matrix.solve(Float64Array.from([-1, 2, 16]), x)
    ;[1, -2, 3].forEach((value, i) => expectClose(at(x, i), value, 1e-14))
  })

  it('tells a singular one', () => {
    expect(() => new FactoredMatrix(Float64Array.from([1, 2, 2, 4]))).toThrow(/singular/)
  })
})

function atRest(delta: number, panelFactor = 1): { readonly wall: TubeWall; readonly strengths: Float64Array } {
  const wall = new TubeWall({ delta, panelFactor })
  const strengths = new Float64Array(wall.panelCount)
  wall.solve(1, new Float64Array(wall.panelCount), strengths)
  return { wall, strengths }
}
