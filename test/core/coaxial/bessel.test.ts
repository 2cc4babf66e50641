import { describe, expect, it } from 'vitest'
import { integrate } from '../../../core/base'
import { besselJ, scaledI, scaledK1, zerosOfJ1 } from '../../../core/coaxial/bessel'
import { expectClose, expectNear } from '../../support/close'

// Abramowitz & Stegun 1964, tables 9.1, 9.5 and 9.8, recalled, not re-read: digits as below. The integrals that follow are the
// second route.
describe('Bessel functions of the round tube', () => {
  it('agree with the tables at x = 1', () => {
    // Ten decimals are printed.
    expectClose(scaledI(1).zero, 0.4657596076, 5e-10)
    expectClose(scaledI(1).one, 0.2079104154, 5e-10)
    expectClose(scaledK1(1) / Math.E, 0.6019072302, 5e-10)
    expectClose(besselJ(1).zero, 0.7651976866, 5e-10)
    expectClose(besselJ(1).one, 0.4400505857, 5e-10)
  })

  // A&S 9.6.16 and 9.6.19 (I), 9.1.21 (J), 9.6.24 (K); adaptive quadrature to 1e-13 of the integral of the size.
  it.each([0.01, 0.5, 3, 12, 19.99, 20.01, 60, 190])('I0 and I1 agree with their integrals at x = %d', (x) => {
    const integral = (n: number): number =>
      integrate((t) => Math.exp(x * (Math.cos(t) - 1)) * Math.cos(n * t), 0, Math.PI, 1e-12) / Math.PI
    expectNear(scaledI(x).zero, integral(0), 1e-12)
    expectNear(scaledI(x).one, integral(1), 1e-12)
  })

  it.each([1e-3, 0.1, 2, 30, 200])('K1 agrees with its integral at x = %d', (x) => {
    const far = Math.acosh(1 + 45 / x)
    expectClose(
      scaledK1(x),
      integrate((t) => Math.exp(-x * (Math.cosh(t) - 1)) * Math.cosh(t), 0, far, 1e-12),
      1e-12,
    )
  })

  it('K1 tends to 1/x', () => {
    expectClose(scaledK1(1e-7), 1e7, 1e-6)
  })

  it.each([1e-9, 0.3, 5, 20, 40])('J0 and J1 agree with their integrals at x = %d', (x) => {
    const integral = (n: number): number =>
      integrate((t) => Math.cos(n * t - x * Math.sin(t)), 0, Math.PI, 1e-12) / Math.PI
    expectNear(besselJ(x).zero, integral(0), 2e-14)
    expectNear(besselJ(x).one, integral(1), 2e-14)
  })

  // A&S table 9.5, recalled, not re-read.
  it('has the zeros of J1', () => {
    const zeros = zerosOfJ1(12)
    expectClose(zeros[0] ?? NaN, 3.8317059702, 1e-10)
    expectClose(zeros[1] ?? NaN, 7.0155866698, 1e-10)
    zeros.forEach((zero) => expectNear(besselJ(zero).one, 0, 1e-12))
    expect(zeros.length).toBe(12)
  })
})
