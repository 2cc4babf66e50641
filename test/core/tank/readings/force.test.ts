import { describe, expect, it } from 'vitest'
import { randomSource } from '../../../../core/base'
import { analyseForce, forceLog, type ForceInput, type ForceLog } from '../../../../core/tank'
import { fourier } from '../../../../core/tank/readings/fourier'
import { expectClose, expectNear } from '../../../support/close'

const PERIOD = 1.25
const DURATION = 0.5
const PULSES = 8
const PEAK = 0.04

/** Half sines of one stroke each: mean over a period = peak x 2/pi x duration / period. */
const MEAN = (PEAK * (2 / Math.PI) * DURATION) / PERIOD

interface Stand {
  readonly zero?: number
  readonly drift?: number
  readonly noise?: number
  readonly rate?: number
  readonly from?: number
  readonly to?: number
  /** Frequency and amplitude of the stand's own ringing. */
  readonly ring?: readonly [number, number]
}

function madeLog({ zero = 0, drift = 0, noise = 0, rate = 1000, from = -2, to = 14, ring = [0, 0] }: Stand): ForceLog {
  const random = randomSource(7)
  const time = Float64Array.from({ length: Math.round((to - from) * rate) + 1 }, (_, i) => from + i / rate)
  const force = time.map((t) => {
    const into = t < 0 || t >= PULSES * PERIOD ? NaN : t % PERIOD
    const jet = into < DURATION ? PEAK * Math.sin((Math.PI * into) / DURATION) : 0
    return jet + zero + drift * t + ring[1] * Math.sin(2 * Math.PI * ring[0] * t) + noise * random.normal()
  })
  return forceLog(time, force)
}

function analysed(stand: Stand, parts: Partial<ForceInput> = {}) {
  const result = analyseForce({
    log: madeLog(stand),
    period: PERIOD,
    pulses: PULSES,
    duration: DURATION,
    standResonance: null,
    predictedMean: null,
    ...parts,
  })
  if (result === null) throw new Error('no result')
  return result
}

