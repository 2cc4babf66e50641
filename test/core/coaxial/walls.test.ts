import { describe, expect, it } from 'vitest'
import { completeElliptic, DomainError, integrate } from '../../../core/base'
import { RoundTube, tankSlowing, tubeSlowing } from '../../../core/coaxial'
import { scaledI, scaledK1 } from '../../../core/coaxial/bessel'
import { thinRingSpeed } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'
import { firstSpeed, lastOf, marched, ring, timesOf } from './scenes'

/** Velocity at (dx, r) of a free ring of unit circulation; Lamb, Hydrodynamics, 6th ed., art. 161. */
function freeRing(radius: number, dx: number, r: number): { axial: number; radial: number } {
  const far = dx * dx + (radius + r) ** 2
  const near = dx * dx + (radius - r) ** 2
  const { K, E } = completeElliptic((4 * radius * r) / far)
  const scale = 1 / (2 * Math.PI * Math.sqrt(far))
  return {
    axial: scale * (K + ((radius * radius - r * r - dx * dx) / near) * E),
    radial: ((scale * dx) / r) * (((radius * radius + r * r + dx * dx) / near) * E - K),
  }
}

/** What a ring does in a tube of unit radius, whole. */
function inTube(radius: number, dx: number, r: number): { axial: number; radial: number } {
  const tube = new RoundTube(1)
  const out = { axial: 0, radial: 0 }
  tube.reaction(tube.prepare(radius), 1, tube.prepare(r), dx, out)
  if (tube.givesWhole(dx)) return out
  const free = freeRing(radius, dx, r)
  return { axial: out.axial + free.axial, radial: out.radial + free.radial }
}

describe('a round tube', () => {
  // Check L5: image integral of a ring in a tube; 0.99 % to the digits given.
  it('five ring radii wide slows a ring of a/R = 0.1 by 0.99 %', () => {
    expectNear(-tubeSlowing(1, 1, 5) / thinRingSpeed(1, 1, 0.1), 0.0099, 5e-5)
  })

  it.each([0.02, 0.3, 0.5, 0.62, 0.77, 0.9])('slows a ring of R/b = %d by the integral', (share) => {
    // An independent quadrature of dU = -(Gamma R / (pi b^2)) int x I1(x R/b) I0(x R/b) K1(x)/I1(x) dx.
    const integral = integrate(
      (x) => {
        const own = scaledI(x * share)
        return (x * own.one * own.zero * scaledK1(x) * Math.exp(-2 * x * (1 - share))) / scaledI(x).one
      },
      1e-9,
      45 / (2 * (1 - share)),
      1e-13,
    )
    // Below 1e-9 the integrand is constant to rounding and adds 1e-9 of itself.
    expectClose(tubeSlowing(2, share, 1), (-2 * share * integral) / Math.PI, 1e-8)
  })

  it.each([0.01, 0.4, 0.999, 1.001, 1.7])('lets no flow through its wall, %d tube radii from the ring', (dx) => {
    expectNear(inTube(0.5, dx, 1).radial, 0, 1e-13)
    // A small ring, its free flow tens of times the rest at the wall.
    expectNear(inTube(0.05, dx, 1).radial, 0, 1e-13)
  })

  it('takes the same value from its modes as from the integral where one hands over to the other', () => {
    for (const [radius, r] of [
      [0.3, 0.3],
      [0.8, 0.2],
      [0.6, 0.85],
    ] as const) {
      const below = inTube(radius, 1 - 1e-12, r)
      const above = inTube(radius, 1, r)
      expectNear(below.axial, above.axial, 2e-11, 'axial')
      expectNear(below.radial, above.radial, 2e-11, 'radial')
    }
  })

  it('acts between two rings as both energies say: the impulse they lose and gain is equal', () => {
    // d(sum Gamma R^2)/dt = 0 without a net force along the tube: R1 u_r(1 by 2) = -R2 u_r(2 by 1) at equal circulation.
    expectClose(0.3 * inTube(0.7, 0.4, 0.3).radial, 0.7 * inTube(0.3, 0.4, 0.7).radial, 1e-12)
  })

  it('slows a marching ring', async () => {
    const wake = await marched({ tubeRadius: 5, duration: 2 })
    expectClose(lastOf(wake, 0).x, 2 * (thinRingSpeed(1, 1, 0.1) + tubeSlowing(1, 1, 5)), 1e-10)
    expect(wake.drift).toEqual({ circulation: null, impulse: null, energy: null })
  })

  it('slows a pair beyond reach of one another like two lone rings, and tells when they near it', async () => {
    const wake = await marched({ tubeRadius: 1.9, rings: [ring(), ring({ x: 18 })] })
    const alone = thinRingSpeed(1, 1, 0.1) + tubeSlowing(1, 1, 1.9)
    expectClose(firstSpeed(wake, 0), alone, 1e-12)
    expectClose(firstSpeed(wake, 1), alone, 1e-12)
    expect(wake.events.filter((event) => event.event === 'near-wall').map((event) => event.rings)).toEqual([[1], [2]])
  })
})

