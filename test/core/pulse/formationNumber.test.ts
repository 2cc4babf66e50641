import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { computePulse, type NozzleInput, type PulseInput } from '../../../core/pulse'
import { expectClose, expectNear } from '../../support/close'
import { CONSTANT, PLAIN, TUBE, atStrokeRatio } from './plans'

function formation(more: Partial<PulseInput>) {
  return computePulse({ ...PLAIN, ...more }).formationNumber
}

function adopted(more: Partial<PulseInput>): number {
  return formation(more).adopted ?? NaN
}

const PUBLISHED = { formationBasis: 'published' } as const

describe('formation number of a constant speed', () => {
  it('by the energy limit is 3.798, inside the published band', () => {
    const { energyLimit, published, adopted: value } = formation({})
    // J1: sqrt(pi/2)/0.33, and Gharib, Rambod & Shariff 1998, band 3.6..4.5.
    expectClose(energyLimit ?? NaN, Math.sqrt(Math.PI / 2) / 0.33, 1e-9)
    expectNear(energyLimit ?? NaN, 3.798, 5e-4)
    expect(published).toEqual([3.6, 4.5])
    expect(value).toBe(energyLimit)
  })

  it('by the match of ring speed and half the exit speed is 3.06 on the whole steady family', () => {
    // Own figure of the design study for the steady family of Norbury 1973: two decimals are stated.
    expectNear(formation({}).speedMatch ?? NaN, 3.06, 5e-3)
  })

  it('by the fluid the ring carries is about 3.9', () => {
    // Own figure of the design study, two decimals; flat, so this holds the carried volume of the ring to 0.03 %.
    expectNear(formation({}).carriedVolume ?? NaN, 3.91, 0.005)
  })

  it('does not depend on stroke, size, speed or density', () => {
    const here = formation({})
    const there = computePulse({
      ...PLAIN,
      density: 1200,
      nozzle: { ...TUBE, diameter: 0.11 },
      programme: { ...CONSTANT, stroke: 1.3, peakSpeed: 0.04 },
    }).formationNumber
    for (const key of ['energyLimit', 'carriedVolume', 'speedMatch'] as const)
      expectClose(there[key] ?? NaN, here[key] ?? 0, 1e-8, key)
  })

  it('spans the band and the finite estimates of energy and jet', () => {
    expect(formation({})).toMatchObject({ low: 3.6, high: 4.5 })
    const jet = {
      formationNumber: 4.1,
      formationNumberLow: 3.5,
      formationNumberHigh: 4.8,
      circulationBeyondSlug: 0,
      impulseBeyondSlug: 0,
      energyBeyondSlug: 0,
    }
    const numbers = formation({ jet, formationBasis: 'computed' })
    expect(numbers.adopted).toBe(4.1)
    expect(numbers.low).toBe(3.5)
    expect(numbers.high).toBe(4.8)
  })

  it('leaves the stream out of the computed jet, which carries it, and brings axis ratio, profile and contraction in', () => {
    const jet = {
      formationNumber: 2,
      formationNumberLow: 1.9,
      formationNumberHigh: 2.1,
      circulationBeyondSlug: 0,
      impulseBeyondSlug: 0,
      energyBeyondSlug: 0,
    }
    const still = formation({ jet })
    const streaming = formation({ jet, axialFlow: 0.3 * PLAIN.programme.peakSpeed })
    expect(streaming.computed).toBe(2)
    expect(streaming.energyLimit ?? Infinity).toBeLessThan(0.8 * (still.energyLimit ?? NaN))
    // Centre 3.5 of the elliptic band over 4 of the round one; a parabolic profile brings 4 to 1; contraction 0.64^1.5 = 0.512.
    const nozzle = PLAIN.nozzle
    expectClose(formation({ jet, nozzle: { ...nozzle, axisRatio: 2 } }).computed ?? NaN, 2 * (3.5 / 4), 1e-14)
    expectClose(formation({ jet, nozzle: { ...nozzle, exitProfile: 'parabolic' } }).computed ?? NaN, 2 / 4, 1e-14)
    const orifice = { ...nozzle, shape: 'orifice', contraction: 0.64 } as const
    expectClose(formation({ jet, nozzle: orifice }).computed ?? NaN, 2 * 0.512, 1e-14)
  })

  it('says what each estimate is worth, and clips none into the band', () => {
    const { notes, speedMatch } = formation({})
    const of = (estimate: string) => notes.filter((note) => note.estimate === estimate).map((note) => note.text)
    expect(speedMatch).toBeLessThan(3.6)
    expect(of('speedMatch').join(' ')).toContain('outside the published band, 3.60 to 4.50, which')
    expect(of('speedMatch').join(' ')).toContain('1.77 to 2.07')
    expect(of('carriedVolume').join(' ')).toContain('1 % of volume moves it by about 0.2')
    expect(of('energyLimit')).toEqual([])
  })
})

