import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CORE_CONSTANT, thinRingEnergy, thinRingImpulse, thinRingSpeed, type CoreModel } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'

const MODELS: readonly CoreModel[] = ['uniform', 'hollow', 'gaussian']
const length = fc.double({ min: 1e-3, max: 10, noNaN: true })
const ratio = fc.double({ min: 1e-6, max: 0.9, noNaN: true })
const factor = fc.double({ min: 0.01, max: 100, noNaN: true })

describe('one thin ring', () => {
  // R1. Kelvin 1867 (uniform); Hicks 1884 (hollow); Saffman 1970 (Gaussian). Digits given: 7.
  it.each([
    ['uniform', 0.3288163],
    ['hollow', 0.3089219],
    ['gaussian', 0.3043091],
  ] as const)('moves at the published speed with a %s core of a/R = 0.1', (model, speed) => {
    expectNear(thinRingSpeed(1, 1, 0.1, model), speed, 1e-6)
  })

  it('takes a uniform core where none is named', () => {
    expect(thinRingSpeed(1, 1, 0.1)).toBe(thinRingSpeed(1, 1, 0.1, 'uniform'))
    expect(thinRingEnergy(1, 1, 1, 0.1)).toBe(thinRingEnergy(1, 1, 1, 0.1, 'uniform'))
  })

  // R2. Lamb, Hydrodynamics, art. 163. Digits given: 8.
  it('has the energy and impulse of Lamb', () => {
    expectNear(thinRingEnergy(1, 1, 1, 0.1), 1.3160133, 1e-6)
    expectClose(thinRingImpulse(1, 1, 1), Math.PI, 1e-15)
  })

  // R3. Roberts & Donnelly 1970: at fixed circulation and core volume a^2 R. Central difference, error O(h^2) = 1e-10.
  it.each(MODELS)('has dE/dI equal to U at fixed core volume for a %s core', (model) => {
    const radius = 0.7
    const core = 0.05
    const h = 1e-5
    const at = (r: number): { E: number; I: number } => ({
      E: thinRingEnergy(1000, 0.02, r, core * Math.sqrt(radius / r), model),
      I: thinRingImpulse(1000, 0.02, r),
    })
    const up = at(radius * (1 + h))
    const down = at(radius * (1 - h))
    expectClose((up.E - down.E) / (up.I - down.I), thinRingSpeed(0.02, radius, core, model), 1e-8)
  })

  // R4. Saffman 1970: U = Gamma/(4 pi R) (ln(8R/sqrt(4 nu t)) - 0.558).
  it('has the Gaussian constant of Saffman', () => {
    expectNear(0.5 - CORE_CONSTANT.gaussian, 0.55796576, 5e-9)
  })

  // R4. While thin dU/dt = -Gamma / (8 pi R t). Central difference in ln t, error O(h^2).
  it('slows as Saffman says while its Gaussian core spreads', () => {
    const viscosity = 1e-6
    const time = 3
    const h = 1e-4
    const speed = (t: number): number => thinRingSpeed(0.01, 0.05, Math.sqrt(4 * viscosity * t), 'gaussian')
    const slope = (speed(time * (1 + h)) - speed(time * (1 - h))) / (2 * h * time)
    expectClose(slope, -0.01 / (8 * Math.PI * 0.05 * time), 1e-7)
  })

  it('scales with circulation, size and density', () => {
    fc.assert(
      fc.property(length, ratio, factor, fc.constantFrom(...MODELS), (R, s, k, model) => {
        const a = s * R
        expectClose(thinRingSpeed(k, k * R, k * a, model), thinRingSpeed(1, R, a, model), 1e-11)
        expectClose(thinRingEnergy(k, 2, k * R, k * a, model), 4 * k * k * thinRingEnergy(1, 1, R, a, model), 1e-11)
        expectClose(thinRingImpulse(k, 3, k * R), 3 * k ** 3 * thinRingImpulse(1, 1, R), 1e-12)
      }),
    )
  })

  it('turns round with the sign of circulation', () => {
    expect(thinRingSpeed(-1, 1, 0.1)).toBe(-thinRingSpeed(1, 1, 0.1))
    expect(thinRingImpulse(1, -1, 1)).toBe(-thinRingImpulse(1, 1, 1))
  })

  it('refuses a core wider than the ring, a core of nothing and what is no number', () => {
    expect(() => thinRingSpeed(1, 0.05, 0.06)).toThrow(/coreRadius must be at most 0\.05 m, got 0\.06 m/)
    expect(() => thinRingSpeed(1, 0.05, 0)).toThrow(/coreRadius must be above 0 m/)
    expect(() => thinRingSpeed(Number.NaN, 1, 0.1)).toThrow(/circulation must be a finite number/)
    expect(() => thinRingEnergy(0, 1, 1, 0.1)).toThrow(/density must be above 0/)
    expect(() => thinRingImpulse(1, 1, -1)).toThrow(/radius must be above 0 m/)
  })
})