describe('a rectangular tank', () => {
  // Lattice sum of 1/d^3 over the square lattice: 4 zeta(3/2) beta(3/2) = 9.03362168 (Glasser & Zucker 1980, recalled, not re-read).
  const SQUARE_SUM = 4 * 2.612375348685488 * 0.8645026534612017
  const centred = (side: number): Parameters<typeof tankSlowing>[2] => ({
    width: side,
    depth: side,
    fromSide: side / 2,
    fromFloor: side / 2,
  })

  it('tends to the lattice of dipoles for a small ring', () => {
    expectClose(tankSlowing(1, 1, centred(1000)), (-0.25 * SQUARE_SUM) / 1e9, 5e-6)
  })

  // Check L5 gives 0.69 %, the first figure below; the mean over the ring, which moves it, is 0.70 %.
  it('ten ring radii square slows a ring of a/R = 0.1 by 0.69 % as dipoles and 0.70 % with the size of the ring', () => {
    const speed = thinRingSpeed(1, 1, 0.1)
    expectNear((0.25 * SQUARE_SUM) / 1000 / speed, 0.0069, 5e-5)
    expectNear(-tankSlowing(1, 1, centred(10)) / speed, 0.007003, 5e-7)
  })

  it('tends to one mirror where three walls are far', () => {
    const far = 400
    // A ring beside its image: the mean over its circumference of the image's field, d = 2 x 1.5.
    let mean = 0
    for (let k = 0; k < 64; k++) {
      const angle = (2 * Math.PI * k) / 64
      mean += freeRing(1, 0, Math.hypot(3 + Math.cos(angle), Math.sin(angle))).axial / 64
    }
    const got = tankSlowing(1, 1, { width: far, depth: far, fromSide: 1.5, fromFloor: far / 2 })
    expectClose(got, mean, 1e-5)
  })

  it('refuses a ring that does not fit', () => {
    expect(() => tankSlowing(1, 1, { width: 4, depth: 4, fromSide: 3.5, fromFloor: 2 })).toThrow(DomainError)
  })
})

describe('a wall across the axis', () => {
  it('acts like the mirror image: a ring towards it moves as in a head-on pair', async () => {
    const towards = await marched({ wall: 3, duration: 10 })
    const pair = await marched({ rings: [ring(), ring({ x: 6, circulation: -1 })], duration: 10 })
    const one = lastOf(towards, 0)
    const two = lastOf(pair, 0)
    // Two marches of one motion, step tolerance 1e-8 each.
    expectClose(one.x, two.x, 1e-7)
    expectClose(one.radius, two.radius, 1e-7)
    expect(one.radius).toBeGreaterThan(1.1)
  })

  it('is told once, when the ring is nearer than its radius, with what a real wall does', async () => {
    const wake = await marched({ wall: 3, duration: 12 })
    const near = wake.events.filter((event) => event.event === 'near-wall')
    expect(near.length).toBe(1)
    expect(near[0]?.detail).toContain('sheds vorticity')
    expect(wake.validUntil).toBe(near[0]?.time)
    expect(wake.reason).toContain('wall')
    expect(timesOf(wake, 'end')).toEqual([wake.time])
  })
})
