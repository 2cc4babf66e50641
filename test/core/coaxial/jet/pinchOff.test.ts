/**
 * J8: what the starting jet must show. Means over delta / D = 0.08, 0.10, 0.12.
 */
import { beforeAll, describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { startingJetEnsemble, type JetEnsemble } from '../../../../core/coaxial'
import { loadKernel } from '../../../../core/kernel'
import { expectNear } from '../../../support/close'
import { BARE, CIRCULATION, JET, ramped } from './jets'

const LONG = 120_000

async function ensemble(strokeRatio: number, ramp = 0): Promise<JetEnsemble> {
  const kernel = await loadKernel()
  const input = { ...JET, delta: null, ensemble: true, programme: ramped(strokeRatio, ramp) }
  const settings = { ...BARE, wholeStroke: false, followTime: 0 }
  return await startingJetEnsemble({ ...input, settings }, { kernel })
}

describe('a long stroke started at once', () => {
  let six: JetEnsemble
  let eight: JetEnsemble
  let fourteen: JetEnsemble

  beforeAll(async () => {
    six = await ensemble(6)
    eight = await ensemble(8)
    fourteen = await ensemble(14)
  }, LONG)

  it('pinches off at a formation number of 3.6 to 4.5', () => {
    // M. Gharib, E. Rambod & K. Shariff 1998, J. Fluid Mech. 360:121: 3.6 to 4.5.
    for (const jet of [six, eight, fourteen]) {
      expect(jet.formationNumber).toBeGreaterThan(3.6)
      expect(jet.formationNumber).toBeLessThan(4.5)
    }
  })

  it('has one formation number whether the stroke is 6, 8 or 14 diameters long', () => {
    // The same paper: the number does not depend on the stroke. Each mean stands on a sawtooth in delta of about +- 0.4.
    const numbers = [six, eight, fourteen].map((jet) => jet.formationNumber ?? NaN)
    expectNear(Math.max(...numbers), Math.min(...numbers), 0.3)
  })

  it('leaves a ring of dimensionless energy 0.30', () => {
    // K. Mohseni, H. Ran & T. Colonius 2001, J. Fluid Mech. 430:267: about 0.3.
    expectNear(eight.ringDimensionlessEnergy ?? NaN, 0.3, 0.03)
  })

  it('leaves a ring of dimensionless circulation 2.0', () => {
    // The same paper: Gamma / ((I/rho)^(1/3) U_ring^(2/3)) about 2.0.
    expectNear(eight.ringLimitingCirculation ?? NaN, 2, 0.2)
  })

  it('leaves a ring of 2.2 U D', () => {
    // Regression against the design study.
    expectNear((eight.ringCirculation ?? NaN) / CIRCULATION, 2.2, 0.15)
  })

  it('tells a range about the mean, one member a smoothing length', () => {
    expect(eight.byDelta.map(({ delta }) => delta)).toEqual([0.08, 0.1, 0.12])
    const numbers = eight.byDelta.map(({ formationNumber }) => formationNumber ?? NaN)
    expect(eight.formationNumberLow).toBe(Math.min(...numbers))
    expect(eight.formationNumberHigh).toBe(Math.max(...numbers))
    expect(eight.shown.delta).toBe(0.1)
    expect(eight.trailingJet).toBe(true)
  })

  it('sees pinch-off after the instant at which the total circulation equalled the ring', () => {
    for (const run of eight.runs) {
      expect(run.pinchOff?.time ?? NaN).toBeGreaterThan(run.formationInstant ?? NaN)
      const { history } = run
      const cut = history.ringCirculation.findIndex((value) => value !== null)
      expect(cut).toBeGreaterThan(10)
      expect(history.ringX.slice(0, cut).every((value) => value === null)).toBe(true)
      expect(at(history.cutX, history.cutX.length - 1)).not.toBeNull()
    }
  })
})

describe('slower starts', () => {
  // Regression against the design study: 4.1, 4.4, 4.8 for ramps over 1, 2, 4 formation times, each +- 0.3.
  const STARTS = [
    { ramp: 1, number: 4.1 },
    { ramp: 2, number: 4.4 },
    { ramp: 4, number: 4.8 },
  ] as const
  const jets: JetEnsemble[] = []

  beforeAll(async () => {
    for (const { ramp } of STARTS) jets.push(await ensemble(8, ramp))
  }, LONG)

  it.each(STARTS.map((start, k) => ({ ...start, k })))(
    'a ramp over $ramp formation times pinches off at $number',
    ({ k, number }) => expectNear(at(jets, k).formationNumber ?? NaN, number, 0.3),
  )

  it('pinch off the later the slower they are, in formation number and in time', () => {
    for (const read of [(jet: JetEnsemble) => jet.formationNumber, (jet: JetEnsemble) => jet.pinchOffTime]) {
      const values = jets.map((jet) => read(jet) ?? NaN)
      expect(values).toEqual([...values].sort((a, b) => a - b))
      expect(new Set(values).size).toBe(3)
    }
  })
})
