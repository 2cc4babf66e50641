import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../core/base'
import { trainRings } from '../../../core/coaxial'
import { steadyRing, thinRingSpeed } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'
import { firstSpeed, marched } from './scenes'

/** A ring of the steady family of water: rho 1000, Gamma 0.01, L 0.02. */
const THIN = steadyRing(0.01, 0.02, 0.15, 1000)

describe('trainRings', () => {
  it('places ring k at k period + duration, where its own speed brought it during its stroke', () => {
    const { rings } = trainRings({ density: 1000, ring: THIN, duration: 0.6, pulses: 3, period: 1.5 })
    expect(rings.map((ring) => ring.startTime)).toEqual([0.6, 2.1, 3.6])
    rings.forEach((ring) => expectClose(ring.x, 0.6 * THIN.speed, 1e-15))
  })

  it('keeps circulation, impulse and the speed of the steady ring', async () => {
    const { rings, coreRatio, thick } = trainRings({ density: 1000, ring: THIN, duration: 0.6, pulses: 1, period: NaN })
    const [ring] = rings
    if (ring === undefined) throw new Error('no ring')
    expect(ring.circulation).toBe(THIN.circulation)
    expectClose(1000 * Math.PI * ring.circulation * ring.radius ** 2, THIN.impulse, 1e-14)
    expectClose(thinRingSpeed(ring.circulation, ring.radius, ring.coreRadius), THIN.speed, 1e-13)
    // The thin ring of equal speed and impulse is that ring to (a/R)^2.
    expectNear(coreRatio, 0.15, 0.01)
    expect(thick).toBe(false)
    const wake = await marched({ rings, duration: 1 })
    expectClose(firstSpeed(wake), THIN.speed, 1e-12)
  })

  it('says where the core is too thick for the thin-core law', () => {
    const ring = steadyRing(0.01, 0.02, 0.486, 1000)
    expect(trainRings({ density: 1000, ring, duration: 0.6, pulses: 2, period: 1 }).thick).toBe(true)
  })

  it('refuses a train without pulses or with no time between them', () => {
    const train = { density: 1000, ring: THIN, duration: 0.6, pulses: 2, period: 1 }
    expect(() => trainRings({ ...train, pulses: 0 })).toThrow(DomainError)
    expect(() => trainRings({ ...train, period: 0 })).toThrow(/train.period must be above 0 s/)
  })
})