describe('the force of a made train', () => {
  it.each([
    ['clean', {}],
    ['at 100 samples a second', { rate: 100 }],
    ['at 50 000 samples a second', { rate: 50_000, noise: 0.002 }],
    ['with zero, drift and noise', { zero: 0.02, drift: -0.0015, noise: 0.002 }],
  ])('is found within 1 %%: %s', (name, stand: Stand) => {
    const { mean, peak, impulse, ripple, zero, periods, errors } = analysed(stand)
    console.info(
      `${name}: mean ${(((mean ?? NaN) / MEAN - 1) * 100).toFixed(3)} %, peak ${((peak / PEAK - 1) * 100).toFixed(2)} %, ripple ${ripple?.toFixed(2)}, zero ${zero.zero.toFixed(5)}, drift ${zero.drift.toFixed(6)}`,
    )
    // 1 % is what is asked of the program.
    expectClose(mean ?? NaN, MEAN, 0.01, 'mean')
    expectClose(impulse, MEAN * PERIOD, 0.01, 'impulse')
    expectClose(peak, PEAK, 0.01, 'peak')
    // Highest and lowest both gain from what noise is left, 1 % of the peak each.
    expectNear(ripple ?? NaN, PEAK / MEAN, (0.02 * PEAK) / MEAN, 'ripple')
    expectNear(zero.zero, stand.zero ?? 0, 3e-4, 'zero')
    expectNear(zero.drift, stand.drift ?? 0, 3e-5, 'drift')
    expect(periods).toBe(PULSES)
    expect(errors.mean ?? NaN).toBeLessThan(0.01 * MEAN)
  })

  it('keeps to whole periods, and says how many the log holds', () => {
    const { periods, mean, notes } = analysed({ from: 0.3, to: 7 })
    expect(periods).toBe(4)
    expectClose(mean ?? NaN, MEAN, 0.01)
    expect(notes.join(' ')).toMatch(/no quiet part.*holds 4 of the 8 periods/)
    expect(
      analyseForce({
        log: madeLog({ from: 0.3, to: 1 }),
        period: PERIOD,
        pulses: 8,
        duration: DURATION,
        standResonance: null,
        predictedMean: null,
      }),
    ).toBeNull()
  })

  it('hands back measured over predicted mean as a loss factor with its error', () => {
    const { lossFactor } = analysed({ noise: 0.002 }, { predictedMean: MEAN / 0.8 })
    expectClose(lossFactor?.value ?? NaN, 0.8, 0.01)
    expect(lossFactor?.standardError ?? NaN).toBeGreaterThan(0)
  })

  it('warns of a resonance of the stand near a harmonic, and of none far from all', () => {
    const near = analysed({}, { standResonance: 5.03 / PERIOD })
    expect(near.resonance).toMatchObject({ from: 'given', nearHarmonic: 5 })
    expect(near.notes.join(' ')).toMatch(/Harmonic 5 of the pulses, 4 Hz, lies within 10 % .*The mean is not touched/)
    expect(analysed({}, { standResonance: 1.5 / PERIOD }).resonance.nearHarmonic).toBeNull()
  })

  it('finds a line that is no harmonic in the spectrum, with its amplitude', () => {
    const { resonance, mean } = analysed({ ring: [23.5, 0.008], noise: 0.001 })
    expect(resonance.from).toBe('spectrum')
    // Lines lie at multiples of one over the record of 10 s.
    expectNear(resonance.frequency ?? NaN, 23.5, 0.1)
    expectClose(resonance.amplitude ?? NaN, 0.008, 0.1)
    expectClose(mean ?? NaN, MEAN, 0.01)
    expect(analysed({ noise: 0.001 }).resonance.frequency).toBeNull()
  })

  it('of one pulse has an impulse, and no mean over whatever the log lasts', () => {
    const { mean, errors, notes, impulse } = analysed({ to: 1.2 }, { period: null, pulses: 1 })
    expect([mean, errors.mean]).toEqual([null, null])
    expectClose(impulse, PEAK * (2 / Math.PI) * DURATION, 0.01)
    expect(notes.join(' ')).toMatch(/One pulse/)
  })

  it('of one pulse with a short flat tail has its offset taken off', () => {
    const stand = { zero: 0.003, noise: 0.002, from: 0, to: 1.2 }
    const { zero, impulse } = analysed(stand, { period: null, pulses: 1 })
    expect(zero.from).toBe('after')
    // 0.2 to 0.7 s of noise at 1000 samples a second: four standard errors of their mean.
    expectNear(zero.zero, 0.003, (4 * 0.002) / Math.sqrt(200))
    expectClose(impulse, PEAK * (2 / Math.PI) * DURATION, 0.06)
  })

  it('of one pulse that is still falling at the end has no offset taken off', () => {
    const time = Array.from({ length: 600 }, (_, i) => i / 1000)
    const log = forceLog(
      time,
      time.map((t) => 0.01 * (0.7 - t)),
    )
    const found = analyseForce({
      log,
      period: null,
      pulses: 1,
      duration: DURATION,
      standResonance: null,
      predictedMean: null,
    })
    expect(found?.zero.from).toBe('none')
  })
})

describe('the transform behind it', () => {
  it('is the sum it stands for', () => {
    const random = randomSource(3)
    const real = Float64Array.from({ length: 32 }, () => random.normal())
    const imaginary = Float64Array.from({ length: 32 }, () => random.normal())
    const wanted = Array.from(real, (_, k) => {
      let [re, im] = [0, 0]
      real.forEach((value, n) => {
        const angle = (-2 * Math.PI * k * n) / 32
        re += value * Math.cos(angle) - (imaginary[n] ?? NaN) * Math.sin(angle)
        im += value * Math.sin(angle) + (imaginary[n] ?? NaN) * Math.cos(angle)
      })
      return [re, im] as const
    })
    fourier(real, imaginary)
    wanted.forEach(([re, im], k) => {
      // 32 terms of order 1: rounding of some 1e-15 each.
      expectNear(real[k] ?? NaN, re, 1e-13)
      expectNear(imaginary[k] ?? NaN, im, 1e-13)
    })
  })
})
