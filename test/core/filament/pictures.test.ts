import { beforeAll, describe, expect, it } from 'vitest'
import {
  carryDye,
  fieldPlane,
  isOnJetAxis,
  marchWake,
  WakeFlow,
  wakeFrame,
  type Wake,
  type WakeInput,
} from '../../../core/filament'
import { loadKernel, type Kernel } from '../../../core/kernel'
import { run, wakePicture } from '../../../core/run'
import { expectClose, expectNear } from '../../support/close'
import { planOf } from '../../support/plans'

const RING = {
  circulation: 0.01,
  radius: 0.02,
  coreRadius: 0.004,
  core: 'uniform',
  centre: [0, 0, 0],
  direction: [1, 0, 0],
} as const

function inputOf(change: Partial<WakeInput> = {}): WakeInput {
  return {
    model: 'auto',
    law: 'thin',
    rings: [RING],
    kinematicViscosity: 1e-6,
    viscous: false,
    ageing: 'laminar',
    axialFlow: 0,
    wall: null,
    tube: null,
    stations: [],
    duration: 0.5,
    outputStep: 0.05,
    tolerance: 1e-8,
    ...change,
  }
}

describe('pictures of a wake', () => {
  let kernel: Kernel
  let wake: Wake
  beforeAll(async () => {
    kernel = await loadKernel()
    wake = await marchWake(inputOf(), { kernel })
  })
  const surroundings = (change: object = {}) => ({
    kernel,
    cores: ['uniform'] as const,
    wall: null,
    axialFlow: 0,
    ...change,
  })

  it('the flow on the axis is that of a circular filament (Lamb, Hydrodynamics, art. 161) with the stream added', () => {
    const flow = new WakeFlow(surroundings({ axialFlow: 0.1 }))
    flow.setRings(wakeFrame(wake, 0))
    const out = new Float64Array(3)
    flow.velocity(Float64Array.of(0.05, 0, 0), 1, out)
    const expected = (0.01 * 0.02 ** 2) / (2 * (0.02 ** 2 + 0.05 ** 2) ** 1.5)
    // 96 straight segments and a smoothing of 0.47 a move it by a share of 1e-2 at the most.
    expectClose((out[0] ?? 0) - 0.1, expected, 1e-2, 'axial velocity')
    expectNear(out[1] ?? 1, 0, 1e-12, 'radial velocity')
  })

  it('no fluid goes through a wall', () => {
    const flow = new WakeFlow(surroundings({ wall: { point: [0.05, 0, 0], normal: [1, 0, 0] } }))
    flow.setRings(wakeFrame(wake, 0))
    const out = new Float64Array(6)
    flow.velocity(Float64Array.of(0.05, 0.01, 0, 0.05, 0.03, 0.01), 2, out)
    // Mixed precision carries about 2e-7 of the velocities near the ring, here 0.1 m/s.
    expectNear(out[0] ?? 1, 0, 1e-7, 'normal velocity')
    expectNear(out[3] ?? 1, 0, 1e-7, 'normal velocity')
    expect(Math.hypot(out[4] ?? 0, out[5] ?? 0)).toBeGreaterThan(1e-3)
  })

  it('dye goes with its ring, and a second ring brings its own when it appears', async () => {
    const late = { ...RING, centre: [-0.1, 0, 0] as const, startTime: 0.2 }
    const two = await marchWake(inputOf({ rings: [RING, late] }), { kernel })
    const positions = await carryDye({
      wake: two,
      surroundings: { ...surroundings(), cores: ['uniform', 'uniform'] },
      points: 600,
    })
    if (positions === null) throw new Error('cancelled')
    expect(positions.length).toBe(two.outputTimes.length)
    expect(positions[0]?.length).toBe(3 * 300)
    expect(positions.at(-1)?.length).toBe(3 * 600)
    const mean = (list: Float32Array | undefined) =>
      Array.from(list ?? [])
        .slice(0, 900)
        .reduce((sum, v, i) => sum + (i % 3 === 0 ? v / 300 : 0), 0)
    const path = two.trajectories[0]
    const went = (path?.x.at(-1) ?? 0) - (path?.x[0] ?? 0)
    // Most of the dyed tube is carried along with the ring; a few points are left behind.
    expectClose(mean(positions.at(-1)) - mean(positions[0]), went, 0.15, 'way of the dye')
  })

  it('the stream function gives the flow: its slope across is r times the axial velocity', async () => {
    const plane = await fieldPlane(wake, surroundings(), 'stream function')
    if (plane === null) throw new Error('no plane')
    const { columns, rows, values, along, across, origin, low, high } = plane
    expect(low).toBe(-high)
    const psi = values[0]
    const row = Math.floor(rows * 0.62)
    const column = Math.floor(columns * 0.8)
    const spacing = across[1] / (rows - 1)
    const at = (r: number) => psi?.[r * columns + column] ?? NaN
    const y = origin[1] + spacing * row
    const slope = (at(row + 1) - at(row - 1)) / (2 * spacing)
    const flow = new WakeFlow(surroundings())
    flow.setRings(wakeFrame(wake, 0))
    const out = new Float64Array(3)
    flow.velocity(Float64Array.of(origin[0] + (along[0] * column) / (columns - 1), y, 0), 1, out)
    // Central difference on the plane's own spacing, and a polygon against a circle.
    expectClose(slope / y, out[0] ?? 0, 0.02, 'axial velocity')
  })

  it('rings off the axis have no stream function', async () => {
    const aside = await marchWake(inputOf({ rings: [{ ...RING, centre: [0, 0.05, 0] }] }), { kernel })
    expect(isOnJetAxis(aside)).toBe(false)
    expect(await fieldPlane(aside, surroundings(), 'stream function')).toBeNull()
  })

  it('are asked for by a plan, and say what they leave out', async () => {
    const plan = planOf({ wake: { rings: [RING], wall: { point: [0.3, 0, 0], normal: [1, 0, 0] }, duration: 0.2 } })
    const { data } = await run(plan, { sections: ['wake'] })
    if (data?.wake === null || data?.wake === undefined) throw new Error('no wake')
    const picture = await wakePicture(plan, data.wake, { dye: 100, plane: 'stream function' })
    expect(picture.status).toBe('done')
    expect(picture.plane?.quantity).toBe('speed')
    expect(picture.notes.join(' ')).toMatch(/speed is drawn instead/)
    expect(picture.dye?.length).toBe(data.wake.wake.outputTimes.length)
    const cancelled = await wakePicture(plan, data.wake, { dye: 100, plane: null }, { signal: { aborted: true } })
    expect(cancelled.status).toBe('cancelled')
  })
})
