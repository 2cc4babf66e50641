import { describe, expect, it } from 'vitest'
import { completeElliptic, RungeKuttaStepper } from '../../../core/base'
import {
  curvatures,
  curveSums,
  evenlySpaced,
  keepSpacing,
  sampleCurve,
  tangents,
} from '../../../core/filament/closedCurve'
import { firstShape } from '../../../core/filament/mesh'
import { expectClose, expectNear } from '../../support/close'
import { ring } from './scenes'

/** Ellipse of semi-axes 2 and 1 by its angle: nodes crowd where it is most bent. */
const ellipse = (count: number): Float64Array =>
  sampleCurve((angle) => [0, 2 * Math.cos(angle), Math.sin(angle)], count)

function sums(nodes: Float64Array): ReturnType<typeof curveSums> {
  const tangent = new Float64Array(nodes.length)
  tangents(nodes, tangent)
  return curveSums(nodes, tangent)
}

/** Perimeter 4 a E(1 - b^2/a^2): Abramowitz & Stegun 17.3. */
const PERIMETER = 8 * completeElliptic(0.75).E

describe('sums over a closed curve', () => {
  it('give length, area and centroid of an ellipse', () => {
    const found = sums(ellipse(256))
    expectClose(found.length, PERIMETER, 1e-9)
    expectClose(found.area[0], 2 * Math.PI, 1e-9)
    expectNear(found.area[1], 0, 1e-14)
    found.centroid.forEach((value) => expectNear(value, 0, 1e-14))
  })

  it('converge with the sixth order of the differences', () => {
    const error = (count: number): number => Math.abs(sums(ellipse(count)).area[0] - 2 * Math.PI)
    expectNear(Math.log2(error(32) / error(64)), 6, 0.2, 'observed order')
  })
})

describe('curvature times binormal', () => {
  const worst = (count: number): number => {
    const nodes = ellipse(count)
    const tangent = new Float64Array(nodes.length)
    const found = new Float64Array(nodes.length)
    tangents(nodes, tangent)
    curvatures(nodes, tangent, found)
    let largest = 0
    for (let i = 0; i < count; i++) {
      const angle = (2 * Math.PI * i) / count
      const exact = 2 / Math.hypot(2 * Math.sin(angle), Math.cos(angle)) ** 3
      largest = Math.max(largest, Math.abs((found[3 * i] ?? NaN) - exact))
      expectNear(found[3 * i + 1] ?? NaN, 0, 1e-12)
    }
    return largest
  }

  it('is a b / |x|^3 on an ellipse, to sixth order', () => {
    expect(worst(256)).toBeLessThan(1e-7)
    expectNear(Math.log2(worst(64) / worst(128)), 6, 0.2, 'observed order')
  })

  // Check R11: omega = beta n sqrt(n^2 - 1)/R^2, Kelvin 1880; Arms & Hama 1965. Period 2 pi / (2 sqrt 3) = 1.8137994 for n = 2.
  it('moves a ring with a small two-lobed ripple through one swing in 1.8137994 R^2/beta under local induction', () => {
    const count = 64
    const ripple = 1e-5
    const nodes = sampleCurve((angle) => {
      const radius = 1 + ripple * Math.cos(2 * angle)
      return [0, radius * Math.cos(angle), radius * Math.sin(angle)]
    }, count)
    const tangent = new Float64Array(nodes.length)
    const stepper = new RungeKuttaStepper({
      derivative: (_time, state, out) => {
        tangents(state, tangent)
        curvatures(state, tangent, out)
      },
      time: 0,
      state: nodes,
      relativeTolerance: 0,
      absoluteTolerance: 1e-12,
    })
    /** Amplitude of cos 2 angle in the radius. */
    const lobes = (): number => {
      let sum = 0
      for (let i = 0; i < count; i++) {
        const radius = Math.hypot(stepper.state[3 * i + 1] ?? NaN, stepper.state[3 * i + 2] ?? NaN)
        sum += (2 / count) * radius * Math.cos((4 * Math.PI * i) / count)
      }
      return sum / ripple
    }
    const to = (time: number): number => {
      while (stepper.time < time) expect(stepper.step(time)).toBe('accepted')
      return lobes()
    }
    const period = 1.8137994
    // 1e-5 is the ripple's own share of nonlinearity; the differences add 64^-6.
    expectNear(to(period / 4), 0, 3e-5)
    expectNear(to(period / 2), -1, 3e-5)
    expectNear(to(period), 1, 3e-5)
  })
})

