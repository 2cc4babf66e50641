import type { CoaxialInput, CoaxialRings, Kernel } from '../../../core/kernel'

/** Numbers in 0..1 from a seed (Park & Miller 1988), the same at each run. */
export function uniform(seed: number): () => number {
  let state = seed
  return () => (state = (state * 16807) % 2147483647) / 2147483647
}

export function filled(count: number, value: (i: number) => number): Float64Array {
  return Float64Array.from({ length: count }, (_, i) => value(i))
}

/** One ring of radius and circulation 1 at x = 0. */
export function unitRing(deltaSquared = 0): CoaxialRings {
  return {
    count: 1,
    x: Float64Array.of(0),
    r: Float64Array.of(1),
    circulation: Float64Array.of(1),
    deltaSquared: Float64Array.of(deltaSquared),
  }
}

export function randomRings(count: number, seed: number): CoaxialRings {
  const random = uniform(seed)
  return {
    count,
    x: filled(count, () => 2 * random()),
    r: filled(count, () => 0.05 + random()),
    circulation: filled(count, () => random() - 0.5),
    deltaSquared: filled(count, () => 0.02 * random() * random()),
  }
}

/** Every ring at every ring. */
export function mutual(rings: CoaxialRings, skipSelf: boolean, pairMean = true): CoaxialInput {
  return {
    targetCount: rings.count,
    targetX: rings.x,
    targetR: rings.r,
    targetDeltaSquared: pairMean ? rings.deltaSquared : null,
    rings,
    skipSelf,
  }
}

export function velocities(kernel: Kernel, input: CoaxialInput): { axial: Float64Array; radial: Float64Array } {
  const out = { axial: new Float64Array(input.targetCount), radial: new Float64Array(input.targetCount) }
  kernel.coaxialVelocity(input, out)
  return out
}

export function streams(kernel: Kernel, input: CoaxialInput): Float64Array {
  const out = new Float64Array(input.targetCount)
  kernel.coaxialStream(input, out)
  return out
}

/** Velocity and stream function of one ring at one point. */
export function atPoint(kernel: Kernel, rings: CoaxialRings, x: number, r: number): [number, number, number] {
  const input = {
    targetCount: 1,
    targetX: Float64Array.of(x),
    targetR: Float64Array.of(r),
    targetDeltaSquared: null,
    rings,
    skipSelf: false,
  }
  const { axial, radial } = velocities(kernel, input)
  return [axial[0] ?? NaN, radial[0] ?? NaN, streams(kernel, input)[0] ?? NaN]
}
