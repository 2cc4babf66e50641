import { marchWake, type Vector, type Wake, type WakeInput, type WakeRing } from '../../../core/filament'
import { typescriptKernel } from '../../../core/kernel'

/** A march with nothing but what a test changes: still water, no ageing. */
export function scene(parts: Partial<WakeInput>): WakeInput {
  return {
    model: 'filament',
    law: 'regularised',
    rings: [ring()],
    kinematicViscosity: 1e-6,
    viscous: false,
    ageing: 'laminar',
    axialFlow: 0,
    wall: null,
    tube: null,
    stations: [],
    duration: 1,
    outputStep: 0.5,
    tolerance: 1e-8,
    ...parts,
  }
}

/** R = 1 m, Gamma = 1 m2/s, a = 0.2 m, uniform core, at the origin along +x. */
export function ring(parts: Partial<WakeRing> = {}): WakeRing {
  return {
    circulation: 1,
    radius: 1,
    coreRadius: 0.2,
    core: 'uniform',
    centre: [0, 0, 0],
    direction: [1, 0, 0],
    ...parts,
  }
}

export async function marched(parts: Partial<WakeInput>, nodeLimit?: number): Promise<Wake> {
  return await marchWake(scene(parts), {
    kernel: typescriptKernel,
    ...(nodeLimit === undefined ? {} : { nodeLimit }),
  })
}

export interface RingState {
  readonly centre: Vector
  readonly direction: Vector
  readonly radius: number
  readonly coreRadius: number
  readonly speed: number
  readonly length: number
}

/** A ring at one of its outputs, the last by default. */
export function stateOf(wake: Wake, index = 0, output = -1): RingState {
  const path = wake.trajectories[index]
  const get = (column: Float64Array | undefined): number => column?.at(output) ?? NaN
  return {
    centre: [get(path?.x), get(path?.y), get(path?.z)],
    direction: [get(path?.directionX), get(path?.directionY), get(path?.directionZ)],
    radius: get(path?.radius),
    coreRadius: get(path?.coreRadius),
    speed: get(path?.speed),
    length: get(path?.length),
  }
}

/** Nodes of a ring at an output of the filament engine. */
export function nodesOf(wake: Wake, ringNumber = 1, output = -1): Float64Array {
  const frame = wake.frames.at(output)
  return frame?.curves[frame.rings.indexOf(ringNumber)] ?? new Float64Array(0)
}