describe('formation number of other programmes', () => {
  it('varies the stroke at fixed peak and ramps', () => {
    // Half sine: E_n over constant speed is (2/3)/(pi/4)^2; sine squared: (5/8)/(3/4)^2.
    const still = Math.sqrt(Math.PI / 2) / 0.33
    const halfSine = formation({ programme: { ...CONSTANT, shape: 'half-sine' } })
    expectClose(halfSine.energyLimit ?? NaN, (still * 2) / 3 / (Math.PI / 4) ** 2, 1e-9)
    const squared = formation({ programme: { ...CONSTANT, shape: 'sine-squared' } })
    expectClose(squared.energyLimit ?? NaN, (still * 5) / 8 / 0.75 ** 2, 1e-9)
  })

  it('a table and the closed shape it is written from agree', () => {
    const programme = { ...CONSTANT, shape: 'linear-ramp' } as const
    const rows = [0, 0.08, 0.16].map((time) => ({ time, speed: (0.5 * time) / 0.16 }))
    const closed = formation({ programme })
    const written = formation({ programme: { ...CONSTANT, shape: 'table', rows } })
    expectClose(written.energyLimit ?? NaN, closed.energyLimit ?? 0, 1e-9)
    expectClose(closed.energyLimit ?? NaN, (Math.sqrt(Math.PI / 2) / 0.33) * 1.125, 1e-9)
  })

  it('a crossing has the limiting energy at its own stroke', () => {
    const trapezoid = { ...CONSTANT, shape: 'trapezoid', riseTime: 0.02, fallTime: 0.09 } as const
    const value = adopted({ programme: trapezoid })
    const there = computePulse(atStrokeRatio(value, { ...PLAIN, programme: trapezoid }))
    expectClose(there.dimensionlessEnergy, 0.33, 1e-8)
  })

  it('leaves out for slow starts what holds for quick ones, and says so', () => {
    const slow = formation({ programme: { ...CONSTANT, shape: 'linear-ramp', stroke: 0.08 } })
    expect(slow.carriedVolume).toBeNull()
    expect(slow.speedMatch).toBeNull()
    expect(slow.energyLimit).not.toBeNull()
    const texts = slow.notes.map((note) => `${note.estimate}: ${note.text}`).join('\n')
    expect(texts).toContain('carriedVolume: The carried volume holds for quick starts only; this start takes 7.6')
    expect(texts).toContain('published: The published band was measured for quick starts from a tube')
  })

  it('a short pulse of a shape that starts slowly at its crossing gets no quick-start estimate either', () => {
    const short = computePulse(atStrokeRatio(0.4, { ...PLAIN, programme: { ...CONSTANT, shape: 'linear-ramp' } }))
    expect(short.quickStart).toBe(true)
    expect(short.formationNumber.speedMatch).toBeNull()
    expect(short.formationNumber.carriedVolume).toBeNull()
  })

  it('puts everything into one ring where the adopted estimate has no value, and says so', () => {
    const programme = { ...CONSTANT, shape: 'linear-ramp', stroke: 0.2 } as const
    const pulse = computePulse({ ...PLAIN, programme, formationBasis: 'speedMatch' })
    expect(pulse.formationNumber.adopted).toBeNull()
    expect(pulse.pinchedOff).toBeNull()
    expect(pulse.ring?.impulse).toBe(pulse.total.impulse)
    expect(pulse.formationNumber.notes.some((note) => note.estimate === 'adopted')).toBe(true)
  })
})

describe('a stream past the nozzle', () => {
  // J6: Zhu, Zhang, Gao & Yu 2023, J. Fluid Mech.: 9.6 at V/U = -0.4 and 1.92 at +0.5 for a tube with 4 at rest.
  it('carries the published centre from 9.6 through 4 to 1.92, falling all the way', () => {
    const at05 = (axialFlow: number) => adopted({ ...PUBLISHED, axialFlow })
    expectClose(at05(-0.2), 9.6, 1e-12)
    expectClose(at05(0), 4, 1e-14)
    expectClose(at05(0.25), 1.92, 1e-12)
    let before = Infinity
    for (let i = 0; i <= 90; i++) {
      const value = at05(0.5 * (-0.4 + i * 0.01))
      expect(value).toBeLessThan(before)
      before = value
    }
  })

  it('moves every estimate and the band', () => {
    const { energyLimit, published, unmodified } = formation({ axialFlow: 0.25 })
    expectClose(energyLimit ?? NaN, (1.92 / 4) * (unmodified.energyLimit ?? NaN), 1e-12)
    expectClose(unmodified.energyLimit ?? NaN, 3.79792, 1e-5)
    expectClose(at(published ?? [NaN], 0), (3.6 * 1.92) / 4, 1e-12)
    // At the counter-flow end the published value is one number, whatever the estimate at rest.
    expectClose(formation({ axialFlow: -0.2 }).energyLimit ?? NaN, 9.6, 1e-12)
    expectClose(formation({ axialFlow: -0.2 }).carriedVolume ?? NaN, 9.6, 1e-12)
  })

  it('is held above +0.5 and says so', () => {
    expectClose(adopted({ ...PUBLISHED, axialFlow: 0.4 }), 1.92, 1e-12)
    expect(formation({ axialFlow: 0.4 }).notes.some((note) => note.text.includes('held at its value for 0.50'))).toBe(
      true,
    )
  })

  it('leaves no ring below -0.4, and says so', () => {
    const pulse = computePulse({ ...PLAIN, axialFlow: -0.2001 })
    const { notes, unmodified, ...numbers } = pulse.formationNumber
    expect(Object.values(numbers).every((value) => value === null)).toBe(true)
    expect(Object.values(unmodified).every((value) => value === null)).toBe(true)
    expect(at(notes, 0).text).toContain('No ring is expected')
    expect(pulse.ring).toBeNull()
    expect(pulse.ringFromSlug).toBeNull()
    expect(pulse.ringWithOverPressure).toBeNull()
    expect(pulse.pinchedOff).toBeNull()
    expect(pulse.unstableWaveNumber).toBeNull()
    expect(pulse.trailingJet).toEqual(pulse.total)
  })
})

