import { marchCoaxialRings, type CoaxialRing, type CoaxialWake, type CoaxialWakeInput } from '../../../core/coaxial'
import { typescriptKernel } from '../../../core/kernel'

/** A march with nothing but what a test changes: still water, no ageing, one second. */
export function scene(parts: Partial<CoaxialWakeInput>): CoaxialWakeInput {
  return {
    rings: [ring()],
    law: 'thin',
    kinematicViscosity: 1e-6,
    viscous: false,
    ageing: 'laminar',
    axialFlow: 0,
    wall: null,
    tubeRadius: null,
    stations: [],
    duration: 1,
    outputStep: 0.1,
    tolerance: 1e-8,
    ...parts,
  }
}

/** R = 1 m, Gamma = 1 m2/s, a = 0.1 m, uniform core, at x = 0 from t = 0. */
export function ring(parts: Partial<CoaxialRing> = {}): CoaxialRing {
  return { circulation: 1, radius: 1, coreRadius: 0.1, core: 'uniform', x: 0, startTime: 0, ...parts }
}

export async function marched(parts: Partial<CoaxialWakeInput>): Promise<CoaxialWake> {
  return await marchCoaxialRings(scene(parts), { kernel: typescriptKernel })
}

/** x, R, a and dx/dt of a ring at its last output. */
export function lastOf(
  wake: CoaxialWake,
  index: number,
): { x: number; radius: number; coreRadius: number; speed: number } {
  const path = wake.trajectories[index]
  return {
    x: path?.x.at(-1) ?? NaN,
    radius: path?.radius.at(-1) ?? NaN,
    coreRadius: path?.coreRadius.at(-1) ?? NaN,
    speed: path?.speed.at(-1) ?? NaN,
  }
}

export function firstSpeed(wake: CoaxialWake, index = 0): number {
  return wake.trajectories[index]?.speed[0] ?? NaN
}

export function timesOf(wake: CoaxialWake, event: string): number[] {
  return wake.events.filter((one) => one.event === event).map((one) => one.time)
}
