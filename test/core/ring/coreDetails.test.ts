import { describe, expect, it } from 'vitest'
import { integrate } from '../../../core/base'
import { corePressureDrop, mostUnstableWaveNumber, peakSwirlRadius } from '../../../core/ring'
import { expectClose, expectNear } from '../../support/close'

describe('inside a core', () => {
  // R13. Maximum of (1 - exp(-s^2))/s: exp(s^2) = 1 + 2 s^2, s = 1.12090642 (8 digits).
  it('swirls fastest at 1.12090642 a in a Gaussian core', () => {
    const s = peakSwirlRadius(1)
    expectNear(s, 1.12090642, 5e-9)
    // Residual of the equation at 14 digits of the constant.
    expectNear(Math.exp(s * s) - 1 - 2 * s * s, 0, 1e-11)
    expectClose(peakSwirlRadius(0.003), 0.003 * s, 1e-15)
  })

  // R13 and the exact integral of rho v^2 / s for each swirl; quadrature to 1e-10.
  it('has the pressure drop of its swirl, summed by quadrature', () => {
    const rho = 998
    const circulation = 0.03
    const a = 0.004
    const gaussian = (s: number): number => (-Math.expm1(-(s * s) / (a * a)) * circulation) / (2 * Math.PI * s)
    const uniform = (s: number): number => (circulation / (2 * Math.PI)) * (s < a ? s / (a * a) : 1 / s)
    const drop = (v: (s: number) => number): number => {
      const near =
        integrate((s) => (rho * v(s) ** 2) / s, 1e-12, a) + integrate((s) => (rho * v(s) ** 2) / s, a, 12 * a)
      return near + (rho * (circulation / (2 * Math.PI)) ** 2) / (2 * (12 * a) ** 2)
    }
    expectClose(corePressureDrop(rho, circulation, a, 'uniform'), drop(uniform), 1e-9)
    expectClose(corePressureDrop(rho, circulation, a, 'gaussian'), drop(gaussian), 1e-9)
    expectClose(
      corePressureDrop(rho, circulation, a, 'gaussian') / corePressureDrop(rho, circulation, a, 'uniform'),
      Math.LN2,
      1e-14,
    )
  })

  // R12. Widnall, Bliss & Tsai 1974, recalled, not re-read: 10 +- 1.
  it('is most unstable to about ten waves at R/a = 4', () => {
    expectNear(mostUnstableWaveNumber(1, 0.25, 'uniform'), 10, 1)
    expect(mostUnstableWaveNumber(1, 0.1, 'gaussian')).toBe(23)
    expect(mostUnstableWaveNumber(1, 1, 'gaussian')).toBe(2)
  })

  it('refuses cores that are no cores', () => {
    expect(() => peakSwirlRadius(0)).toThrow(/coreRadius must be above 0 m/)
    expect(() => corePressureDrop(1000, 1, -1, 'uniform')).toThrow(/coreRadius must be above 0 m/)
    expect(() => mostUnstableWaveNumber(1, 2, 'uniform')).toThrow(/coreRadius must be at most 1 m, got 2 m/)
  })
})