describe('evenlySpaced', () => {
  it('spaces the nodes of an ellipse evenly and leaves them on it', () => {
    const nodes = evenlySpaced(ellipse(200), 160)
    expect(nodes.length).toBe(480)
    const { longestSegment, shortestSegment, length } = sums(nodes)
    // Both are sixth-order differences themselves, taken where the ellipse is most and least bent.
    expectClose(longestSegment, shortestSegment, 2e-5)
    expectClose(length, PERIMETER, 1e-7)
    for (let i = 0; i < nodes.length; i += 3)
      expectNear(((nodes[i + 1] ?? NaN) / 2) ** 2 + (nodes[i + 2] ?? NaN) ** 2, 1, 1e-9)
  })

  it('errs with the eighth power of the old spacing', () => {
    const error = (count: number): number => {
      const nodes = evenlySpaced(ellipse(count), 100)
      let worst = 0
      for (let i = 0; i < nodes.length; i += 3)
        worst = Math.max(worst, Math.abs(((nodes[i + 1] ?? NaN) / 2) ** 2 + (nodes[i + 2] ?? NaN) ** 2 - 1))
      return worst
    }
    expectNear(Math.log2(error(24) / error(48)), 8, 0.5, 'observed power')
  })
})

describe('keepSpacing', () => {
  it('changes a velocity only along the curve, so that every segment grows alike', () => {
    const nodes = evenlySpaced(ellipse(512), 256)
    const tangent = new Float64Array(nodes.length)
    tangents(nodes, tangent)
    const given = nodes.map((value, i) => (i % 3 === 0 ? Math.sin(value) : value ** 3 / 5 + (nodes[i - 1] ?? 0)))
    const velocity = given.slice()
    keepSpacing(velocity, tangent, new Float64Array(nodes.length))
    for (let i = 0; i < nodes.length; i += 3) {
      const [tx = NaN, ty = NaN, tz = NaN] = tangent.subarray(i, i + 3)
      const [cx = NaN, cy = NaN, cz = NaN] = [0, 1, 2].map(
        (axis) => (velocity[i + axis] ?? NaN) - (given[i + axis] ?? NaN),
      )
      expectNear(Math.hypot(ty * cz - tz * cy, tz * cx - tx * cz, tx * cy - ty * cx), 0, 1e-13)
    }
    // The differences of the growth that are left are those of the scheme, here about 1e-5 of what they were.
    expect(spread(velocity, tangent)).toBeLessThan(1e-4 * spread(given, tangent))
  })
})

/** How unlike the segments grow under a velocity. */
function spread(velocity: Float64Array, tangent: Float64Array): number {
  const growth = new Float64Array(velocity.length)
  tangents(velocity, growth)
  const rates: number[] = []
  for (let i = 0; i < velocity.length; i += 3)
    rates.push([0, 1, 2].reduce((sum, axis) => sum + (tangent[i + axis] ?? NaN) * (growth[i + axis] ?? NaN), 0))
  return Math.max(...rates) - Math.min(...rates)
}

describe('firstShape', () => {
  it('is the circle of equal area, right-handed about its direction', () => {
    for (const axisRatio of [1, 3, 1 / 3]) {
      const { area, centroid } = sums(
        firstShape(ring({ axisRatio, radius: 2, direction: [0, 3, 4], centre: [1, 2, 3] })),
      )
      expectClose(Math.hypot(...area), 4 * Math.PI, 1e-9)
      expectClose(area[1], 4 * Math.PI * 0.6, 1e-9)
      expectClose(area[2], 4 * Math.PI * 0.8, 1e-9)
      centroid.forEach((value, axis) => expectClose(value, axis + 1, 1e-9))
    }
  })

  it('lies with its long axis along y for a jet along x and an axis ratio above 1', () => {
    const nodes = firstShape(ring({ axisRatio: 4 }))
    let y = 0
    let z = 0
    for (let i = 0; i < nodes.length; i += 3) {
      y = Math.max(y, nodes[i + 1] ?? NaN)
      z = Math.max(z, nodes[i + 2] ?? NaN)
    }
    expectClose(y, 2, 1e-9)
    expectClose(z, 0.5, 1e-4)
  })
})