describe('nozzles', () => {
  const nozzle = (more: Partial<NozzleInput>) => ({ nozzle: { ...TUBE, ...more } })

  // J10: D. Limbourg & J. Nedic 2021, J. Fluid Mech.: 4 Cc^1.5 on the exit diameter; 2.0 +- 0.3 at tube/orifice ratio 2.
  it('a sharp orifice has 4 times contraction^1.5', () => {
    for (const contraction of [0.61, 0.7, 0.85, 1])
      expectClose(
        adopted({ ...PUBLISHED, ...nozzle({ shape: 'orifice', contraction }) }),
        4 * contraction ** 1.5,
        1e-13,
      )
    const half = adopted({ ...PUBLISHED, ...nozzle({ shape: 'orifice', diameter: 0.02, pistonDiameter: 0.04 }) })
    expectNear(half, 2.0, 0.3)
    // 0.63 + 0.37/64 by the usual fit; recalled, not re-read.
    expectClose(half, 4 * (0.63 + 0.37 / 64) ** 1.5, 1e-13)
  })

  it('a sharp orifice is not corrected twice: the radial ratio stays out of its search', () => {
    const parallel = formation(nozzle({ shape: 'orifice' }))
    const radial = formation(nozzle({ shape: 'orifice', radialRatio: 0.4 }))
    expectClose(radial.energyLimit ?? NaN, parallel.energyLimit ?? 0, 1e-12)
    expect(radial.notes.some((note) => note.text.includes('count it twice'))).toBe(true)
    // A converging nozzle has no contraction: there the integrals carry the radial ratio.
    const converging = formation(nozzle({ shape: 'converging', radialRatio: 0.4 }))
    const share = 2.2 / (Math.sqrt(1.725) * 1.95 ** 1.5)
    expectClose(converging.energyLimit ?? NaN, (share * Math.sqrt(Math.PI / 2)) / 0.33, 1e-9)
  })

  it('an elliptic nozzle of axis ratio 2 to 4 has 3..4 on the equal-area diameter', () => {
    // C. O'Farrell & J. O. Dabiri 2014, J. Fluid Mech. 740:61.
    for (const axisRatio of [2, 3, 4]) {
      const numbers = formation(nozzle({ axisRatio }))
      expect(numbers.published).toEqual([3, 4])
      expect(numbers.energyLimit).toBeGreaterThan(3)
      expect(numbers.energyLimit).toBeLessThan(4)
      expectClose(adopted({ ...PUBLISHED, ...nozzle({ axisRatio }) }), 3.5, 1e-14)
    }
    expect(formation(nozzle({ axisRatio: 6 })).notes.some((note) => note.text.includes('held at that'))).toBe(true)
  })

  it('a parabolic exit profile brings every estimate to about 1, counted once', () => {
    // M. Rosenfeld, E. Rambod & M. Gharib 1998, J. Fluid Mech. 376:297: about 1; recalled, not re-read.
    const numbers = formation(nozzle({ exitProfile: 'parabolic' }))
    expectNear(numbers.energyLimit ?? NaN, 1, 0.2)
    // The shear layer of a parabolic jet sees its axis speed, so the ring must reach the mean speed; own figure.
    expectNear(numbers.speedMatch ?? NaN, 1.2, 0.2)
    expectClose(adopted({ ...PUBLISHED, ...nozzle({ exitProfile: 'parabolic' }) }), 1, 1e-14)
    expect(numbers.published).toEqual([0.9, 1.125])
    // The exact integrals: 3.798 * 2/(sqrt(4/3) 4^1.5).
    expectClose(numbers.energyLimit ?? NaN, (Math.sqrt(Math.PI / 2) / 0.33) * (2 / (Math.sqrt(4 / 3) * 8)), 1e-9)
  })
})
