import { describe, expect, it } from 'vitest'
import { sampleCurve } from '../../../core/filament/closedCurve'
import { FilamentFlow, type FilamentSetup } from '../../../core/filament/filamentFlow'
import { unit, type Vector } from '../../../core/filament/vector'
import { typescriptKernel } from '../../../core/kernel'
import { expectClose, expectNear } from '../../support/close'

interface TestRing {
  readonly circulation: number
  readonly radius: number
  readonly delta: number
  readonly x: number
  readonly y?: number
  readonly nodes: number
}

function flowOf(
  rings: readonly TestRing[],
  parts: Partial<FilamentSetup> = {},
): { flow: FilamentFlow; state: Float64Array; slope: () => Float64Array } {
  const flow = new FilamentFlow({
    rings: rings.map(({ circulation, nodes }) => ({ circulation, core: 'uniform', nodeCount: nodes })),
    axialFlow: 0,
    wall: null,
    coreGrowth: 0,
    kernel: typescriptKernel,
    ...parts,
  })
  const state = new Float64Array(flow.stateSize)
  rings.forEach(({ radius, delta, x, y = 0, nodes }, i) => {
    const circle = sampleCurve((angle) => [x, y + radius * Math.cos(angle), radius * Math.sin(angle)], nodes)
    state.set(circle, 3 * (flow.starts[i] ?? NaN))
    // delta = a exp(-3/4) of a uniform core.
    state[3 * flow.nodeCount + i] = (delta * Math.exp(0.75)) ** 2 * 2 * Math.PI * radius
  })
  const slope = (): Float64Array => {
    const out = new Float64Array(state.length)
    flow.derivative(0, state, out)
    return out
  }
  return { flow, state, slope }
}

/** 4 pi R U / Gamma of the regularised ring by the coaxial kernel. */
function exactSpeed(delta: number): number {
  const one = (value: number): Float64Array => Float64Array.of(value)
  const out = { axial: one(0), radial: one(0) }
  typescriptKernel.coaxialVelocity(
    {
      targetCount: 1,
      targetX: one(0),
      targetR: one(1),
      targetDeltaSquared: null,
      rings: { count: 1, x: one(0), r: one(1), circulation: one(1), deltaSquared: one(delta * delta) },
      skipSelf: false,
    },
    out,
  )
  return 4 * Math.PI * (out.axial[0] ?? NaN)
}

const speedOf = (delta: number, nodes: number): number =>
  4 * Math.PI * (flowOf([{ circulation: 1, radius: 1, delta, x: 0, nodes }]).slope()[0] ?? NaN)

describe('a ring of segments', () => {
  // Check R9: identity of the regularised kernel, both values as printed there.
  it.each([
    [0.05, 4.07342085],
    [0.1, 3.37632355],
  ])('of delta/R = %d tends to 4 pi R U / Gamma = %d', (delta, value) => {
    expectClose(exactSpeed(delta), value, 2e-9)
    // Three segments to a delta: the rule errs by exp(-6 pi) and the correction takes most of that.
    expectClose(speedOf(delta, Math.ceil((3 * 2 * Math.PI) / delta)), value, 3e-9)
  })

  it('converges with order 6 once its smoothing spans several segments', () => {
    const error = (nodes: number): number => Math.abs(speedOf(1.5, nodes) / exactSpeed(1.5) - 1)
    expectNear(Math.log2(error(24) / error(48)), 6, 0.2, 'observed order')
  })

  it.each([0.02, 0.05, 0.1])('of delta/R = %d errs by less than 2e-5 with segments as long as delta', (delta) => {
    expectClose(speedOf(delta, Math.round((2 * Math.PI) / delta)), exactSpeed(delta), 2e-5)
  })

  it('induces at other rings what the coaxial kernel says', () => {
    const { slope, flow } = flowOf([
      { circulation: 1, radius: 1, delta: 0.2, x: 0, nodes: 96 },
      { circulation: -0.5, radius: 0.7, delta: 0.1, x: 0.4, nodes: 96 },
    ])
    const velocity = slope()
    const out = { axial: new Float64Array(2), radial: new Float64Array(2) }
    const deltaSquared = Float64Array.of(0.04, 0.01)
    const x = Float64Array.of(0, 0.4)
    const r = Float64Array.of(1, 0.7)
    typescriptKernel.coaxialVelocity(
      {
        targetCount: 2,
        targetX: x,
        targetR: r,
        targetDeltaSquared: deltaSquared,
        rings: { count: 2, x, r, circulation: Float64Array.of(1, -0.5), deltaSquared },
        skipSelf: false,
      },
      out,
    )
    for (const i of [0, 1]) {
      const first = 3 * (flow.starts[i] ?? NaN)
      // Node 0 lies at y = R: axial velocity along x, radial along y.
      expectClose(velocity[first] ?? NaN, out.axial[i] ?? NaN, 1e-7)
      expectClose(velocity[first + 1] ?? NaN, out.radial[i] ?? NaN, 1e-7)
    }
  })
})

describe('fewer nodes for far rings', () => {
  it('change the velocity by less than 1e-9 of itself', () => {
    const rings = [0, 1, 2, 3].map((k) => ({
      circulation: 1 - 0.4 * k,
      radius: 1 + 0.1 * k,
      delta: 0.06,
      x: 1.3 * k,
      y: 0.2 * k,
      nodes: 160,
    }))
    const { flow, state, slope } = flowOf(rings)
    const all = slope()
    flow.updateStrides(state)
    const some = slope()
    const largest = Math.max(...all.map(Math.abs))
    expect(Math.max(...all.map((value, i) => Math.abs(value - (some[i] ?? NaN))))).toBeLessThan(1e-9 * largest)
    expect(some.some((value, i) => value !== all[i])).toBe(true)
  })
})

describe('a plane wall', () => {
  it('acts like the mirrored ring, whichever way it faces', () => {
    const normal: Vector = unit([1, 2, -0.5])
    const point: Vector = [2, 0.3, 0]
    const nodes = 64
    const circle = sampleCurve((angle) => [0, Math.cos(angle), Math.sin(angle)], nodes)
    const mirror = circle.slice()
    for (let i = 0; i < mirror.length; i += 3) {
      let height = 0
      for (const axis of [0, 1, 2] as const) height += ((circle[i + axis] ?? NaN) - point[axis]) * normal[axis]
      for (const axis of [0, 1, 2] as const) mirror[i + axis] = (circle[i + axis] ?? NaN) - 2 * height * normal[axis]
    }
    const one = { circulation: 1, radius: 1, delta: 0.3, x: 0, nodes }
    const walled = flowOf([one], { wall: { point, normal } })
    const pair = flowOf([one, { ...one, circulation: -1 }])
    pair.state.set(mirror, 3 * nodes)
    const expected = pair.slope().subarray(0, 3 * nodes)
    const got = walled.slope()
    expected.forEach((value, i) => expectNear(got[i] ?? NaN, value, 1e-12))
  })
})

describe('the energy of filaments', () => {
  it('gives the speed of a ring: dE/dI at fixed core volume', () => {
    const energy = (radius: number): number => {
      // a^2 length kept: delta falls as the root of the radius.
      const { flow, state } = flowOf([{ circulation: 1, radius, delta: 0.02 / Math.sqrt(radius), x: 0, nodes: 1024 }])
      return flow.energy(state)
    }
    const step = 1e-3
    const slope = (energy(1 + step) - energy(1 - step)) / (2 * step) / (2 * Math.PI)
    // The energy law is thin: (delta/R)^2 ln.
    expectClose(4 * Math.PI * slope, exactSpeed(0.02), 1e-3)
  })
})
